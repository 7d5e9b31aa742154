/** Something to be ended when this process ends by a signal or by `Deno.exit`. */
export interface Living {
  /** Ends it at once, synchronously; may be called twice. */
  endNow(): void;
}

const living = new Set<Living>();
// Windows knows no SIGTERM.
const SIGNALS: readonly Deno.Signal[] = Deno.build.os === "windows"
  ? ["SIGINT"]
  : ["SIGINT", "SIGTERM", "SIGHUP"];
const listeners = SIGNALS.map((signal) => ({ signal, listen: () => endAllBy(signal) }));

/** Watches over `kernel` until {@linkcode forget} is called. */
export function watchOver(kernel: Living): void {
  if (living.size === 0) {
    for (const { signal, listen } of listeners) Deno.addSignalListener(signal, listen);
    addEventListener("unload", endAll);
  }
  living.add(kernel);
}

/** Ends the watch over `kernel`. */
export function forget(kernel: Living): void {
  if (living.delete(kernel) && living.size === 0) unlisten();
}

function unlisten(): void {
  for (const { signal, listen } of listeners) Deno.removeSignalListener(signal, listen);
  removeEventListener("unload", endAll);
}

function endAll(): void {
  for (const kernel of living) kernel.endNow();
}

function endAllBy(signal: Deno.Signal): void {
  endAll();
  living.clear();
  unlisten();
  // Without our listener the signal does what it does by default: end this process, saying why.
  Deno.kill(Deno.pid, signal);
}
