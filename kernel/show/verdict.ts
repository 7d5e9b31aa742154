import { formatQuantity } from "../../lib/quantity/format_quantity.ts";
import { markup } from "./markup.ts";
import type { Limit, Verdict, VerdictState } from "./payload.ts";
import { PayloadShowable } from "./showable.ts";
import { differenceText, limitText, STATE_SYMBOLS } from "./verdict_text.ts";

/** Options of {@linkcode verdict}: at least one limit is given. */
export interface VerdictOptions {
  /** Lower limit [unit], itself allowed. */
  readonly atLeast?: number;
  /** Upper limit [unit], itself allowed. */
  readonly atMost?: number;
  /** Margin asked for [unit]: inside the limit by less is *thin*. @default 0 */
  readonly thin?: number;
  /** Where the worst value was found, or why there is none. */
  readonly note?: string;
}

/** Slack of the asked margin against the rounding of value - limit, relative to the larger of them. */
const ROUNDING = 4 * Number.EPSILON;

/** Note of a verdict without value or reason. */
const NO_REASON = "no value was computed, and no reason was given";

/**
 * Holds a named figure against its limits and hands the result to the report.
 *
 * missed: outside a limit; thin: inside by less than `thin`; met: inside; not run: no finite value.
 *
 * @param name what is judged
 * @param value [unit] in SI, or null when it could not be computed (say why in `note`)
 * @param unit as `formatQuantity` takes it
 * @throws {TypeError} when no limit is given
 * @throws {RangeError} when a limit is not finite, the limits exclude each other or `thin` is negative
 */
export function verdict(
  name: string,
  value: number | null,
  unit: string,
  options: VerdictOptions,
): PayloadShowable<{ readonly kind: "verdict" } & Verdict> {
  const judged = judge(name, value, unit, options);
  const limit = limitText(judged);
  const margin = judged.margin === null
    ? undefined
    : `margin ${differenceText(judged.margin, unit)}`;
  const shown = judged.value === null ? "no value" : formatQuantity(judged.value, unit);
  const { state, note } = judged;
  const details = [`limit: ${limit}`, margin].filter((part) => part !== undefined).join(", ");
  const tail = note === undefined ? "" : `; ${note}`;
  return new PayloadShowable({ kind: "verdict", ...judged }, {
    "text/plain": `${STATE_SYMBOLS[state]} ${state}: ${name}: ${shown} (${details})${tail}`,
    "text/html": markup`
      <p class="verdict ${state.replace(" ", "-")}">
      <strong>${STATE_SYMBOLS[state]} ${state}</strong>
      ${" "}${name}: <strong>${shown}</strong> (${details})${tail}</p>`.text,
  });
}

function judge(
  name: string,
  value: number | null,
  unit: string,
  { atLeast, atMost, thin = 0, note }: VerdictOptions,
): Verdict {
  if (atLeast === undefined && atMost === undefined) {
    throw new TypeError(`Cannot judge "${name}": atLeast or atMost must be given, got neither`);
  }
  for (const [side, limit] of [["atLeast", atLeast], ["atMost", atMost]] as const) {
    if (limit !== undefined && !Number.isFinite(limit)) {
      throw new RangeError(`Cannot judge "${name}": ${side} must be finite, got ${limit} ${unit}`);
    }
  }
  if (atLeast !== undefined && atMost !== undefined && !(atLeast <= atMost)) {
    throw new RangeError(
      `Cannot judge "${name}": atLeast must be <= atMost, got ${atLeast} and ${atMost} ${unit}`,
    );
  }
  if (!(thin >= 0)) {
    throw new RangeError(`Cannot judge "${name}": thin must be >= 0 ${unit}, got ${thin} ${unit}`);
  }
  const limit: Limit = {
    ...(atLeast === undefined ? {} : { atLeast }),
    ...(atMost === undefined ? {} : { atMost }),
  };
  if (value === null || !Number.isFinite(value)) {
    const odd = value === null ? undefined : `the computed value is ${oddName(value)}`;
    const reason = [note, odd].filter((part) => part !== undefined).join("; ") || NO_REASON;
    return { name, value: null, unit, limit, margin: null, state: "not run", note: reason };
  }
  const margin = Math.min(
    atLeast === undefined ? Infinity : value - atLeast,
    atMost === undefined ? Infinity : atMost - value,
  );
  const slack = ROUNDING * Math.max(Math.abs(value), Math.abs(atLeast ?? 0), Math.abs(atMost ?? 0));
  const state: VerdictState = margin < 0 ? "missed" : margin + slack < thin ? "thin" : "met";
  return { name, value, unit, limit, margin, state, ...(note === undefined ? {} : { note }) };
}

function oddName(value: number): string {
  return Number.isNaN(value) ? "not a number" : value > 0 ? "infinite" : "minus infinite";
}
