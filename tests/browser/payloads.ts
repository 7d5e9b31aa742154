import { type Payload, PAYLOAD_MIME } from "../../kernel/show/payload.ts";

/**
 * The verdicts and figures among outputs, by name. Not by cell: Deno's kernel says a cell is done
 * before it has sent its outputs, so other clients file some under the next one.
 */
export function figuresOf(outputs: readonly object[]): Record<string, number | string | null> {
  const found: [string, number | string | null][] = [];
  for (const output of outputs) {
    const data = "data" in output ? output.data : undefined;
    const raw = typeof data === "object" && data !== null && PAYLOAD_MIME in data
      ? data[PAYLOAD_MIME]
      : undefined;
    if (raw === undefined) continue;
    const payload = (typeof raw === "string" ? JSON.parse(raw) : raw) as Payload;
    if (payload.kind === "figure") found.push([`figure ${payload.name}`, payload.value]);
    if (payload.kind === "verdict") {
      found.push([`verdict ${payload.name}`, payload.value], [
        `state of ${payload.name}`,
        payload.state,
      ]);
    }
  }
  return Object.fromEntries(found.sort(([a], [b]) => a < b ? -1 : 1));
}

/** All outputs of a notebook as nbformat writes it. */
export function outputsOf(notebook: unknown): readonly object[] {
  const { cells } = notebook as { cells: readonly { readonly outputs?: readonly object[] }[] };
  return cells.flatMap(({ outputs = [] }) => outputs);
}
