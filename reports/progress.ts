/** Where a run stands. */
export interface ProgressEvent {
  readonly template: string;
  /** Code cells run so far. */
  readonly done: number;
  readonly of: number;
}

/** Shows progress; `end` leaves the terminal clean. */
export interface Progress {
  show(event: ProgressEvent): void;
  end(): void;
}

const CLEAR_LINE = "\r\x1b[2K";

/**
 * On a terminal one line that is rewritten cell by cell; elsewhere a plain line when a template is done.
 *
 * @param write where the text goes
 */
export function progressTo(
  write: (text: string) => void,
  { terminal }: { readonly terminal: boolean },
): Progress {
  let shown = false;
  return {
    show({ template, done, of }) {
      if (terminal) {
        shown = true;
        write(`${CLEAR_LINE}${template}: ${done < of ? `cell ${done + 1} of ${of}` : "done"}`);
      } else if (done === of) {
        write(`${template}: ${of} ${of === 1 ? "cell" : "cells"} run\n`);
      }
    },
    end() {
      if (shown) write(CLEAR_LINE);
      shown = false;
    },
  };
}
