import { texToMathML } from "../kernel/show/formula.ts";
import { type Markup, markup } from "../kernel/show/markup.ts";
import { PAYLOAD_MIME } from "../kernel/show/payload.ts";
import { PROGRESS_MIME } from "../kernel/show/progress.ts";
import { cleanMarkup, type CleanMarkupOptions } from "./page_markup.ts";
import { markdownMarkup } from "./page_markdown.ts";
import type { CellOutput } from "./report_data.ts";

/** Images that a browser decodes without running anything. */
const IMAGES = ["image/png", "image/jpeg", "image/gif", "image/webp"] as const;
// The escape character is what this looks for.
// deno-lint-ignore no-control-regex
const TERMINAL_CODES = /\x1b\[[0-9;]*[A-Za-z]/g;

/** One output of a cell; progress lines and sheet declarations, which the page shows elsewhere, are left out. */
export function outputMarkup(output: CellOutput, options: CleanMarkupOptions): Markup | undefined {
  if (output.type === "stream") {
    const name = output.name === "stderr" ? "Warnings of the cell" : "Printed by the cell";
    return markup`<pre class="stream ${output.name}" aria-label="${name}">${
      plain(output.text)
    }</pre>`;
  }
  if (output.type === "error") {
    const place = output.line === undefined ? "" : ` (line ${output.line} of the cell)`;
    return markup`
      <p class="error"><strong>\u2717 ${output.name}${place}:</strong> ${
      plain(output.message)
    }</p>`;
  }
  const { data } = output;
  if (PROGRESS_MIME in data || isSheet(data[PAYLOAD_MIME])) return undefined;
  return displayMarkup(data, options);
}

function isSheet(payload: unknown): boolean {
  const value = typeof payload === "string" ? JSON.parse(payload) as unknown : payload;
  return typeof value === "object" && value !== null && "kind" in value && value.kind === "sheet";
}

/** The richest form that can be shown without scripts. */
function displayMarkup(
  data: Readonly<Record<string, unknown>>,
  options: CleanMarkupOptions,
): Markup | undefined {
  const text = (mime: string) => mime in data ? joined(data[mime]) : undefined;
  const rich = text("text/html") ?? text("image/svg+xml");
  if (rich !== undefined) return richMarkup(rich, { ...options, fallback: text("text/plain") });
  const image = IMAGES.find((mime) => mime in data);
  if (image !== undefined) {
    const source = `data:${image};base64,${text(image)!.replace(/\s+/g, "")}`;
    return markup`<p><img src="${source}" alt="${text("text/plain") ?? "image"}"></p>`;
  }
  const latex = text("text/latex");
  if (latex !== undefined) return latexMarkup(latex);
  const prose = text("text/markdown");
  if (prose !== undefined) return markup`<div>${markdownMarkup(prose, options)}</div>`;
  const words = text("text/plain");
  return words === undefined ? undefined : markup`<pre>${plain(words)}</pre>`;
}

function richMarkup(
  text: string,
  { fallback, ...options }: CleanMarkupOptions & { readonly fallback: string | undefined },
): Markup {
  const { markup: cleaned, removed } = cleanMarkup(text, options);
  const empty = cleaned.text.replace(/<[^>]*>/g, "").trim() === "" &&
    !/<(?:svg|img)\b/.test(cleaned.text);
  const note = removed.length > 0 &&
    markup`<p class="note">Left out of the report: ${removed.join(", ")}.</p>`;
  // What only a script would have drawn is still there in words.
  if (empty && fallback !== undefined) return markup`<pre>${plain(fallback)}</pre>${note}`;
  return markup`${cleaned}${note}`;
}

function latexMarkup(latex: string): Markup {
  const tex = latex.trim().replace(/^\$\$?|\$\$?$/g, "");
  try {
    return markup`<div class="formula">${texToMathML(tex, { display: true })}</div>`;
  } catch {
    return markup`<pre>${latex}</pre>`;
  }
}

/** nbformat allows a text to be split into lines. */
function joined(value: unknown): string {
  return Array.isArray(value) ? value.join("") : String(value);
}

function plain(text: string): string {
  return text.replace(TERMINAL_CODES, "").trimEnd();
}
