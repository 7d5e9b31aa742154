/**
 * Noise and tones on a supply, a control line or a bias, carried to the phase by the gain with which they
 * move the frequency.
 *
 * @module
 */
import { requireFinite, requireNotNegative, requirePositive } from "./_require.ts";

/** Where the square root of two in the results comes from, to be printed with them. */
export const SIDEBAND_CONVENTION: string =
  "L = S_phi/2 (IEEE Std 1139) with a one-sided noise density: L = 20 log(K v / (sqrt(2) f)); " +
  "without the half, L would be 3.01 dB higher";

/** A point of a table of noise density. */
export interface DensityPoint {
  /** [Hz] */
  readonly frequency: number;
  /** One-sided noise density, such as of a regulator's output [V/sqrt(Hz)], or A/sqrt(Hz) for a current. */
  readonly density: number;
}

/** One-sided noise density [V/sqrt(Hz)]: white, or a table over rising frequencies, straight in log-log. */
export type NoiseDensity = number | readonly DensityPoint[];

/** What {@linkcode supplyPhaseNoise} needs. */
export interface SupplyNoise {
  /** Pushing or tuning gain K, of either sign [Hz/V]; Hz/A for a current. */
  readonly gain: number;
  /** One-sided noise density at the supply or control node [V/sqrt(Hz)]; A/sqrt(Hz) for a current. */
  readonly density: NoiseDensity;
}

/** Phase noise from a supply or control line at one offset. */
export interface SupplyPhaseNoise {
  /** L, half the one-sided spectral density of phase [dBc/Hz]; `-Infinity` without gain or noise. */
  readonly level: number;
  /** Noise density used, one-sided [V/sqrt(Hz)]. */
  readonly density: number;
  /** K v, one-sided density of frequency [Hz/sqrt(Hz)]. */
  readonly frequencyDensity: number;
  /** {@linkcode SIDEBAND_CONVENTION} */
  readonly convention: string;
}

const ACTION = "carry supply noise to phase noise";

/**
 * Phase noise from noise on a supply or control node, L = 20 log(K v / (sqrt(2) f)), with the noise density
 * at the offset itself. Quasi-static: the oscillator follows the node as it does at dc.
 *
 * @param offset f [Hz]
 * @throws {RangeError} for an offset that is not positive or outside the table, or a negative density
 */
export function supplyPhaseNoise(
  { gain, density }: SupplyNoise,
  offset: number,
): SupplyPhaseNoise {
  requireFinite(ACTION, { what: "gain", value: gain, unit: "Hz/V" });
  requirePositive(ACTION, { what: "offset", value: offset, unit: "Hz" });
  const value = densityAt(density, offset);
  const frequencyDensity = Math.abs(gain) * value;
  return {
    level: 20 * Math.log10(frequencyDensity / (Math.SQRT2 * offset)),
    density: value,
    frequencyDensity,
    convention: SIDEBAND_CONVENTION,
  };
}

/**
 * Noise density on a supply or control node that gives a phase noise, v = sqrt(2) f 10^(L/20) / K.
 *
 * @param level L allowed from this node, half the one-sided spectral density of phase [dBc/Hz]
 * @returns one-sided density [V/sqrt(Hz)]
 * @throws {RangeError} for a gain of zero or an offset that is not positive
 */
export function allowedSupplyNoise(
  level: number,
  { gain, offset }: {
    /** K [Hz/V] */
    readonly gain: number;
    /** f [Hz] */
    readonly offset: number;
  },
): number {
  requireFinite(ACTION, { what: "level", value: level, unit: "dBc/Hz" });
  requirePositive(ACTION, { what: "size of the gain", value: Math.abs(gain), unit: "Hz/V" });
  requirePositive(ACTION, { what: "offset", value: offset, unit: "Hz" });
  return Math.SQRT2 * offset * 10 ** (level / 20) / Math.abs(gain);
}

/**
 * Noise density at a frequency: the white value, or the table, straight in log density over log f.
 *
 * @param frequency [Hz]
 * @returns one-sided density [V/sqrt(Hz)]
 * @throws {TypeError} for an empty table
 * @throws {RangeError} outside the table, for frequencies that do not rise, or a negative density
 */
export function densityAt(density: NoiseDensity, frequency: number): number {
  const action = "read a noise density";
  requirePositive(action, { what: "frequency", value: frequency, unit: "Hz" });
  if (typeof density === "number") {
    requireNotNegative(action, { what: "density", value: density, unit: "V/sqrt(Hz)" });
    return density;
  }
  const first = density[0];
  const last = density.at(-1);
  if (!first || !last) throw new TypeError(`Cannot ${action}: expected at least 1 point, got 0`);
  density.forEach((point, index) => {
    const place = `point ${index + 1}`;
    const previous = density[index - 1]?.frequency ?? 0;
    requirePositive(action, {
      what: `the density of ${place}`,
      value: point.density,
      unit: "V/sqrt(Hz)",
    });
    if (!(point.frequency > previous && point.frequency < Infinity)) {
      throw new RangeError(
        `Cannot ${action}: frequencies must rise, but ${place} has ${point.frequency} Hz after ` +
          `${previous} Hz`,
      );
    }
  });
  if (!(frequency >= first.frequency && frequency <= last.frequency)) {
    throw new RangeError(
      `Cannot ${action} at ${frequency} Hz: the table runs from ${first.frequency} Hz to ` +
        `${last.frequency} Hz`,
    );
  }
  const above = density.findIndex((point) => point.frequency >= frequency);
  const b = density[above]!;
  const a = density[above - 1];
  if (!a || b.frequency === frequency) return b.density;
  const share = Math.log(frequency / a.frequency) / Math.log(b.frequency / a.frequency);
  return a.density * (b.density / a.density) ** share;
}
