/**
 * Phase-noise masks: the most a radio or a clock allows, over the offset, with where each part comes from.
 *
 * @module
 */
import { formatQuantity } from "../quantity/format_quantity.ts";
import { requireFinite, requirePositive } from "./_require.ts";

/** Where a part of a mask comes from. */
export interface MaskOrigin {
  /** In a few words, such as `"blocker at 3 MHz"`. */
  readonly label: string;
  /** The numbers it follows from, in words. */
  readonly basis: string;
}

/** A part of a mask, straight in dB over the logarithm of the offset. */
export interface MaskPiece {
  /** Offset where it begins [Hz]. */
  readonly from: number;
  /** Offset where it ends; equal to `from` for a demand at one offset, or `Infinity` [Hz]. */
  readonly to: number;
  /** Highest allowed L at `from`, half the one-sided spectral density of phase [dBc/Hz]. */
  readonly level: number;
  /** Slope [dB per decade], 0 for a flat piece. */
  readonly slope: number;
  /** Where it comes from. */
  readonly origin: MaskOrigin;
}

/** The lowest of all demands at every offset. */
export interface Mask {
  /** Carrier at which the levels hold [Hz]. */
  readonly frequency: number;
  /** In the order of their offsets. Between pieces nothing is demanded. */
  readonly pieces: readonly MaskPiece[];
}

/** What a mask allows at one offset. */
export interface MaskLimit {
  /** [dBc/Hz] */
  readonly level: number;
  /** Where it comes from. */
  readonly origin: MaskOrigin;
}

/** Difference in level of one line, computed from two places: rounding [dB]. */
const SAME_LEVEL = 1e-9;
/** Share of a decade within which a crossing is no corner beside another: rounding of log10. */
const SAME_CORNER = 1e-12;

/**
 * A mask from demands of one or more sources: at every offset the lowest of them, which keeps its origin.
 *
 * @throws {TypeError} without a demand
 * @throws {RangeError} for a piece that does not run from a positive offset upwards
 */
export function maskFrom(
  pieces: readonly MaskPiece[],
  { frequency }: {
    /** Carrier at which the levels hold [Hz]. */
    readonly frequency: number;
  },
): Mask {
  requirePositive("make a mask", { what: "frequency", value: frequency, unit: "Hz" });
  if (pieces.length === 0) {
    throw new TypeError("Cannot make a mask: expected at least 1 demand, got 0");
  }
  pieces.forEach(checkPiece);
  const wide = pieces.filter(({ from, to }) => to > from);
  const corners = cornersOf(wide);
  const envelope: MaskPiece[] = [];
  corners.forEach((from, index) => {
    const to = corners[index + 1] ?? Infinity;
    const middle = to < Infinity ? Math.sqrt(from) * Math.sqrt(to) : 2 * from;
    const lowest = lowestAt(wide, middle);
    if (!lowest) return;
    const last = envelope.at(-1);
    if (last && last.to === from && continues(last, lowest)) {
      envelope[envelope.length - 1] = { ...last, to };
    } else envelope.push({ ...lowest, from, to, level: levelOf(lowest, from) });
  });
  for (const point of pieces.filter(({ from, to }) => from === to)) {
    const limit = limitIn(envelope, point.from);
    if (limit && limit.level <= point.level) continue;
    const rival = envelope.findIndex(({ from, to }) => from === point.from && to === point.from);
    if (rival >= 0) envelope.splice(rival, 1);
    envelope.push({ ...point, slope: 0 });
  }
  envelope.sort((a, b) => a.from - b.from || a.to - b.to);
  return { frequency, pieces: envelope };
}

/**
 * One mask from several that hold at the same carrier: at every offset the lowest.
 *
 * @throws {TypeError} without a mask
 * @throws {RangeError} for masks at different carriers: translate them to one first
 */
export function mergeMasks(masks: readonly Mask[]): Mask {
  const [first] = masks;
  if (!first) throw new TypeError("Cannot merge masks: expected at least 1, got 0");
  const other = masks.find(({ frequency }) => frequency !== first.frequency);
  if (other) {
    throw new RangeError(
      `Cannot merge masks: all must hold at one carrier, got ${first.frequency} Hz and ` +
        `${other.frequency} Hz; translate them to one first`,
    );
  }
  return maskFrom(masks.flatMap(({ pieces }) => pieces), { frequency: first.frequency });
}

/**
 * What a mask allows at an offset, straight in dB over log f within a piece.
 *
 * @param offset [Hz]
 * @returns the limit with its origin, or undefined where nothing is demanded
 * @throws {RangeError} for an offset that is not positive
 */
export function maskAt(mask: Mask, offset: number): MaskLimit | undefined {
  requirePositive("read a mask", { what: "offset", value: offset, unit: "Hz" });
  return limitIn(mask.pieces, offset);
}

/**
 * The mask on the other side of an ideal divider or multiplier. Offsets stay; levels rise by
 * 20 log(new carrier / old carrier): an oscillator in front of a divider by N may have 20 log N more.
 *
 * @param frequency carrier on the other side [Hz]
 * @throws {RangeError} for a frequency that is not positive
 */
export function translateMask(mask: Mask, frequency: number): Mask {
  const shift = translationShift(mask.frequency, frequency);
  const note = `, ${shift < 0 ? "-" : "+"}${Math.abs(shift).toFixed(2)} dB from ` +
    `${formatQuantity(mask.frequency, "Hz")} to ${formatQuantity(frequency, "Hz")}`;
  return {
    frequency,
    pieces: mask.pieces.map((piece) => ({
      ...piece,
      level: piece.level + shift,
      origin: { ...piece.origin, basis: piece.origin.basis + note },
    })),
  };
}

/**
 * Change of phase noise through an ideal divider or multiplier, 20 log(to / from): the phase is scaled
 * with the frequency. Noise that the divider adds is not in it.
 *
 * @param from carrier in [Hz]
 * @param to carrier out [Hz]
 * @returns shift [dB], negative for a divider
 * @throws {RangeError} for frequencies that are not positive
 */
export function translationShift(from: number, to: number): number {
  const action = "translate phase noise";
  requirePositive(action, { what: "the frequency it is taken from", value: from, unit: "Hz" });
  requirePositive(action, { what: "the frequency it is taken to", value: to, unit: "Hz" });
  return 20 * Math.log10(to / from);
}

/**
 * Level of a piece at an offset [dBc/Hz].
 *
 * @internal
 */
export function levelOf({ from, level, slope }: MaskPiece, offset: number): number {
  return slope === 0 || offset === from ? level : level + slope * Math.log10(offset / from);
}

function checkPiece({ from, to, level, slope, origin }: MaskPiece): void {
  const action = `use the demand "${origin.label}"`;
  requirePositive(action, { what: "the offset where it begins", value: from, unit: "Hz" });
  requireFinite(action, { what: "its level", value: level, unit: "dBc/Hz" });
  requireFinite(action, { what: "its slope", value: slope, unit: "dB per decade" });
  if (!(to >= from)) {
    throw new RangeError(
      `Cannot ${action}: it must end at or above ${from} Hz, where it begins, got ${to} Hz`,
    );
  }
}

/** Ends and crossings of all pieces, rising; where the last runs to infinity, infinity is left out. */
function cornersOf(pieces: readonly MaskPiece[]): number[] {
  const ends = [...new Set(pieces.flatMap(({ from, to }) => [from, to]))];
  const corners = ends.filter((end) => end < Infinity);
  pieces.forEach((a, index) => {
    for (const b of pieces.slice(index + 1)) {
      const crossing = crossingOf(a, b);
      if (crossing === undefined) continue;
      const known = corners.some((each) => Math.abs(Math.log10(each / crossing)) < SAME_CORNER);
      if (!known) corners.push(crossing);
    }
  });
  return corners.sort((a, b) => a - b);
}

function crossingOf(a: MaskPiece, b: MaskPiece): number | undefined {
  if (a.slope === b.slope) return undefined;
  const decades = (levelOf(b, a.from) - a.level) / (a.slope - b.slope);
  const offset = a.from * 10 ** decades;
  const inside = offset > Math.max(a.from, b.from) && offset < Math.min(a.to, b.to);
  return inside ? offset : undefined;
}

function lowestAt(pieces: readonly MaskPiece[], offset: number): MaskPiece | undefined {
  let lowest: MaskPiece | undefined;
  for (const piece of pieces) {
    if (!(piece.from <= offset && offset <= piece.to)) continue;
    if (!lowest || levelOf(piece, offset) < levelOf(lowest, offset)) lowest = piece;
  }
  return lowest;
}

function limitIn(pieces: readonly MaskPiece[], offset: number): MaskLimit | undefined {
  const lowest = lowestAt(pieces, offset);
  return lowest && { level: levelOf(lowest, offset), origin: lowest.origin };
}

/** Whether `next` is the line that `last`, a part of the envelope, was cut from. */
function continues(last: MaskPiece, next: MaskPiece): boolean {
  return last.origin === next.origin && last.slope === next.slope &&
    Math.abs(levelOf(last, last.to) - levelOf(next, last.to)) < SAME_LEVEL;
}
