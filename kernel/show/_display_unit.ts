import { formatQuantity } from "../../lib/quantity/format_quantity.ts";
import { resolveUnit } from "../../lib/quantity/unit.ts";

/** One unit for a whole column or axis, with the way from SI into it. */
export interface DisplayUnit {
  /** Unit with its prefix, "mA"; "" for a pure number. */
  readonly unit: string;
  /** @returns the SI value in `unit` */
  readonly from: (value: number) => number;
}

/** The unit with the prefix that fits the largest of the values, which are in SI. */
export function displayUnit(values: readonly number[], unit: string): DisplayUnit {
  let largest = 0;
  for (const value of values) {
    if (Number.isFinite(value) && Math.abs(value) > Math.abs(largest)) largest = value;
  }
  const { scale: ownScale, offset } = resolveUnit(unit);
  if (offset !== 0) return { unit, from: (value) => (value - offset) / ownScale };
  const shown = formatQuantity(largest, unit).split(" ").slice(1).join(" ");
  const { scale, decimalExponent } = resolveUnit(shown === "" ? "1" : shown);
  // Multiplying by an exact power of ten rounds once; dividing by 1e-3 would round twice.
  const factor = decimalExponent !== undefined && decimalExponent < 0
    ? Number(`1e${-decimalExponent}`)
    : 1 / scale;
  return { unit: shown, from: (value) => value * factor };
}

/** As {@linkcode displayUnit}, but an axis to 0.9 V is drawn in V, its ends being round numbers. */
export function axisUnit(values: readonly number[], unit: string): DisplayUnit {
  return displayUnit(resolveUnit(unit).offset === 0 ? values.map((v) => 2 * v) : values, unit);
}

/** "current, mA", or the bare name of a pure number. */
export function withUnit(name: string, unit: string): string {
  return unit === "" || unit === "1" ? name : `${name}, ${unit}`;
}
