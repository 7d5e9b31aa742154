/**
 * Which contributor of a budget would have to be off, and by how much, to explain a measured or simulated curve.
 *
 * Indices stay inside the arrays by construction; `!` says so to the compiler.
 *
 * @module
 */
import type { NoiseBudget } from "./budget.ts";
import { checkCurve, curveLevel, type PhaseNoiseCurve } from "./piecewise.ts";

/** How far a contributor may be off [dB]. */
const FARTHEST = 40;
/** Factors tried before the best is narrowed down [dB]. */
const STEP = 1;
/** The factor is known to this [dB]. */
const PRECISION = 1e-4;
const GOLDEN = (Math.sqrt(5) - 1) / 2;
/** rms residuals within this of the best say that the curve cannot tell the contributors apart [dB]. */
const SAME = 0.3;

/** A contributor that may be off: its phase noise at the budget's offsets [1/Hz], shape (m,). */
export interface Suspect {
  readonly name: string;
  readonly phase: ArrayLike<number>;
}

/** One contributor taken as the only one that is off. */
export interface Explanation {
  readonly name: string;
  /** Factor on its noise power that brings the total nearest to the curve [dB]. */
  readonly decibels: number;
  /** rms of curve minus total with that factor [dB]. */
  readonly rms: number;
  /** Whether its rms is as good as the best one's: the curve cannot tell them apart. */
  readonly asGood: boolean;
}

/** A curve against a budget. */
export interface CurveExplanation {
  /** Offsets of the budget inside the curve [Hz], shape (m,). */
  readonly offsets: readonly number[];
  /** Curve minus the budget's total there [dB], shape (m,). */
  readonly residuals: readonly number[];
  /** rms of the residuals [dB]. */
  readonly rms: number;
  /** The best first. */
  readonly explanations: readonly Explanation[];
}

/**
 * Holds a curve against a budget and, for each contributor by itself, finds the factor on its noise power, 40 dB
 * either way at most, that brings the total nearest to the curve in the root mean square of decibels.
 *
 * @param suspects contributors; their sum need not be the whole budget
 * @throws {RangeError} for a curve that `checkCurve` refuses, or one that covers fewer than two of the budget's offsets
 * @throws {TypeError} for a contributor with another number of values than there are offsets
 */
export function explainCurve(
  budget: Pick<NoiseBudget, "offsets" | "total">,
  { curve, suspects }: { readonly curve: PhaseNoiseCurve; readonly suspects: readonly Suspect[] },
): CurveExplanation {
  checkCurve(curve);
  const { offsets, total } = budget;
  const [first, last] = [curve[0]!.offset, curve.at(-1)!.offset];
  const places = offsets.flatMap((offset, k) => offset >= first && offset <= last ? [k] : []);
  if (places.length < 2) {
    throw new RangeError(
      `Cannot explain the curve: it must cover at least 2 of the budget's offsets, got ` +
        `${places.length} between ${first} Hz and ${last} Hz`,
    );
  }
  const measured = places.map((k) => curveLevel(curve, offsets[k]!));
  const base = places.map((k) => 10 ** (total[k]! / 10));
  const residuals = places.map((k, i) => measured[i]! - total[k]!);
  const rmsWith = (part: readonly number[], decibels: number) => {
    const more = 10 ** (decibels / 10) - 1;
    return rmsOf(base.map((own, i) => measured[i]! - 10 * Math.log10(own + more * part[i]!)));
  };
  const found = suspects.map(({ name, phase }) => {
    if (phase.length !== offsets.length) {
      throw new TypeError(
        `Cannot explain the curve: ${name} must have ${offsets.length} values, found ${phase.length}`,
      );
    }
    // Rounding must not let a contributor exceed the total it is part of.
    const part = places.map((k, i) => Math.min(phase[k]!, base[i]! * (1 - Number.EPSILON)));
    const decibels = least((value) => rmsWith(part, value));
    return { name, decibels, rms: rmsWith(part, decibels) };
  }).sort((a, b) => a.rms - b.rms);
  const best = found[0]?.rms ?? 0;
  return {
    offsets: places.map((k) => offsets[k]!),
    residuals,
    rms: rmsOf(residuals),
    explanations: found.map((own) => ({ ...own, asGood: own.rms <= best + SAME })),
  };
}

/** Where a cost over the factors is least: tried in steps, narrowed by golden section. */
function least(cost: (decibels: number) => number): number {
  let best = 0;
  for (let value = -FARTHEST; value <= FARTHEST; value += STEP) {
    if (cost(value) < cost(best)) best = value;
  }
  let [low, high] = [Math.max(-FARTHEST, best - STEP), Math.min(FARTHEST, best + STEP)];
  while (high - low > PRECISION) {
    const left = high - GOLDEN * (high - low);
    const right = low + GOLDEN * (high - low);
    if (cost(left) <= cost(right)) high = right;
    else low = left;
  }
  return (low + high) / 2;
}

function rmsOf(values: readonly number[]): number {
  return Math.sqrt(values.reduce((sum, value) => sum + value * value, 0) / values.length);
}
