/** Type of the iopub message that marks the end of a cell's outputs. */
export const MARK_TYPE = "tankwright_mark";

/** Name of the global that holds the line of the top-level statement now running. */
export const LINE_VARIABLE = "__tankwrightLine";

/** What a mark carries. */
export interface Mark {
  readonly id: string;
  /** Line of the last statement begun, 0 when the cell carries no line numbers. */
  readonly line: number;
  /** Errors that reached no statement of a cell. */
  readonly faults: readonly { readonly name: string; readonly message: string }[];
}

/**
 * Code run once in every kernel. It keeps the line number, collects rejections and timer errors
 * (which the kernel would swallow), sends marks, and ends the kernel when its parent is gone, for a
 * parent that was killed cannot do it.
 */
export const SETUP_CODE = `{
  const broadcast = Deno.jupyter.broadcast.bind(Deno.jupyter);
  const faults = [];
  const fault = (error, origin) => {
    const known = error instanceof Error;
    const message = known ? error.message : "a value that is not an Error: " + String(error);
    faults.push({ name: known ? error.name : "Error", message: message + " (" + origin + ")" });
  };
  addEventListener("unhandledrejection", (event) => {
    event.preventDefault();
    fault(event.reason, "in a promise that no statement awaits");
  });
  addEventListener("error", (event) => {
    event.preventDefault();
    fault(event.error ?? event.message, "in a timer or an event listener");
  });
  Object.defineProperty(globalThis, "${LINE_VARIABLE}", { value: 0, writable: true });
  Object.defineProperty(globalThis, Symbol.for("tankwright.mark"), {
    value: async (id) => {
      // One turn of the event loop, so that rejections of the cell have been reported.
      await new Promise((resolve) => setTimeout(resolve, 0));
      const line = globalThis.${LINE_VARIABLE};
      globalThis.${LINE_VARIABLE} = 0;
      await broadcast("${MARK_TYPE}", { id, line, faults: faults.splice(0) });
    },
  });
  const parent = Deno.ppid;
  Deno.unrefTimer(setInterval(() => {
    if (Deno.ppid !== parent) Deno.exit(1);
  }, 500));
}`;

/** Code that makes the kernel send a mark with this id. */
export function markCode(id: string): string {
  return `await globalThis[Symbol.for("tankwright.mark")]("${id}"); undefined`;
}

/** Reads the content of a mark. */
export function readMark(content: Readonly<Record<string, unknown>>): Mark {
  return {
    id: String(content.id),
    line: Number(content.line),
    faults: content.faults as Mark["faults"],
  };
}
