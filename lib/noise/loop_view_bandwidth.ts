/**
 * The loop bandwidth that balances oscillator and reference.
 *
 * @module
 */
import { requireLimits } from "./_require.ts";
import { type PhaseNoise, phaseNoiseDensity } from "./integrals.ts";
import type { Loop } from "./loop_view.ts";
import {
  type IntegratedLockedNoise,
  integrateLockedNoise,
  type LockedSources,
} from "./loop_view_locked_noise.ts";
import type { OffsetRange } from "./piecewise.ts";

/** Options of {@linkcode balancedBandwidth}. */
export interface BalancedBandwidthOptions extends OffsetRange {
  /** The loop of a bandwidth [Hz], such as `firstOrderLoop`. */
  readonly loopOf: (bandwidth: number) => Loop;
  /** Bandwidths among which to look; a tenth of the reference is a usual upper end [Hz]. */
  readonly among: OffsetRange;
  /**
   * Carrier f0 [Hz].
   * @default none: no jitter in the result
   */
  readonly frequency?: number;
}

/** The bandwidth of the least total phase error. */
export interface BalancedBandwidth {
  /** `found` inside the range, or at an end of it, where a bandwidth outside might be better. */
  readonly status: "found" | "at the lower end" | "at the upper end";
  /** [Hz] */
  readonly bandwidth: number;
  /** What is left at that bandwidth. */
  readonly noise: IntegratedLockedNoise;
  /**
   * Lowest offset within the limits where the reference's noise, at the output, rises above the
   * free-running oscillator's: near the best bandwidth [Hz]. Absent where the two do not cross.
   */
  readonly crossing?: number;
  /** Integrals computed. */
  readonly evaluations: number;
}

/** Bandwidths tried per decade before the best is refined: the total has one broad minimum or two. */
const TRIES_PER_DECADE = 8;
/** Stops when the bandwidth is known to this ratio; the total, flat there, to its square. */
const RATIO = 1 + 1e-5;
/** Offsets looked at per decade for the crossing. */
const CROSSING_STEPS = 50;
const GOLDEN = (Math.sqrt(5) - 1) / 2;

/**
 * The loop bandwidth at which the total phase error is least, among given bandwidths: tried over the whole
 * range, then narrowed by golden section.
 *
 * @throws {TypeError} without a reference
 * @throws {RangeError} for limits that are not in order, or beyond the points of a curve
 */
export function balancedBandwidth(
  sources: LockedSources & { readonly reference: PhaseNoise },
  { from, to, loopOf, among, frequency }: BalancedBandwidthOptions,
): BalancedBandwidth {
  requireLimits("balance the loop", { from, to });
  requireLimits("balance the loop", among);
  if (sources.reference === undefined) {
    throw new TypeError("Cannot balance the loop: expected a reference, got none");
  }
  let evaluations = 0;
  const noiseAt = (logarithm: number) => {
    evaluations++;
    const loop = loopOf(Math.exp(logarithm));
    return integrateLockedNoise(sources, {
      loop,
      from,
      to,
      ...(frequency === undefined ? {} : { frequency }),
    });
  };
  const start = Math.log(among.from);
  const width = Math.log(among.to) - start;
  const count = Math.ceil(width / Math.LN10 * TRIES_PER_DECADE) + 1;
  const tries = Array.from({ length: count }, (_, i) => start + width * i / (count - 1));
  const totals = tries.map((each) => noiseAt(each).total.area);
  const best = totals.indexOf(Math.min(...totals));
  const logarithm = narrow((each) => noiseAt(each).total.area, {
    low: tries[Math.max(0, best - 1)]!,
    high: tries[Math.min(count - 1, best + 1)]!,
  });
  // An end is the best where the narrowing ran into it.
  const near = Math.log(RATIO);
  const status = logarithm - start < near
    ? "at the lower end"
    : start + width - logarithm < near
    ? "at the upper end"
    : "found";
  const crossing = crossingOf(sources, { from, to });
  return {
    status,
    bandwidth: Math.exp(logarithm),
    noise: noiseAt(logarithm),
    ...(crossing === undefined ? {} : { crossing }),
    evaluations,
  };
}

/** Golden section between `low` and `high`, which enclose one minimum. */
function narrow(
  cost: (x: number) => number,
  { low, high }: { low: number; high: number },
): number {
  let left = high - GOLDEN * (high - low);
  let right = low + GOLDEN * (high - low);
  let costLeft = cost(left);
  let costRight = cost(right);
  while (high - low > Math.log(RATIO)) {
    if (costLeft <= costRight) {
      high = right;
      [right, costRight] = [left, costLeft];
      left = high - GOLDEN * (high - low);
      costLeft = cost(left);
    } else {
      low = left;
      [left, costLeft] = [right, costRight];
      right = low + GOLDEN * (high - low);
      costRight = cost(right);
    }
  }
  return (low + high) / 2;
}

function crossingOf(
  { oscillator, reference, multiplication = 1 }: LockedSources & { readonly reference: PhaseNoise },
  { from, to }: OffsetRange,
): number | undefined {
  const free = phaseNoiseDensity(oscillator);
  const source = phaseNoiseDensity(reference);
  const decades = Math.log10(to / from);
  const steps = Math.ceil(decades * CROSSING_STEPS);
  // Rounding must not carry an offset beyond the limits, where a curve cannot be read.
  const offsetAt = (i: number) => Math.min(to, from * 10 ** (decades * i / steps));
  const excess = (offset: number) => Math.log(multiplication ** 2 * source(offset) / free(offset));
  for (let i = 0; i < steps; i++) {
    let low = offsetAt(i);
    let high = offsetAt(i + 1);
    if (!(excess(low) < 0 && excess(high) >= 0)) continue;
    while (high / low > RATIO) {
      const middle = Math.sqrt(low * high);
      if (excess(middle) < 0) low = middle;
      else high = middle;
    }
    return Math.sqrt(low * high);
  }
  return undefined;
}
