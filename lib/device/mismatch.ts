import type { TransistorParameters, TransistorSize } from "./transistor_parameters.ts";

/** Deviation of one transistor from its neighbours. */
export interface TransistorDeviation {
  /** Added to the magnitude of the threshold [V]. */
  readonly threshold: number;
  /** Relative change of the transconductance parameter [1]. */
  readonly gain: number;
}

/**
 * Standard deviations of one transistor: A / sqrt(2 W L), so that the difference of a pair of equal
 * devices has A / sqrt(W L).
 *
 * @see M. J. M. Pelgrom, A. C. J. Duinmaijer, A. P. G. Welbers, IEEE J. Solid-State Circuits 24 (1989)
 *   1433, eq. 5 without the distance term
 */
export function mismatchDeviation(
  parameters: TransistorParameters,
  size: TransistorSize,
): TransistorDeviation {
  const { width, length, multiplier = 1 } = size;
  const root = Math.sqrt(2 * width * length * multiplier);
  return {
    threshold: parameters.thresholdMismatch / root,
    gain: parameters.gainMismatch / root,
  };
}

/** The same transistor with a deviation applied. */
export function deviatedTransistor(
  parameters: TransistorParameters,
  deviation: TransistorDeviation,
): TransistorParameters {
  return {
    ...parameters,
    threshold: parameters.threshold + deviation.threshold,
    transconductanceParameter: parameters.transconductanceParameter * (1 + deviation.gain),
  };
}
