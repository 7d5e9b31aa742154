/** A line of a Touchstone file that is not blank or comment only. */
export interface TouchstoneLine {
  /** From 1. */
  readonly number: number;
  readonly kind: "option" | "keyword" | "data";
  /** In lower case with single spaces, of a keyword line: `number of ports`. */
  readonly keyword: string;
  /** What follows the `#` or the keyword, or the whole line, cut at white space. */
  readonly words: readonly string[];
}

/** Makes an error that names the file and the line. */
export type LineError = (line: number, expected: string, found: string) => SyntaxError;

const COMMENT = "!";

/** Every line that says something. Comments may hold any character, the rest ASCII only. */
export function touchstoneLines(text: string, fail: LineError): TouchstoneLine[] {
  const lines: TouchstoneLine[] = [];
  for (const [index, raw] of text.replace(/^\uFEFF/, "").split(/\r\n|\n|\r/).entries()) {
    const number = index + 1;
    const content = (raw.split(COMMENT, 1)[0] ?? "").trim();
    if (content === "") continue;
    const odd = /[^\x20-\x7e\t]/.exec(content);
    if (odd) throw fail(number, "ASCII characters outside comments", `"${odd[0]}"`);
    if (content.startsWith("#")) {
      lines.push({ number, kind: "option", keyword: "", words: cut(content.slice(1)) });
    } else if (content.startsWith("[")) {
      const end = content.indexOf("]");
      if (end < 0) throw fail(number, "a keyword closed by ]", `"${content}"`);
      const keyword = cut(content.slice(1, end)).join(" ").toLowerCase();
      lines.push({ number, kind: "keyword", keyword, words: cut(content.slice(end + 1)) });
    } else {
      lines.push({ number, kind: "data", keyword: "", words: cut(content) });
    }
  }
  return lines;
}

function cut(text: string): string[] {
  return text.split(/[ \t]+/).filter((word) => word !== "");
}

const NUMBER = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i;

/** A finite number, or the error that says what was expected in its place. */
export function readNumber(
  word: string | undefined,
  { line, what, fail }: { line: number; what: string; fail: LineError },
): number {
  const value = word !== undefined && NUMBER.test(word) ? Number(word) : NaN;
  if (Number.isFinite(value)) return value;
  throw fail(line, what, word === undefined ? "nothing" : `"${word}"`);
}

/** "1 value", "3 values". */
export function countOf(count: number, noun: string): string {
  return `${count} ${noun}${count === 1 ? "" : "s"}`;
}
