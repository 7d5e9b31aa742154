import { formatQuantity } from "../quantity/format_quantity.ts";
import { requireFinite, requirePositive } from "./_require.ts";
import { phaseErrorFromJitter } from "./jitter.ts";
import type { MaskPiece } from "./mask.ts";
import type { OffsetRange } from "./piecewise.ts";

/** What a demand on the whole phase error leaves to the oscillator, and how it is counted. */
export interface PhaseErrorPlace {
  /** In a few words. */
  readonly label: string;
  /**
   * Share of phi^2 given to the oscillator [1].
   * @default 1
   */
  readonly share?: number;
  /**
   * Bandwidth of the loop around the oscillator, taken as a first-order high-pass [Hz].
   * @default 0: free-running
   */
  readonly bandwidth?: number;
  /**
   * Lower limit of the integral [Hz].
   * @default 0
   */
  readonly from?: number;
  /**
   * Upper limit of the integral [Hz].
   * @default Infinity
   */
  readonly to?: number;
  /**
   * Offsets over which the mask draws the line.
   * @default from the loop bandwidth to ten times it, where the oscillator's noise counts most, within the
   *   limits of the integral; the limits themselves without a loop
   */
  readonly drawn?: OffsetRange;
}

/** What {@linkcode phaseErrorRequirement} needs. */
export interface PhaseErrorDemand extends PhaseErrorPlace {
  /** Whole rms phase error allowed [rad]. */
  readonly phaseError: number;
}

/** Ratio of the offsets over which the line is drawn unless said otherwise: a decade. */
const DRAWN_RATIO = 10;

/**
 * Phase error that a modulation accuracy leaves to the local oscillator, 10^((accuracy - below) / 20).
 *
 * @param accuracy error vector magnitude, 20 log of its ratio to the signal, such as -32 [dB]
 * @param below how far the oscillator's part is to stay below it, such as 6 or 10 [dB]
 * @returns rms phase error [rad]; the error vector of a small phase error phi is phi
 * @throws {RangeError} for an accuracy that is not below 0 dB
 */
export function phaseErrorFromModulation(accuracy: number, below: number): number {
  const action = "derive a phase error";
  requireFinite(action, { what: "below", value: below, unit: "dB" });
  if (!(accuracy < 0 && accuracy > -Infinity)) {
    throw new RangeError(
      `Cannot ${action}: the error vector magnitude must be below 0 dB, got ${accuracy} dB`,
    );
  }
  return 10 ** ((accuracy - below) / 20);
}

/**
 * Free-running 1/f^2 phase noise that an rms phase error allows: share phi^2 = 2 times the integral of
 * L f^2 / (f^2 + fc^2) from one limit to the other, fc the loop bandwidth. Without limits
 * L = share phi^2 fc / (pi f^2).
 *
 * The line assumes the 1/f^2 shape. Whether a curve of another shape keeps the phase error is for the
 * integral to say.
 *
 * @returns a piece of a mask, falling by 20 dB per decade [dBc/Hz]
 * @throws {RangeError} for values out of range; without a loop both limits must be given
 */
export function phaseErrorRequirement(
  { phaseError, ...place }: PhaseErrorDemand,
): MaskPiece {
  return demandOf(place, {
    phaseError,
    basis: `phase error ${formatQuantity(phaseError, "rad")} rms`,
  });
}

/** What {@linkcode jitterRequirement} needs. */
export interface JitterDemand extends PhaseErrorPlace {
  /** Whole rms jitter allowed [s]. */
  readonly jitter: number;
  /** Frequency of the clock, the carrier the mask holds at [Hz]. */
  readonly frequency: number;
}

/**
 * Free-running 1/f^2 phase noise that an rms clock jitter allows, as {@linkcode phaseErrorRequirement} with
 * phi = 2 pi f0 sigma.
 *
 * @returns a piece of a mask, falling by 20 dB per decade [dBc/Hz]
 * @throws {RangeError} for values out of range
 */
export function jitterRequirement(
  { jitter, frequency, ...place }: JitterDemand,
): MaskPiece {
  requirePositive(`derive the demand "${place.label}"`, {
    what: "jitter",
    value: jitter,
    unit: "s",
  });
  return demandOf(place, {
    phaseError: phaseErrorFromJitter(jitter, frequency),
    basis: `jitter ${formatQuantity(jitter, "s")} rms at ${formatQuantity(frequency, "Hz")}`,
  });
}

function demandOf(
  { label, share = 1, bandwidth = 0, from = 0, to = Infinity, drawn }: PhaseErrorPlace,
  { phaseError, basis }: { readonly phaseError: number; readonly basis: string },
): MaskPiece {
  const action = `derive the demand "${label}"`;
  requirePositive(action, { what: "phase error", value: phaseError, unit: "rad" });
  if (!(share > 0 && share <= 1)) {
    throw new RangeError(`Cannot ${action}: the share must be above 0 and at most 1, got ${share}`);
  }
  if (!(bandwidth >= 0 && bandwidth < Infinity)) {
    throw new RangeError(
      `Cannot ${action}: the loop bandwidth must be >= 0 Hz and finite, got ${bandwidth} Hz`,
    );
  }
  if (!(from >= 0 && from < to)) {
    throw new RangeError(
      `Cannot ${action}: the limits must be 0 Hz <= from < to, got from ${from} Hz to ${to} Hz`,
    );
  }
  if (bandwidth === 0 && !(from > 0 && (to < Infinity || drawn))) {
    throw new RangeError(
      `Cannot ${action}: without a loop both limits must be given, got from ${from} Hz to ${to} Hz`,
    );
  }
  // Integral of 1 / (f^2 + fc^2), with fc = 0 where the oscillator runs free [1/Hz].
  const weight = bandwidth === 0
    ? 1 / from - 1 / to
    : (Math.atan(to / bandwidth) - Math.atan(from / bandwidth)) / bandwidth;
  const coefficient = share * phaseError ** 2 / (2 * weight);
  const line = drawn ?? drawnOver({ from, to }, bandwidth);
  requirePositive(action, { what: "the lower end of the line", value: line.from, unit: "Hz" });
  return {
    from: line.from,
    to: line.to,
    level: 10 * Math.log10(coefficient / line.from ** 2),
    slope: -20,
    origin: {
      label,
      basis: [
        basis,
        ...(share === 1 ? [] : [`share of the oscillator ${formatQuantity(share, "%")}`]),
        bandwidth === 0 ? "free-running" : `loop bandwidth ${formatQuantity(bandwidth, "Hz")}`,
        ...(from === 0 && to === Infinity
          ? []
          : [`from ${from} Hz to ${to === Infinity ? "infinity" : `${to} Hz`}`]),
      ].join(", "),
    },
  };
}

/** A decade of offsets from the loop bandwidth, moved into the limits of the integral. */
function drawnOver({ from, to }: OffsetRange, bandwidth: number): OffsetRange {
  if (bandwidth === 0) return { from, to };
  const start = Math.max(from, Math.min(bandwidth, to / DRAWN_RATIO));
  return { from: start, to: Math.min(to, start * DRAWN_RATIO) };
}
