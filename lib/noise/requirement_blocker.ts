import { formatQuantity } from "../quantity/format_quantity.ts";
import { requireFinite, requirePositive } from "./_require.ts";
import type { MaskPiece } from "./mask.ts";

/** Where a demand holds, and what it is called. */
export interface DemandPlace {
  /** In a few words. */
  readonly label: string;
  /** Offset from the carrier where it begins [Hz]. */
  readonly offset: number;
  /**
   * Offset to which it holds; `Infinity` for all offsets above [Hz].
   * @default `offset`: a demand at one offset
   */
  readonly upTo?: number;
  /**
   * Left to other impairments of the receiver or transmitter [dB].
   * @default 0
   */
  readonly margin?: number;
}

/** What {@linkcode blockerRequirement} needs. */
export interface Blocker extends DemandPlace {
  /** Wanted signal [dBm]. */
  readonly wanted: number;
  /** Blocker at the offset [dBm]. */
  readonly blocker: number;
  /** Channel over which the mixed noise falls [Hz]. */
  readonly bandwidth: number;
  /** Least ratio of signal to noise at which the receiver still works [dB]. */
  readonly signalToNoise: number;
}

/**
 * Phase noise that a blocker allows by reciprocal mixing,
 * L = wanted - blocker - signal to noise - 10 log(bandwidth) - margin.
 *
 * All of the noise is given to the local oscillator (common practice leaves 3 to 10 dB in `margin`), and L
 * is taken as constant across the channel.
 *
 * @returns a flat piece of a mask [dBc/Hz]
 * @throws {RangeError} for a level that is not finite, or an offset or bandwidth that is not positive
 */
export function blockerRequirement(
  { wanted, blocker, bandwidth, signalToNoise, ...place }: Blocker,
): MaskPiece {
  const action = `derive the demand "${place.label}"`;
  requireFinite(action, { what: "wanted", value: wanted, unit: "dBm" });
  requireFinite(action, { what: "blocker", value: blocker, unit: "dBm" });
  requireFinite(action, { what: "signal to noise", value: signalToNoise, unit: "dB" });
  requirePositive(action, { what: "bandwidth", value: bandwidth, unit: "Hz" });
  return flatDemand(place, {
    level: wanted - blocker - signalToNoise - 10 * Math.log10(bandwidth),
    basis: `wanted ${wanted} dBm, blocker ${blocker} dBm, signal to noise ${signalToNoise} dB, ` +
      `bandwidth ${formatQuantity(bandwidth, "Hz")}`,
  });
}

/** What {@linkcode adjacentRequirement} needs. */
export interface AdjacentInterferer extends DemandPlace {
  /** Carrier to interferer at the offset, negative where the interferer is stronger [dB]. */
  readonly carrierToInterferer: number;
  /** Carrier to co-channel interferer at which the receiver still works [dB]. */
  readonly coChannel: number;
  /** Channel [Hz]. */
  readonly bandwidth: number;
}

/**
 * Phase noise that an adjacent or farther channel allows where a standard gives carrier-to-interferer
 * ratios: L = C/I at the offset - C/I in the channel - 10 log(bandwidth) - margin. The co-channel ratio
 * stands for the signal to noise that the receiver needs.
 *
 * @returns a flat piece of a mask [dBc/Hz]
 * @throws {RangeError} for a ratio that is not finite, or an offset or bandwidth that is not positive
 */
export function adjacentRequirement(
  { carrierToInterferer, coChannel, bandwidth, ...place }: AdjacentInterferer,
): MaskPiece {
  const action = `derive the demand "${place.label}"`;
  requireFinite(action, {
    what: "carrier to interferer",
    value: carrierToInterferer,
    unit: "dB",
  });
  requireFinite(action, { what: "co-channel ratio", value: coChannel, unit: "dB" });
  requirePositive(action, { what: "bandwidth", value: bandwidth, unit: "Hz" });
  return flatDemand(place, {
    level: carrierToInterferer - coChannel - 10 * Math.log10(bandwidth),
    basis: `C/I ${carrierToInterferer} dB, co-channel C/I ${coChannel} dB, bandwidth ` +
      formatQuantity(bandwidth, "Hz"),
  });
}

/**
 * A flat piece of a mask, lower by the margin.
 *
 * @internal
 */
export function flatDemand(
  { label, offset, upTo = offset, margin = 0 }: DemandPlace,
  { level, basis }: { readonly level: number; readonly basis: string },
): MaskPiece {
  const action = `derive the demand "${label}"`;
  requirePositive(action, { what: "offset", value: offset, unit: "Hz" });
  requireFinite(action, { what: "margin", value: margin, unit: "dB" });
  if (!(upTo >= offset)) {
    throw new RangeError(
      `Cannot ${action}: it must hold to ${offset} Hz or above, got ${upTo} Hz`,
    );
  }
  return {
    from: offset,
    to: upTo,
    level: level - margin,
    slope: 0,
    origin: { label, basis: margin === 0 ? basis : `${basis}, margin ${margin} dB` },
  };
}
