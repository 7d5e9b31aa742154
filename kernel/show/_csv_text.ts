import type { TableCell, TableColumn } from "./table_parts.ts";

/** Characters with which a spreadsheet takes a text cell for a formula. */
const FORMULA_START = /^[=+\-@\t\r]/;

/** The rows as CSV (RFC 4180): full precision, SI units, the unit in brackets in the header. */
export function csvText(
  { columns, rows }: {
    readonly columns: readonly TableColumn[];
    readonly rows: readonly (readonly TableCell[])[];
  },
): string {
  const head = columns.map(({ name, unit }) =>
    csvCell(unit === undefined ? name : `${name} [${siUnit(unit)}]`)
  );
  const lines = rows.map((row) => row.map(csvCell).join(","));
  return [head.join(","), ...lines].map((line) => line + "\r\n").join("");
}

/** Values are handed over in SI, so what is written in °C or per cent on screen is K or 1 here. */
function siUnit(unit: string): string {
  if (unit === "°C") return "K";
  return unit === "%" || unit === "ppm" ? "1" : unit;
}

function csvCell(cell: TableCell): string {
  if (cell === null) return "";
  if (typeof cell === "number") return Number.isFinite(cell) ? String(cell) : "";
  if (typeof cell === "boolean") return cell ? "yes" : "no";
  const text = FORMULA_START.test(cell) ? `'${cell}` : cell;
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}
