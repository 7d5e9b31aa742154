/** One output of a cell. */
export type KernelOutput = DisplayOutput | StreamOutput | ErrorOutput;

/** A MIME bundle; an update of the same display replaces it in place. */
export interface DisplayOutput {
  readonly type: "display";
  readonly data: Readonly<Record<string, unknown>>;
  readonly metadata: Readonly<Record<string, unknown>>;
  readonly displayId?: string;
}

/** Printed text, adjacent pieces merged. */
export interface StreamOutput {
  readonly type: "stream";
  readonly name: "stdout" | "stderr";
  readonly text: string;
}

/** What a cell failed with; never a stack trace. */
export interface ErrorOutput {
  readonly type: "error";
  readonly name: string;
  readonly message: string;
  /** Line of the cell's source, 1-based, where it is known. */
  readonly line?: number;
}
