import { type Varactor, type VaractorNoise, writeTwoTerminals } from "./varactor.ts";

/** An accumulation-mode MOS varactor: the fit of its capacitance. */
export interface AccumulationVaractorParameters {
  /** In accumulation, fringe included [F]. */
  readonly maximumCapacitance: number;
  /** In depletion, fringe included [F]. */
  readonly minimumCapacitance: number;
  /** Gate-well voltage of the mean capacitance [V]. */
  readonly centreVoltage: number;
  /** Voltage scale of the transition [V]. */
  readonly transitionVoltage: number;
  /** Of well, gate and contacts [ohm]. */
  readonly seriesResistance: number;
}

/**
 * Accumulation-mode MOS varactor between gate and well:
 * C(v) = (Cmax + Cmin)/2 + (Cmax - Cmin)/2 tanh((v - V0)/Vs), with the charge as its integral,
 * Q = (Cmax + Cmin)/2 v + (Cmax - Cmin)/2 Vs ln(cosh((v - V0)/Vs)/cosh(V0/Vs)), zero at v = 0.
 *
 * No current and no noise of its own: the gate does not leak, the loss is in series. The junction of the
 * well to the substrate is not in it.
 *
 * @see B. Razavi, RF Microelectronics, 2nd ed. (Prentice Hall, 2012), sec. 8.5.2, for the fit
 */
export class AccumulationVaractor implements Varactor {
  readonly terminals = ["gate", "well"] as const;
  readonly parameters: AccumulationVaractorParameters;
  readonly noise: readonly VaractorNoise[] = [];
  readonly #mean: number;
  readonly #half: number;
  readonly #atZero: number;

  /** @throws {RangeError} when a parameter is outside its range */
  constructor(parameters: AccumulationVaractorParameters) {
    const { maximumCapacitance, minimumCapacitance, centreVoltage } = parameters;
    const { transitionVoltage, seriesResistance } = parameters;
    demand(minimumCapacitance > 0, "minimum capacitance must be > 0 F", minimumCapacitance, "F");
    demand(
      maximumCapacitance >= minimumCapacitance,
      `maximum capacitance must be >= the minimum, ${minimumCapacitance} F`,
      maximumCapacitance,
      "F",
    );
    demand(Number.isFinite(centreVoltage), "centre voltage must be finite", centreVoltage, "V");
    demand(transitionVoltage > 0, "transition voltage must be > 0 V", transitionVoltage, "V");
    demand(seriesResistance >= 0, "series resistance must be >= 0 ohm", seriesResistance, "ohm");
    this.parameters = parameters;
    this.#mean = (maximumCapacitance + minimumCapacitance) / 2;
    this.#half = (maximumCapacitance - minimumCapacitance) / 2;
    this.#atZero = logCosh(centreVoltage / transitionVoltage);
  }

  /** Into the gate first; layout of {@linkcode Varactor.evaluate} for two terminals. */
  evaluate(v: Float64Array, out: Float64Array): void {
    const { centreVoltage, transitionVoltage } = this.parameters;
    const voltage = v[0]! - v[1]!;
    const u = (voltage - centreVoltage) / transitionVoltage;
    const charge = this.#mean * voltage +
      this.#half * transitionVoltage * (logCosh(u) - this.#atZero);
    writeTwoTerminals(0, 0, charge, this.#mean + this.#half * Math.tanh(u), out);
  }

  /**
   * Small-signal capacitance.
   *
   * @param voltage gate minus well [V]
   * @returns [F]
   */
  capacitance(voltage: number): number {
    const { centreVoltage, transitionVoltage } = this.parameters;
    return this.#mean + this.#half * Math.tanh((voltage - centreVoltage) / transitionVoltage);
  }

  /** The series resistance, at any bias. */
  lossResistance(_v?: Float64Array): number {
    return this.parameters.seriesResistance;
  }
}

/** ln cosh u, analytic in u; written so that it neither overflows nor cancels at large |u|. */
function logCosh(u: number): number {
  const size = Math.abs(u);
  return size + Math.log1p(Math.exp(-2 * size)) - Math.LN2;
}

function demand(condition: boolean, wording: string, value: number, unit: string): void {
  if (!condition) {
    throw new RangeError(`Cannot make the varactor: ${wording}, got ${value} ${unit}`);
  }
}
