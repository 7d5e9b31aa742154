import { SplineAxis } from "../numeric/spline_axis.ts";
import { TensorSpline } from "../numeric/spline_tensor.ts";
import { BOLTZMANN } from "../quantity/constants.ts";
import { characterizedAsN, checkTable, conductanceErrors } from "./_transistor_table_checks.ts";
import { Transistor, TRANSISTOR_VALUES } from "./transistor.ts";
import type { TransistorModel } from "./transistor_model.ts";
import type { TransistorOperatingPoint } from "./transistor_operating_point.ts";
import type { TransistorParameters, TransistorSize } from "./transistor_parameters.ts";
import type { TransistorTableData } from "./transistor_table_data.ts";

/** Per quantity: its value and its change with vgs, vds and vbs. */
const ENTRIES = 4;
/** Drain current, charges of drain, gate and source. */
const QUANTITIES = 4;
/** A voltage may miss the range by this much: rounding [V]. */
const EDGE = 1e-9;

/** What a table is a table of, and what it is used for. */
export interface TransistorTableOptions {
  /** The card's, for what the table does not hold. */
  readonly parameters: TransistorParameters;
  /** Of the transistor in the circuit; its length is that of the table. */
  readonly size: TransistorSize;
  /** Width of the transistor that was characterized, all fingers [m]. */
  readonly characterizedWidth: number;
}

/** Where a bias leaves the table. */
export interface TableExcursion {
  /** Drain and source in the roles the voltages give them. */
  readonly axis: "vgs" | "vds" | "vbs";
  /** [V] */
  readonly value: number;
  /** [V] */
  readonly lowest: number;
  /** [V] */
  readonly highest: number;
}

/**
 * A transistor from its characterization on a grid instead of from the model: the same currents, charges,
 * Jacobians and noise by the same calls.
 *
 * Between the grid's points stands the tensor product of cubic splines, twice continuously differentiable.
 * Conductances are the derivatives of the interpolated current; columns of conductances in the table are
 * compared with them and refused when they contradict.
 *
 * A table that begins at a drain-source voltage of zero is taken as symmetric in drain and source: with a
 * negative voltage the two swap, and within one step of the grid around zero both readings are blended by
 * a twice continuously differentiable step, so that the current at zero is zero. A table with negative
 * drain-source voltages is used as it is.
 *
 * A table without body voltage gets the body effect as a shift of the gate voltage by (n - 1) v_BS, n the
 * card's slope factor, or by the table's own ratio of gmb to gm; the exact form of the charge model. Without
 * charges the card's charges serve; charges without body voltage change with it as the card's do. The
 * currents of the bulk junctions are the card's. `notes` says which of these hold.
 *
 * Thermal noise: S = 4kT G_n(card) g(table)/g(card), g the channel conductance at zero drain-source voltage
 * at the same gate and the end that conducts: Nyquist's 4kT g of the table itself at zero voltage, the
 * card's shape beyond. Flicker noise: the table's own transconductance, signed, times the card's gate voltage.
 *
 * Outside the grid nothing throws, for Newton's sake: slope and curvature of the edge go on, the curvature
 * fading over the outermost step. Whether a state lies inside is asked of `withinRange`; a result outside
 * is to be refused, by `demandWithinRange`.
 */
export class TransistorTable implements TransistorModel {
  readonly parameters: TransistorParameters;
  readonly size: TransistorSize;
  /** What does not come from the table, and how far the table agrees with itself, one line each. */
  readonly notes: readonly string[];
  readonly #sign: number;
  readonly #scale: number;
  readonly #spline: TensorSpline;
  readonly #symmetric: boolean;
  /** Half the width of the blend around zero drain-source voltage [V]. */
  readonly #blend: number;
  /** Shift of the gate voltage with the bulk's [1]; null when the table has a body voltage. */
  readonly #bodyShift: number | null;
  readonly #bulkZero: number;
  readonly #hasCharges: boolean;
  /** The card's transistor of the same size, and without its bulk junctions. */
  readonly #card: Transistor;
  readonly #channel: Transistor;
  readonly #hasJunctions: boolean;
  readonly #flicker: number;
  readonly #direct = new Float64Array(QUANTITIES * ENTRIES);
  readonly #swapped = new Float64Array(QUANTITIES * ENTRIES);
  /** What `#solve` leaves: quantities in n-type signs of the characterized width. */
  readonly #at = new Float64Array(QUANTITIES * ENTRIES);
  readonly #values = new Float64Array(TRANSISTOR_VALUES);
  readonly #others = new Float64Array(TRANSISTOR_VALUES);
  /** The card's charges at two body voltages. */
  readonly #here = new Float64Array(TRANSISTOR_VALUES);
  readonly #there = new Float64Array(TRANSISTOR_VALUES);

  /**
   * @param data grid, in SI, signs as measured
   * @throws {RangeError} when the table has no zero drain-source voltage, a current there, conductances
   *   that contradict its current, or a size or parameter is outside its range
   * @throws {TypeError} when an array does not fit the grid
   */
  constructor(data: TransistorTableData, options: TransistorTableOptions) {
    const { parameters, size, characterizedWidth } = options;
    checkTable(data);
    if (!(characterizedWidth > 0)) {
      throw new RangeError(
        `Cannot use the transistor table: characterized width must be > 0 m, got ${characterizedWidth} m`,
      );
    }
    const { multiplier = 1, bulkJunctions = true, width, length } = size;
    this.parameters = parameters;
    this.size = size;
    this.#sign = parameters.kind === "n" ? 1 : -1;
    this.#scale = width * multiplier / characterizedWidth;
    this.#card = new Transistor(parameters, size);
    this.#channel = new Transistor(parameters, { ...size, bulkJunctions: false });
    this.#hasJunctions = bulkJunctions;
    this.#flicker = Math.sqrt(
      parameters.flickerCoefficient / (parameters.oxideCapacitance * width * length * multiplier),
    );
    const table = parameters.kind === "n" ? data : characterizedAsN(data);
    const { gateVoltages, drainVoltages, bulkVoltages, current, charges } = table;
    // `checkTable` has found a zero and at least four voltages.
    const zero = drainVoltages.findIndex((v) => Math.abs(v) <= EDGE);
    this.#symmetric = zero === 0;
    this.#blend = zero + 1 < drainVoltages.length
      ? drainVoltages[zero + 1]! - drainVoltages[zero]!
      : drainVoltages[zero]! - drainVoltages[zero - 1]!;
    this.#bulkZero = bulkVoltages[0]!;
    this.#hasCharges = charges !== undefined;
    const quantities = charges ? [current, charges.drain, charges.gate, charges.source] : [current];
    const values = new Float64Array(current.length * quantities.length);
    for (let k = 0; k < values.length; k++) {
      values[k] = quantities[k % quantities.length]![Math.floor(k / quantities.length)]!;
    }
    this.#spline = new TensorSpline(
      [
        new SplineAxis(gateVoltages),
        new SplineAxis(drainVoltages, { continueBelow: this.#symmetric ? this.#blend : 0 }),
        new SplineAxis(bulkVoltages),
      ],
      values,
    );
    const body = bulkVoltages.length > 1 ? null : bodyShift(table, parameters.slopeFactor);
    this.#bodyShift = body?.shift ?? null;
    this.notes = [
      ...conductanceErrors(table, { spline: this.#spline, sign: this.#sign }),
      this.#symmetric
        ? "drain and source: the table begins at vds 0 V and is taken as symmetric"
        : "drain and source: negative vds from the table",
      body?.note ?? "body voltage: from the table",
      charges
        ? body
          ? "charges: from the table; their change with the body voltage from the card"
          : "charges: from the table"
        : "charges: from the card",
      "noise: the table's conductance at zero vds, the card's shape beyond; flicker from the card",
    ];
  }

  /**
   * Currents and charges of the four terminals with their derivatives, as {@linkcode Transistor.evaluate}.
   *
   * @param vd drain potential [V]
   * @param vg gate potential [V]
   * @param vs source potential [V]
   * @param vb bulk potential [V]
   * @param out shape (40,), overwritten
   */
  evaluate(vd: number, vg: number, vs: number, vb: number, out: Float64Array): void {
    if (this.#hasJunctions || !this.#hasCharges) this.#card.evaluate(vd, vg, vs, vb, out);
    if (this.#hasJunctions) {
      // What the junctions add to the card's channel.
      this.#channel.evaluate(vd, vg, vs, vb, this.#others);
      for (let e = 0; e < 20; e++) out[e] = out[e]! - this.#others[e]!;
    } else for (let e = 0; e < 20; e++) out[e] = 0;
    this.#solve(vd, vg, vs, vb);
    const at = this.#at;
    const valueScale = this.#sign * this.#scale;
    out[0] = out[0]! + valueScale * at[0]!;
    out[2] = out[2]! - valueScale * at[0]!;
    this.#addRow(4, 0, this.#scale, out);
    this.#addRow(12, 0, -this.#scale, out);
    if (!this.#hasCharges) return;
    for (let terminal = 0; terminal < 3; terminal++) {
      const row = 24 + 4 * terminal;
      for (let e = row; e < row + 4; e++) out[e] = 0;
      out[20 + terminal] = valueScale * at[(1 + terminal) * ENTRIES]!;
      this.#addRow(row, 1 + terminal, this.#scale, out);
    }
    out[23] = -(out[20]! + out[22]! + out[21]!);
    for (let column = 36; column < 40; column++) {
      out[column] = -(out[column - 12]! + out[column - 4]! + out[column - 8]!);
    }
  }

  /**
   * Thermal noise of the channel: the square root of its one-sided density, positive, as a current into
   * the drain and out of the source.
   *
   * @returns [A/sqrt(Hz)]
   */
  channelNoise(vd: number, vg: number, vs: number, vb: number): number {
    const across = this.#sign * (vd - vs);
    const drive = this.#channel.channelNoise(vd, vg, vs, vb);
    const weight = smoothStep(across / this.#blend);
    let ratio = 0;
    if (weight > 0) ratio += weight * this.#conductanceRatio(vs, vg, vb);
    if (weight < 1) ratio += (1 - weight) * this.#conductanceRatio(vd, vg, vb);
    // Where the interpolated conductance dips below zero in an off device there is no noise to speak of.
    return drive * Math.sqrt(Math.max(0, ratio));
  }

  /**
   * Flicker noise of the channel at 1 Hz, signed, one-sided, as a current into the drain and out of the
   * source: the table's dI_d/dV_g times the card's gate voltage.
   *
   * @returns [A/sqrt(Hz)]
   */
  flickerNoise(vd: number, vg: number, vs: number, vb: number): number {
    this.#solve(vd, vg, vs, vb);
    return this.#scale * this.#at[1]! * this.#flicker;
  }

  /** As {@linkcode Transistor.operatingPoint}; inversion and saturation voltage are the card's. */
  operatingPoint(vd: number, vg: number, vs: number, vb: number): TransistorOperatingPoint {
    const noise = this.channelNoise(vd, vg, vs, vb);
    const values = this.#values;
    this.evaluate(vd, vg, vs, vb, values);
    const at = this.#at;
    return {
      ...this.#card.operatingPoint(vd, vg, vs, vb),
      current: this.#sign * this.#scale * at[0]!,
      gm: this.#scale * at[1]!,
      gms: this.#scale * (at[1]! + at[2]! + at[3]!),
      gds: this.#scale * at[2]!,
      noiseConductance: noise * noise / (4 * BOLTZMANN * this.parameters.temperature),
      gateSourceCapacitance: -values[30]!,
      gateDrainCapacitance: -values[28]!,
      gateBulkCapacitance: -values[31]!,
      drainBulkCapacitance: -values[36]!,
      sourceBulkCapacitance: -values[38]!,
    };
  }

  /** Whether the table covers a bias. */
  withinRange(vd: number, vg: number, vs: number, vb: number): boolean {
    return this.excursion(vd, vg, vs, vb) === undefined;
  }

  /** How far a bias lies outside the table, on the axis where it does so most; undefined inside. */
  excursion(vd: number, vg: number, vs: number, vb: number): TableExcursion | undefined {
    const sign = this.#sign;
    const swap = this.#symmetric && sign * (vd - vs) < 0;
    const [low, high] = swap ? [vd, vs] : [vs, vd];
    const bulk = sign * (vb - low);
    const shift = this.#bodyShift;
    const voltages = [
      sign * (vg - low) + (shift === null ? 0 : shift * (bulk - this.#bulkZero)),
      sign * (high - low),
      // Without a body voltage any is allowed: it comes from the card.
      shift === null ? bulk : this.#bulkZero,
    ];
    let worst: TableExcursion | undefined;
    let most = EDGE;
    (["vgs", "vds", "vbs"] as const).forEach((axis, k) => {
      const { points } = this.#spline.axes[k]!;
      // Three voltages, and an axis has a point.
      const [value, first, last] = [voltages[k]!, points[0]!, points[points.length - 1]!];
      const beyond = Math.max(first - value, value - last);
      if (!(beyond > most)) return;
      most = beyond;
      const [lowest, highest] = sign > 0 ? [first, last] : [-last, -first];
      worst = { axis, value: sign * value, lowest, highest };
    });
    return worst;
  }

  /**
   * Refuses a bias outside the table.
   *
   * @throws {RangeError} with the potentials, the voltage that is outside and its range
   */
  demandWithinRange(vd: number, vg: number, vs: number, vb: number): void {
    const excursion = this.excursion(vd, vg, vs, vb);
    if (excursion === undefined) return;
    const { axis, value, lowest, highest } = excursion;
    const [d, g, s, b] = [vd, vg, vs, vb].map(short);
    throw new RangeError(
      `Cannot use the transistor table at drain ${d} V, gate ${g} V, source ${s} V, bulk ${b} V: ` +
        `${axis} must lie between ${short(lowest)} V and ${short(highest)} V, got ${
          short(value)
        } V`,
    );
  }

  /** Table's over card's channel conductance with both ends at one potential. */
  #conductanceRatio(end: number, vg: number, vb: number): number {
    this.#solve(end, vg, end, vb);
    const noise = this.#channel.channelNoise(end, vg, end, vb);
    if (!(noise > 0)) return 0;
    return this.#scale * this.#at[2]! * 4 * BOLTZMANN * this.parameters.temperature /
      (noise * noise);
  }

  /** Adds a quantity's derivatives to the row of a matrix over d, g, s, b. */
  #addRow(row: number, quantity: number, scale: number, out: Float64Array): void {
    const q = quantity * ENTRIES;
    const byGate = scale * this.#at[q + 1]!;
    const byDrain = scale * this.#at[q + 2]!;
    const byBulk = scale * this.#at[q + 3]!;
    out[row] = out[row]! + byDrain;
    out[row + 1] = out[row + 1]! + byGate;
    out[row + 2] = out[row + 2]! - (byDrain + byGate + byBulk);
    out[row + 3] = out[row + 3]! + byBulk;
  }

  /** Quantities at a bias with drain and source in either role, left in `#at`. */
  #solve(vd: number, vg: number, vs: number, vb: number): void {
    const sign = this.#sign;
    const gate = sign * (vg - vs);
    const across = sign * (vd - vs);
    const bulk = sign * (vb - vs);
    const at = this.#at;
    const u = this.#symmetric ? across / this.#blend : 1;
    if (u >= 1) {
      this.#read(gate, across, bulk, at);
      return;
    }
    const swapped = this.#swapped;
    this.#read(gate - across, -across, bulk - across, swapped);
    swapRoles(swapped);
    if (u <= -1) {
      at.set(swapped);
      return;
    }
    const direct = this.#direct;
    this.#read(gate, across, bulk, direct);
    const weight = smoothStep(u);
    const rise = smoothStepSlope(u) / this.#blend;
    for (let q = 0; q < QUANTITIES * ENTRIES; q += ENTRIES) {
      for (let e = q; e < q + ENTRIES; e++) {
        at[e] = weight * direct[e]! + (1 - weight) * swapped[e]!;
      }
      at[q + 2] = at[q + 2]! + rise * (direct[q]! - swapped[q]!);
    }
  }

  /** The table as it stands at vgs, vds and vbs. */
  #read(gate: number, across: number, bulk: number, into: Float64Array): void {
    const shift = this.#bodyShift;
    if (shift === null) {
      this.#spline.evaluate(gate, across, bulk, into);
      return;
    }
    const beyond = bulk - this.#bulkZero;
    this.#spline.evaluate(gate + shift * beyond, across, this.#bulkZero, into);
    into[3] = shift * into[1]!;
    if (!this.#hasCharges) return;
    // Charges of the table are at one body voltage and take no shift: read again there, and the card's
    // change with the body voltage, of the characterized width.
    const current = into[0]!;
    const byGate = into[1]!;
    const byDrain = into[2]!;
    const byBulk = into[3]!;
    this.#spline.evaluate(gate, across, this.#bulkZero, into);
    into[0] = current;
    into[1] = byGate;
    into[2] = byDrain;
    into[3] = byBulk;
    const sign = this.#sign;
    const here = this.#here;
    const there = this.#there;
    this.#card.evaluate(sign * across, sign * gate, 0, sign * bulk, here);
    this.#card.evaluate(sign * across, sign * gate, 0, sign * this.#bulkZero, there);
    const part = 1 / this.#scale;
    for (let terminal = 0; terminal < 3; terminal++) {
      const q = (1 + terminal) * ENTRIES;
      const d = 24 + 4 * terminal;
      const g = d + 1;
      const b = d + 3;
      into[q] = into[q]! + part * sign * (here[20 + terminal]! - there[20 + terminal]!);
      into[q + 1] = into[q + 1]! + part * (here[g]! - there[g]!);
      into[q + 2] = into[q + 2]! + part * (here[d]! - there[d]!);
      into[q + 3] = part * here[b]!;
    }
  }
}

/**
 * Turns quantities read with drain and source swapped, at vgd, -vds and vbd, into those of the device:
 * the current changes its sign, drain and source their charges, and the derivatives their voltages.
 */
function swapRoles(values: Float64Array): void {
  for (let e = 0; e < ENTRIES; e++) {
    values[e] = -values[e]!;
    const drain = values[ENTRIES + e]!;
    values[ENTRIES + e] = values[3 * ENTRIES + e]!;
    values[3 * ENTRIES + e] = drain;
  }
  for (let q = 0; q < QUANTITIES * ENTRIES; q += ENTRIES) {
    values[q + 2] = -(values[q + 1]! + values[q + 2]! + values[q + 3]!);
  }
}

/** From 0 at -1 to 1 at 1 with two continuous derivatives; the parts of u and -u sum to 1. */
function smoothStep(u: number): number {
  if (u <= -1) return 0;
  if (u >= 1) return 1;
  return 0.5 + u * (15 + u * u * (3 * u * u - 10)) / 16;
}

function smoothStepSlope(u: number): number {
  const rest = 1 - u * u;
  return 15 / 16 * rest * rest;
}

/** How far the gate voltage shifts with the body's in a table that has one body voltage. */
function bodyShift(
  { gm, gmb }: TransistorTableData,
  slopeFactor: number,
): { shift: number; note: string } {
  if (gm === undefined || gmb === undefined) {
    const shift = slopeFactor - 1;
    return {
      shift,
      note: `body voltage: not in the table; shifts the gate by ${
        short(shift)
      } of it, the card's slope factor less 1`,
    };
  }
  let product = 0;
  let square = 0;
  gm.forEach((g, k) => {
    product += g * gmb[k]!;
    square += g * g;
  });
  const shift = product / square;
  return {
    shift,
    note: `body voltage: one in the table; shifts the gate by ${
      short(shift)
    } of it, the mean of gmb over gm`,
  };
}

function short(value: number): string {
  return String(Number(value.toPrecision(6)));
}
