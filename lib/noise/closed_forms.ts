/**
 * Published closed forms of the noise factor, keyed by topology. They are compared with the computed
 * values, not used in their place.
 *
 * @module
 */

/** What the closed form of the cross-coupled pair needs. */
export interface PairNoiseValues {
  /** Thermal noise conductance of a pair transistor over its gate transconductance, balanced [1]. */
  readonly pairGamma: number;
  /** Thermal noise conductance of the tail transistor over its gate transconductance [1]. */
  readonly tailGamma: number;
  /** Gate transconductance of the tail transistor [S]. */
  readonly tailTransconductance: number;
  /** Differential tank resistance [ohm]. */
  readonly resistance: number;
  /** Startup loop gain [1]. */
  readonly loopGain: number;
}

/** Parts of a closed-form noise factor; total over the tank's own diffusion. */
export interface NoiseFactorParts {
  readonly tank: 1;
  readonly pair: number;
  readonly tail: number;
  readonly total: number;
}

/**
 * Noise factor of the cross-coupled pair: F = 1 + gamma + gamma_tail gm_tail (R / 4) (1 - 1/a).
 *
 * The pair's share is gamma, referred to the gate transconductance, for any waveform; the tail's is
 * that of a quasi-static tanh pair passing white tail noise, which goes to gamma gm R / 4 in hard
 * switching. A capacitance at the tail node filters tail noise and makes the last term an upper bound.
 *
 * @throws RangeError for values that are not positive
 * @see J. Bank, PhD thesis, Technical University of Denmark (2006); D. Murphy, J. Rael, A. Abidi, IEEE
 *   Trans. Circuits Syst. I 57 (2010) 1187 (from memory) for 1 + gamma; the tail term is derived with
 *   the differential resistance and agrees with hard switching
 */
export function pairNoiseFactor(values: PairNoiseValues): NoiseFactorParts {
  for (const [name, value] of Object.entries(values)) {
    if (!(value > 0 && value < Infinity)) {
      throw new RangeError(`Cannot compute the noise factor: ${name} must be > 0, got ${value}`);
    }
  }
  const { pairGamma, tailGamma, tailTransconductance, resistance, loopGain } = values;
  const switching = Math.max(0, 1 - 1 / loopGain);
  const tail = tailGamma * tailTransconductance * resistance / 4 * switching;
  return { tank: 1, pair: pairGamma, tail, total: 1 + pairGamma + tail };
}
