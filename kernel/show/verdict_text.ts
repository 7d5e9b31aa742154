import { formatQuantity } from "../../lib/quantity/format_quantity.ts";
import type { Verdict, VerdictState } from "./payload.ts";

/** A symbol beside each state's word, so that neither colour nor language alone carries it. */
export const STATE_SYMBOLS: Readonly<Record<VerdictState, string>> = {
  met: "\u2713",
  thin: "\u25b3",
  missed: "\u2717",
  waived: "\u25c7",
  "not run": "\u2013",
};

/** "at least 2", "0.9 V to 1.1 V". */
export function limitText(
  { limit: { atLeast, atMost }, unit }: Pick<Verdict, "limit" | "unit">,
): string {
  if (atLeast !== undefined && atMost !== undefined) {
    return `${formatQuantity(atLeast, unit)} to ${formatQuantity(atMost, unit)}`;
  }
  if (atLeast !== undefined) return `at least ${formatQuantity(atLeast, unit)}`;
  return atMost === undefined ? "none" : `at most ${formatQuantity(atMost, unit)}`;
}

/**
 * A difference of two values in `unit` as text: a span of degrees is not a temperature, and a span of
 * levels is in plain decibels whatever they refer to.
 *
 * @param difference [unit] in SI
 */
export function differenceText(difference: number, unit: string): string {
  if (unit === "°C") return formatQuantity(difference, "K");
  return formatQuantity(difference, unit.startsWith("dB") ? "dB" : unit);
}
