import { countOf, type LineError, readNumber, type TouchstoneLine } from "./_touchstone_lines.ts";
import type { MatrixFormat, TwoPortOrder } from "./_touchstone_header.ts";
import type { OptionLine } from "./_touchstone_options.ts";
import type { NetworkNoisePoint } from "./touchstone_network.ts";

/** How the data of a file are laid out. */
export interface DataLayout {
  readonly ports: 1 | 2;
  readonly order: TwoPortOrder;
  readonly matrix: MatrixFormat;
  readonly options: OptionLine;
  /** Whether noise parameters may follow the network data without a keyword, as in the first version. */
  readonly noiseFollows: boolean;
  /** What S is not: in the first version the others are divided by the reference resistance. */
  readonly normalised: boolean;
}

/** Frequencies [Hz] and values, one after the other, full matrices row-major. */
export interface DataBlock {
  readonly frequencies: number[];
  readonly lines: number[];
  readonly re: number[];
  readonly im: number[];
  /** Index of the line where the data end: at noise parameters, or after the last line. */
  readonly next: number;
}

const NOISE_WORDS = 5;

/** Where each written entry of a two-port matrix goes, row-major: 0 is 11, 1 is 12, 2 is 21, 3 is 22. */
const TWO_PORT_PLACES = {
  full: { "12_21": [[0], [1], [2], [3]], "21_12": [[0], [2], [1], [3]] },
  lower: { "12_21": [[0], [1, 2], [3]], "21_12": [[0], [1, 2], [3]] },
  upper: { "12_21": [[0], [1, 2], [3]], "21_12": [[0], [1, 2], [3]] },
} as const;

/** The data of one frequency, which may go on over several lines. */
interface DataSet {
  readonly line: number;
  readonly words: { readonly word: string; readonly line: number }[];
}

/** Reads network data. `lines` holds data lines only. */
export function readNetworkData(
  lines: readonly TouchstoneLine[],
  layout: DataLayout,
  fail: LineError,
): DataBlock {
  const { ports, options } = layout;
  const places: readonly (readonly number[])[] = ports === 1
    ? [[0]]
    : TWO_PORT_PLACES[layout.matrix][layout.order];
  const size = 1 + 2 * places.length;
  const block = { frequencies: [], lines: [], re: [], im: [] } as Omit<DataBlock, "next">;
  let next = 0;
  while (next < lines.length) {
    const first = lines[next]!;
    const frequency = readNumber(first.words[0], {
      line: first.number,
      what: "a frequency",
      fail,
    }) * options.frequencyUnit;
    const previous = block.frequencies.at(-1);
    if (previous !== undefined && !(frequency > previous)) {
      const isNoise = layout.noiseFollows && first.words.length === NOISE_WORDS;
      if (isNoise) return { ...block, next };
      throw fail(
        first.number,
        `a frequency above that of line ${block.lines.at(-1)}`,
        `"${first.words[0]}"`,
      );
    }
    if (!(frequency >= 0)) throw fail(first.number, "a frequency >= 0", `"${first.words[0]}"`);
    const { set, after } = gather(lines, next, { size, ports, fail });
    next = after;
    block.frequencies.push(frequency);
    block.lines.push(set.line);
    const re = new Array<number>(ports * ports).fill(0);
    const im = new Array<number>(ports * ports).fill(0);
    for (const [k, targets] of places.entries()) {
      const value = readPair(set, 1 + 2 * k, { format: options.format, fail });
      for (const target of targets) {
        const factor = layout.normalised ? unitFactor(options, target) : 1;
        re[target] = value.re * factor;
        im[target] = value.im * factor;
      }
    }
    block.re.push(...re);
    block.im.push(...im);
  }
  return { ...block, next };
}

/** Joins lines until a frequency's values are complete. A frequency begins on a new line. */
function gather(
  lines: readonly TouchstoneLine[],
  start: number,
  { size, ports, fail }: { size: number; ports: number; fail: LineError },
): { set: DataSet; after: number } {
  const first = lines[start]!;
  const set: DataSet = { line: first.number, words: [] };
  const wanted = `${size} values for one frequency of ${countOf(ports, "port")}`;
  for (let k = start; k < lines.length; k++) {
    const { number, words } = lines[k]!;
    const begun = set.words.length;
    // Whole pairs go on a further line: an odd number of values begins a frequency.
    if (begun > 0 && (words.length % 2 === 1 || begun + words.length > size)) break;
    set.words.push(...words.map((word) => ({ word, line: number })));
    if (set.words.length === size) return { set, after: k + 1 };
    if (set.words.length > size) break;
  }
  throw fail(first.number, wanted, countOf(set.words.length, "value"));
}

function readPair(
  { words }: DataSet,
  at: number,
  { format, fail }: { format: OptionLine["format"]; fail: LineError },
): { re: number; im: number } {
  const number = (k: number, what: string) =>
    readNumber(words[k]?.word, { line: words[k]?.line ?? 0, what, fail });
  if (format === "RI") {
    return { re: number(at, "a real part"), im: number(at + 1, "an imaginary part") };
  }
  const size = number(at, format === "MA" ? "a magnitude" : "a magnitude in dB");
  if (format === "MA" && !(size >= 0)) {
    throw fail(words[at]?.line ?? 0, "a magnitude >= 0", `"${words[at]?.word}"`);
  }
  const degrees = number(at + 1, "an angle in degrees");
  return polar(format === "MA" ? size : 10 ** (size / 20), degrees);
}

function polar(magnitude: number, degrees: number): { re: number; im: number } {
  const angle = degrees * Math.PI / 180;
  return { re: magnitude * Math.cos(angle), im: magnitude * Math.sin(angle) };
}

/**
 * What the first version divides each entry by: ohm for Z, siemens for Y, and the unit of each entry of a
 * hybrid matrix; `place` is row-major, 0 for a one-port.
 */
export function unitFactor(
  { parameter, referenceResistance }: Pick<OptionLine, "parameter" | "referenceResistance">,
  place: number,
): number {
  switch (parameter) {
    case "S":
      return 1;
    case "Z":
      return referenceResistance;
    case "Y":
      return 1 / referenceResistance;
    case "H":
      return place === 0 ? referenceResistance : place === 3 ? 1 / referenceResistance : 1;
    case "G":
      return place === 0 ? 1 / referenceResistance : place === 3 ? referenceResistance : 1;
  }
}

/** Reads lines of five noise parameters. */
export function readNoise(
  lines: readonly TouchstoneLine[],
  layout: DataLayout,
  fail: LineError,
): NetworkNoisePoint[] {
  const points: NetworkNoisePoint[] = [];
  let previous: TouchstoneLine | undefined;
  for (const line of lines) {
    const { number, words } = line;
    if (words.length !== NOISE_WORDS) {
      throw fail(number, `${NOISE_WORDS} noise parameters`, countOf(words.length, "value"));
    }
    const value = (k: number, what: string) => readNumber(words[k], { line: number, what, fail });
    const frequency = value(0, "a frequency") * layout.options.frequencyUnit;
    const last = points.at(-1);
    if (!(frequency >= 0)) throw fail(number, "a frequency >= 0", `"${words[0]}"`);
    if (last && !(frequency > last.frequency)) {
      throw fail(number, `a frequency above that of line ${previous?.number}`, `"${words[0]}"`);
    }
    const size = value(2, "the magnitude of a reflection");
    if (!(size >= 0)) throw fail(number, "a magnitude >= 0", `"${words[2]}"`);
    const resistance = value(4, "a noise resistance");
    points.push({
      frequency,
      minimumNoiseFigureDb: value(1, "a minimum noise figure in dB"),
      sourceReflection: polar(size, value(3, "an angle in degrees")),
      noiseResistance: resistance *
        (layout.normalised ? layout.options.referenceResistance : 1),
    });
    previous = line;
  }
  return points;
}
