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

/** What a closed form of a noise factor takes. */
export interface ClosedFormValues {
  /** Thermal noise conductance of the core over the transconductance that its loop gain counts [1]. */
  readonly coreGamma: number;
  /** Thermal noise conductance of one tail, 4kT times which is its one-sided density; 0 without a tail [S]. */
  readonly tailNoiseConductance: number;
  /** Parallel loss resistance between the output nodes [ohm]. */
  readonly resistance: number;
  /** Startup loop gain [1]. */
  readonly loopGain: number;
  /** Fraction n at the divider's tap, for the Colpitts oscillators [1]. */
  readonly tap?: number;
}

/** A closed form of the noise factor with its formula and assumptions. */
export interface NoiseClosedForm {
  /** TeX. */
  readonly formula: string;
  readonly source: string;
  /** Where it holds, in words. */
  readonly holds: string;
  factor(values: ClosedFormValues): NoiseFactorParts;
}

const BANK = "J. Bank (2006); D. Murphy, J. Rael, A. Abidi (2010), from memory";
const COLPITTS =
  "P. Andreani, X. Wang, L. Vandi, A. Fard, IEEE J. Solid-State Circuits 40 (2005) " +
  "1107 (from memory); tail term derived";
const PAIR: NoiseClosedForm = {
  formula: "F = 1 + \\gamma + \\gamma_t g_{m,t} \\tfrac{R}{4} (1 - \\tfrac{1}{a})",
  source: `${BANK}; tail term derived`,
  holds: "a pair in saturation, no capacitance at the tail node; one filters the last term",
  factor: (values) => parts(values, { pair: values.coreGamma, tail: switchedTail(values) / 4 }),
};
const CORE_ALONE: Omit<NoiseClosedForm, "holds"> = {
  formula: "F = 1 + \\gamma",
  source: BANK,
  factor: (values) => parts(values, { pair: values.coreGamma, tail: 0 }),
};

/**
 * The closed forms by the topology's name. A topology that is not here has none.
 *
 * The core's gamma refers to the gate transconductance, both kinds together in a complementary pair, and to
 * the source transconductance in a Colpitts oscillator: its noise sees 1 - n of the tank's sensitivity, the
 * tail's n of it, while n (1 - n) of the core's transconductance makes up for the loss.
 */
const CLOSED_FORMS: Readonly<Record<string, NoiseClosedForm>> = {
  n_pair: PAIR,
  p_pair: PAIR,
  n_pair_resistor_tail: {
    ...PAIR,
    formula: "F = 1 + \\gamma + \\tfrac{R}{4 R_t} (1 - \\tfrac{1}{a})",
  },
  n_pair_no_tail: {
    ...CORE_ALONE,
    holds: "a pair in saturation throughout, which without a tail it leaves at any useful swing",
  },
  complementary_pair: {
    formula: "F = 1 + \\gamma + \\gamma_t g_{m,t} R (1 - \\tfrac{1}{a})",
    source: `${BANK}; tail term derived`,
    holds:
      "pairs in saturation, no capacitance at the tail node, no current from the outputs to ground",
    factor: (values) => parts(values, { pair: values.coreGamma, tail: switchedTail(values) }),
  },
  class_c_pair: {
    ...CORE_ALONE,
    source: "A. Mazzanti, P. Andreani, IEEE J. Solid-State Circuits 43 (2008) 2716 (from memory)",
    holds:
      "pair in saturation, tail noise shorted by the tail capacitor, bias resistors large against R",
  },
  colpitts: {
    formula: "F = 1 + \\gamma \\tfrac{1 - n}{n} + \\gamma_t g_{m,t} n^2 R",
    source: COLPITTS,
    holds:
      "core in saturation, a nearly sinusoidal tank voltage, the source's swing n of the drain's",
    factor: (values) => colpittsParts(values, { side: values.resistance }),
  },
  differential_colpitts: {
    formula: "F = 1 + \\gamma \\tfrac{1 - n}{n} + \\gamma_t g_{m,t} n^2 \\tfrac{R}{2}",
    source: COLPITTS,
    holds:
      "core in saturation, a nearly sinusoidal tank voltage, the source's swing n of the drain's",
    factor: (values) => colpittsParts(values, { side: values.resistance / 2 }),
  },
};

/**
 * The closed form of a topology's noise factor.
 *
 * @param topology its name
 * @returns the form; undefined where the topology has none
 */
export function noiseClosedForm(topology: string): NoiseClosedForm | undefined {
  return Object.hasOwn(CLOSED_FORMS, topology) ? CLOSED_FORMS[topology] : undefined;
}

/** Noise of a tail that is switched over the whole tank: its noise conductance times R (1 - 1/a). */
function switchedTail({ tailNoiseConductance, resistance, loopGain }: ClosedFormValues): number {
  return tailNoiseConductance * resistance * Math.max(0, 1 - 1 / loopGain);
}

function colpittsParts(
  values: ClosedFormValues,
  { side }: { readonly side: number },
): NoiseFactorParts {
  const { tap } = values;
  if (!(tap !== undefined && tap > 0 && tap < 1)) {
    throw new RangeError(
      `Cannot compute the noise factor: tap must be between 0 and 1, got ${tap}`,
    );
  }
  return parts(values, {
    pair: values.coreGamma * (1 - tap) / tap,
    tail: values.tailNoiseConductance * side * tap ** 2,
  });
}

function parts(
  { coreGamma, tailNoiseConductance, resistance, loopGain }: ClosedFormValues,
  { pair, tail }: { readonly pair: number; readonly tail: number },
): NoiseFactorParts {
  for (const [name, value] of Object.entries({ coreGamma, resistance, loopGain })) {
    if (!(value > 0)) {
      throw new RangeError(`Cannot compute the noise factor: ${name} must be > 0, got ${value}`);
    }
  }
  if (!(tailNoiseConductance >= 0)) {
    throw new RangeError(
      `Cannot compute the noise factor: tailNoiseConductance must be >= 0 S, got ${tailNoiseConductance} S`,
    );
  }
  return { tank: 1, pair, tail, total: 1 + pair + tail };
}
