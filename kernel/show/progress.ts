import { jupyter } from "./_jupyter.ts";

/** MIME type that marks a progress line: the report leaves such a display out. */
export const PROGRESS_MIME = "application/vnd.tankwright.progress.v1+json";

/** The line moves in steps of this many per cent, so that what is sent does not depend on speed. */
const STEP_PERCENT = 5;

interface RunningLine {
  readonly id: string;
  readonly done: number;
  readonly step: number;
}

const running = new Map<string, RunningLine>();
let lines = 0;

/**
 * Moves a progress line: `progress("Sweep", done, total)` from 1 (or 0) to `total`. In Jupyter one
 * display is updated in place and ends as "Sweep: 60 of 60"; in a terminal one line on standard error.
 * A call with a smaller `done` starts a new line.
 *
 * @param done [1] steps finished
 * @param total [1] steps in all
 * @throws {RangeError} when `done` is not between 0 and `total`, or `total` is not above 0
 */
// A kernel has one display area for everyone, hence a label, a count and a total in one plain call.
export async function progress(label: string, done: number, total: number): Promise<void> {
  if (!(total > 0)) throw new RangeError(`Cannot show progress: total must be > 0, got ${total}`);
  if (!(done >= 0 && done <= total)) {
    throw new RangeError(`Cannot show progress: done must be 0 to ${total}, got ${done}`);
  }
  const before = running.get(label);
  const fresh = before === undefined || done < before.done;
  const step = Math.floor(100 * done / total / STEP_PERCENT);
  const finished = done >= total;
  const id = fresh ? `progress-${++lines}` : before.id;
  if (finished) running.delete(label);
  else running.set(label, { id, done, step });
  if (!fresh && !finished && step === before.step) return;
  const text = `${label}: ${done} of ${total}`;
  const kernel = jupyter();
  if (kernel !== undefined) {
    await kernel.broadcast(fresh ? "display_data" : "update_display_data", {
      data: { "text/plain": text, [PROGRESS_MIME]: { label, done, total } },
      metadata: {},
      transient: { display_id: id },
    });
  } else if (Deno.stderr.isTerminal()) {
    const line = `\r\x1b[K${text}${finished ? "\n" : ""}`;
    await Deno.stderr.write(new TextEncoder().encode(line));
  }
}
