/**
 * What every varactor has in common.
 *
 * @module
 */

/** A noise current between two terminals of a varactor. */
export interface VaractorNoise {
  readonly label: string;
  readonly color: "white" | "1/f";
  /** Terminals by index: the current flows into `into` and out of `out`. */
  readonly into: number;
  readonly out: number;
  /** Signed one-sided amplitude at terminal potentials `v` [A/sqrt(Hz)]. */
  readonly amplitude: (v: Float64Array) => number;
}

/**
 * A capacitance that a voltage sets, with k terminals, as a circuit takes it.
 *
 * The loss in series is not part of `evaluate`: a circuit puts a resistor of `lossResistance` at the
 * bias, with its noise, between the first terminal and the tank.
 */
export interface Varactor {
  /** Names of the terminals in their order, the plate that is looked at first. */
  readonly terminals: readonly string[];
  /**
   * Currents into the terminals [A], shape (k,); dI/dv (k, k) [S]; charges [C] (k,); dQ/dv (k, k) [F], one
   * after the other in `out`, row-major. Charges and currents sum to zero.
   */
  evaluate(v: Float64Array, out: Float64Array): void;
  readonly noise: readonly VaractorNoise[];
  /** Resistance in series with the first terminal that makes the loss at potentials `v` [ohm]. */
  lossResistance(v: Float64Array): number;
}

/** A varactor at one bias and frequency. */
export interface VaractorFigures {
  /** Change of the first terminal's charge with its potential [F]. */
  readonly capacitance: number;
  /** Of the first terminal [C]. */
  readonly charge: number;
  /** Into the first terminal [A]. */
  readonly current: number;
  /** Reactance over resistance, series loss and conduction; Infinity without loss [1]. */
  readonly quality: number;
}

/**
 * What a designer reads off a varactor: Z = R + 1/(g + jwC), Q = |Im Z|/Re Z, which is 1/(w R C) when it
 * does not conduct.
 *
 * @param at potentials of the terminals [V], and the frequency [Hz]
 * @throws {RangeError} when the frequency is not above zero
 */
export function varactorFigures(
  varactor: Varactor,
  at: { readonly potentials: ArrayLike<number>; readonly frequency: number },
): VaractorFigures {
  const { frequency } = at;
  if (!(frequency > 0)) {
    throw new RangeError(
      `Cannot read the varactor: frequency must be > 0 Hz, got ${frequency} Hz`,
    );
  }
  const k = varactor.terminals.length;
  if (at.potentials.length !== k) {
    throw new TypeError(
      `Cannot read the varactor: expected ${k} potentials (${
        varactor.terminals.join(", ")
      }), got ${at.potentials.length}`,
    );
  }
  const v = Float64Array.from(at.potentials);
  const out = new Float64Array(2 * k * (1 + k));
  varactor.evaluate(v, out);
  // Inside `out` by its layout.
  const conductance = out[k]!;
  const capacitance = out[k + k * k + k]!;
  const susceptance = 2 * Math.PI * frequency * capacitance;
  const size = conductance ** 2 + susceptance ** 2;
  return {
    capacitance,
    charge: out[k + k * k]!,
    current: out[0]!,
    quality: susceptance / (varactor.lossResistance(v) * size + conductance),
  };
}

/**
 * Writes a device between two terminals, from what flows into the first at the voltage between them.
 *
 * @param current [A]
 * @param conductance [S]
 * @param charge [C]
 * @param capacitance [F]
 * @param out shape (12,), overwritten
 * @internal
 */
export function writeTwoTerminals(
  current: number,
  conductance: number,
  charge: number,
  capacitance: number,
  out: Float64Array,
): void {
  out[0] = current;
  out[1] = -current;
  out[2] = conductance;
  out[3] = -conductance;
  out[4] = -conductance;
  out[5] = conductance;
  out[6] = charge;
  out[7] = -charge;
  out[8] = capacitance;
  out[9] = -capacitance;
  out[10] = -capacitance;
  out[11] = capacitance;
}
