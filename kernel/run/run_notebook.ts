import { openNotebook, type OpenNotebookOptions, type RunCell } from "./notebook_run.ts";

/** How to run a notebook from start to end. */
export interface RunNotebookOptions extends OpenNotebookOptions {
  /** Handed over before the first cell, if given. */
  readonly handover?: unknown;
}

/**
 * Runs a notebook from start to end in a kernel of its own.
 *
 * @returns its cells with their outputs
 * @throws {NotebookError | TemplateError | KernelError} as {@linkcode openNotebook} and the run do
 */
export async function runNotebook(
  path: string,
  options: RunNotebookOptions = {},
): Promise<readonly RunCell[]> {
  const { handover, ...open } = options;
  await using run = await openNotebook(path, open);
  if (handover !== undefined) await run.handOver(handover);
  await run.runCells();
  return run.cells;
}
