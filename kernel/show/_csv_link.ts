import { csvText } from "./_csv_text.ts";
import { type Markup, markup } from "./markup.ts";
import type { TableCell, TableColumn } from "./table_parts.ts";

/** A link that carries all rows as a file; `name` may leave out its ending. */
export function csvLink(
  name: string,
  content: {
    readonly columns: readonly TableColumn[];
    readonly rows: readonly (readonly TableCell[])[];
  },
): Markup {
  const file = name.endsWith(".csv") ? name : `${name}.csv`;
  const address = `data:text/csv;charset=utf-8,${encodeURIComponent(csvText(content))}`;
  const count = content.rows.length;
  const rows = count === 1 ? "1 row" : `${count} rows`;
  return markup`<p><a download="${file}" href="${address}">Download ${file} (${rows}, SI units)</a></p>`;
}
