/** Metadata of a notebook that belongs to its source; editors and runs add more. */
const NOTEBOOK_METADATA = new Set(["kernelspec", "language_info"]);
/** Ids that Jupyter makes up for a cell: they tell nothing and change when it is pasted. */
const MADE_UP_ID = /^[0-9a-f]{8}(-[0-9a-f]{4}){0,3}(-[0-9a-f]{12})?$/;

/**
 * A notebook as source: no outputs, no counts, no metadata of editors and runs, keys sorted, one
 * space of indent, text split into lines. Two people's notebooks then differ where they differ.
 *
 * @param text a notebook file that `parseNotebook` accepts
 */
export function notebookSource(text: string): string {
  const { cells, metadata, ...rest } = JSON.parse(text) as Record<string, unknown> & {
    cells: (Record<string, unknown> & { source: string | string[] })[];
    metadata?: Record<string, unknown>;
  };
  const clean = {
    ...rest,
    cells: cells.map(({ id, cell_type: type, source }) => ({
      id,
      cell_type: type,
      metadata: {},
      source: linesOf(typeof source === "string" ? source : source.join("")),
      ...(type === "code" ? { execution_count: null, outputs: [] } : {}),
    })),
    metadata: Object.fromEntries(
      Object.entries(metadata ?? {}).filter(([key]) => NOTEBOOK_METADATA.has(key)),
    ),
  };
  return JSON.stringify(sorted(clean), null, 1) + "\n";
}

/** The ids of cells that were made up by an editor and not chosen. */
export function madeUpIds(cells: readonly { readonly id: string }[]): readonly string[] {
  return cells.map(({ id }) => id).filter((id) => MADE_UP_ID.test(id));
}

function linesOf(text: string): string[] {
  return text === "" ? [] : text.split(/(?<=\n)/);
}

function sorted(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(sorted);
  if (typeof value !== "object" || value === null) return value;
  return Object.fromEntries(
    Object.entries(value).sort(([a], [b]) => a < b ? -1 : 1).map(([k, v]) => [k, sorted(v)]),
  );
}
