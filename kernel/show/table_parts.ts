/** What a table's cell may hold; numbers are in SI, `null` is shown as a dash. */
export type TableCell = number | string | boolean | null;

/** One column of a table. */
export interface TableColumn {
  /** Header, without the unit. */
  readonly name: string;
  /** Unit of the column's numbers; the prefix is chosen for the whole column. @default "1" */
  readonly unit?: string;
  /** Significant digits of the largest number. @default 4 */
  readonly digits?: number;
}
