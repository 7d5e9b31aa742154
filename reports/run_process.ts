import { command, type CommandContext, Stopped } from "./command.ts";

/**
 * Runs the command line of this process and ends it with the command's exit status. The person's
 * Ctrl-C stops the command, which ends its kernels first.
 *
 * @param overrides what differs from the process's own surroundings
 */
export async function runProcess(overrides: Partial<CommandContext> = {}): Promise<never> {
  const controller = new AbortController();
  const stop = () => controller.abort(new Stopped("stopped by the person"));
  const signals: Deno.Signal[] = Deno.build.os === "windows" ? ["SIGINT"] : ["SIGINT", "SIGTERM"];
  for (const signal of signals) Deno.addSignalListener(signal, stop);
  const encoder = new TextEncoder();
  const status = await command(Deno.args, {
    // A task runs in the project's folder and leaves the person's own in INIT_CWD.
    cwd: Deno.env.get("INIT_CWD") ?? Deno.cwd(),
    write: (text) => writeAll(Deno.stdout, encoder.encode(text)),
    writeError: (text) => writeAll(Deno.stderr, encoder.encode(text)),
    terminal: Deno.stderr.isTerminal(),
    signal: controller.signal,
    ...overrides,
  });
  Deno.exit(status);
}

/** A pipe may take less than it is given at once. */
function writeAll(to: { writeSync(bytes: Uint8Array): number }, bytes: Uint8Array): void {
  try {
    for (let sent = 0; sent < bytes.length;) sent += to.writeSync(bytes.subarray(sent));
  } catch (error) {
    // Whoever reads the output may stop early, as `head` does.
    if (!(error instanceof Deno.errors.BrokenPipe)) throw error;
  }
}
