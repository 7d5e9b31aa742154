/**
 * A system seen through its charges.
 *
 * The rows whose charges are independent (the range of C) carry the state from step to step; every
 * other row, after subtracting the combination of charge rows that cancels its charge, is an
 * algebraic equation. All quantities are scaled to about one.
 *
 * Indices stay inside the arrays by construction; `!` says so to the compiler.
 *
 * @see E. Hairer, C. Lubich, M. Roche, The Numerical Solution of Differential-Algebraic Systems by
 * Runge-Kutta Methods (1989), for index-1 systems
 * @module
 */
import { factor, solve } from "../numeric/lu.ts";
import type { OscillatorSystem, SystemValues } from "./system.ts";

/** A row whose remainder is below this part of its size is a combination of the other rows. */
const RANK_TOLERANCE = 1e-9;
/** A combination this close to a whole number is that number: incidence matrices are integer. */
const INTEGER_TOLERANCE = 1e-7;
/** Offsets, in units of the scale, at which the rank of C is looked at besides the given state. */
const RANK_PROBES = [0, 0.13, -0.17];
const STATE_ITERATIONS = 30;
const STATE_TOLERANCE = 1e-13;
/** Corrections below this that no longer shrink are rounding, which a stiff row amplifies. */
const STATE_ROUNDING = 1e-9;
/** Longest change of a state, in units of the scale, in one iteration. */
const STATE_STEP = 2;

/**
 * A system in the coordinates of its independent charges, everything scaled to about one.
 *
 * @internal
 */
export class ChargeCoordinates {
  readonly system: OscillatorSystem;
  /** Number of unknowns. */
  readonly n: number;
  /** Number of independent charges: the states carried from step to step. */
  readonly r: number;
  /** Row order: the r rows with independent charge, then the algebraic rows. */
  readonly rows: Int32Array;
  /** Combination of charge rows inside each algebraic row, shape (n - r, r). */
  readonly mix: Float64Array;
  /** Typical size of each unknown. */
  readonly unknownScale: Float64Array;
  /** What each reordered row is multiplied by. */
  readonly rowScale: Float64Array;
  evaluations = 0;
  readonly #mixed: boolean;
  readonly #x: Float64Array;
  readonly #raw: SystemValues;
  readonly #q: Float64Array;
  readonly #f: Float64Array;
  readonly #C: Float64Array;
  readonly #G: Float64Array;
  readonly #matrix: Float64Array;
  readonly #pivots: Int32Array;
  readonly #change: Float64Array;

  /**
   * @param system any oscillator system
   * @param at a state near which it will be used, shape (n,), or the coordinates of a neighbouring
   * system with the same rows, whose row order and scales are taken over
   * @throws RangeError where fewer than two charges are independent
   */
  constructor(system: OscillatorSystem, at: Float64Array | ChargeCoordinates) {
    const n = system.dimension;
    this.system = system;
    this.n = n;
    this.unknownScale = at instanceof ChargeCoordinates
      ? at.unknownScale
      : system.scale ?? new Float64Array(n).fill(1);
    this.#x = new Float64Array(n);
    this.#raw = {
      q: new Float64Array(n),
      f: new Float64Array(n),
      C: new Float64Array(n * n),
      G: new Float64Array(n * n),
    };
    const { rows, r, mix } = at instanceof ChargeCoordinates ? at : this.#chargeRows(at);
    this.rows = rows;
    this.r = r;
    this.mix = mix;
    this.#mixed = mix.some((value) => value !== 0);
    this.rowScale = new Float64Array(n).fill(1);
    this.#q = new Float64Array(r);
    this.#f = new Float64Array(n);
    this.#C = new Float64Array(r * n);
    this.#G = new Float64Array(n * n);
    this.#matrix = new Float64Array(n * n);
    this.#pivots = new Int32Array(n);
    this.#change = new Float64Array(n);
    if (at instanceof ChargeCoordinates) this.rowScale.set(at.rowScale);
    else this.#setRowScales(at);
  }

  /** Name of unknown `j`, for messages. */
  unknownName(j: number): string {
    return this.system.unknowns?.[j] ?? `x${j}`;
  }

  #chargeRows(at: Float64Array) {
    const n = this.n;
    const width = n * RANK_PROBES.length;
    const table = new Float64Array(n * width);
    RANK_PROBES.forEach((offset, probe) => {
      for (let j = 0; j < n; j++) this.#x[j] = at[j]! + offset * this.unknownScale[j]!;
      this.system.evaluate(this.#x, this.#raw);
      for (let i = 0; i < n; i++) {
        for (let j = 0; j < n; j++) {
          table[i * width + probe * n + j] = this.#raw.C[i * n + j]! * this.unknownScale[j]!;
        }
      }
    });
    const size = Float64Array.from({ length: n }, (_, i) => {
      return Math.hypot(...table.subarray(i * width, (i + 1) * width));
    });
    // Gram-Schmidt on the rows, largest remainder first, keeping each row as a combination of the
    // rows chosen before it.
    const chosen: number[] = [];
    const rest = new Set(Array.from({ length: n }, (_, i) => i));
    const combination = new Float64Array(n * n);
    const residual = Float64Array.from(table);
    const basis: Float64Array[] = [];
    const inChosen: Float64Array[] = [];
    for (;;) {
      let best = -1;
      let largest = RANK_TOLERANCE;
      for (const i of rest) {
        const part = size[i]! > 0
          ? Math.hypot(...residual.subarray(i * width, (i + 1) * width)) / size[i]!
          : 0;
        if (part > largest) {
          largest = part;
          best = i;
        }
      }
      if (best < 0) break;
      rest.delete(best);
      const vector = residual.slice(best * width, (best + 1) * width);
      const norm = Math.hypot(...vector);
      for (let k = 0; k < width; k++) vector[k]! /= norm;
      // The unit vector itself as a combination of chosen rows.
      const own = new Float64Array(n);
      own[best] = 1 / norm;
      for (let k = 0; k < n; k++) own[k]! -= combination[best * n + k]! / norm;
      chosen.push(best);
      basis.push(vector);
      inChosen.push(own);
      for (const i of rest) {
        let projection = 0;
        for (let k = 0; k < width; k++) projection += residual[i * width + k]! * vector[k]!;
        for (let k = 0; k < width; k++) residual[i * width + k]! -= projection * vector[k]!;
        for (let k = 0; k < n; k++) combination[i * n + k]! += projection * own[k]!;
      }
    }
    chosen.sort((a, b) => a - b);
    const others = [...rest].sort((a, b) => a - b);
    const mix = new Float64Array(others.length * chosen.length);
    others.forEach((row, k) => {
      chosen.forEach((pivot, i) => {
        const value = size[row]! > 0 ? combination[row * n + pivot]! : 0;
        const whole = Math.round(value);
        mix[k * chosen.length + i] = Math.abs(value - whole) < INTEGER_TOLERANCE ? whole : value;
      });
    });
    if (chosen.length < 2) {
      throw new RangeError(
        `Cannot describe an oscillator: at least 2 independent charges are needed, found ${chosen.length}`,
      );
    }
    return { rows: Int32Array.from([...chosen, ...others]), r: chosen.length, mix };
  }

  #setRowScales(at: Float64Array): void {
    const { n, r } = this;
    for (let j = 0; j < n; j++) this.#x[j] = at[j]! / this.unknownScale[j]!;
    this.evaluate(this.#x, 0, this.#q, 0, this.#f, 0, this.#C, 0, this.#G, 0);
    for (let i = 0; i < n; i++) {
      const source = i < r ? this.#C : this.#G;
      let largest = 0;
      for (let j = 0; j < n; j++) largest = Math.max(largest, Math.abs(source[i * n + j]!));
      this.rowScale[i] = largest > 0 ? 1 / largest : 1;
    }
  }

  /**
   * Scaled charges, currents and Jacobians at a scaled state; every output slice is written whole.
   *
   * @param x scaled state at `x[xAt...]`, shape (n,)
   * @param q charges of the r charge rows
   * @param f currents of all rows, charge rows first
   * @param C dq/dx, shape (r, n)
   * @param G df/dx, shape (n, n)
   */
  evaluate(
    x: Float64Array,
    xAt: number,
    q: Float64Array,
    qAt: number,
    f: Float64Array,
    fAt: number,
    C: Float64Array,
    CAt: number,
    G: Float64Array,
    GAt: number,
  ): void {
    const { n, r, rows, rowScale, unknownScale, mix } = this;
    const raw = this.#raw;
    const state = this.#x;
    for (let j = 0; j < n; j++) state[j] = x[xAt + j]! * unknownScale[j]!;
    this.system.evaluate(state, raw);
    this.evaluations++;
    for (let i = 0; i < n; i++) {
      const row = rows[i]! * n;
      const factor = rowScale[i]!;
      f[fAt + i] = raw.f[rows[i]!]! * factor;
      const out = GAt + i * n;
      for (let j = 0; j < n; j++) G[out + j] = raw.G[row + j]! * factor * unknownScale[j]!;
    }
    for (let i = 0; i < r; i++) {
      const row = rows[i]! * n;
      const factor = rowScale[i]!;
      q[qAt + i] = raw.q[rows[i]!]! * factor;
      const out = CAt + i * n;
      for (let j = 0; j < n; j++) C[out + j] = raw.C[row + j]! * factor * unknownScale[j]!;
    }
    if (!this.#mixed) return;
    for (let k = 0; k < n - r; k++) {
      for (let i = 0; i < r; i++) {
        const weight = mix[k * r + i]! * rowScale[r + k]! / rowScale[i]!;
        if (weight === 0) continue;
        f[fAt + r + k]! -= weight * f[fAt + i]!;
        for (let j = 0; j < n; j++) G[GAt + (r + k) * n + j]! -= weight * G[GAt + i * n + j]!;
      }
    }
  }

  /** Whether every entry of the scaled state at `x[at...]` is finite. */
  isFinite(x: Float64Array, at = 0): boolean {
    for (let j = 0; j < this.n; j++) if (!Number.isFinite(x[at + j]!)) return false;
    return true;
  }

  /**
   * Solves q(x) = charge, algebraic rows = 0 for the scaled state.
   *
   * @param charge scaled charges at `charge[chargeAt...]`, shape (r,)
   * @param x start at `x[xAt...]`, overwritten by the solution, shape (n,)
   * @returns whether it converged
   */
  stateOf(charge: Float64Array, chargeAt: number, x: Float64Array, xAt: number): boolean {
    const { n, r } = this;
    let previous = Infinity;
    for (let iteration = 0; iteration < STATE_ITERATIONS; iteration++) {
      if (!this.#linearise(x, xAt)) return false;
      for (let i = 0; i < n; i++) {
        this.#change[i] = i < r ? charge[chargeAt + i]! - this.#q[i]! : -this.#f[i]!;
      }
      solve(this.#matrix, this.#pivots, this.#change, { n });
      let size = 0;
      for (let j = 0; j < n; j++) size = Math.max(size, Math.abs(this.#change[j]!));
      if (!(size < Infinity)) return false;
      const damping = size > STATE_STEP ? STATE_STEP / size : 1;
      for (let j = 0; j < n; j++) x[xAt + j]! += damping * this.#change[j]!;
      if (size < STATE_TOLERANCE || (size < STATE_ROUNDING && size > previous / 2)) return true;
      previous = size;
    }
    return false;
  }

  /** Factors [C; algebraic rows of G] at a state; leaves values and factors in the work arrays. */
  #linearise(x: Float64Array, xAt: number): boolean {
    const { n, r } = this;
    this.evaluate(x, xAt, this.#q, 0, this.#f, 0, this.#C, 0, this.#G, 0);
    this.#matrix.set(this.#C);
    this.#matrix.set(this.#G.subarray(r * n), r * n);
    return factor(this.#matrix, this.#pivots, { n });
  }

  /**
   * The reduced flow y' = F(y) linearised at a scaled state: its Jacobian dF/dy, shape (r, r), and
   * the state's response dx/dy, shape (n, r).
   *
   * @throws RangeError where the system is not of index 1, naming the unknown that nothing determines
   */
  reducedFlow(
    x: Float64Array,
    xAt = 0,
  ): { flow: Float64Array; jacobian: Float64Array; response: Float64Array } {
    const { n, r } = this;
    if (!this.#linearise(x, xAt)) {
      throw new RangeError(
        `Cannot describe an oscillator: neither charge nor current determines ${this.#undetermined()}`,
      );
    }
    const response = new Float64Array(n * r);
    for (let i = 0; i < r; i++) response[i * r + i] = 1;
    solve(this.#matrix, this.#pivots, response, { n, columns: r });
    const jacobian = new Float64Array(r * r);
    const flow = new Float64Array(r);
    for (let i = 0; i < r; i++) {
      flow[i] = -this.#f[i]!;
      for (let k = 0; k < n; k++) {
        const slope = this.#G[i * n + k]!;
        for (let j = 0; j < r; j++) jacobian[i * r + j]! -= slope * response[k * r + j]!;
      }
    }
    return { flow, jacobian, response };
  }

  #undetermined(): string {
    const { n } = this;
    for (let j = 0; j < n; j++) {
      if (!(Math.abs(this.#matrix[j * n + j]!) > 0)) return this.unknownName(j);
    }
    return "an unknown";
  }
}
