/**
 * Phase noise as a sum of powers of the offset.
 *
 * @module
 */
import { requireLimits, requireNotNegative, requirePositive } from "./_require.ts";
import type { CurvePoint, OffsetRange } from "./piecewise.ts";

/**
 * L(f) = inverseCube / f^3 + inverseSquare / f^2 + inverse / f + floor, in 1/Hz: half the one-sided
 * spectral density of phase (IEEE Std 1139). A term that is left out is zero.
 */
export interface PowerLaw {
  /** Coefficient of 1/f^3, up-converted 1/f noise [Hz^2]. */
  readonly inverseCube?: number;
  /** Coefficient of 1/f^2, white noise of a free-running oscillator [Hz]. */
  readonly inverseSquare?: number;
  /** Coefficient of 1/f, 1/f noise added behind the oscillator [1]. */
  readonly inverse?: number;
  /** White noise added behind the oscillator [1/Hz]. */
  readonly floor?: number;
}

/** The terms of a power law by name, with the power of 1/f of each. */
const TERMS = [["inverseCube", 3], ["inverseSquare", 2], ["inverse", 1], ["floor", 0]] as const;

/**
 * A power law whose terms pass through given points, each term by itself through its own.
 *
 * @throws {RangeError} for an offset that is not positive
 */
export function powerLawThrough(
  points: { readonly [term in keyof PowerLaw]?: CurvePoint },
): PowerLaw {
  const law: { -readonly [term in keyof PowerLaw]: number } = {};
  for (const [term, power] of TERMS) {
    const point = points[term];
    if (!point) continue;
    requirePositive("make a power law", {
      what: `the offset of ${term}`,
      value: point.offset,
      unit: "Hz",
    });
    law[term] = 10 ** (point.level / 10) * point.offset ** power;
  }
  return law;
}

/**
 * Level of a power law.
 *
 * @param offset f [Hz]
 * @returns L [dBc/Hz]
 * @throws {RangeError} for an offset that is not positive, a negative coefficient, or no term at all
 */
export function powerLawLevel(law: PowerLaw, offset: number): number {
  checkPowerLaw(law);
  requirePositive("compute phase noise", { what: "offset", value: offset, unit: "Hz" });
  return 10 * Math.log10(powerLawDensity(law, offset));
}

/**
 * Area under a power law on one side of the carrier, in closed form.
 *
 * @returns area [1]; the phase variance is twice this
 * @throws {RangeError} for limits that are not in order, or a law that {@linkcode powerLawLevel} refuses
 */
export function powerLawArea(law: PowerLaw, { from, to }: OffsetRange): number {
  checkPowerLaw(law);
  requireLimits("integrate phase noise", { from, to });
  const { inverseCube = 0, inverseSquare = 0, inverse = 0, floor = 0 } = law;
  const difference = (to - from) / (from * to);
  return inverseCube * difference * (1 / from + 1 / to) / 2 + inverseSquare * difference +
    inverse * Math.log(to / from) + floor * (to - from);
}

/**
 * Offset where the 1/f^3 and the 1/f^2 term are equal, inverseCube / inverseSquare.
 *
 * @returns corner [Hz], or undefined when one of the two is zero
 * @throws {RangeError} for a law that {@linkcode powerLawLevel} refuses
 */
export function flickerCorner(law: PowerLaw): number | undefined {
  checkPowerLaw(law);
  const { inverseCube = 0, inverseSquare = 0 } = law;
  return inverseCube > 0 && inverseSquare > 0 ? inverseCube / inverseSquare : undefined;
}

/**
 * Offset where the 1/f^2 term and the floor are equal, sqrt(inverseSquare / floor).
 *
 * @returns corner [Hz], or undefined when one of the two is zero
 * @throws {RangeError} for a law that {@linkcode powerLawLevel} refuses
 */
export function floorCorner(law: PowerLaw): number | undefined {
  checkPowerLaw(law);
  const { inverseSquare = 0, floor = 0 } = law;
  return inverseSquare > 0 && floor > 0 ? Math.sqrt(inverseSquare / floor) : undefined;
}

/**
 * Refuses a negative coefficient and a law without a term.
 *
 * @internal
 */
export function checkPowerLaw(law: PowerLaw): void {
  let sum = 0;
  for (const [term, power] of TERMS) {
    const value = law[term] ?? 0;
    const unit = ["1/Hz", "", "Hz", "Hz^2"][power]!;
    requireNotNegative("use the power law", { what: term, value, unit });
    sum += value;
  }
  if (!(sum > 0)) {
    throw new RangeError("Cannot use the power law: at least one coefficient must be > 0");
  }
}

/**
 * Linear density of a checked power law [1/Hz].
 *
 * @internal
 */
export function powerLawDensity(law: PowerLaw, offset: number): number {
  const { inverseCube = 0, inverseSquare = 0, inverse = 0, floor = 0 } = law;
  return ((inverseCube / offset + inverseSquare) / offset + inverse) / offset + floor;
}
