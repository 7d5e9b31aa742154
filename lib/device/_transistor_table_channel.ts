import { SplineAxis } from "../numeric/spline_axis.ts";
import { TensorSpline } from "../numeric/spline_tensor.ts";
import type { TransistorTableData } from "./transistor_table_data.ts";

/** Per quantity: its value and its change with vgs, vds and vbs. */
export const ENTRIES = 4;
/** Drain current, charges of drain, gate and source. */
const QUANTITIES = 4;
/** A voltage may miss zero or the range by this much: rounding [V]. */
const EDGE = 1e-9;
/** Steps of the grid by which a symmetric table is continued to negative drain-source voltages. */
const MIRRORED = 2;

/** How a table of one body voltage depends on it. */
export interface TableBody {
  /** Shift of the gate voltage with the body voltage [1]. */
  readonly shift: number;
  /** Adds the change of the charges with the body voltage to quantities read at the table's own. */
  readonly addCharges: (
    voltages: { readonly gate: number; readonly across: number; readonly bulk: number },
    into: Float64Array,
  ) => void;
}

/** Where a bias leaves a table. */
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
 * A table of an n transistor, or of a p one with its signs turned, interpolated: drain current and charges of
 * the characterized device over vgs, vds and vbs, with drain and source in either role.
 */
export class TableChannel {
  /** Whether negative drain-source voltages come from swapping drain and source. */
  readonly symmetric: boolean;
  /** The spline through the table's own points. */
  readonly spline: TensorSpline;
  /**
   * What `solve` leaves: drain current and charges of drain, gate and source, each followed by its change
   * with vgs, vds and vbs.
   */
  readonly at = new Float64Array(QUANTITIES * ENTRIES);
  /** Half the width of the blend around zero drain-source voltage [V]. */
  readonly #blend: number;
  readonly #body: TableBody | null;
  readonly #bulkZero: number;
  readonly #hasCharges: boolean;
  /** The spline through the table's points and, in a symmetric one, some mirrored ones. */
  readonly #continued: TensorSpline;
  readonly #direct = new Float64Array(QUANTITIES * ENTRIES);
  readonly #swapped = new Float64Array(QUANTITIES * ENTRIES);

  /**
   * @param table checked, in n-type signs
   * @param body for a table of one body voltage, else null
   */
  constructor(table: TransistorTableData, body: TableBody | null) {
    const { gateVoltages, drainVoltages, bulkVoltages, current, charges } = table;
    // The check of the table has found a zero and at least four voltages.
    const zero = drainVoltages.findIndex((v) => Math.abs(v) <= EDGE);
    this.symmetric = zero === 0;
    this.#blend = zero + 1 < drainVoltages.length
      ? drainVoltages[zero + 1]! - drainVoltages[zero]!
      : drainVoltages[zero]! - drainVoltages[zero - 1]!;
    this.#body = body;
    this.#bulkZero = bulkVoltages[0]!;
    this.#hasCharges = charges !== undefined;
    const quantities = charges ? [current, charges.drain, charges.gate, charges.source] : [current];
    const values = new Float64Array(current.length * quantities.length);
    for (let k = 0; k < values.length; k++) {
      values[k] = quantities[k % quantities.length]![Math.floor(k / quantities.length)]!;
    }
    this.spline = new TensorSpline(
      [new SplineAxis(gateVoltages), new SplineAxis(drainVoltages), new SplineAxis(bulkVoltages)],
      values,
    );
    this.#continued = this.spline;
    if (this.symmetric) this.#continued = this.#mirrored(values);
  }

  /** Quantities at a bias, left in `at`. */
  solve(gate: number, across: number, bulk: number): void {
    const at = this.at;
    const u = this.symmetric ? across / this.#blend : 1;
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

  /** Part of the source's end at a drain-source voltage, the rest being the drain's: 1/2 at zero. */
  sourcePart(across: number): number {
    return smoothStep(across / this.#blend);
  }

  /** How far a bias lies outside the table, on the axis where it does so most; undefined inside. */
  excursion(gate: number, across: number, bulk: number): TableExcursion | undefined {
    const swap = this.symmetric && across < 0;
    const ownGate = swap ? gate - across : gate;
    const ownBulk = swap ? bulk - across : bulk;
    const body = this.#body;
    const voltages = [
      ownGate + (body === null ? 0 : body.shift * (ownBulk - this.#bulkZero)),
      swap ? -across : across,
      // Without a body voltage any is allowed: it comes from the card.
      body === null ? ownBulk : this.#bulkZero,
    ];
    let worst: TableExcursion | undefined;
    let most = EDGE;
    (["vgs", "vds", "vbs"] as const).forEach((axis, k) => {
      const { points } = this.spline.axes[k]!;
      // Three voltages, and an axis has a point.
      const [value, lowest, highest] = [voltages[k]!, points[0]!, points[points.length - 1]!];
      const beyond = Math.max(lowest - value, value - highest);
      if (!(beyond > most)) return;
      most = beyond;
      worst = { axis, value, lowest, highest };
    });
    return worst;
  }

  /** The table as it stands at vgs, vds and vbs. */
  #read(gate: number, across: number, bulk: number, into: Float64Array): void {
    const body = this.#body;
    const spline = this.#continued;
    if (body === null) {
      spline.evaluate(gate, across, bulk, into);
      return;
    }
    spline.evaluate(gate + body.shift * (bulk - this.#bulkZero), across, this.#bulkZero, into);
    into[3] = body.shift * into[1]!;
    if (!this.#hasCharges) return;
    // Charges take no shift: they are read again at the table's body voltage, the current kept.
    const current = into[0]!;
    const byGate = into[1]!;
    const byDrain = into[2]!;
    const byBulk = into[3]!;
    spline.evaluate(gate, across, this.#bulkZero, into);
    into[0] = current;
    into[1] = byGate;
    into[2] = byDrain;
    into[3] = byBulk;
    body.addCharges({ gate, across, bulk }, into);
  }

  /**
   * The spline of a symmetric table, continued to negative drain-source voltages by the swapped device, so
   * that zero, where the channel's conductance is read, is no edge.
   */
  #mirrored(values: Float64Array): TensorSpline {
    const { axes, quantities } = this.spline;
    const [gates, drains, bulks] = axes.map(({ points }) => points) as [
      Float64Array,
      Float64Array,
      Float64Array,
    ];
    const added = Array.from(drains.subarray(1, 1 + MIRRORED), (v) => -v).reverse();
    const perGate = drains.length * bulks.length * quantities;
    const swapped = this.#swapped;
    const extended: number[] = [];
    gates.forEach((gate, i) => {
      for (const across of added) {
        for (const bulk of bulks) {
          this.#read(gate - across, -across, bulk - across, swapped);
          swapRoles(swapped);
          for (let q = 0; q < quantities; q++) extended.push(swapped[q * ENTRIES]!);
        }
      }
      for (let k = i * perGate; k < (i + 1) * perGate; k++) extended.push(values[k]!);
    });
    return new TensorSpline(
      [axes[0], new SplineAxis([...added, ...drains]), axes[2]],
      Float64Array.from(extended),
    );
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
