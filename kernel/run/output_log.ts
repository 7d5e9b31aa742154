import type { ErrorOutput, KernelOutput } from "./kernel_output.ts";
import type { WireMessage } from "./wire.ts";

/** What the kernel answers to a syntax error or an import it cannot load: no place, no reason. */
const NO_REASON = "Execution failed";

/**
 * Collects outputs cell by cell, in the order of their arrival. An update of a display replaces it
 * where it stands, in an earlier cell too, so the list of a finished cell may still change.
 */
export class OutputLog {
  #outputs: KernelOutput[] = [];
  #clearOnNext = false;
  readonly #displays = new Map<string, { list: KernelOutput[]; index: number }[]>();

  /** Starts the list of the next cell and returns it. */
  begin(): readonly KernelOutput[] {
    this.#outputs = [];
    this.#clearOnNext = false;
    return this.#outputs;
  }

  /** Takes what an iopub message says; messages that are no output are passed over. */
  take({ type, content }: WireMessage): void {
    if (type === "clear_output") {
      if (content.wait === true) this.#clearOnNext = true;
      else this.#clear();
    } else if (type === "update_display_data") {
      const id = displayIdOf(content);
      for (const { list, index } of this.#displays.get(id ?? "") ?? []) {
        // A cleared list no longer holds what stood there.
        if (list[index]?.type === "display" && list[index].displayId === id) {
          list[index] = displayOf(content);
        }
      }
    } else if (type === "display_data" || type === "execute_result") {
      this.#add(displayOf(content));
    } else if (type === "stream") {
      this.#addText(content.name === "stderr" ? "stderr" : "stdout", String(content.text ?? ""));
    } else if (type === "error") {
      this.#add(errorOf(content));
    }
  }

  /** Adds an error that did not come as an output of its own. */
  addError(error: ErrorOutput): void {
    this.#add(error);
  }

  /** The cell's first error, given `line` if it has none. */
  firstError(line: number | undefined): ErrorOutput | undefined {
    for (const [i, output] of this.#outputs.entries()) {
      if (output.type !== "error") continue;
      if (line === undefined || output.line !== undefined) return output;
      return this.#outputs[i] = { ...output, line };
    }
    return undefined;
  }

  #add(output: KernelOutput): void {
    if (this.#clearOnNext) this.#clear();
    const index = this.#outputs.push(output) - 1;
    if (output.type === "display" && output.displayId !== undefined) {
      const places = this.#displays.get(output.displayId) ?? [];
      places.push({ list: this.#outputs, index });
      this.#displays.set(output.displayId, places);
    }
  }

  #addText(name: "stdout" | "stderr", text: string): void {
    if (this.#clearOnNext) this.#clear();
    const last = this.#outputs.at(-1);
    if (last?.type === "stream" && last.name === name) {
      this.#outputs[this.#outputs.length - 1] = { ...last, text: last.text + text };
    } else this.#add({ type: "stream", name, text });
  }

  #clear(): void {
    this.#outputs.length = 0;
    this.#clearOnNext = false;
  }
}

/** The error an `error` message or a failed `execute_reply` tells. */
export function errorOf(content: Readonly<Record<string, unknown>>): ErrorOutput {
  const value = String(content.evalue ?? "");
  const traceback = Array.isArray(content.traceback) ? content.traceback : [];
  let message = value;
  if (traceback.length === 0 && value === NO_REASON) {
    message = "the kernel could not run this cell and gives no reason; " +
      "check its imports against deno.json and deno.lock";
  } else if (traceback.length === 1 && traceback[0] === "") {
    // Only something that is no Error has an empty stack.
    message = `a value that is not an Error was thrown: ${value}`;
  }
  return { type: "error", name: String(content.ename || "Error"), message };
}

function displayOf(content: Readonly<Record<string, unknown>>): KernelOutput {
  const displayId = displayIdOf(content);
  return {
    type: "display",
    data: recordOf(content.data),
    metadata: recordOf(content.metadata),
    ...(displayId === undefined ? {} : { displayId }),
  };
}

function displayIdOf(content: Readonly<Record<string, unknown>>): string | undefined {
  const id = recordOf(content.transient).display_id;
  return typeof id === "string" ? id : undefined;
}

function recordOf(value: unknown): Readonly<Record<string, unknown>> {
  return typeof value === "object" && value !== null ? { ...value } : {};
}
