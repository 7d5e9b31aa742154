import { formatQuantity } from "../../lib/quantity/format_quantity.ts";
import { markup } from "./markup.ts";
import type { Figure } from "./payload.ts";
import { PayloadShowable } from "./showable.ts";

/**
 * A named figure without a limit, handed to the report so that revisions can be compared.
 *
 * @param value [unit] in SI
 * @param unit as `formatQuantity` takes it
 * @throws {RangeError} when the value is not finite
 */
export function figure(
  name: string,
  value: number,
  unit: string,
): PayloadShowable<{ readonly kind: "figure" } & Figure> {
  if (!Number.isFinite(value)) {
    throw new RangeError(`Cannot show "${name}": value must be finite, got ${value} ${unit}`);
  }
  const text = formatQuantity(value, unit);
  return new PayloadShowable({ kind: "figure", name, value, unit }, {
    "text/plain": `${name}: ${text}`,
    "text/html": markup`<p>${name}: <strong>${text}</strong></p>`.text,
  });
}
