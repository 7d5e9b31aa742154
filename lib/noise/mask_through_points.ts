import { requireFinite, requirePositive } from "./_require.ts";
import type { MaskPiece } from "./mask.ts";
import type { CurvePoint } from "./piecewise.ts";

/** Options of {@linkcode maskThroughPoints}. */
export interface MaskThroughPointsOptions {
  /** In a few words, what the points are. */
  readonly label: string;
  /** Where they come from. */
  readonly basis: string;
  /**
   * `line`: straight in dB over log f from point to point; `step`: each level holds to the next point.
   * @default "line"
   */
  readonly between?: "line" | "step";
  /**
   * Offset to which the last level holds; `Infinity` for all offsets above [Hz].
   * @default the last point's own
   */
  readonly upTo?: number;
}

/**
 * The demand of a table of points, each the highest allowed L [dBc/Hz] at its offset [Hz].
 *
 * @throws {TypeError} without a point
 * @throws {RangeError} for offsets that do not rise, or an end below the last point
 */
export function maskThroughPoints(
  points: readonly CurvePoint[],
  { label, basis, between = "line", upTo }: MaskThroughPointsOptions,
): MaskPiece[] {
  const action = `use the points of "${label}"`;
  const last = points.at(-1);
  if (!last) throw new TypeError(`Cannot ${action}: expected at least 1 point, got 0`);
  points.forEach(({ offset, level }, index) => {
    const previous = points[index - 1]?.offset ?? 0;
    requirePositive(action, {
      what: `the offset of point ${index + 1}`,
      value: offset,
      unit: "Hz",
    });
    requireFinite(action, {
      what: `the level of point ${index + 1}`,
      value: level,
      unit: "dBc/Hz",
    });
    if (!(offset > previous)) {
      throw new RangeError(
        `Cannot ${action}: offsets must rise, but point ${index + 1} has ${offset} Hz after ` +
          `${previous} Hz`,
      );
    }
  });
  const end = upTo ?? last.offset;
  if (!(end >= last.offset)) {
    throw new RangeError(
      `Cannot ${action}: the last level must hold to ${last.offset} Hz or above, got ${end} Hz`,
    );
  }
  const origin = { label, basis };
  const pieces = points.slice(0, -1).map(({ offset, level }, index): MaskPiece => {
    const next = points[index + 1]!;
    const slope = between === "step" ? 0 : (next.level - level) / Math.log10(next.offset / offset);
    return { from: offset, to: next.offset, level, slope, origin };
  });
  if (end > last.offset || points.length === 1 || between === "step") {
    pieces.push({ from: last.offset, to: end, level: last.level, slope: 0, origin });
  }
  return pieces;
}
