import { join } from "node:path";
import { type NotebookRun, openNotebook, type RunCell } from "../kernel/run/notebook_run.ts";
import { TemplateError } from "../kernel/run/template_error.ts";
import type { Handover } from "../kernel/sheet/handover.ts";
import { type Collected, collectPayloads } from "./collect_payloads.ts";
import { TemplateFailure } from "./exit_status.ts";
import type { ProgressEvent } from "./progress.ts";
import type { CellOutput, ReportCell } from "./report_data.ts";

/** How to run a template. */
export interface TemplateRunOptions {
  /** Folder of the notebooks; the cells' working folder. */
  readonly folder: string;
  readonly handover: Handover;
  /** Time limit of one cell [s]. */
  readonly cellTimeout: number;
  /** Time limit of all cells of one template [s]. */
  readonly notebookTimeout: number;
  readonly signal?: AbortSignal;
  readonly onProgress?: (event: ProgressEvent) => void;
}

/** A template whose first code cell has been run, in a kernel of its own that waits for the rest. */
export class TemplateRun implements AsyncDisposable {
  readonly template: string;
  /** Why the first cell stopped, if it did; the revision may be what it could not take. */
  readonly firstCellError: TemplateError | undefined;
  readonly #run: NotebookRun;

  private constructor(
    template: string,
    run: NotebookRun,
    firstCellError: TemplateError | undefined,
  ) {
    this.template = template;
    this.firstCellError = firstCellError;
    this.#run = run;
  }

  /**
   * Starts a kernel, hands over, and runs the first code cell.
   *
   * @throws {NotebookError | KernelError} when the notebook cannot be read or no kernel comes up
   * @throws {TemplateError} when a cell has a syntax error
   */
  static async open(template: string, options: TemplateRunOptions): Promise<TemplateRun> {
    const { folder, handover, cellTimeout, notebookTimeout, signal, onProgress } = options;
    const run = await openNotebook(join(folder, `${template}.ipynb`), {
      cwd: folder,
      cellTimeout,
      notebookTimeout,
      ...(signal === undefined ? {} : { signal }),
      onCell: ({ phase, codeCell, codeCells }) =>
        onProgress?.({ template, done: codeCell - (phase === "begin" ? 1 : 0), of: codeCells }),
    });
    try {
      await run.handOver(handover);
      await run.next();
      return new TemplateRun(template, run, undefined);
    } catch (error) {
      if (error instanceof TemplateError && error.kind === "error") {
        return new TemplateRun(template, run, error);
      }
      await run.close();
      throw error;
    }
  }

  /** The first heading of the notebook, else the template's name. */
  get title(): string {
    for (const { type, source } of this.#run.notebook.cells) {
      const heading = type === "markdown" ? /^#{1,6}\s+(.+?)\s*#*$/m.exec(source)?.[1] : undefined;
      if (heading !== undefined) return heading;
    }
    return this.template;
  }

  /** Cells run so far. */
  get cells(): readonly ReportCell[] {
    return this.#run.cells.map(reportCell);
  }

  /**
   * What the cells run so far handed over.
   *
   * @throws {TemplateFailure} as `collectPayloads` does
   */
  collect(): Collected {
    return collectPayloads(this.template, this.cells.flatMap(({ outputs }) => outputs));
  }

  /** True when the first cell stopped because only the declaration was asked for. */
  get declaredOnly(): boolean {
    return this.cells.some(({ outputs }) =>
      outputs.some((output) => output.type === "error" && output.name === "DeclaredOnly")
    );
  }

  /**
   * Runs the remaining cells.
   *
   * @throws {TemplateError} when one fails
   * @throws {TemplateFailure} when the notebook has changed under the run
   */
  async finish(): Promise<void> {
    if (this.firstCellError !== undefined) throw this.firstCellError;
    await this.#run.runCells();
  }

  async [Symbol.asyncDispose](): Promise<void> {
    await this.#run.close();
  }
}

/**
 * The template's declaration, which its first cell must have made.
 *
 * @throws {TemplateError | TemplateFailure} when it has not
 */
export function declarationOfRun(run: TemplateRun): NonNullable<Collected["declaration"]> {
  const { declaration } = run.collect();
  if (declaration !== undefined) return declaration;
  throw run.firstCellError ??
    new TemplateFailure(run.template, "its first code cell must declare a sheet: await sheet(...)");
}

function reportCell({ id, type, source, outputs }: RunCell): ReportCell {
  return { id, type, source, outputs: outputs.map(cellOutput) };
}

function cellOutput(output: RunCell["outputs"][number]): CellOutput {
  if (output.type === "display") return { type: "display", data: output.data };
  return output;
}
