import type { CellOutcome } from "./kernel.ts";
import type { NotebookCell } from "./notebook.ts";

/** What went wrong with a template, and where. */
export interface TemplateErrorOptions {
  /** Name of the notebook file. */
  readonly file: string;
  readonly cell: NotebookCell;
  readonly kind: "syntax" | "error" | "timeout" | "died";
  /** In plain words. */
  readonly reason: string;
  readonly line?: number;
  readonly column?: number;
}

/** A cell of a template failed; the message reads "bias_selection.ipynb cell 4 line 3: ...". */
export class TemplateError extends Error {
  override readonly name = "TemplateError";
  readonly file: string;
  /** Position of the cell among all cells of the notebook, from 1. */
  readonly cell: number;
  readonly cellId: string;
  readonly kind: TemplateErrorOptions["kind"];
  /** The message without the place. */
  readonly reason: string;
  /** Line of the cell's source, from 1, where it is known. */
  readonly line: number | undefined;

  constructor({ file, cell, kind, reason, line, column }: TemplateErrorOptions) {
    super(`${placeOf({ file, cell: cell.number, line, column })}: ${reason}`);
    this.file = file;
    this.cell = cell.number;
    this.cellId = cell.id;
    this.kind = kind;
    this.reason = reason;
    this.line = line;
  }
}

/** "bias_selection.ipynb cell 4 line 3:7", as much of it as is known. */
export function placeOf(
  { file, cell, line, column }: {
    readonly file: string;
    readonly cell: number;
    readonly line?: number | undefined;
    readonly column?: number | undefined;
  },
): string {
  const at = line === undefined ? "" : ` line ${line}${column === undefined ? "" : `:${column}`}`;
  return `${file} cell ${cell}${at}`;
}

/** Why the kernel's process ended, in plain words. */
export function reasonOfDeath({ exitCode, signal, lastWords }: NonNullable<CellOutcome["death"]>) {
  if (/out of memory/i.test(lastWords)) return "the kernel ran out of memory in this cell";
  if (signal !== null) return `the kernel was ended by ${signal} while this cell ran`;
  return `the kernel ended by itself with status ${exitCode} while this cell ran; ` +
    "a cell must not call Deno.exit";
}
