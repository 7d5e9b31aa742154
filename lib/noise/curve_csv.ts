/**
 * Measured or simulated phase-noise curves as text.
 *
 * @module
 */
import { parseQuantity } from "../quantity/parse_quantity.ts";
import type { CurvePoint, PhaseNoiseCurve } from "./piecewise.ts";

/** Options of {@linkcode readCurve}. */
export interface ReadCurveOptions {
  /**
   * What the text is called in messages, such as its file's name.
   * @default "curve"
   */
  readonly name?: string;
  /**
   * Carrier f0, which offsets must stay below [Hz].
   * @default none
   */
  readonly frequency?: number;
}

/** A positive number below this in a column of dBc/Hz is a linear density: 0.1/Hz is -10 dBc/Hz. */
const LOOKS_LINEAR = 0.1;
/** A number at or below this in a column of linear densities is a level in dBc/Hz. */
const LOOKS_DECIBEL = -1;

const NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d{1,3})?$/;
const HEADER = /^([A-Za-z][^()[\]]*?)\s*(?:[([]\s*([^()[\]]+?)\s*[)\]])?$/;

/** What the columns hold. */
interface Columns {
  /** Hz in the unit of the first column. */
  readonly scale: number;
  readonly levels: "dBc/Hz" | "1/Hz";
}

interface Row {
  readonly cells: readonly string[];
  /** 1-based. */
  readonly line: number;
}

/**
 * Reads a phase-noise curve from comma-separated text: an offset and a level on each line.
 *
 * Columns may also be separated by semicolons or tabs. A first line may name them with their units, as in
 * `offset [kHz], phase noise [dBc/Hz]` or `offset (Hz); L (1/Hz)`; without it they are Hz and dBc/Hz. Lines
 * that are empty or begin with `#` are left out. Levels are L, half the one-sided spectral density of phase
 * (IEEE Std 1139).
 *
 * @returns points with rising offsets, levels in dBc/Hz
 * @throws {SyntaxError} for text that is no such table, with the line
 * @throws {RangeError} for offsets that do not rise, repeat, or reach the carrier, and for levels of the
 *   wrong kind, with the line
 */
export function readCurve(
  text: string,
  { name = "curve", frequency = Infinity }: ReadCurveOptions = {},
): PhaseNoiseCurve {
  const rows = rowsOf(text, name);
  const [first] = rows;
  const columns = first ? columnsOf(first, name) : undefined;
  const data = columns ? rows.slice(1) : rows;
  const points: CurvePoint[] = [];
  const lines: number[] = [];
  for (const row of data) {
    const point = pointOf(row, columns ?? { scale: 1, levels: "dBc/Hz" }, name);
    const previous = points.at(-1);
    const place = `${name}:${row.line}`;
    if (!(point.offset < frequency)) {
      throw new RangeError(
        `${place}: offset must be below the carrier's ${frequency} Hz, got ${point.offset} Hz`,
      );
    }
    const same = points.findIndex(({ offset }) => offset === point.offset);
    if (same >= 0) {
      throw new RangeError(`${place}: offset ${point.offset} Hz is already on line ${lines[same]}`);
    }
    if (previous && !(point.offset > previous.offset)) {
      throw new RangeError(
        `${place}: offsets must rise, got ${point.offset} Hz after ${previous.offset} Hz`,
      );
    }
    points.push(point);
    lines.push(row.line);
  }
  if (points.length < 2) {
    throw new SyntaxError(
      `${name}: a curve must have at least 2 lines of offset and level, got ${points.length}`,
    );
  }
  return points;
}

function rowsOf(text: string, name: string): Row[] {
  const lines = text.replace(/^\uFEFF/, "").split(/\r\n|\n|\r/);
  const rows = lines
    .map((content, index) => ({ content: content.trim(), line: index + 1 }))
    .filter(({ content }) => content !== "" && !content.startsWith("#"));
  const separator = [";", "\t", ","].find((each) => rows[0]?.content.includes(each));
  return rows.map(({ content, line }) => {
    const cells = separator === undefined ? [content] : content.split(separator);
    if (cells.length !== 2) {
      const hint = separator === "," && cells.length > 2
        ? "; the decimal mark must be a point"
        : "";
      throw new SyntaxError(
        `${name}:${line}: expected 2 columns, offset and level, separated by a comma, semicolon or ` +
          `tab, got ${cells.length}${hint}`,
      );
    }
    return { cells: cells.map((cell) => cell.trim()), line };
  });
}

/** What a line of names says of the columns; undefined when the line holds numbers. */
function columnsOf({ cells, line }: Row, name: string): Columns | undefined {
  const [first = "", second = ""] = cells;
  if (!/^[A-Za-z]/.test(first)) return undefined;
  const offset = HEADER.exec(first);
  const level = HEADER.exec(second);
  if (!offset || !/offset|frequency|^f$/i.test(offset[1] ?? "")) {
    throw new SyntaxError(
      `${name}:${line}: the first column must be the offset, as in "offset [Hz]", got ` +
        JSON.stringify(first),
    );
  }
  if (!level) {
    throw new SyntaxError(
      `${name}:${line}: the second column must be the level, as in "phase noise [dBc/Hz]", got ` +
        JSON.stringify(second),
    );
  }
  const levels = (level[2] ?? "dBc/Hz").replace(/\s/g, "");
  if (levels !== "dBc/Hz" && levels !== "1/Hz") {
    throw new SyntaxError(
      `${name}:${line}: the level must be in dBc/Hz or 1/Hz, got ${JSON.stringify(level[2])}`,
    );
  }
  return { scale: scaleOf(offset[2] ?? "Hz", `${name}:${line}`), levels };
}

function scaleOf(unit: string, place: string): number {
  try {
    return parseQuantity(`1 ${unit}`, "Hz");
  } catch {
    throw new SyntaxError(
      `${place}: the offset must be in Hz, kHz, MHz or GHz, got ${JSON.stringify(unit)}`,
    );
  }
}

function pointOf({ cells, line }: Row, { scale, levels }: Columns, name: string): CurvePoint {
  const place = `${name}:${line}`;
  const offset = numberOf(cells[0] ?? "", "offset", place) * scale;
  const value = numberOf(cells[1] ?? "", "level", place);
  if (!(offset > 0 && offset < Infinity)) {
    throw new RangeError(`${place}: offset must be > 0 Hz and finite, got ${offset} Hz`);
  }
  if (!Number.isFinite(value)) {
    throw new RangeError(`${place}: level must be finite, got ${cells[1]}`);
  }
  if (levels === "dBc/Hz") {
    if (value > 0 && value < LOOKS_LINEAR) {
      throw new RangeError(
        `${place}: level must be in dBc/Hz, but ${cells[1]} looks like a linear density in 1/Hz; ` +
          'give all levels in one kind, and name linear ones by a first line "offset [Hz], L [1/Hz]"',
      );
    }
    return { offset, level: value };
  }
  if (!(value > 0)) {
    throw new RangeError(
      value <= LOOKS_DECIBEL
        ? `${place}: density must be in 1/Hz, but ${
          cells[1]
        } looks like a level in dBc/Hz; give all ` +
          "levels in one kind"
        : `${place}: density must be > 0 1/Hz, got ${cells[1]} 1/Hz`,
    );
  }
  return { offset, level: 10 * Math.log10(value) };
}

function numberOf(cell: string, what: string, place: string): number {
  const text = cell.replace(/^\u2212/, "-");
  if (!NUMBER.test(text)) {
    const hint = /^[+-]?\d+,\d+$/.test(text) ? "; the decimal mark must be a point" : "";
    throw new SyntaxError(
      `${place}: ${what} must be a number, got ${JSON.stringify(cell)}${hint}`,
    );
  }
  return Number(text);
}
