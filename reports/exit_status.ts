/** What the command line returns to the shell. */
export const EXIT = {
  /** Every verdict met, thin or validly waived. */
  allMet: 0,
  /** A verdict missed, not run, or waived past its date. */
  missed: 1,
  /** The input is wrong, or the output folder cannot be written. */
  wrongInput: 2,
  /** A template failed to run. */
  templateFailed: 3,
  /** Stopped by the person (128 + SIGINT, common practice of shells). */
  stopped: 130,
} as const;

/** One of {@linkcode EXIT}. */
export type ExitStatus = typeof EXIT[keyof typeof EXIT];

/** A template that did not run to its end. */
export class TemplateFailure extends Error {
  override readonly name = "TemplateFailure";

  /**
   * @param template its name
   * @param message what happened, and in which cell and line
   */
  constructor(readonly template: string, message: string) {
    super(`${template}.ipynb: ${message}`);
  }
}

/** The output folder cannot take the report. */
export class OutputError extends Error {
  override readonly name = "OutputError";
}

/** The words of the command line make no sense. */
export class UsageError extends Error {
  override readonly name = "UsageError";
}
