import { formatQuantity } from "../../lib/quantity/format_quantity.ts";
import { markup } from "./markup.ts";
import { Showable } from "./showable.ts";

/** Options of {@linkcode quantity}. */
export interface QuantityOptions {
  /** What the value is, put in front of it. */
  readonly name?: string;
  /** Significant digits. @default as `formatQuantity` chooses */
  readonly digits?: number;
}

/**
 * A value with its unit: `quantity(1.2e-9, "H", { name: "Inductance" })` reads "Inductance: 1.2 nH".
 *
 * @param value [unit] in SI, as `formatQuantity` takes it
 * @throws {RangeError} when the value is not finite
 */
export function quantity(
  value: number,
  unit: string,
  { name, digits }: QuantityOptions = {},
): Showable {
  const text = formatQuantity(value, unit, digits === undefined ? {} : { digits });
  return new Showable({
    "text/plain": name === undefined ? text : `${name}: ${text}`,
    "text/html":
      markup`<p>${name === undefined ? "" : `${name}: `}<strong>${text}</strong></p>`.text,
  });
}
