const ESCAPES: Readonly<Record<string, string>> = {
  "&": "&amp;",
  "<": "&lt;",
  ">": "&gt;",
  '"': "&quot;",
  "'": "&#39;",
};

/** Text made safe for HTML, in content and in quoted attributes. */
export function escapeText(text: string): string {
  return text.replace(/[&<>"']/g, (character) => ESCAPES[character]!);
}

/** Text that is markup already; {@linkcode markup} puts in anything else escaped. */
export class Markup {
  /** Takes markup as it is. @param text trusted markup, never text that a person typed */
  constructor(readonly text: string) {}

  toString(): string {
    return this.text;
  }
}

/** What {@linkcode markup} takes between its pieces; `null`, `undefined` and `false` leave nothing. */
export type MarkupPart =
  | Markup
  | string
  | number
  | null
  | undefined
  | false
  | readonly MarkupPart[];

/**
 * Template tag that escapes every value unless it is {@linkcode Markup}; arrays are joined. Line breaks of the
 * template itself, with the indentation after them, are dropped.
 *
 * @example
 * ```ts
 * import { markup } from "./markup.ts";
 * if (markup`<b>${"a < b"}</b>`.text !== "<b>a &lt; b</b>") throw new Error("not escaped");
 * ```
 */
export function markup(pieces: TemplateStringsArray, ...parts: readonly MarkupPart[]): Markup {
  const [first, ...rest] = pieces.map((piece) => piece.replace(/\n\s*/g, ""));
  let text = first!;
  parts.forEach((part, i) => text += written(part) + rest[i]!);
  return new Markup(text);
}

function written(part: MarkupPart): string {
  if (part === null || part === undefined || part === false) return "";
  if (part instanceof Markup) return part.text;
  if (typeof part === "string" || typeof part === "number") return escapeText(String(part));
  return part.map(written).join("");
}

/** Marks text as markup: only for what this house made or {@linkcode escapeText} has seen. */
export function raw(text: string): Markup {
  return new Markup(text);
}
