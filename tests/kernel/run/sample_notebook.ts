/** A cell for a test notebook: a text starting with "#" is markdown, else code. */
export interface SampleCell {
  readonly id: string;
  readonly source: string;
}

/** The text of a notebook of format 4.5 with these cells. */
export function notebookText(cells: readonly SampleCell[]): string {
  return JSON.stringify({
    cells: cells.map(({ id, source }) =>
      source.startsWith("#")
        ? { cell_type: "markdown", id, metadata: {}, source }
        : { cell_type: "code", execution_count: null, id, metadata: {}, outputs: [], source }
    ),
    metadata: { kernelspec: { display_name: "", language: "typescript", name: "tankwright" } },
    nbformat: 4,
    nbformat_minor: 5,
  });
}

/** Runs `use` with the path of a notebook of these sources, in a folder that is then removed. */
export async function withNotebook<T>(
  sources: readonly string[],
  use: (path: string) => Promise<T>,
): Promise<T> {
  const folder = await Deno.makeTempDir();
  try {
    const path = `${folder}/sample.ipynb`;
    const cells = sources.map((source, i) => ({ id: `cell-${i + 1}`, source }));
    await Deno.writeTextFile(path, notebookText(cells));
    return await use(path);
  } finally {
    await Deno.remove(folder, { recursive: true });
  }
}
