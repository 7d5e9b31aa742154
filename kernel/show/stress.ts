import { formatQuantity } from "../../lib/quantity/format_quantity.ts";
import type { Stress } from "./payload.ts";
import { PayloadShowable } from "./showable.ts";
import { table } from "./table.ts";

/**
 * Worst-case stresses against the technology card's limits; the report's caution section shows them
 * again, those over their limit first.
 *
 * @param rows value and limit [unit] in SI, both magnitudes
 * @throws {RangeError} when a value is not finite or negative, or a limit is not above 0
 */
export function stress(
  rows: readonly Stress[],
): PayloadShowable<{ readonly kind: "stress"; readonly rows: readonly Stress[] }> {
  for (const { device, quantity, value, limit, unit } of rows) {
    const what = `Cannot list the ${quantity} of ${device}`;
    if (!(value >= 0 && value < Infinity)) {
      throw new RangeError(`${what}: value must be finite and >= 0 ${unit}, got ${value} ${unit}`);
    }
    if (!(limit > 0 && limit < Infinity)) {
      throw new RangeError(`${what}: limit must be finite and > 0 ${unit}, got ${limit} ${unit}`);
    }
  }
  const { bundle } = table({
    caption: "Worst-case stress against the limits of the technology card",
    columns: [
      { name: "device" },
      { name: "stress" },
      { name: "worst" },
      { name: "limit" },
      { name: "share of limit", unit: "%", digits: 3 },
      { name: "at" },
      { name: "judgement" },
    ],
    rows: rows.map((row) => [
      row.device,
      row.quantity,
      formatQuantity(row.value, row.unit),
      formatQuantity(row.limit, row.unit),
      row.value / row.limit,
      row.at,
      stressJudgement(row),
    ]),
  });
  return new PayloadShowable({ kind: "stress", rows }, bundle);
}

/** Whether a stress is within its limit, in a symbol and words. */
export function stressJudgement({ value, limit }: Pick<Stress, "value" | "limit">): string {
  return value > limit ? "\u2717 over the limit" : "\u2713 within";
}
