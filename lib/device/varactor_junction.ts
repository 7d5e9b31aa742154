import { BOLTZMANN } from "../quantity/constants.ts";
import { Junction, type JunctionParameters } from "./junction.ts";
import { type Varactor, type VaractorNoise, writeTwoTerminals } from "./varactor.ts";

/** A p-n junction used as a varactor. */
export interface JunctionVaractorParameters extends JunctionParameters {
  /** Of the neutral regions and contacts [ohm]. */
  readonly seriesResistance: number;
}

/**
 * Junction varactor: the law of {@linkcode Junction} between anode and cathode, with shot noise.
 *
 * S = 2 k T (g + g0) with the conductances g at the voltage and g0 at zero: 2 q (I + 2 I_s) for an emission
 * coefficient of 1, Nyquist's 4 k T g0 at zero volts for any. The junction of the cathode's well to the
 * substrate is not in it: add a junction or a capacitor where the well is not held.
 *
 * @see A. van der Ziel, Noise in Solid State Devices and Circuits (Wiley, 1986), for the shot noise
 *   (from memory)
 */
export class JunctionVaractor implements Varactor {
  readonly terminals = ["anode", "cathode"] as const;
  readonly parameters: JunctionVaractorParameters;
  readonly noise: readonly VaractorNoise[];
  readonly #junction: Junction;
  readonly #values = new Float64Array(4);

  /** @throws {RangeError} when a parameter is outside its range */
  constructor(parameters: JunctionVaractorParameters) {
    const { seriesResistance, temperature } = parameters;
    if (!(seriesResistance >= 0)) {
      throw new RangeError(
        `Cannot make the varactor: series resistance must be >= 0 ohm, got ${seriesResistance} ohm`,
      );
    }
    this.parameters = parameters;
    this.#junction = new Junction(parameters);
    const values = this.#values;
    this.#junction.evaluate(0, values);
    const zero = values[1]!;
    this.noise = [{
      label: "shot",
      color: "white",
      into: 0,
      out: 1,
      amplitude: (v) => {
        this.#junction.evaluate(v[0]! - v[1]!, values);
        return Math.sqrt(2 * BOLTZMANN * temperature * (values[1]! + zero));
      },
    }];
  }

  /** Into the anode first; layout of {@linkcode Varactor.evaluate} for two terminals. */
  evaluate(v: Float64Array, out: Float64Array): void {
    const values = this.#values;
    this.#junction.evaluate(v[0]! - v[1]!, values);
    writeTwoTerminals(values[0]!, values[1]!, values[2]!, values[3]!, out);
  }

  /** The series resistance, at any bias. */
  lossResistance(_v?: Float64Array): number {
    return this.parameters.seriesResistance;
  }
}
