import { requireFinite, requireNotNegative, requirePositive } from "./_require.ts";

/** What {@linkcode toneSpur} needs. */
export interface SupplyTone {
  /** Pushing or tuning gain K, of either sign [Hz/V]. */
  readonly gain: number;
  /** Peak of the tone [V]. */
  readonly amplitude: number;
  /** fm of the tone, the offset of the spur [Hz]. */
  readonly frequency: number;
}

/** A spur on either side of the carrier. */
export interface Spur {
  /** Each side against the carrier [dBc]; `-Infinity` without a tone. */
  readonly level: number;
  /** K Vm / fm [1] */
  readonly modulationIndex: number;
  /** Whether the index is small enough for the formula, to 0.05 dB; else it understates the spur's ratio to the carrier. */
  readonly smallAngle: boolean;
}

/** Index below which J1/J0 and half the index agree to 0.05 dB: their ratio is 1 + index^2 / 8. */
const SMALL_INDEX = 0.2;

/**
 * Spur from a tone on a supply or control node, 20 log(K Vm / (2 fm)): first sidebands of narrow-band
 * frequency modulation.
 *
 * @throws {RangeError} for a negative amplitude or a frequency that is not positive
 */
export function toneSpur({ gain, amplitude, frequency }: SupplyTone): Spur {
  const action = "compute a spur";
  requireFinite(action, { what: "gain", value: gain, unit: "Hz/V" });
  requireNotNegative(action, { what: "amplitude", value: amplitude, unit: "V" });
  requirePositive(action, { what: "frequency", value: frequency, unit: "Hz" });
  const modulationIndex = Math.abs(gain) * amplitude / frequency;
  return {
    level: 20 * Math.log10(modulationIndex / 2),
    modulationIndex,
    smallAngle: modulationIndex <= SMALL_INDEX,
  };
}
