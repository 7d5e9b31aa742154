import { parseQuantity } from "../quantity/parse_quantity.ts";
import { gridAxis, gridPlaces, type TableRow } from "./_transistor_table_grid.ts";
import type { TransistorTableData } from "./transistor_table_data.ts";

/** Columns a table may have with their units. */
const COLUMNS: Readonly<Record<string, string>> = {
  vgs: "V",
  vds: "V",
  vbs: "V",
  id: "A",
  gm: "S",
  gds: "S",
  gmb: "S",
  qd: "C",
  qg: "C",
  qs: "C",
  qb: "C",
};
const NEEDED = ["vgs", "vds", "id"] as const;

/** Fewest voltages of gate and drain for a cubic. */
const FEWEST = 4;

/** Part of the largest gate charge by which the four charges of a row may miss zero. */
const CHARGE_BALANCE = 0.01;

const NUMBER = /^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?$/;
const HEADING = /^([a-z]+)\s*(?:[[(]\s*([^\])]*?)\s*[\])])?$/i;

/** A fault in the text of a table, with its place. */
export class TransistorTableError extends SyntaxError {
  /** From 1. */
  readonly line: number;
  /** First character of the field, from 1. */
  readonly column: number;

  /** @param found what is wrong, as what was expected and what is there */
  constructor(found: string, { line, column }: { line: number; column: number }) {
    super(`Cannot read the transistor table: line ${line}, column ${column}: ${found}`);
    this.name = "TransistorTableError";
    this.line = line;
    this.column = column;
  }
}

interface Field {
  readonly text: string;
  readonly line: number;
  readonly column: number;
}

/**
 * Reads a transistor's characterization from comma-separated text.
 *
 * The first line names the columns, each with its unit in brackets, `id [uA]`; without one it is SI:
 * `vgs`, `vds`, `id`, and where known `vbs`, `gm`, `gds`, `gmb` and the terminal charges `qd`, `qg`, `qs`
 * and `qb`. The rows may come in any order but must fill a grid of voltages. Semicolon or tab may stand for
 * the comma; lines that begin with `#` and empty lines are skipped.
 *
 * @param text the file
 * @throws {TransistorTableError} for text that cannot be read, with line and column
 * @throws {RangeError} when the rows do not fill a grid, with the lines or the missing points
 */
export function parseTransistorTable(text: string): TransistorTableData {
  const lines = text.replace(/^\uFEFF/, "").split(/\r?\n/)
    .map((content, i) => ({ content, line: i + 1 }))
    .filter(({ content }) => content.trim() !== "" && !content.trimStart().startsWith("#"));
  const [head, ...body] = lines;
  if (head === undefined) {
    throw new TransistorTableError("expected a line of column names, got an empty file", {
      line: 1,
      column: 1,
    });
  }
  const separator = ["\t", ";"].find((candidate) => head.content.includes(candidate)) ?? ",";
  const columns = readHead(fieldsOf(head, separator));
  if (body.length === 0) {
    throw new TransistorTableError("expected rows of numbers after it, got none", {
      line: head.line,
      column: 1,
    });
  }
  const rows = body.map((row): TableRow => {
    const fields = fieldsOf(row, separator);
    if (fields.length !== columns.length) {
      const { column } = fields[Math.min(fields.length, columns.length) - 1]!;
      throw new TransistorTableError(
        `expected ${columns.length} fields as in the first line, got ${fields.length}`,
        { line: row.line, column },
      );
    }
    return {
      line: row.line,
      values: fields.map((field, i) => readNumber(field, columns[i]!.name) * columns[i]!.scale),
    };
  });
  return onGrid(rows, columns.map(({ name }) => name));
}

function onGrid(given: readonly TableRow[], names: readonly string[]): TransistorTableData {
  const column = (name: string) => names.indexOf(name);
  // A table without body voltage stands at zero.
  const rows = column("vbs") >= 0
    ? given
    : given.map(({ line, values }) => ({ line, values: [...values, 0] }));
  const bulkColumn = column("vbs") >= 0 ? column("vbs") : names.length;
  const axes = [
    gridAxis(rows, { name: "vgs", column: column("vgs"), atLeast: FEWEST }),
    gridAxis(rows, { name: "vds", column: column("vds"), atLeast: FEWEST }),
    gridAxis(rows, { name: "vbs", column: bulkColumn, atLeast: 1 }),
  ] as const;
  const places = gridPlaces(rows, axes);
  const values = (name: string) => {
    const result = new Float64Array(rows.length);
    rows.forEach((row, r) => result[places[r]!] = row.values[column(name)]!);
    return result;
  };
  const optional = (name: "gm" | "gds" | "gmb") =>
    column(name) >= 0 ? { [name]: values(name) } : {};
  const charged = names.some((name) => name.startsWith("q"));
  if (column("qb") >= 0) checkBalance(rows, names);
  return {
    gateVoltages: axes[0].points,
    drainVoltages: axes[1].points,
    bulkVoltages: axes[2].points,
    current: values("id"),
    ...optional("gm"),
    ...optional("gds"),
    ...optional("gmb"),
    ...(charged
      ? { charges: { drain: values("qd"), gate: values("qg"), source: values("qs") } }
      : {}),
  };
}

function checkBalance(rows: readonly TableRow[], names: readonly string[]): void {
  const columns = ["qd", "qg", "qs", "qb"].map((name) => names.indexOf(name));
  const largest = Math.max(...rows.map(({ values }) => Math.abs(values[columns[1]!]!)));
  for (const { line, values } of rows) {
    const sum = columns.reduce((total, column) => total + values[column]!, 0);
    if (Math.abs(sum) <= CHARGE_BALANCE * largest) continue;
    throw new RangeError(
      `Cannot read the transistor table: line ${line}: charges qd, qg, qs and qb must sum to 0 C, got ${sum} C`,
    );
  }
}

/** Names and scales of the columns. */
function readHead(fields: readonly Field[]): { name: string; scale: number }[] {
  const seen = new Set<string>();
  const known = Object.entries(COLUMNS).map(([name, unit]) => `${name} [${unit}]`).join(", ");
  const columns = fields.map((field) => {
    const [, written, unitText] = HEADING.exec(field.text) ?? [];
    const name = written?.toLowerCase() ?? "";
    const unit = COLUMNS[name];
    if (unit === undefined) {
      throw new TransistorTableError(`expected one of ${known}, got "${field.text}"`, field);
    }
    if (seen.has(name)) {
      throw new TransistorTableError(`expected each column once, got ${name} again`, field);
    }
    seen.add(name);
    return { name, scale: unitText ? readScale(unitText, { unit, field }) : 1 };
  });
  const start = fields[0]!;
  const missing = NEEDED.filter((name) => !seen.has(name));
  if (missing.length > 0) {
    throw new TransistorTableError(
      `expected columns ${NEEDED.join(", ")}, missing ${missing.join(", ")}`,
      start,
    );
  }
  const uncharged = ["qd", "qg", "qs"].filter((name) => !seen.has(name));
  if (
    (uncharged.length > 0 && uncharged.length < 3) || (uncharged.length === 3 && seen.has("qb"))
  ) {
    throw new TransistorTableError(
      `expected all of qd, qg, qs or no charges, missing ${uncharged.join(", ")}`,
      start,
    );
  }
  return columns;
}

function readScale(
  unitText: string,
  { unit, field }: { readonly unit: string; readonly field: Field },
): number {
  try {
    return parseQuantity(`1 ${unitText}`, unit);
  } catch (error) {
    if (!(error instanceof SyntaxError || error instanceof TypeError)) throw error;
    throw new TransistorTableError(
      `expected a unit such as ${unit} in brackets, got "${unitText}"`,
      field,
    );
  }
}

function readNumber(field: Field, name: string): number {
  const value = NUMBER.test(field.text) ? Number(field.text) : NaN;
  if (Number.isFinite(value)) return value;
  const hint = /^[+-]?\d+,\d+$/.test(field.text) ? " (write the decimal mark as a point)" : "";
  throw new TransistorTableError(
    `expected a number for ${name}, got "${field.text}"${hint}`,
    field,
  );
}

/** The fields of a line without blanks and quotes around them, each with its first character's place. */
function fieldsOf(
  { content, line }: { content: string; line: number },
  separator: string,
): Field[] {
  let start = 0;
  return content.split(separator).map((raw) => {
    const column = start + raw.length - raw.trimStart().length + 1;
    start += raw.length + separator.length;
    return { text: raw.trim().replace(/^"(.*)"$/, "$1").trim(), line, column };
  });
}
