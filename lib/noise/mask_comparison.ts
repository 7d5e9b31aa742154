import { isCurve, type PhaseNoise, phaseNoiseLevel } from "./integrals.ts";
import { levelOf, type Mask, type MaskOrigin } from "./mask.ts";
import { checkCurve, type OffsetRange } from "./piecewise.ts";

/** Phase noise held against a mask at one offset. */
export interface MaskMargin {
  /** [Hz] */
  readonly offset: number;
  /** L of the curve [dBc/Hz]. */
  readonly level: number;
  /** What the mask allows [dBc/Hz]. */
  readonly limit: number;
  /** Limit minus level, negative where the mask is broken [dB]. */
  readonly margin: number;
  /** Where this part of the mask comes from. */
  readonly origin: MaskOrigin;
}

/** Phase noise held against a mask. */
export interface MaskComparison {
  /** Where the margin is least. */
  readonly worst: MaskMargin;
  /** The least margin of every piece of the mask that the curve reaches, in their order. */
  readonly pieces: readonly MaskMargin[];
  /** Parts of the mask that the curve does not reach: nothing is known there. */
  readonly uncovered: readonly (OffsetRange & { readonly origin: MaskOrigin })[];
}

/**
 * Holds phase noise against a mask. Exact: curve and mask are straight between their corners in dB over
 * log f, and a power law is convex there, so that the margin is least at a corner of either. A piece
 * without end is followed to the carrier's frequency.
 *
 * @throws {RangeError} when the curve reaches no part of the mask
 */
export function compareWithMask(noise: PhaseNoise, mask: Mask): MaskComparison {
  if (isCurve(noise)) checkCurve(noise);
  const first = isCurve(noise) ? noise[0]!.offset : 0;
  const last = isCurve(noise) ? noise.at(-1)!.offset : Infinity;
  const pieces: MaskMargin[] = [];
  const uncovered: (OffsetRange & { readonly origin: MaskOrigin })[] = [];
  for (const piece of mask.pieces) {
    const { origin, from } = piece;
    const to = piece.to === Infinity ? Math.max(from, mask.frequency) : piece.to;
    const low = Math.max(from, first);
    const high = Math.min(to, last);
    if (!(low <= high)) {
      uncovered.push({ from, to, origin });
      continue;
    }
    if (low > from) uncovered.push({ from, to: low, origin });
    const corners = isCurve(noise) ? noise.map(({ offset }) => offset) : [];
    const offsets = [low, ...corners.filter((offset) => offset > low && offset < high), high];
    const margins = offsets.map((offset): MaskMargin => {
      const level = phaseNoiseLevel(noise, offset);
      const limit = levelOf(piece, offset);
      return { offset, level, limit, margin: limit - level, origin };
    });
    pieces.push(least(margins));
    if (high < to) uncovered.push({ from: high, to, origin });
  }
  if (pieces.length === 0) {
    throw new RangeError(
      `Cannot compare with the mask: the curve runs from ${first} Hz to ${last} Hz, but the mask asks ` +
        `only from ${mask.pieces[0]!.from} Hz to ${mask.pieces.at(-1)!.to} Hz`,
    );
  }
  return { worst: least(pieces), pieces, uncovered };
}

function least(margins: readonly MaskMargin[]): MaskMargin {
  return margins.reduce((worst, each) => each.margin < worst.margin ? each : worst);
}
