import { BOLTZMANN, ELEMENTARY_CHARGE } from "../quantity/constants.ts";
import { channelCharges } from "./_channel_charges.ts";
import { inversionCharge, inversionSlope } from "./inversion.ts";
import { Junction } from "./junction.ts";
import {
  inversionName,
  terminalCapacitances,
  type TransistorOperatingPoint,
} from "./transistor_operating_point.ts";
import type { TransistorParameters, TransistorSize } from "./transistor_parameters.ts";

/** Length of the `out` array of {@linkcode Transistor.evaluate}. */
export const TRANSISTOR_VALUES = 40;

/** Rounds off the drain-source voltage in the output conductance, so that it is even and analytic [V]. */
const OUTPUT_SMOOTHING = 0.1;

/** A drawn length may fall short of the minimum by this fraction: rounding of units. */
const LENGTH_ROUNDING = 1e-9;

/**
 * A charge-based MOS transistor for all regions, symmetric in drain and source.
 *
 * Each channel end has the charge q of 2q + ln q = ((V_G - V_T)/n - V)/U_T, voltages against the bulk.
 * With N = qs^2 + qs - qd^2 - qd the current is I = I_spec M N (1 + (lambda^2 N / 4)^2)^(-1/4), where
 * I_spec = 2 n mu C_ox (W/L) U_T^2 and lambda = 2 mu U_T / (v_sat L). In strong inversion the root
 * goes to 2 qs / lambda, the current of saturated carriers, and it rises with the drain voltage at any
 * lambda; the more usual 1/sqrt(1 + lambda^2 (qs - qd)^2) falls again before pinch-off once
 * lambda^2 qs^3 > 1. The output conductance is the factor M = 1 + (k/L)(sqrt(V_DS^2 + e^2) - e),
 * e = 0.1 V. Everything is analytic; at zero drain-source voltage M = 1 and the root is 1.
 *
 * Charges follow the same qs and qd without velocity saturation: Ward-Dutton shares for drain and
 * source, the linearised depletion charge for the bulk, constant overlap. Below threshold the
 * gate-bulk capacitance is (n - 1)/n C_ox W L; there is no accumulation. Two bulk junctions belong to the
 * device unless switched off; they make no noise. A p transistor is the n one with all voltages, currents
 * and charges negated.
 *
 * @see C. C. Enz, F. Krummenacher, E. A. Vittoz, Analog Integr. Circuits Signal Process. 8 (1995) 83
 * @see J.-M. Sallese et al., Solid-State Electron. 47 (2003) 677
 * @see C. C. Enz, E. A. Vittoz, Charge-Based MOS Transistor Modeling (Wiley, 2006)
 */
export class Transistor {
  readonly parameters: TransistorParameters;
  readonly size: TransistorSize;
  /** 2 n mu C_ox (W/L) U_T^2 [A] */
  readonly specificCurrent: number;
  /** k T / q [V] */
  readonly thermalVoltage: number;
  /** lambda = 2 mu U_T / (v_sat L) [1] */
  readonly velocitySaturation: number;
  readonly #sign: number;
  readonly #threshold: number;
  readonly #inverseSlope: number;
  readonly #inverseThermal: number;
  readonly #saturation: number;
  readonly #output: number;
  readonly #oxide: number;
  readonly #channelCharge: number;
  readonly #overlap: number;
  readonly #flicker: number;
  readonly #junction: Junction | null;
  readonly #shares = new Float64Array(6);
  readonly #diode = new Float64Array(4);
  readonly #scratch = new Float64Array(TRANSISTOR_VALUES);
  /** The channel at the last bias, in n-type signs against the bulk; what `#solve` leaves. */
  readonly #at = {
    drain: 0.5,
    gate: 0.5,
    source: 0.5,
    qs: 0.5,
    qd: 0.5,
    /** Specific current times the factors of velocity saturation and output conductance. */
    factor: 0.5,
    current: 0.5,
    byDrain: 0.5,
    byGate: 0.5,
    bySource: 0.5,
  };

  /** @throws {RangeError} when a size or a parameter is outside its range */
  constructor(parameters: TransistorParameters, size: TransistorSize) {
    const { width, length, multiplier = 1, bulkJunctions = true } = size;
    const { slopeFactor, oxideCapacitance, transconductanceParameter, temperature } = parameters;
    const { minimumLength } = parameters;
    demand(width > 0, "width must be > 0 m", `${width} m`);
    demand(
      length >= minimumLength * (1 - LENGTH_ROUNDING),
      `length must be >= ${minimumLength} m`,
      `${length} m`,
    );
    demand(multiplier > 0, "multiplier must be > 0", `${multiplier}`);
    demand(
      Number.isFinite(parameters.threshold),
      "threshold must be finite",
      `${parameters.threshold} V`,
    );
    demand(slopeFactor >= 1, "slope factor must be >= 1", `${slopeFactor}`);
    demand(temperature > 0, "temperature must be > 0 K", `${temperature} K`);
    const above = ["transconductanceParameter", "oxideCapacitance", "saturationVelocity"] as const;
    for (const name of above) {
      demand(parameters[name] > 0, `${name} must be > 0`, `${parameters[name]}`);
    }
    const notBelow = [
      "outputConductanceLength",
      "overlapCapacitance",
      "flickerCoefficient",
    ] as const;
    for (const name of notBelow) {
      demand(parameters[name] >= 0, `${name} must be >= 0`, `${parameters[name]}`);
    }
    const thermal = BOLTZMANN * temperature / ELEMENTARY_CHARGE;
    const totalWidth = width * multiplier;
    const mobility = transconductanceParameter / oxideCapacitance;
    this.parameters = parameters;
    this.size = size;
    this.thermalVoltage = thermal;
    this.specificCurrent = 2 * slopeFactor * transconductanceParameter * (totalWidth / length) *
      thermal ** 2;
    this.velocitySaturation = 2 * mobility * thermal / (parameters.saturationVelocity * length);
    this.#sign = parameters.kind === "n" ? 1 : -1;
    this.#threshold = parameters.threshold;
    this.#inverseSlope = 1 / slopeFactor;
    this.#inverseThermal = 1 / thermal;
    this.#saturation = this.velocitySaturation ** 2 / 4;
    this.#output = parameters.outputConductanceLength / length;
    this.#oxide = oxideCapacitance * totalWidth * length;
    this.#channelCharge = 2 * slopeFactor * thermal * this.#oxide;
    this.#overlap = parameters.overlapCapacitance * totalWidth;
    this.#flicker = Math.sqrt(parameters.flickerCoefficient / this.#oxide);
    this.#junction = bulkJunctions ? bulkJunction(parameters, size) : null;
  }

  /**
   * Currents and charges of the four terminals with their derivatives.
   *
   * @param vd drain potential [V]
   * @param vg gate potential [V]
   * @param vs source potential [V]
   * @param vb bulk potential [V]
   * @param out shape (40,), overwritten, terminals in the order d, g, s, b: currents into the terminals
   *   [A] at 0, dI/dv row-major (4, 4) [S] at 4, charges [C] at 20, dQ/dv row-major (4, 4) [F] at 24.
   *   Rows and columns of both matrices sum to zero, and so do currents and charges.
   */
  evaluate(vd: number, vg: number, vs: number, vb: number, out: Float64Array): void {
    this.#solve(vd, vg, vs, vb);
    const sign = this.#sign;
    const { drain, gate, source, qs, qd, current, byDrain, byGate, bySource } = this.#at;
    const byBulk = -(byDrain + byGate + bySource);
    out[0] = sign * current;
    out[1] = 0;
    out[2] = -sign * current;
    out[3] = 0;
    writeRow(4, byDrain, byGate, bySource, byBulk, out);
    writeRow(8, 0, 0, 0, 0, out);
    writeRow(12, -byDrain, -byGate, -bySource, -byBulk, out);
    writeRow(16, 0, 0, 0, 0, out);

    // Charges of the channel and of the depletion layer under it: shares of the drain and the source,
    // what they mirror on the gate, and the linear depletion charge.
    const shares = this.#shares;
    channelCharges(qs, qd, shares);
    const inverseSlope = this.#inverseSlope;
    const unit = this.#channelCharge;
    const atSource = inversionSlope(qs) * this.#inverseThermal * unit;
    const atDrain = inversionSlope(qd) * this.#inverseThermal * unit;
    const drainByDrain = shares[3]! * atDrain;
    const drainBySource = shares[2]! * atSource;
    const drainByGate = -(drainByDrain + drainBySource) * inverseSlope;
    const sourceByDrain = shares[5]! * atDrain;
    const sourceBySource = shares[4]! * atSource;
    const sourceByGate = -(sourceByDrain + sourceBySource) * inverseSlope;
    const gateByDrain = -(drainByDrain + sourceByDrain) * inverseSlope;
    const gateBySource = -(drainBySource + sourceBySource) * inverseSlope;
    const depletion = this.#oxide * (1 - inverseSlope);
    const gateByGate = depletion - (drainByGate + sourceByGate) * inverseSlope;
    const overlap = this.#overlap;
    const drainOverlap = overlap * (gate - drain);
    const sourceOverlap = overlap * (gate - source);
    out[20] = -sign * (unit * shares[0]! + drainOverlap);
    out[21] = sign *
      (depletion * gate + unit * inverseSlope * (shares[0]! + shares[1]!) +
        (drainOverlap + sourceOverlap));
    out[22] = -sign * (unit * shares[1]! + sourceOverlap);
    writeClosedRow(24, drainByDrain + overlap, drainByGate - overlap, drainBySource, out);
    writeClosedRow(
      28,
      gateByDrain - overlap,
      gateByGate + 2 * overlap,
      gateBySource - overlap,
      out,
    );
    writeClosedRow(32, sourceByDrain, sourceByGate - overlap, sourceBySource + overlap, out);
    if (this.#junction !== null) {
      this.#addJunction(this.#junction, -drain, 0, out);
      this.#addJunction(this.#junction, -source, 2, out);
    }
    // The bulk balances the other three, to the last bit and in an order that drain and source may swap.
    out[23] = -(out[20]! + out[22]! + out[21]!);
    for (let column = 36; column < 40; column++) {
      out[column] = -(out[column - 12]! + out[column - 4]! + out[column - 8]!);
    }
  }

  /**
   * Thermal noise of the channel: the square root of its one-sided density, positive, as a current into
   * the drain and out of the source.
   *
   * S = 4kT G_n with G_n = (I_spec/U_T) M r [2/3 (qs^2 + qs qd + qd^2) + (qs + qd)/2]/(qs + qd + 1), r the
   * root of the current: the charge of the channel times the mobility that carries the current. At
   * zero drain-source voltage G_n is the channel conductance.
   *
   * @returns [A/sqrt(Hz)]
   * @see C. C. Enz, E. A. Vittoz, Charge-Based MOS Transistor Modeling (Wiley, 2006), for the form
   *   without velocity saturation and output conductance
   */
  channelNoise(vd: number, vg: number, vs: number, vb: number): number {
    this.#solve(vd, vg, vs, vb);
    const { qs, qd, factor } = this.#at;
    const sum = qs + qd;
    const charge = ((2 / 3) * (sum * sum - qs * qd) + 0.5 * sum) / (sum + 1);
    // 4kT / U_T is four elementary charges.
    return Math.sqrt(4 * ELEMENTARY_CHARGE * factor * charge);
  }

  /**
   * Flicker noise of the channel at 1 Hz: dI_d/dV_g sqrt(K_F / (C_ox W L)), one-sided, as a current into
   * the drain and out of the source. It changes sign with the drain-source voltage.
   *
   * @returns signed amplitude [A/sqrt(Hz)]
   */
  flickerNoise(vd: number, vg: number, vs: number, vb: number): number {
    this.#solve(vd, vg, vs, vb);
    return this.#at.byGate * this.#flicker;
  }

  /**
   * What a designer reads off at a bias.
   *
   * The saturation voltage is U_T (2 sqrt(IC + 1/4) + 3), the long-channel figure (Enz and Vittoz, 2006,
   * from memory); inversion is weak below IC = 0.1 and strong above 10 (common practice).
   */
  operatingPoint(vd: number, vg: number, vs: number, vb: number): TransistorOperatingPoint {
    const noise = this.channelNoise(vd, vg, vs, vb);
    const values = this.#scratch;
    this.evaluate(vd, vg, vs, vb, values);
    const { qs, qd, current, byDrain, byGate, bySource } = this.#at;
    const q = Math.max(qs, qd);
    const inversionCoefficient = q * q + q;
    const saturationVoltage = this.thermalVoltage *
      (2 * Math.sqrt(inversionCoefficient + 0.25) + 3);
    return {
      current: this.#sign * current,
      gm: byGate,
      gms: -bySource,
      gds: byDrain,
      inversionCoefficient,
      inversion: inversionName(inversionCoefficient),
      saturationVoltage,
      region: Math.abs(vd - vs) < saturationVoltage ? "triode" : "saturation",
      noiseConductance: noise * noise / (4 * BOLTZMANN * this.parameters.temperature),
      ...terminalCapacitances(values),
    };
  }

  /** Charges of the two ends and the current with its slopes, left in `#at`. */
  #solve(vd: number, vg: number, vs: number, vb: number): void {
    const at = this.#at;
    const perVolt = this.#inverseThermal;
    const inverseSlope = this.#inverseSlope;
    const drain = this.#sign * (vd - vb);
    const gate = this.#sign * (vg - vb);
    const source = this.#sign * (vs - vb);
    const pinch = (gate - this.#threshold) * inverseSlope;
    const qs = inversionCharge((pinch - source) * perVolt);
    const qd = inversionCharge((pinch - drain) * perVolt);
    const flow = (qs - qd) * (qs + qd + 1);
    const saturation = this.#saturation * flow;
    const relief = 1 / (1 + saturation * saturation);
    const across = drain - source;
    const round = Math.sqrt(across * across + OUTPUT_SMOOTHING * OUTPUT_SMOOTHING);
    const root = this.specificCurrent * Math.sqrt(Math.sqrt(relief));
    const output = 1 + this.#output * (round - OUTPUT_SMOOTHING);
    const slope = root * output * (1 - 0.5 * saturation * saturation * relief) * perVolt;
    const lengthening = root * flow * this.#output * (across / round);
    at.drain = drain;
    at.gate = gate;
    at.source = source;
    at.qs = qs;
    at.qd = qd;
    at.factor = root * output;
    at.current = root * flow * output;
    at.byDrain = slope * qd + lengthening;
    at.bySource = -(slope * qs + lengthening);
    at.byGate = slope * (qs - qd) * inverseSlope;
  }

  /** Adds the junction from the bulk to terminal `k` (0 drain, 2 source); the bulk's charge comes later. */
  #addJunction(junction: Junction, v: number, k: number, out: Float64Array): void {
    const diode = this.#diode;
    junction.evaluate(v, diode);
    const current = this.#sign * diode[0]!;
    const conductance = diode[1]!;
    const row = 4 + 4 * k;
    out[k] = out[k]! - current;
    out[3] = out[3]! + current;
    out[row + k] = out[row + k]! + conductance;
    out[row + 3] = out[row + 3]! - conductance;
    out[16 + k] = out[16 + k]! - conductance;
    out[19] = out[19]! + conductance;
    out[20 + k] = out[20 + k]! - this.#sign * diode[2]!;
    out[20 + row + k] = out[20 + row + k]! + diode[3]!;
    out[20 + row + 3] = out[20 + row + 3]! - diode[3]!;
  }
}

function writeRow(
  at: number,
  byDrain: number,
  byGate: number,
  bySource: number,
  byBulk: number,
  out: Float64Array,
): void {
  out[at] = byDrain;
  out[at + 1] = byGate;
  out[at + 2] = bySource;
  out[at + 3] = byBulk;
}

/** A row of the matrix whose last entry makes it sum to zero. */
function writeClosedRow(
  at: number,
  byDrain: number,
  byGate: number,
  bySource: number,
  out: Float64Array,
): void {
  writeRow(at, byDrain, byGate, bySource, -(byDrain + byGate + bySource), out);
}

/** The junction under one diffusion: a rectangle of the width by the diffusion length. */
function bulkJunction(parameters: TransistorParameters, size: TransistorSize): Junction {
  const { width, multiplier = 1 } = size;
  const { diffusionLength, areaCapacitance, perimeterCapacitance, ...rest } = parameters.junction;
  const area = width * diffusionLength * multiplier;
  const perimeter = 2 * (width + diffusionLength) * multiplier;
  return new Junction({
    saturationCurrent: rest.saturationCurrent * area,
    emission: rest.emission,
    temperature: parameters.temperature,
    zeroBiasCapacitance: areaCapacitance * area + perimeterCapacitance * perimeter,
    builtInPotential: rest.builtInPotential,
    grading: rest.grading,
  });
}

function demand(condition: boolean, wording: string, found: string): void {
  if (!condition) throw new RangeError(`Cannot size the transistor: ${wording}, got ${found}`);
}
