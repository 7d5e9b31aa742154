import { BOLTZMANN, ELEMENTARY_CHARGE } from "../quantity/constants.ts";

/**
 * Above this many thermal voltages the exponential is continued by its second-order Taylor polynomial.
 * At 1 fA of saturation current that is above 1 A, which no bulk junction on a chip carries.
 */
const EXPONENT_BOUND = 35;

/** Below this many thermal voltages the exponential is lost against 1 in the current's rounding. */
const EXPONENT_FLOOR = -40;

/** Fraction of the built-in potential from which the capacitance is continued along its tangent. */
const DEPLETION_FRACTION = 0.5;

/** A p-n junction at one temperature. */
export interface JunctionParameters {
  /** [A] */
  readonly saturationCurrent: number;
  /** Emission coefficient [1]. */
  readonly emission: number;
  /** [K] */
  readonly temperature: number;
  /** Depletion capacitance at zero bias [F]. */
  readonly zeroBiasCapacitance: number;
  /** [V] */
  readonly builtInPotential: number;
  /** Grading coefficient m, 0 < m < 1 [1]. */
  readonly grading: number;
}

/**
 * A p-n junction: exponential current and depletion charge, both twice continuously differentiable for
 * any voltage.
 *
 * I = Is (e^{v / (N U_T)} - 1), and C = C0 / (1 - v/phi)^m below phi/2. Above phi/2 the capacitance
 * goes on along its tangent, above 35 N U_T the exponential along its parabola. Charge stored by
 * diffusion is left out: in an oscillator the bulk junctions conduct for moments only.
 *
 * @see S. M. Sze, Physics of Semiconductor Devices, for both laws (from memory)
 */
export class Junction {
  readonly #saturationCurrent: number;
  readonly #perEmissionVoltage: number;
  /** At zero voltage. */
  readonly #conductance: number;
  readonly #boundExponential = Math.exp(EXPONENT_BOUND);
  readonly #capacitance: number;
  readonly #perBuiltIn: number;
  readonly #grading: number;
  /** Charge scale C0 phi / (1 - m). */
  readonly #chargeScale: number;
  readonly #joint: number;
  readonly #jointCharge: number;
  readonly #jointCapacitance: number;
  readonly #jointSlope: number;

  /** @throws {RangeError} when a parameter is outside its range */
  constructor(parameters: JunctionParameters) {
    const { saturationCurrent, emission, temperature } = parameters;
    const { zeroBiasCapacitance, builtInPotential, grading } = parameters;
    demand(saturationCurrent >= 0, "saturation current must be >= 0 A", saturationCurrent, "A");
    demand(emission > 0, "emission coefficient must be > 0", emission, "");
    demand(temperature > 0, "temperature must be > 0 K", temperature, "K");
    demand(zeroBiasCapacitance >= 0, "capacitance must be >= 0 F", zeroBiasCapacitance, "F");
    demand(builtInPotential > 0, "built-in potential must be > 0 V", builtInPotential, "V");
    demand(grading > 0 && grading < 1, "grading must lie between 0 and 1", grading, "");
    this.#saturationCurrent = saturationCurrent;
    this.#perEmissionVoltage = ELEMENTARY_CHARGE / (emission * BOLTZMANN * temperature);
    this.#conductance = saturationCurrent * this.#perEmissionVoltage;
    this.#capacitance = zeroBiasCapacitance;
    this.#perBuiltIn = 1 / builtInPotential;
    this.#grading = grading;
    this.#chargeScale = zeroBiasCapacitance * builtInPotential / (1 - grading);
    this.#joint = DEPLETION_FRACTION * builtInPotential;
    const rest = 1 - DEPLETION_FRACTION;
    this.#jointCapacitance = zeroBiasCapacitance * rest ** -grading;
    this.#jointSlope = this.#jointCapacitance * grading / (rest * builtInPotential);
    this.#jointCharge = this.#chargeScale * (1 - rest ** (1 - grading));
  }

  /**
   * Current, conductance, charge and capacitance at a voltage.
   *
   * @param v anode minus cathode [V]
   * @param out shape (4,), overwritten: current into the anode [A], dI/dv [S], charge of the anode
   *   (0 at v = 0) [C], dQ/dv [F]
   */
  evaluate(v: number, out: Float64Array): void {
    if (v === 0) {
      // A source tied to its bulk.
      out[0] = 0;
      out[1] = this.#conductance;
      out[2] = 0;
      out[3] = this.#capacitance;
      return;
    }
    const x = v * this.#perEmissionVoltage;
    const conductance = this.#conductance;
    if (x < EXPONENT_FLOOR) {
      out[0] = -this.#saturationCurrent;
      out[1] = 0;
    } else if (x < EXPONENT_BOUND) {
      const e = Math.exp(x);
      out[0] = this.#saturationCurrent * (e - 1);
      out[1] = conductance * e;
    } else {
      const d = x - EXPONENT_BOUND;
      out[0] = this.#saturationCurrent * (this.#boundExponential * (1 + d * (1 + 0.5 * d)) - 1);
      out[1] = conductance * this.#boundExponential * (1 + d);
    }
    if (v < this.#joint) {
      const u = 1 - v * this.#perBuiltIn;
      const shrink = Math.pow(u, -this.#grading);
      out[2] = this.#chargeScale * (1 - u * shrink);
      out[3] = this.#capacitance * shrink;
    } else {
      const d = v - this.#joint;
      out[2] = this.#jointCharge + d * (this.#jointCapacitance + 0.5 * d * this.#jointSlope);
      out[3] = this.#jointCapacitance + d * this.#jointSlope;
    }
  }
}

function demand(condition: boolean, wording: string, value: number, unit: string): void {
  if (condition) return;
  throw new RangeError(`Cannot make the junction: ${wording}, got ${`${value} ${unit}`.trim()}`);
}
