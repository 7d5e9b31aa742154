import { findSyntaxProblem, withLineMarks } from "./cell_lines.ts";
import { type CellOutcome, type Kernel, startKernel } from "./kernel.ts";
import type { KernelOutput } from "./kernel_output.ts";
import { type Notebook, type NotebookCell, readNotebook } from "./notebook.ts";
import { reasonOfDeath, TemplateError } from "./template_error.ts";

/** Name of the global symbol under which a cell finds what was handed over. */
const HANDOVER = "tankwright.handover";

/** A cell with what it put out. */
export interface RunCell {
  readonly id: string;
  readonly type: "markdown" | "code";
  readonly source: string;
  readonly outputs: readonly KernelOutput[];
}

/** Told before and after each code cell. */
export interface CellEvent {
  readonly phase: "begin" | "end";
  /** Which code cell, from 1, of how many. */
  readonly codeCell: number;
  readonly codeCells: number;
  readonly cell: NotebookCell;
}

/** How to run a notebook. */
export interface OpenNotebookOptions {
  /** Working folder of the cells. @default the notebook's folder */
  readonly cwd?: string;
  /** Time limit of one cell [s]. @default 120 */
  readonly cellTimeout?: number;
  /** Time limit of all cells together [s]. @default 600 */
  readonly notebookTimeout?: number;
  /** Aborting kills the kernel; the run throws the signal's reason. */
  readonly signal?: AbortSignal;
  readonly onCell?: (event: CellEvent) => void;
  /** Added to the kernel's environment. */
  readonly env?: Readonly<Record<string, string>>;
}

/**
 * Reads a notebook, checks the syntax of all its cells and starts a kernel for it.
 *
 * @throws {NotebookError} when the file is no notebook
 * @throws {TemplateError} when a cell has a syntax error
 * @throws {KernelError} when the kernel does not come up
 */
export async function openNotebook(
  path: string,
  options: OpenNotebookOptions = {},
): Promise<NotebookRun> {
  const { cwd = folderOf(path), signal, env } = options;
  const notebook = await readNotebook(path);
  for (const cell of notebook.cells) {
    const problem = cell.type === "code" ? findSyntaxProblem(cell.source) : undefined;
    if (problem === undefined) continue;
    const { line, column, message } = problem;
    const place = { file: notebook.name, cell, line, column };
    throw new TemplateError({ ...place, kind: "syntax", reason: `syntax error: ${message}` });
  }
  const kernel = await startKernel({
    cwd,
    ...(signal === undefined ? {} : { signal }),
    ...(env === undefined ? {} : { env }),
  });
  return new NotebookRun(notebook, kernel, options);
}

/** A notebook being run, cell after cell, in one kernel; made by {@linkcode openNotebook}. */
export class NotebookRun implements AsyncDisposable {
  readonly notebook: Notebook;
  readonly #kernel: Kernel;
  readonly #cellTimeout: number;
  readonly #notebookTimeout: number;
  readonly #onCell: (event: CellEvent) => void;
  readonly #cells: RunCell[] = [];
  /** Time the cells have taken so far [s]. */
  #spent = 0;
  #position = 0;
  #failed = false;

  constructor(
    notebook: Notebook,
    kernel: Kernel,
    { cellTimeout = 120, notebookTimeout = 600, onCell = () => {} }: OpenNotebookOptions = {},
  ) {
    this.notebook = notebook;
    this.#kernel = kernel;
    this.#cellTimeout = cellTimeout;
    this.#notebookTimeout = notebookTimeout;
    this.#onCell = onCell;
  }

  /** The cells run so far, the failed one included; raw cells are left out. */
  get cells(): readonly RunCell[] {
    return this.#cells;
  }

  /** Process id of the kernel. */
  get pid(): number {
    return this.#kernel.pid;
  }

  /**
   * Leaves `value` (JSON) in the kernel as `globalThis[Symbol.for("tankwright.handover")]`.
   *
   * @throws {RangeError} when a cell has been run already
   */
  async handOver(value: unknown): Promise<void> {
    if (this.#position > 0) {
      throw new RangeError("Cannot hand a value over: it must be done before the first cell");
    }
    const code = `globalThis[Symbol.for("${HANDOVER}")] = ${JSON.stringify(value)}; undefined`;
    const { status } = await this.#kernel.execute(code, { silent: true, timeout: 30 });
    if (status !== "ok") {
      throw new Error(`Cannot hand a value over to ${this.notebook.name}: ${status} in the kernel`);
    }
  }

  /**
   * Runs up to and with the next code cell.
   *
   * @returns the cells passed; none at the end of the notebook
   * @throws {TemplateError} when the cell fails
   */
  next(): Promise<readonly RunCell[]> {
    const { cells } = this.notebook;
    const code = cells.findIndex((cell, i) => i >= this.#position && cell.type === "code");
    return this.runCells(this.#position, code < 0 ? cells.length : code + 1);
  }

  /**
   * Runs the cells from index `from` (where the run stands) up to but without index `to`.
   *
   * @returns the cells passed
   * @throws {TemplateError} when a cell fails; nothing can be run after that
   */
  async runCells(
    from: number = this.#position,
    to: number = this.notebook.cells.length,
  ): Promise<readonly RunCell[]> {
    if (this.#failed) throw new RangeError("Cannot run more cells: an earlier cell has failed");
    if (from !== this.#position || !(to >= from && to <= this.notebook.cells.length)) {
      throw new RangeError(
        `Cannot run cells ${from} to ${to}: the run stands at ${this.#position} of ` +
          `${this.notebook.cells.length}`,
      );
    }
    const passed: RunCell[] = [];
    for (const cell of this.notebook.cells.slice(from, to)) {
      this.#position++;
      if (cell.type === "code") passed.push(await this.#runCode(cell));
      else if (cell.type === "markdown") {
        const { id, type, source } = cell;
        passed.push({ id, type, source, outputs: [] });
        this.#cells.push(passed.at(-1)!); // pushed the line before
      }
    }
    return passed;
  }

  /** Ends the kernel; may be called twice. */
  close(): Promise<void> {
    return this.#kernel.close();
  }

  [Symbol.asyncDispose](): Promise<void> {
    return this.close();
  }

  async #runCode(cell: NotebookCell): Promise<RunCell> {
    const codes = this.notebook.cells.filter(({ type }) => type === "code");
    const event = { codeCell: codes.indexOf(cell) + 1, codeCells: codes.length, cell };
    this.#onCell({ phase: "begin", ...event });
    const begin = performance.now();
    const left = this.#notebookTimeout - this.#spent;
    const outcome = await this.#kernel.execute(withLineMarks(cell.source), {
      timeout: Math.max(0, Math.min(this.#cellTimeout, left)),
    });
    this.#spent += (performance.now() - begin) / 1000;
    const { id, source } = cell;
    const run: RunCell = { id, type: "code", source, outputs: outcome.outputs };
    this.#cells.push(run);
    if (outcome.status !== "ok") {
      this.#failed = true;
      throw this.#failure(cell, outcome, left);
    }
    this.#onCell({ phase: "end", ...event });
    return run;
  }

  #failure(cell: NotebookCell, outcome: CellOutcome, left: number): TemplateError {
    const { status, line, error, death } = outcome;
    const reason = status === "timeout"
      ? left < this.#cellTimeout
        ? `the notebook took longer than its time limit of ${this.#notebookTimeout} s, in this cell`
        : `the cell took longer than its time limit of ${this.#cellTimeout} s`
      : death !== undefined
      ? reasonOfDeath(death)
      : error?.message || error?.name || "the cell failed";
    return new TemplateError({
      file: this.notebook.name,
      cell,
      kind: status === "ok" ? "error" : status,
      reason,
      ...(line === undefined ? {} : { line }),
    });
  }
}

function folderOf(path: string): string {
  return path.match(/^(.*)[\\/]/)?.[1] || (path.startsWith("/") ? "/" : ".");
}
