import { formatColumn } from "./_format_column.ts";
import { withUnit } from "./_display_unit.ts";
import { csvLink } from "./_csv_link.ts";
import { type Markup, markup, raw } from "./markup.ts";
import { Showable } from "./showable.ts";
import type { TableCell, TableColumn } from "./table_parts.ts";

/** Options of {@linkcode table}. */
export interface TableOptions {
  /** The columns, from the left. */
  readonly columns: readonly TableColumn[];
  /** Row by row, as many cells as there are columns. */
  readonly rows: readonly (readonly TableCell[])[];
  /** What the table shows, in one line. */
  readonly caption: string;
  /** File name under which the rows can be taken away as CSV (full precision, SI units). */
  readonly csv?: string;
}

const DEFAULT_DIGITS = 4;
const NOTHING = "-";

interface ShownColumn {
  readonly header: string;
  readonly numeric: boolean;
  readonly cells: readonly string[];
}

/**
 * A table with units in its headers; the first column names the row.
 *
 * @throws {TypeError} when a row has another number of cells than there are columns
 */
export function table({ columns, rows, caption, csv }: TableOptions): Showable {
  rows.forEach((row, i) => {
    if (row.length !== columns.length) {
      throw new TypeError(
        `Cannot make a table: row ${i + 1} must have ${columns.length} cells, got ${row.length}`,
      );
    }
  });
  const shown = columns.map((column, k) => showColumn(column, rows.map((row) => row[k]!)));
  const link = csv === undefined ? undefined : csvLink(csv, { columns, rows });
  return new Showable({
    "text/plain": plainText(shown, rows.length, caption),
    "text/html": tableMarkup(shown, { rowCount: rows.length, caption, link }).text,
  });
}

function showColumn(
  { name, unit = "1", digits = DEFAULT_DIGITS }: TableColumn,
  cells: readonly TableCell[],
): ShownColumn {
  const numbers = cells.filter((cell) => typeof cell === "number");
  const format = formatColumn(numbers, { unit, digits });
  return {
    header: withUnit(name, numbers.length === 0 ? unit : format.unit),
    numeric: numbers.length > 0,
    cells: cells.map((cell) => {
      if (cell === null) return NOTHING;
      if (typeof cell === "number") return format.text(cell);
      if (typeof cell === "boolean") return cell ? "yes" : "no";
      return cell;
    }),
  };
}

function plainText(columns: readonly ShownColumn[], rowCount: number, caption: string): string {
  const widths = columns.map(({ header, cells }) => Math.max(...[header, ...cells].map(width)));
  const line = (cells: readonly string[]) =>
    cells.map((cell, k) => {
      const space = " ".repeat(widths[k]! - width(cell));
      return columns[k]!.numeric ? space + cell : cell + space;
    }).join("  ").trimEnd();
  const body = Array.from({ length: rowCount }, (_, i) => line(columns.map((c) => c.cells[i]!)));
  return [
    caption,
    line(columns.map((c) => c.header)),
    widths.map((w) => "-".repeat(w)).join("  "),
    ...body,
  ].join("\n");
}

/** Characters a person sees, not UTF-16 units. */
function width(text: string): number {
  return [...text].length;
}

function tableMarkup(
  columns: readonly ShownColumn[],
  { rowCount, caption, link }: {
    readonly rowCount: number;
    readonly caption: string;
    readonly link: Markup | undefined;
  },
): Markup {
  const head = columns.map(({ header, numeric }) =>
    markup`<th scope="col"${align(numeric)}>${header}</th>`
  );
  const rowMarkup = (i: number) =>
    columns.map(({ cells, numeric }, k) =>
      k === 0
        ? markup`<th scope="row"${align(numeric)}>${cells[i]!}</th>`
        : markup`<td${align(numeric)}>${cells[i]!}</td>`
    );
  return markup`
    <table><caption>${caption}</caption>
    <thead><tr>${head}</tr></thead>
    <tbody>${Array.from({ length: rowCount }, (_, i) => markup`<tr>${rowMarkup(i)}</tr>`)}</tbody>
    </table>${link}`;
}

const NUMERIC = raw(' style="text-align:right;font-variant-numeric:tabular-nums"');

function align(numeric: boolean): Markup | false {
  return numeric && NUMERIC;
}
