import type { KernelOutput } from "./kernel_output.ts";
import { type Death, KernelProcess } from "./kernel_process.ts";
import { type Mark, MARK_TYPE, markCode, readMark, SETUP_CODE } from "./kernel_setup.ts";
import { errorOf, OutputLog } from "./output_log.ts";
import { Wire, type WireMessage } from "./wire.ts";
import { ZmtpSocket } from "./zmtp.ts";

/** How often a start is tried; another process may take a port between choosing and listening. */
const START_ATTEMPTS = 3;
/** Pause between attempts to reach the kernel's ports [ms]. */
const CONNECT_PAUSE = 5;
/** How long the kernel's first published message is waited for before asking again [ms]. */
const READY_PAUSE = 100;
/** How long an interrupted cell gets to end before the kernel is killed [ms]. */
const INTERRUPT_WAIT = 1000;
/** How long a kernel gets to shut down, and one that hung up to end, before it is killed [ms]. */
const SHUTDOWN_WAIT = 500;

/** How to start a kernel. */
export interface KernelOptions {
  /** Folder of the notebook: relative paths and deno.json are found from here. */
  readonly cwd: string;
  /** @default 20 [s] */
  readonly startTimeout?: number;
  /** Aborting kills the kernel; whatever waits for it throws the signal's reason. */
  readonly signal?: AbortSignal;
  /** Added to the environment. */
  readonly env?: Readonly<Record<string, string>>;
}

/** How to execute one cell. */
export interface ExecuteOptions {
  /** Keep no history and show no value. @default false */
  readonly silent?: boolean;
  /** Time limit [s]; then the cell is interrupted and, if that fails, the kernel killed. @default none */
  readonly timeout?: number;
}

/** How a cell ended, and what it put out: everything, in order. */
export interface CellOutcome {
  readonly status: "ok" | "error" | "timeout" | "died";
  /** A later cell may still update a display in this list. */
  readonly outputs: readonly KernelOutput[];
  /** Line of the statement that failed or was interrupted, from 1, where it is known. */
  readonly line?: number;
  /** The first error, for `status` "error". */
  readonly error?: { readonly name: string; readonly message: string; readonly line?: number };
  /** How the process ended, when it did. */
  readonly death?: Death;
}

/** The kernel could not be started, or does not behave as one. */
export class KernelError extends Error {
  override readonly name = "KernelError";
}

/**
 * Starts Deno's notebook kernel as a process of its own.
 *
 * @throws {KernelError} when it does not come up
 */
export async function startKernel(options: KernelOptions): Promise<Kernel> {
  const { cwd, startTimeout = 20, signal, env = {} } = options;
  if (!isFolder(cwd)) {
    throw new KernelError(`Cannot start the notebook kernel: there is no folder ${cwd}`);
  }
  const deadline = performance.now() + 1000 * startTimeout;
  for (let attempt = 1;; attempt++) {
    signal?.throwIfAborted();
    const process = new KernelProcess({ cwd, env });
    const kernel = new Kernel(process, signal);
    const late = after(deadline - performance.now());
    const outcome = await Promise.race([
      kernel.open().then(() => "open" as const),
      process.death,
      late.done.then(() => "late" as const),
    ]).catch((error: unknown) => error instanceof Error ? error : new Error(String(error)));
    late.cancel();
    if (outcome === "open" && !signal?.aborted) return kernel;
    await kernel.close();
    signal?.throwIfAborted();
    if (outcome instanceof Error) throw outcome;
    if (outcome === "late" || outcome === "open") {
      throw new KernelError(
        `Cannot start the notebook kernel: it was not ready within ${startTimeout} s`,
      );
    }
    if (!(attempt < START_ATTEMPTS)) {
      throw new KernelError(
        `Cannot start the notebook kernel: ${Deno.execPath()} jupyter ended with status ` +
          `${outcome.exitCode}: ${outcome.lastWords.split("\n")[0] || "it does not say why"}`,
      );
    }
  }
}

/** A running kernel; made by {@linkcode startKernel}. */
export class Kernel implements AsyncDisposable {
  readonly #process: KernelProcess;
  readonly #signal: AbortSignal | undefined;
  readonly #wire: Wire;
  readonly #log = new OutputLog();
  readonly #answers = new Map<string, (reply: WireMessage) => void>();
  readonly #marks = new Map<string, (mark: Mark) => void>();
  readonly #pumps: Promise<void>[] = [];
  readonly #sockets: ZmtpSocket[] = [];
  #shell?: ZmtpSocket;
  #control?: ZmtpSocket;
  #publishing = false;
  #closing?: Promise<void>;
  #turn: Promise<unknown> = Promise.resolve();
  readonly #kill = () => this.#process.kill();

  constructor(process: KernelProcess, signal: AbortSignal | undefined) {
    this.#process = process;
    this.#signal = signal;
    this.#wire = new Wire(process.connection.key);
    signal?.addEventListener("abort", this.#kill, { once: true });
  }

  /** Process id of the kernel. */
  get pid(): number {
    return this.#process.pid;
  }

  /** Connects, waits until the kernel answers and publishes, and prepares it. Called once. */
  async open(): Promise<void> {
    const { shellPort, controlPort, iopubPort } = this.#process.connection;
    const iopub = await this.#connect(iopubPort, "SUB");
    this.#pump(iopub, (message) => this.#hear(message));
    this.#shell = await this.#connect(shellPort, "DEALER");
    this.#pump(this.#shell, (message) => this.#answer(message));
    this.#control = await this.#connect(controlPort, "DEALER");
    this.#pump(this.#control, (message) => this.#answer(message));
    // A subscription takes effect some time after it was sent: ask until something is published.
    while (!this.#publishing && this.#closing === undefined) {
      await this.#ask(this.#shell, "kernel_info_request", {});
      for (let waited = 0; waited < READY_PAUSE && !this.#publishing; waited += CONNECT_PAUSE) {
        await after(CONNECT_PAUSE).done;
      }
    }
    // The kernel has read it; so nothing is left behind even if this process is killed.
    this.#process.connection.remove();
    await this.#run(SETUP_CODE, true);
    this.#log.begin();
  }

  /**
   * Executes a cell and waits for all of its outputs. Calls wait for one another.
   *
   * @throws the reason of the kernel's `signal` when that is aborted
   */
  execute(code: string, options: ExecuteOptions = {}): Promise<CellOutcome> {
    const turn = this.#turn.then(() => this.#execute(code, options));
    this.#turn = turn.catch(() => {});
    return turn;
  }

  /** Ends the process, the sockets and the connection file; may be called twice. */
  close(): Promise<void> {
    return this.#closing ??= this.#close();
  }

  [Symbol.asyncDispose](): Promise<void> {
    return this.close();
  }

  async #execute(code: string, { silent = false, timeout }: ExecuteOptions): Promise<CellOutcome> {
    this.#signal?.throwIfAborted();
    if (this.#closing) throw new KernelError("Cannot execute a cell: the kernel has been closed");
    const outputs = this.#log.begin();
    const ended = Promise.race([
      this.#run(code, silent),
      this.#process.death.then((death) => ({ death })),
    ]);
    const limit = after(timeout === undefined ? Infinity : 1000 * timeout);
    let end = await Promise.race([ended, limit.done]);
    limit.cancel();
    const late = end === undefined;
    end ??= await this.#stop(ended);
    this.#signal?.throwIfAborted();
    if ("death" in end) {
      // What was sent before the end is still to be read.
      const wait = after(SHUTDOWN_WAIT);
      await Promise.race([Promise.all(this.#pumps), wait.done]);
      wait.cancel();
      return { status: late ? "timeout" : "died", outputs, death: end.death };
    }
    const place = end.mark.line > 0 ? { line: end.mark.line } : {};
    if (late) return { status: "timeout", outputs, ...place };
    const error = this.#firstError(end);
    if (error === undefined) return { status: "ok", outputs };
    return { status: "error", outputs, error, ...(error.line === undefined ? {} : place) };
  }

  /** Ends a cell that takes too long: by an interrupt, or else by force. */
  async #stop<T>(ended: Promise<T>): Promise<T> {
    if (this.#control) this.#ask(this.#control, "interrupt_request", {});
    const wait = after(INTERRUPT_WAIT);
    const end = await Promise.race([ended, wait.done]);
    wait.cancel();
    if (end !== undefined) return end;
    this.#process.kill();
    return await ended;
  }

  /**
   * Sends the code, then a request for a mark. The kernel answers before it has published all
   * outputs of a cell, but publishes in order: when the mark is heard, every output has been.
   */
  async #run(code: string, silent: boolean): Promise<{ reply: WireMessage; mark: Mark }> {
    const shell = this.#shell!; // opened before anything is run
    const request = {
      code,
      silent,
      store_history: !silent,
      user_expressions: {},
      allow_stdin: false,
      stop_on_error: false,
    };
    const reply = await this.#ask(shell, "execute_request", request);
    const id = crypto.randomUUID();
    const mark = new Promise<Mark>((resolve) => this.#marks.set(id, resolve));
    await this.#ask(shell, "execute_request", {
      ...request,
      code: markCode(id),
      silent: true,
      store_history: false,
    });
    return { reply, mark: await mark };
  }

  /** A failed display publishes an error though the reply says ok; a syntax error does neither. */
  #firstError({ reply, mark }: { reply: WireMessage; mark: Mark }): CellOutcome["error"] {
    const line = mark.line > 0 ? mark.line : undefined;
    if (reply.content.status === "error" && this.#log.firstError(line) === undefined) {
      this.#log.addError(errorOf(reply.content));
    }
    const error = this.#log.firstError(line);
    for (const fault of mark.faults) this.#log.addError({ type: "error", ...fault });
    const first = error ?? this.#log.firstError(undefined);
    if (first === undefined) return undefined;
    const { type: _type, ...told } = first;
    return told;
  }

  #ask(socket: ZmtpSocket, type: string, content: unknown): Promise<WireMessage> {
    const { id, frames } = this.#wire.request(type, content);
    const answer = new Promise<WireMessage>((resolve) => this.#answers.set(id, resolve));
    // A broken connection is noticed by the pumps.
    socket.send(frames).catch(() => {});
    return answer;
  }

  #answer(message: WireMessage): void {
    this.#answers.get(message.parentId)?.(message);
    this.#answers.delete(message.parentId);
  }

  #hear(message: WireMessage): void {
    this.#publishing = true;
    if (message.type === MARK_TYPE) {
      const mark = readMark(message.content);
      this.#marks.get(mark.id)?.(mark);
      this.#marks.delete(mark.id);
    } else this.#log.take(message);
  }

  async #connect(port: number, socketType: "DEALER" | "SUB"): Promise<ZmtpSocket> {
    for (;;) {
      try {
        const socket = await ZmtpSocket.open({ port, socketType });
        this.#sockets.push(socket);
        if (this.#closing) socket.close();
        return socket;
      } catch (error) {
        if (!(error instanceof Deno.errors.ConnectionRefused) || this.#closing) throw error;
        await after(CONNECT_PAUSE).done;
      }
    }
  }

  #pump(socket: ZmtpSocket, take: (message: WireMessage) => void): void {
    const pump = async () => {
      try {
        for (let frames = await socket.receive(); frames; frames = await socket.receive()) {
          take(this.#wire.read(frames));
        }
      } catch (error) {
        // A message with a wrong signature or shape: trust nothing more from there.
        if (!(error instanceof SyntaxError)) throw error;
      }
      if (this.#closing) return;
      // Whoever waits is told by the end of the process; see that it comes.
      const wait = after(SHUTDOWN_WAIT);
      await Promise.race([this.#process.death, wait.done]);
      wait.cancel();
      this.#process.kill();
    };
    this.#pumps.push(pump());
  }

  async #close(): Promise<void> {
    if (this.#control) this.#ask(this.#control, "shutdown_request", { restart: false });
    const wait = after(this.#control ? SHUTDOWN_WAIT : 0);
    await Promise.race([this.#process.death, wait.done]);
    wait.cancel();
    await this.#process.end();
    for (const socket of this.#sockets) socket.close();
    await Promise.all(this.#pumps);
    this.#signal?.removeEventListener("abort", this.#kill);
  }
}

/** A wait that can be called off; Infinity waits for ever. */
function after(milliseconds: number): { readonly done: Promise<undefined>; cancel(): void } {
  let timer: ReturnType<typeof setTimeout> | undefined;
  const done = new Promise<undefined>((resolve) => {
    if (milliseconds < Infinity) {
      timer = setTimeout(() => resolve(undefined), Math.max(0, milliseconds));
    }
  });
  return { done, cancel: () => clearTimeout(timer) };
}

function isFolder(path: string): boolean {
  try {
    return Deno.statSync(path).isDirectory;
  } catch {
    return false;
  }
}
