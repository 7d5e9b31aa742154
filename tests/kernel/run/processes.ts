/** Whether a process still runs; one that only waits to be reaped does not. */
export function isRunning(pid: number): boolean {
  try {
    return !/^\d+ \(.*\) [ZX]/s.test(Deno.readTextFileSync(`/proc/${pid}/stat`));
  } catch {
    return false;
  }
}

/** Waits until a process is gone, at most `seconds`; answers whether it is. */
export async function isGoneWithin(pid: number, seconds: number): Promise<boolean> {
  const deadline = performance.now() + 1000 * seconds;
  while (isRunning(pid)) {
    if (performance.now() > deadline) return false;
    await new Promise((resolve) => setTimeout(resolve, 20));
  }
  return true;
}

/** The connection file a kernel process was started with. */
export function connectionFileOf(pid: number): string {
  return Deno.readTextFileSync(`/proc/${pid}/cmdline`).split("\0").find((word) =>
    word.endsWith("connection.json")
  )!; // it is always started with one
}

export function exists(path: string): boolean {
  try {
    Deno.lstatSync(path);
    return true;
  } catch {
    return false;
  }
}
