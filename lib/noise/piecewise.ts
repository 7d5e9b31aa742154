/**
 * Phase noise given at points, straight in dB over the logarithm of the offset in between.
 *
 * @module
 */
import { requireFinite, requireLimits, requirePositive } from "./_require.ts";

/** One point of a phase-noise curve. */
export interface CurvePoint {
  /** Offset from the carrier [Hz]. */
  readonly offset: number;
  /** L, half the one-sided spectral density of phase [dBc/Hz]. */
  readonly level: number;
}

/** Points with rising offsets. */
export type PhaseNoiseCurve = readonly CurvePoint[];

/** Limits in offset, 0 < from < to [Hz]. */
export interface OffsetRange {
  /** [Hz] */
  readonly from: number;
  /** [Hz] */
  readonly to: number;
}

/**
 * Refuses a curve that is empty, has offsets that do not rise, or a level that is not finite.
 *
 * @throws {TypeError} when there are fewer than two points
 * @throws {RangeError} for a point that is out of order, or at or beyond the carrier's `frequency` [Hz]
 */
export function checkCurve(
  curve: PhaseNoiseCurve,
  { frequency = Infinity }: { readonly frequency?: number } = {},
): void {
  const action = "use the phase-noise curve";
  if (curve.length < 2) {
    throw new TypeError(`Cannot ${action}: expected at least 2 points, got ${curve.length}`);
  }
  let previous = 0;
  curve.forEach(({ offset, level }, index) => {
    const place = `point ${index + 1}`;
    requirePositive(action, { what: `the offset of ${place}`, value: offset, unit: "Hz" });
    requireFinite(action, { what: `the level of ${place}`, value: level, unit: "dBc/Hz" });
    if (offset === previous) {
      throw new RangeError(`Cannot ${action}: ${place} repeats the offset ${offset} Hz`);
    }
    if (!(offset > previous)) {
      throw new RangeError(
        `Cannot ${action}: offsets must rise, but ${place} has ${offset} Hz after ${previous} Hz`,
      );
    }
    if (!(offset < frequency)) {
      throw new RangeError(
        `Cannot ${action}: an offset must be below the carrier's ${frequency} Hz, but ${place} has ` +
          `${offset} Hz`,
      );
    }
    previous = offset;
  });
}

/**
 * Level of a curve, straight in dB over log f between its points.
 *
 * @param offset within the curve [Hz]
 * @returns L [dBc/Hz]
 * @throws {RangeError} outside the curve: it is not continued beyond its ends
 */
export function curveLevel(curve: PhaseNoiseCurve, offset: number): number {
  checkCurve(curve);
  requireInside(curve, offset);
  return levelInside(curve, offset);
}

/**
 * Area under a curve on one side of the carrier, the integral of L over the offset, exact for its
 * straight pieces: L1 f1 (r^(s + 1) - 1) / (s + 1) with r = f2/f1 and slope s, and L1 f1 ln r for s = -1.
 *
 * @returns area [1]; the phase variance is twice this, since L is half the one-sided density
 * @throws {RangeError} for limits that are not in order or reach beyond the curve
 */
export function curveArea(curve: PhaseNoiseCurve, { from, to }: OffsetRange): number {
  checkCurve(curve);
  requireLimits("integrate the phase-noise curve", { from, to });
  requireInside(curve, from);
  requireInside(curve, to);
  const inside = curve.filter(({ offset }) => offset > from && offset < to);
  let start: CurvePoint = { offset: from, level: levelInside(curve, from) };
  let area = 0;
  for (const end of [...inside, { offset: to, level: levelInside(curve, to) }]) {
    area += pieceArea(start, end);
    start = end;
  }
  return area;
}

function pieceArea(start: CurvePoint, end: CurvePoint): number {
  const width = Math.log(end.offset / start.offset);
  // (slope + 1) times the width; expm1 keeps the digits where the slope is near -1.
  const growth = (end.level - start.level) / 10 * Math.LN10 + width;
  const mean = growth === 0 ? 1 : Math.expm1(growth) / growth;
  return 10 ** (start.level / 10) * start.offset * width * mean;
}

/**
 * Sum of uncorrelated levels, 10 log(sum of 10^(L/10)).
 *
 * @param levels in dBc/Hz, or any one power level in dB; `-Infinity` is nothing
 * @throws {TypeError} for an empty list
 */
export function sumLevels(levels: readonly number[]): number {
  if (levels.length === 0) throw new TypeError("Cannot sum levels: expected at least 1, got 0");
  const highest = Math.max(...levels);
  if (highest === -Infinity) return highest;
  return highest +
    10 * Math.log10(levels.reduce((sum, level) => sum + 10 ** ((level - highest) / 10), 0));
}

function requireInside(curve: PhaseNoiseCurve, offset: number): void {
  const first = curve[0]!.offset;
  const last = curve.at(-1)!.offset;
  if (!(offset >= first && offset <= last)) {
    throw new RangeError(
      `Cannot read the phase-noise curve at ${offset} Hz: it runs from ${first} Hz to ${last} Hz`,
    );
  }
}

/** Level at an offset that is known to lie inside a checked curve. */
function levelInside(curve: PhaseNoiseCurve, offset: number): number {
  let low = 0;
  let high = curve.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (curve[middle]!.offset <= offset) low = middle;
    else high = middle;
  }
  const a = curve[low]!;
  const b = curve[high]!;
  if (offset === b.offset) return b.level;
  const share = Math.log(offset / a.offset) / Math.log(b.offset / a.offset);
  return a.level + share * (b.level - a.level);
}

/**
 * Linear density of a curve, checked once for many readings.
 *
 * @internal
 */
export function curveDensity(curve: PhaseNoiseCurve): (offset: number) => number {
  checkCurve(curve);
  return (offset) => {
    requireInside(curve, offset);
    return 10 ** (levelInside(curve, offset) / 10);
  };
}
