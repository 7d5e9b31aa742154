import { countOf, type LineError, readNumber, type TouchstoneLine } from "./_touchstone_lines.ts";

/** The order in which a version 2 file writes a two-port matrix; the first version has "21_12". */
export type TwoPortOrder = "12_21" | "21_12";

/** Which entries of the matrix a file writes. */
export type MatrixFormat = "full" | "lower" | "upper";

/** What the keywords of a version 2 file say, up to the data. */
export interface TouchstoneHeader {
  readonly ports: 1 | 2;
  readonly order: TwoPortOrder;
  readonly matrix: MatrixFormat;
  readonly frequencies: number;
  readonly noiseFrequencies: number;
  /** Per port [ohm]; none when the option line's holds. */
  readonly references: readonly number[] | undefined;
}

const HEADER_KEYWORDS = [
  "number of ports",
  "two-port data order",
  "number of frequencies",
  "number of noise frequencies",
  "reference",
  "matrix format",
] as const;

type HeaderKeyword = (typeof HEADER_KEYWORDS)[number];

const ORDERS: readonly TwoPortOrder[] = ["12_21", "21_12"];
const MATRICES: readonly MatrixFormat[] = ["full", "lower", "upper"];

/** A keyword with its arguments, which may go on over further lines. */
interface Entry {
  readonly line: number;
  readonly words: string[];
}

/**
 * Reads the keyword lines before [Network Data].
 *
 * @param lines from the line after [Version] on, option lines and information blocks left out
 * @returns the header and the index of the line after [Network Data]
 */
export function readHeader(
  lines: readonly TouchstoneLine[],
  { lastLine, fail }: { lastLine: number; fail: LineError },
): { header: TouchstoneHeader; next: number } {
  const entries = new Map<HeaderKeyword, Entry>();
  let latest: { keyword: HeaderKeyword; entry: Entry } | undefined;
  for (const [index, line] of lines.entries()) {
    if (line.kind === "data") {
      // Only the reference resistances may go on over further lines.
      if (latest?.keyword !== "reference") {
        throw fail(line.number, "a keyword before the data, or [Network Data]", quoted(line));
      }
      latest.entry.words.push(...line.words);
      continue;
    }
    if (line.keyword === "network data") {
      return { header: assemble(entries, line.number, fail), next: index + 1 };
    }
    if (line.keyword === "mixed-mode order") {
      throw fail(
        line.number,
        "single-ended ports (mixed-mode data are not read; write the file single-ended)",
        "[Mixed-Mode Order]",
      );
    }
    const keyword = HEADER_KEYWORDS.find((each) => each === line.keyword);
    if (keyword === undefined) {
      throw fail(
        line.number,
        `one of ${HEADER_KEYWORDS.map(bracketed).join(", ")}, [Network Data]`,
        `[${line.keyword}]`,
      );
    }
    const before = entries.get(keyword);
    if (before) {
      throw fail(line.number, `${bracketed(keyword)} once`, `it again after line ${before.line}`);
    }
    const entry = { line: line.number, words: [...line.words] };
    entries.set(keyword, entry);
    latest = { keyword, entry };
  }
  throw fail(lastLine, "[Network Data]", "the end of the file");
}

function assemble(
  entries: ReadonlyMap<HeaderKeyword, Entry>,
  dataLine: number,
  fail: LineError,
): TouchstoneHeader {
  const need = (keyword: HeaderKeyword): Entry => {
    const entry = entries.get(keyword);
    if (entry) return entry;
    throw fail(dataLine, `${bracketed(keyword)} before [Network Data]`, "none");
  };
  const portsEntry = need("number of ports");
  const ports = readCount(portsEntry, "number of ports", { least: 1, fail });
  if (ports !== 1 && ports !== 2) {
    throw fail(portsEntry.line, "[Number of Ports] 1 or 2", `${ports}`);
  }
  const orderEntry = entries.get("two-port data order");
  let order: TwoPortOrder = "12_21";
  if (ports === 2) {
    order = readWord(need("two-port data order"), "two-port data order", { words: ORDERS, fail });
  } else if (orderEntry) {
    throw fail(orderEntry.line, "no [Two-Port Data Order] with one port", "one");
  }
  const matrixEntry = entries.get("matrix format");
  const referenceEntry = entries.get("reference");
  const noiseEntry = entries.get("number of noise frequencies");
  return {
    ports,
    order,
    matrix: matrixEntry
      ? readWord(matrixEntry, "matrix format", { words: MATRICES, fail })
      : "full",
    frequencies: readCount(need("number of frequencies"), "number of frequencies", {
      least: 1,
      fail,
    }),
    noiseFrequencies: noiseEntry
      ? readCount(noiseEntry, "number of noise frequencies", { least: 1, fail })
      : 0,
    references: referenceEntry ? readReferences(referenceEntry, ports, fail) : undefined,
  };
}

function readCount(
  { line, words }: Entry,
  keyword: HeaderKeyword,
  { least, fail }: { least: number; fail: LineError },
): number {
  const what = `${bracketed(keyword)} and a whole number >= ${least}`;
  const value = readNumber(words[0], { line, what, fail });
  if (words.length === 1 && Number.isInteger(value) && value >= least) return value;
  throw fail(line, what, `"${words.join(" ")}"`);
}

function readWord<T extends string>(
  { line, words }: Entry,
  keyword: HeaderKeyword,
  { words: known, fail }: { words: readonly T[]; fail: LineError },
): T {
  const found = known.find((each) => each === words.join(" ").toLowerCase());
  if (found !== undefined) return found;
  throw fail(line, `${bracketed(keyword)} ${known.join(" or ")}`, `"${words.join(" ")}"`);
}

function readReferences({ line, words }: Entry, ports: number, fail: LineError): number[] {
  const what = `[Reference] and ${countOf(ports, "resistance")} > 0 ohm`;
  if (words.length !== ports) throw fail(line, what, countOf(words.length, "value"));
  return words.map((word) => {
    const value = readNumber(word, { line, what, fail });
    if (value > 0) return value;
    throw fail(line, what, `${value}`);
  });
}

/** As the specification spells it. */
function bracketed(keyword: HeaderKeyword): string {
  const words = keyword.split(" ").map((word) =>
    word === "of" ? word : word.replace(/(^|-)[a-z]/g, (letter) => letter.toUpperCase())
  );
  return `[${words.join(" ")}]`;
}

function quoted({ words }: TouchstoneLine): string {
  return `"${words.join(" ")}"`;
}
