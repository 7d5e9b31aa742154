import { type Connection, writeConnection } from "./connection.ts";
import { forget, type Living, watchOver } from "./living_kernels.ts";

/** How much of what the process wrote to its standard error is kept [characters]. */
const LAST_WORDS = 4000;
/** How long to wait for the rest of it once the process is gone [ms]. */
const LAST_WORDS_WAIT = 200;
/** What Deno writes there whenever a kernel starts. */
const USUAL_WARNING = /^Warning "deno jupyter" is unstable.*\n?/m;

/** How a kernel process ended. */
export interface Death {
  readonly exitCode: number;
  /** The signal that ended it, "SIGKILL". */
  readonly signal: string | null;
  /** The end of its standard error. */
  readonly lastWords: string;
}

/** A kernel's process with its connection file; both are gone after {@linkcode KernelProcess.end}. */
export class KernelProcess implements Living {
  readonly connection: Connection;
  /** Settles when the process has ended. */
  readonly death: Promise<Death>;
  readonly pid: number;
  readonly #child: Deno.ChildProcess;
  #ended = false;

  /** Starts `deno jupyter` in the folder `cwd`. */
  constructor({ cwd, env }: { cwd: string; env: Readonly<Record<string, string>> }) {
    this.connection = writeConnection();
    try {
      this.#child = new Deno.Command(Deno.execPath(), {
        args: ["jupyter", "--kernel", "--conn", this.connection.file],
        cwd,
        env: { NO_COLOR: "1", ...env },
        stdin: "null",
        stdout: "null",
        stderr: "piped",
      }).spawn();
    } catch (error) {
      this.connection.remove();
      throw error;
    }
    this.pid = this.#child.pid;
    watchOver(this);
    this.death = this.#watch();
  }

  /** Kills the process; may be called twice. */
  kill(): void {
    if (this.#ended) return;
    try {
      this.#child.kill("SIGKILL");
    } catch (error) {
      // It may have ended by itself a moment ago.
      if (!(error instanceof Deno.errors.NotFound || error instanceof TypeError)) throw error;
    }
  }

  endNow(): void {
    this.kill();
    this.connection.remove();
  }

  /** Kills the process, waits for its end and removes the connection file. */
  async end(): Promise<void> {
    this.kill();
    await this.death;
    this.connection.remove();
    forget(this);
  }

  async #watch(): Promise<Death> {
    const reader = this.#child.stderr.getReader();
    let text = "";
    const decoder = new TextDecoder();
    const reading = (async () => {
      for (let part = await reader.read(); !part.done; part = await reader.read()) {
        text = (text + decoder.decode(part.value, { stream: true })).slice(-LAST_WORDS);
      }
    })();
    const { code, signal } = await this.#child.status;
    this.#ended = true;
    // A process that a cell started may hold the stream open for ever.
    const timer = setTimeout(() => reader.cancel(), LAST_WORDS_WAIT);
    await reading;
    clearTimeout(timer);
    return { exitCode: code, signal, lastWords: text.replace(USUAL_WARNING, "").trim() };
  }
}
