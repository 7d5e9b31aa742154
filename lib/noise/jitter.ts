/**
 * Time jitter.
 *
 * @module
 */
import { requireFinite, requireNotNegative, requirePositive } from "./_require.ts";

const ACTION = "compute jitter";

/**
 * rms time jitter of an rms phase error, phi / (2 pi f0).
 *
 * @param phaseError phi, rms [rad]
 * @param frequency f0 of the carrier [Hz]
 * @returns rms jitter [s]
 * @throws {RangeError} for a negative phase error or a frequency that is not positive
 */
export function jitterFromPhaseError(phaseError: number, frequency: number): number {
  requireNotNegative(ACTION, { what: "phase error", value: phaseError, unit: "rad" });
  requirePositive(ACTION, { what: "frequency", value: frequency, unit: "Hz" });
  return phaseError / (2 * Math.PI * frequency);
}

/**
 * rms phase error of an rms time jitter, 2 pi f0 sigma.
 *
 * @param jitter sigma, rms [s]
 * @param frequency f0 of the carrier [Hz]
 * @returns rms phase error [rad]
 * @throws {RangeError} for a negative jitter or a frequency that is not positive
 */
export function phaseErrorFromJitter(jitter: number, frequency: number): number {
  requireNotNegative(ACTION, { what: "jitter", value: jitter, unit: "s" });
  requirePositive(ACTION, { what: "frequency", value: frequency, unit: "Hz" });
  return 2 * Math.PI * frequency * jitter;
}

/**
 * Phase diffusion of a free-running oscillator from its 1/f^2 noise, c = 10^(L/10) f^2 / f0^2.
 *
 * @param level L at the offset, half the one-sided spectral density of phase [dBc/Hz]
 * @returns c, growth rate of the variance of the time shift [s]
 * @throws {RangeError} for values that are not positive
 * @see A. Demir, A. Mehrotra, J. Roychowdhury, IEEE Trans. Circuits Syst. I 47 (2000) 655
 */
export function diffusionFromLevel(
  level: number,
  { frequency, offset }: {
    /** f0 of the carrier [Hz]. */
    readonly frequency: number;
    /** f, in the 1/f^2 region [Hz]. */
    readonly offset: number;
  },
): number {
  requireFinite(ACTION, { what: "level", value: level, unit: "dBc/Hz" });
  requirePositive(ACTION, { what: "frequency", value: frequency, unit: "Hz" });
  requirePositive(ACTION, { what: "offset", value: offset, unit: "Hz" });
  return 10 ** (level / 10) * (offset / frequency) ** 2;
}

/**
 * rms jitter that a free-running oscillator with white sources gathers in a time, sqrt(c tau).
 *
 * @param diffusion c [s]
 * @param interval tau [s]; one period for the period jitter
 * @returns rms jitter of the end against the start of the interval [s]
 * @throws {RangeError} for negative values
 * @see A. Demir, A. Mehrotra, J. Roychowdhury, IEEE Trans. Circuits Syst. I 47 (2000) 655
 */
export function accumulatedJitter(diffusion: number, interval: number): number {
  requireNotNegative(ACTION, { what: "diffusion", value: diffusion, unit: "s" });
  requireNotNegative(ACTION, { what: "interval", value: interval, unit: "s" });
  return Math.sqrt(diffusion * interval);
}

/**
 * rms period jitter of a free-running oscillator with white sources, sqrt(c / f0).
 *
 * @param diffusion c [s]
 * @param frequency f0 [Hz]
 * @returns rms jitter of one period [s]
 * @throws {RangeError} for a negative diffusion or a frequency that is not positive
 * @see A. Demir, A. Mehrotra, J. Roychowdhury, IEEE Trans. Circuits Syst. I 47 (2000) 655
 */
export function periodJitter(diffusion: number, frequency: number): number {
  requirePositive(ACTION, { what: "frequency", value: frequency, unit: "Hz" });
  return accumulatedJitter(diffusion, 1 / frequency);
}
