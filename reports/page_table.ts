import { type Markup, markup, type MarkupPart } from "../kernel/show/markup.ts";

/** Options of {@linkcode pageTable}. */
export interface PageTableOptions {
  readonly caption: string;
  readonly columns: readonly string[];
  readonly rows: readonly PageRow[];
  /** Columns of figures, counted from 0, aligned to the right. @default none */
  readonly numeric?: readonly number[];
  /** Which column names the row. @default 0 */
  readonly rowHeader?: number;
}

/** One row of a {@linkcode pageTable}. */
export interface PageRow {
  readonly cells: readonly MarkupPart[];
  readonly id?: string;
  readonly class?: string;
}

/** From this many columns a table keeps its width on a narrow screen and scrolls in its box. */
const WIDE = 6;

/** A table of the page's own, in a box that scrolls when the screen is narrower than the table. */
export function pageTable(
  { caption, columns, rows, numeric = [], rowHeader = 0 }: PageTableOptions,
): Markup {
  const wide = columns.length >= WIDE && markup` class="wide"`;
  const classOf = (k: number) => numeric.includes(k) && markup` class="figure"`;
  const cell = (part: MarkupPart, k: number) =>
    k === rowHeader
      ? markup`<th scope="row"${classOf(k)}>${part}</th>`
      : markup`<td${classOf(k)}>${part}</td>`;
  const body = rows.map(({ cells, id, class: kind }) =>
    markup`<tr${id !== undefined && markup` id="${id}"`}${
      kind !== undefined && markup` class="${kind}"`
    }>${cells.map(cell)}</tr>`
  );
  return markup`
    <div class="scroll" role="region" aria-label="${caption}" tabindex="0"><table${wide}>
    <caption>${caption}</caption>
    <thead><tr>${columns.map((c, k) => markup`<th scope="col"${classOf(k)}>${c}</th>`)}</tr></thead>
    <tbody>${body}</tbody></table></div>`;
}
