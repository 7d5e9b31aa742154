import { jupyter } from "./_jupyter.ts";
import { Showable } from "./showable.ts";

/**
 * Wait after a display [ms]: the kernel answers "idle" before its outputs have left, and what leaves
 * late lands under the next cell. Measured on Deno 2.9.6: 20 ms keep bundles up to 100 kB in place,
 * 60 ms keep 2 MB.
 */
const WAIT = { base: 20, perMegabyte: 20, most: 500 } as const;

/**
 * Displays showables, or text, in order under the cell; outside a kernel prints their plain text.
 * End a cell with `await show(...)`.
 *
 * @throws {TypeError} when an item is neither a showable nor text
 */
export async function show(...items: readonly (Showable | string)[]): Promise<void> {
  const bundles = items.map((item, i) => {
    if (typeof item === "string") return { "text/plain": item };
    if (item instanceof Showable) return item.bundle;
    throw new TypeError(
      `Cannot show item ${
        i + 1
      }: it must be text or made by quantity, table, chart, verdict and the ` +
        `like, got ${item === null ? "null" : typeof item}`,
    );
  });
  const kernel = jupyter();
  if (kernel === undefined) {
    for (const bundle of bundles) console.log(bundle["text/plain"]);
    return;
  }
  let size = 0;
  for (const data of bundles) {
    size += JSON.stringify(data).length;
    await kernel.broadcast("display_data", { data, metadata: {}, transient: {} });
  }
  const wait = Math.min(WAIT.base + WAIT.perMegabyte * size / 1e6, WAIT.most);
  await new Promise((resolve) => setTimeout(resolve, wait));
}
