/** One thing wrong in a file that a person wrote, and where. */
export interface Problem {
  /** As the person named it. */
  readonly file: string;
  /** From 1. */
  readonly line: number;
  /** From 1, in UTF-16 units. */
  readonly column: number;
  /** What is wrong and what would be right, one line without a final period. */
  readonly message: string;
}

/** Writes a problem on one line: `rev_b.yaml:12:5: supply_voltage: expected a voltage ...`. */
export function problemText({ file, line, column, message }: Problem): string {
  return `${file}:${line}:${column}: ${message}`;
}

/** Everything wrong in the input at once, in order; the message has one line for each problem. */
export class InputError extends Error {
  override readonly name = "InputError";
  readonly problems: readonly Problem[];

  constructor(problems: readonly Problem[]) {
    const ordered = inOrder(problems);
    super(ordered.map(problemText).join("\n"));
    this.problems = ordered;
  }
}

/** Order of appearance, so that one run lists everything from the top of the file down. */
export function inOrder(problems: readonly Problem[]): readonly Problem[] {
  return [...problems].sort((a, b) =>
    a.file !== b.file ? (a.file < b.file ? -1 : 1) : a.line - b.line || a.column - b.column
  );
}
