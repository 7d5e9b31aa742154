import { requireLimits } from "./_require.ts";
import type { Mask } from "./mask.ts";
import type { OffsetRange } from "./piecewise.ts";

/** A mask's demands between two offsets, in decades of offset. */
export interface MaskCoverage {
  /** Part of the decades between the two offsets at which something is demanded [1]. */
  readonly covered: number;
  /** Stretches without a demand [Hz]. */
  readonly gaps: readonly OffsetRange[];
}

/**
 * How much of a range of offsets a mask speaks about.
 *
 * @throws {RangeError} for a range that is not 0 < from < to
 */
export function maskCoverage(
  { pieces }: Mask,
  { from, to }: OffsetRange,
): MaskCoverage {
  requireLimits("judge the mask", { from, to });
  const gaps: OffsetRange[] = [];
  let reached = from;
  for (const piece of pieces.toSorted((a, b) => a.from - b.from)) {
    if (piece.from > reached && reached < to) {
      gaps.push({ from: reached, to: Math.min(piece.from, to) });
    }
    reached = Math.max(reached, piece.to);
  }
  if (reached < to) gaps.push({ from: reached, to });
  const missing = gaps.reduce((sum, gap) => sum + Math.log(gap.to / gap.from), 0);
  return { covered: 1 - missing / Math.log(to / from), gaps };
}
