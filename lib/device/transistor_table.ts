import { BOLTZMANN } from "../quantity/constants.ts";
import { ENTRIES, TableChannel, type TableExcursion } from "./_transistor_table_channel.ts";
import { characterizedAsN, checkTable, conductanceErrors } from "./_transistor_table_checks.ts";
import { deviatedTransistor, type TransistorDeviation } from "./mismatch.ts";
import { Transistor, TRANSISTOR_VALUES } from "./transistor.ts";
import type { TransistorModel } from "./transistor_model.ts";
import {
  terminalCapacitances,
  type TransistorOperatingPoint,
} from "./transistor_operating_point.ts";
import type { TransistorParameters, TransistorSize } from "./transistor_parameters.ts";
import type { TransistorTableData } from "./transistor_table_data.ts";

export type { TableExcursion } from "./_transistor_table_channel.ts";

/** What a table is a table of, and what it is used for. */
export interface TransistorTableOptions {
  /** The card's, for what the table does not hold. */
  readonly parameters: TransistorParameters;
  /** Of the transistor in the circuit; its length is that of the table. */
  readonly size: TransistorSize;
  /** Width of the transistor that was characterized, all fingers [m]. */
  readonly characterizedWidth: number;
  /** Deviation of this transistor from its neighbours; `parameters` are those without it. @default none */
  readonly deviation?: TransistorDeviation;
}

const NO_DEVIATION: TransistorDeviation = { threshold: 0, gain: 0 };

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
 * a twice continuously differentiable step, so that the current at zero is zero. The table is continued by
 * two steps to negative voltages by its own swapped values, which makes its conductance at zero as good as
 * elsewhere. A table with negative drain-source voltages is used as it is.
 *
 * A table without body voltage gets the body effect as a shift of the gate voltage by (n - 1) v_BS, n the
 * card's slope factor, or by the table's own ratio of gmb to gm; the exact form of the charge model. Without
 * charges the card's charges serve; charges without body voltage change with it as the card's do. The
 * table's current is taken as the channel's; the currents of the bulk junctions are the card's. `notes` says
 * which of these hold. A table holds at the corner and the temperature of its characterization. A deviation
 * shifts the gate voltage by the threshold's and multiplies the current by the gain's; the model's gain
 * changes less where its carriers saturate.
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
  readonly #gateShift: number;
  readonly #gain: number;
  readonly #table: TableChannel;
  readonly #hasCharges: boolean;
  /** The card's transistor of the same size, and without its bulk junctions. */
  readonly #card: Transistor;
  readonly #channel: Transistor;
  readonly #hasJunctions: boolean;
  readonly #flicker: number;
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
    const { size, characterizedWidth, deviation = NO_DEVIATION } = options;
    const parameters = deviatedTransistor(options.parameters, deviation);
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
    this.#gateShift = deviation.threshold;
    this.#gain = 1 + deviation.gain;
    this.#card = new Transistor(parameters, size);
    this.#channel = new Transistor(parameters, { ...size, bulkJunctions: false });
    this.#hasJunctions = bulkJunctions;
    this.#flicker = Math.sqrt(
      parameters.flickerCoefficient / (parameters.oxideCapacitance * width * length * multiplier),
    );
    const table = parameters.kind === "n" ? data : characterizedAsN(data);
    const { bulkVoltages, charges } = table;
    this.#hasCharges = charges !== undefined;
    const body = bulkVoltages.length > 1 ? null : bodyShift(table, parameters.slopeFactor);
    const bulkZero = bulkVoltages[0]!;
    this.#table = new TableChannel(
      table,
      body && {
        shift: body.shift,
        addCharges: ({ gate, across, bulk }, into) =>
          this.#addCardCharges({ gate, across, bulk, bulkZero }, into),
      },
    );
    this.notes = [
      ...conductanceErrors(table, { spline: this.#table.spline, sign: this.#sign }),
      this.#table.symmetric
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
    const { at } = this.#table;
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
    const weight = this.#table.sourcePart(across);
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
    return this.#scale * this.#table.at[1]! * this.#flicker;
  }

  /** As {@linkcode Transistor.operatingPoint}; inversion and saturation voltage are the card's. */
  operatingPoint(vd: number, vg: number, vs: number, vb: number): TransistorOperatingPoint {
    const noise = this.channelNoise(vd, vg, vs, vb);
    const values = this.#values;
    this.evaluate(vd, vg, vs, vb, values);
    const { at } = this.#table;
    return {
      ...this.#card.operatingPoint(vd, vg, vs, vb),
      current: this.#sign * this.#scale * at[0]!,
      gm: this.#scale * at[1]!,
      gms: this.#scale * (at[1]! + at[2]! + at[3]!),
      gds: this.#scale * at[2]!,
      noiseConductance: noise * noise / (4 * BOLTZMANN * this.parameters.temperature),
      ...terminalCapacitances(values),
    };
  }

  /** Whether the table covers a bias. */
  withinRange(vd: number, vg: number, vs: number, vb: number): boolean {
    return this.excursion(vd, vg, vs, vb) === undefined;
  }

  /** How far a bias lies outside the table, on the axis where it does so most; undefined inside. */
  excursion(vd: number, vg: number, vs: number, vb: number): TableExcursion | undefined {
    const sign = this.#sign;
    const found = this.#table.excursion(
      sign * (vg - vs) - this.#gateShift,
      sign * (vd - vs),
      sign * (vb - vs),
    );
    if (found === undefined || sign > 0) return found;
    const { axis, value, lowest, highest } = found;
    // From zero, so that no negative zero is shown.
    return { axis, value: 0 - value, lowest: 0 - highest, highest: 0 - lowest };
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
    return this.#scale * this.#table.at[2]! * 4 * BOLTZMANN * this.parameters.temperature /
      (noise * noise);
  }

  /** Adds a quantity's derivatives to the row of a matrix over d, g, s, b. */
  #addRow(row: number, quantity: number, scale: number, out: Float64Array): void {
    const q = quantity * ENTRIES;
    const byGate = scale * this.#table.at[q + 1]!;
    const byDrain = scale * this.#table.at[q + 2]!;
    const byBulk = scale * this.#table.at[q + 3]!;
    out[row] = out[row]! + byDrain;
    out[row + 1] = out[row + 1]! + byGate;
    out[row + 2] = out[row + 2]! - (byDrain + byGate + byBulk);
    out[row + 3] = out[row + 3]! + byBulk;
  }

  /** The table at a bias, left in `#table.at`. */
  #solve(vd: number, vg: number, vs: number, vb: number): void {
    const sign = this.#sign;
    this.#table.solve(
      sign * (vg - vs) - this.#gateShift,
      sign * (vd - vs),
      sign * (vb - vs),
    );
    const { at } = this.#table;
    for (let e = 0; e < ENTRIES; e++) at[e] = at[e]! * this.#gain;
  }

  /** Adds how far the card's charges, of the characterized width, change from one body voltage to another. */
  #addCardCharges(
    { gate, across, bulk, bulkZero }: {
      readonly gate: number;
      readonly across: number;
      readonly bulk: number;
      readonly bulkZero: number;
    },
    into: Float64Array,
  ): void {
    const sign = this.#sign;
    const here = this.#here;
    const there = this.#there;
    this.#card.evaluate(sign * across, sign * gate, 0, sign * bulk, here);
    this.#card.evaluate(sign * across, sign * gate, 0, sign * bulkZero, there);
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
