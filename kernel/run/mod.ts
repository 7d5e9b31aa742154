/** Runs notebooks on Deno's own kernel, and checks their cells, without a browser. */
export { type CellModule, type CellPlace, cellsAsModule } from "./cells_as_module.ts";
export { type CellProblem, checkCells, type NotebookToCheck, problemText } from "./check_cells.ts";
export {
  type CellOutcome,
  type ExecuteOptions,
  Kernel,
  KernelError,
  type KernelOptions,
  startKernel,
} from "./kernel.ts";
export type { DisplayOutput, ErrorOutput, KernelOutput, StreamOutput } from "./kernel_output.ts";
export type { Death } from "./kernel_process.ts";
export {
  type Notebook,
  type NotebookCell,
  NotebookError,
  parseNotebook,
  readNotebook,
} from "./notebook.ts";
export {
  type CellEvent,
  NotebookRun,
  openNotebook,
  type OpenNotebookOptions,
  type RunCell,
} from "./notebook_run.ts";
export { madeUpIds, notebookSource } from "./notebook_source.ts";
export { runNotebook, type RunNotebookOptions } from "./run_notebook.ts";
export { TemplateError, type TemplateErrorOptions } from "./template_error.ts";
