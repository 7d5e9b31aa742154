/**
 * The discrete period map: all stages of all steps of one period, Newton on the closed path, and the
 * adjoint of the same map. This is the engine's hot path: everything is preallocated and nothing is
 * allocated inside a pass.
 *
 * One pass condenses each step's stage unknowns to a map of the charges at its start and the period;
 * the product of these maps with the closing and the phase condition is a small bordered system.
 *
 * Indices stay inside the arrays by construction; `!` says so to the compiler.
 *
 * @see U. Ascher, R. Mattheij, R. Russell, Numerical Solution of Boundary Value Problems for Ordinary
 * Differential Equations (1995), ch. 5 and 7, for collocation and condensation
 * @module
 */
import { factor, solve, solveTransposed } from "../numeric/lu.ts";
import type { GaussMethod } from "../numeric/gauss.ts";
import type { ChargeCoordinates } from "./charge_coordinates.ts";
import {
  assembleMatrix,
  evaluateStages,
  stageResidual,
  type StageValues,
  stageValues,
} from "./gauss_step.ts";

/**
 * A discrete closed path: what Newton works on and what a found orbit keeps.
 *
 * @internal
 */
export interface Path {
  /** Mesh as fractions of the period, shape (steps + 1,), from 0 to 1. */
  readonly mesh: Float64Array;
  /** Scaled stage states, shape (steps, s, n). */
  readonly stages: Float64Array;
  /** Scaled charges at the mesh points, shape (steps + 1, r). */
  readonly charges: Float64Array;
  /** Period [s]. */
  readonly period: number;
}

/**
 * The adjoint of the period map on its unit multiplier, per scaled charge.
 *
 * @internal
 */
export interface Adjoint {
  /** Seconds per scaled charge at the mesh points, shape (steps + 1, r). */
  readonly nodes: Float64Array;
  /** Seconds per scaled row at the stages, shape (steps, s, n), charge rows first. */
  readonly stages: Float64Array;
  /** Multipliers of the stage equations' charge rows, shape (steps, s, r), for inputs that hold charge. */
  readonly stageWeights: Float64Array;
  /** Change of the sensitivity over one full period, relative: zero but for rounding. */
  readonly closure: number;
}

/**
 * The size of one Newton update.
 *
 * @internal
 */
export interface Update {
  /** Largest change of a scaled state. */
  readonly state: number;
  /** Change of the period, relative. */
  readonly period: number;
}

/**
 * The period map of one system on one mesh, with its work arrays.
 *
 * @internal
 */
export class PeriodMap {
  coordinates: ChargeCoordinates;
  readonly method: GaussMethod;
  readonly steps: number;
  readonly mesh: Float64Array;
  readonly stages: Float64Array;
  readonly charges: Float64Array;
  period = 0;
  factorizations = 0;
  /** Product of the step maps of the last full pass: the monodromy matrix, scaled, shape (r, r). */
  readonly monodromy: Float64Array;
  /** Step maps of the last full pass, shape (steps, r, r). */
  readonly stepMaps: Float64Array;
  readonly #values: StageValues;
  readonly #J: Float64Array;
  readonly #pivots: Int32Array;
  /** Per step: columns [d stages / d charges | d stages / d period | remaining], shape (s n, r + 2). */
  readonly #columns: Float64Array;
  /** Per step: d (charges at the end) / d stages, shape (r, s n). */
  readonly #output: Float64Array;
  readonly #periodSlope: Float64Array;
  readonly #gap: Float64Array;
  readonly #normal: Float64Array;
  readonly #endSlope: Float64Array;
  readonly #endGap: Float64Array;
  readonly #scratch: Float64Array;
  readonly #rowScratch: Float64Array;
  readonly #bordered: Float64Array;
  readonly #borderedPivots: Int32Array;
  readonly #border: Float64Array;
  readonly #stageWork: Float64Array;
  /** Period at the last full pass: the unit of the bordered system's last unknown. */
  #periodUnit = 0;

  constructor(coordinates: ChargeCoordinates, method: GaussMethod, steps: number) {
    const { n, r } = coordinates;
    const s = method.stages;
    const size = s * n;
    this.coordinates = coordinates;
    this.method = method;
    this.steps = steps;
    this.mesh = new Float64Array(steps + 1);
    this.stages = new Float64Array(steps * size);
    this.charges = new Float64Array((steps + 1) * r);
    this.monodromy = new Float64Array(r * r);
    this.stepMaps = new Float64Array(steps * r * r);
    this.#values = stageValues(steps * s, coordinates);
    this.#J = new Float64Array(steps * size * size);
    this.#pivots = new Int32Array(steps * size);
    this.#columns = new Float64Array(steps * size * (r + 2));
    this.#output = new Float64Array(steps * r * size);
    this.#periodSlope = new Float64Array(steps * r);
    this.#gap = new Float64Array(steps * r);
    this.#normal = new Float64Array(r);
    this.#endSlope = new Float64Array(r);
    this.#endGap = new Float64Array(r);
    this.#scratch = new Float64Array(r * r);
    this.#rowScratch = new Float64Array(2 * r);
    this.#bordered = new Float64Array((r + 1) * (r + 1));
    this.#borderedPivots = new Int32Array(r + 1);
    this.#border = new Float64Array(r + 1);
    this.#stageWork = new Float64Array(size);
  }

  /** Takes a path of the same number of steps; the end is made to coincide with the start. */
  load({ mesh, stages, charges, period }: Path, coordinates: ChargeCoordinates): void {
    const { r } = coordinates;
    this.coordinates = coordinates;
    this.mesh.set(mesh);
    this.stages.set(stages);
    this.charges.set(charges);
    for (let i = 0; i < r; i++) this.charges[this.steps * r + i] = charges[i]!;
    this.period = period;
  }

  copy(): Path {
    return {
      mesh: this.mesh.slice(),
      stages: this.stages.slice(),
      charges: this.charges.slice(),
      period: this.period,
    };
  }

  /** Scaled currents at the stages of the present path, shape (steps, s, n). */
  get stageCurrents(): Float64Array {
    return this.#values.f;
  }

  #stepLength(step: number): number {
    return this.period * (this.mesh[step + 1]! - this.mesh[step]!);
  }

  /**
   * Evaluates and factors every step at the present path, and the small bordered system.
   *
   * @returns the largest residual of the scaled equations; NaN where a step cannot be factored
   */
  linearise(): number {
    const { coordinates, method, steps } = this;
    const { n, r } = coordinates;
    const s = method.stages;
    const size = s * n;
    const width = r + 2;
    const values = this.#values;
    let residual = 0;
    for (let step = 0; step < steps; step++) {
      const first = step * s;
      const h = this.#stepLength(step);
      evaluateStages(coordinates, this.stages, values, { first, count: s });
      const JAt = step * size * size;
      assembleMatrix(coordinates, method, values, { h, first, J: this.#J, JAt });
      this.factorizations++;
      if (!factor(this.#J, this.#pivots, { n: size, at: JAt, pivotsAt: step * size })) return NaN;
      const columnsAt = step * size * width;
      const columns = this.#columns;
      for (let i = 0; i < s; i++) {
        for (let row = 0; row < n; row++) {
          const at = columnsAt + (row * s + i) * width;
          for (let c = 0; c < r; c++) columns[at + c] = c === row ? 1 : 0;
          let slope = 0;
          if (row < r) {
            for (let j = 0; j < s; j++) {
              slope -= method.matrix[i * s + j]! * values.f[(first + j) * n + row]!;
            }
          }
          columns[at + r] = slope * h / this.period;
        }
      }
      const largest = stageResidual(coordinates, method, values, {
        h,
        first,
        y: this.charges,
        yAt: step * r,
        out: columns,
        outAt: columnsAt + r + 1,
        stride: width,
      });
      residual = Math.max(residual, largest);
      solve(this.#J, this.#pivots, columns, {
        n: size,
        columns: width,
        at: JAt,
        pivotsAt: step * size,
        bAt: columnsAt,
      });
      const gap = this.#writeStepMap(step, h);
      residual = Math.max(residual, gap);
    }
    if (!Number.isFinite(residual)) return NaN;
    this.#multiply();
    for (let row = 0; row < r; row++) this.#normal[row] = -values.f[row]! * this.period;
    return this.#factorBorder() ? residual : NaN;
  }

  /** Evaluates the residual at the present path and reuses the factors of the last full pass. */
  reevaluate(): number {
    const { coordinates, method, steps } = this;
    const { n, r } = coordinates;
    const s = method.stages;
    const size = s * n;
    const width = r + 2;
    const values = this.#values;
    const work = this.#stageWork;
    let residual = 0;
    for (let step = 0; step < steps; step++) {
      const first = step * s;
      const h = this.#stepLength(step);
      evaluateStages(coordinates, this.stages, values, { first, count: s });
      const largest = stageResidual(coordinates, method, values, {
        h,
        first,
        y: this.charges,
        yAt: step * r,
        out: work,
        outAt: 0,
        stride: 1,
      });
      residual = Math.max(residual, largest);
      solve(this.#J, this.#pivots, work, {
        n: size,
        at: step * size * size,
        pivotsAt: step * size,
      });
      const columnsAt = step * size * width + r + 1;
      for (let k = 0; k < size; k++) this.#columns[columnsAt + k * width] = work[k]!;
      const gap = this.#writeGap(step, h);
      residual = Math.max(residual, gap);
    }
    if (!Number.isFinite(residual)) return NaN;
    this.#multiplyGap();
    return residual;
  }

  /** d (charges at the end) by the stages, the step map, the slope with the period and the gap. */
  #writeStepMap(step: number, h: number): number {
    const { n, r } = this.coordinates;
    const { weights, stages: s } = this.method;
    const { f, G } = this.#values;
    const output = this.#output;
    const columns = this.#columns;
    const stepMaps = this.stepMaps;
    const size = s * n;
    const width = r + 2;
    const columnsAt = step * size * width;
    for (let row = 0; row < r; row++) {
      const outputAt = (step * r + row) * size;
      const mapAt = (step * r + row) * r;
      for (let c = 0; c < r; c++) stepMaps[mapAt + c] = c === row ? 1 : 0;
      let slope = 0;
      for (let j = 0; j < s; j++) {
        const weight = -h * weights[j]!;
        const stage = step * s + j;
        slope += weight * f[stage * n + row]! / this.period;
        const GAt = (stage * n + row) * n;
        for (let k = 0; k < n; k++) {
          const own = weight * G[GAt + k]!;
          output[outputAt + k * s + j] = own;
          if (own === 0) continue;
          const from = columnsAt + (k * s + j) * width;
          for (let c = 0; c < r; c++) stepMaps[mapAt + c]! += own * columns[from + c]!;
          slope += own * columns[from + r]!;
        }
      }
      this.#periodSlope[step * r + row] = slope;
    }
    return this.#writeGap(step, h);
  }

  #writeGap(step: number, h: number): number {
    const { n, r } = this.coordinates;
    const { weights, stages: s } = this.method;
    const { f } = this.#values;
    const output = this.#output;
    const columns = this.#columns;
    const charges = this.charges;
    const size = s * n;
    const width = r + 2;
    const columnsAt = step * size * width + r + 1;
    let largest = 0;
    for (let row = 0; row < r; row++) {
      let gap = charges[step * r + row]! - charges[(step + 1) * r + row]!;
      for (let j = 0; j < s; j++) gap -= h * weights[j]! * f[(step * s + j) * n + row]!;
      largest = Math.max(largest, Math.abs(gap));
      const outputAt = (step * r + row) * size;
      for (let k = 0; k < size; k++) gap += output[outputAt + k]! * columns[columnsAt + k * width]!;
      this.#gap[step * r + row] = gap;
    }
    return largest;
  }

  /** Product of the step maps, with the end's slope by the period and its gap. */
  #multiply(): void {
    const { r } = this.coordinates;
    const product = this.monodromy;
    const next = this.#scratch;
    product.fill(0);
    for (let i = 0; i < r; i++) product[i * r + i] = 1;
    for (let step = 0; step < this.steps; step++) {
      const mapAt = step * r * r;
      for (let i = 0; i < r; i++) {
        for (let c = 0; c < r; c++) {
          let value = 0;
          for (let k = 0; k < r; k++) {
            value += this.stepMaps[mapAt + i * r + k]! * product[k * r + c]!;
          }
          next[i * r + c] = value;
        }
      }
      product.set(next);
    }
    this.#carry(this.#endSlope, this.#periodSlope);
    this.#multiplyGap();
  }

  #multiplyGap(): void {
    this.#carry(this.#endGap, this.#gap);
  }

  /** Sum over the steps of `added`, each carried to the end of the period. */
  #carry(end: Float64Array, added: Float64Array): void {
    const { r } = this.coordinates;
    end.fill(0);
    for (let step = 0; step < this.steps; step++) {
      for (let i = 0; i < r; i++) {
        let value = added[step * r + i]!;
        const mapAt = (step * r + i) * r;
        for (let k = 0; k < r; k++) value += this.stepMaps[mapAt + k]! * end[k]!;
        this.#rowScratch[i] = value;
      }
      for (let i = 0; i < r; i++) end[i] = this.#rowScratch[i]!;
    }
  }

  /** [[M - 1, slope], [normal, 0]]: closing condition and phase condition. */
  #factorBorder(): boolean {
    const { r } = this.coordinates;
    const matrix = this.#bordered;
    const size = r + 1;
    this.#periodUnit = this.period;
    let normalSize = 0;
    for (let i = 0; i < r; i++) normalSize = Math.max(normalSize, Math.abs(this.#normal[i]!));
    if (!(normalSize > 0)) return false;
    for (let i = 0; i < r; i++) {
      for (let c = 0; c < r; c++) {
        matrix[i * size + c] = this.monodromy[i * r + c]! - (i === c ? 1 : 0);
      }
      matrix[i * size + r] = this.#endSlope[i]! * this.#periodUnit;
      matrix[r * size + i] = this.#normal[i]! / normalSize;
    }
    matrix[r * size + r] = 0;
    return factor(matrix, this.#borderedPivots, { n: size });
  }

  /**
   * Applies the Newton update of the last pass to the path.
   *
   * @param bound longest change of a scaled state and of the relative period; longer updates are cut
   * @returns the size of the full update
   */
  update(bound: number): Update {
    const { steps } = this;
    const { r } = this.coordinates;
    const border = this.#border;
    for (let i = 0; i < r; i++) {
      border[i] = this.charges[i]! - this.charges[steps * r + i]! - this.#endGap[i]!;
    }
    border[r] = 0;
    solve(this.#bordered, this.#borderedPivots, border, { n: r + 1 });
    const period = border[r]! * this.#periodUnit;
    const relative = Math.abs(period) / this.period;
    // First round: the size of the update. Second round: the update, cut where it is too long.
    const state = this.#sweepUpdate(period, 0);
    const longest = Math.max(state, relative);
    const cut = longest > bound ? bound / longest : 1;
    if (!(cut > 0)) return { state: Infinity, period: Infinity };
    this.#sweepUpdate(period, cut);
    this.period += cut * period;
    return { state, period: relative };
  }

  /**
   * Carries the update of the first charges and of the period through the steps and adds `cut` times it
   * to the path; the stage currents follow to first order.
   *
   * @returns largest change of a scaled stage state, before the cut
   */
  #sweepUpdate(period: number, cut: number): number {
    const { steps, stages, charges, stepMaps } = this;
    const { n, r } = this.coordinates;
    const s = this.method.stages;
    const { f, G } = this.#values;
    const columns = this.#columns;
    const change = this.#rowScratch;
    const work = this.#stageWork;
    const size = s * n;
    const width = r + 2;
    let largest = 0;
    for (let i = 0; i < r; i++) change[i] = this.#border[i]!;
    for (let step = 0; step < steps; step++) {
      for (let k = 0; k < size; k++) {
        const at = (step * size + k) * width;
        let value = columns[at + r + 1]! + columns[at + r]! * period;
        for (let c = 0; c < r; c++) value += columns[at + c]! * change[c]!;
        work[k] = value;
        largest = Math.max(largest, Math.abs(value));
      }
      if (cut > 0) {
        for (let j = 0; j < s; j++) {
          const stage = (step * s + j) * n;
          for (let k = 0; k < n; k++) stages[stage + k]! += cut * work[k * s + j]!;
          for (let row = 0; row < n; row++) {
            const GAt = (stage + row) * n;
            for (let k = 0; k < n; k++) f[stage + row]! += cut * G[GAt + k]! * work[k * s + j]!;
          }
        }
        for (let i = 0; i < r; i++) charges[step * r + i]! += cut * change[i]!;
      }
      for (let i = 0; i < r; i++) {
        const mapAt = (step * r + i) * r;
        let value = this.#gap[step * r + i]! + this.#periodSlope[step * r + i]! * period;
        for (let c = 0; c < r; c++) value += stepMaps[mapAt + c]! * change[c]!;
        change[r + i] = value;
      }
      for (let i = 0; i < r; i++) change[i] = change[r + i]!;
    }
    if (cut > 0) { for (let i = 0; i < r; i++) charges[steps * r + i]! += cut * change[i]!; }
    return largest;
  }

  /**
   * The adjoint of the discrete period map on its unit multiplier, from the factors of the last full
   * pass; swept backward, so that no period map is inverted.
   *
   * Injecting a unit of charge rate into a row over a stage's share of a step advances the phase by
   * exactly the stage's sensitivity, to first order.
   */
  adjoint(): Adjoint {
    const { steps } = this;
    const { n, r } = this.coordinates;
    const s = this.method.stages;
    const size = s * n;
    const nodes = new Float64Array((steps + 1) * r);
    const stages = new Float64Array(steps * size);
    const stageWeights = new Float64Array(steps * s * r);
    const w = this.#border;
    w.fill(0);
    // The period's column is scaled by the period: w . slope = 1 reads w . (slope T) = T.
    w[r] = this.#periodUnit;
    solveTransposed(this.#bordered, this.#borderedPivots, w, { n: r + 1 });
    for (let i = 0; i < r; i++) nodes[steps * r + i] = w[i]!;
    this.#sweepBack(nodes, stages, stageWeights);
    let closure = 0;
    let largest = 0;
    for (let i = 0; i < r; i++) {
      closure = Math.max(closure, Math.abs(nodes[i]! - nodes[steps * r + i]!));
      largest = Math.max(largest, Math.abs(nodes[i]!));
    }
    return { nodes, stages, stageWeights, closure: closure / largest };
  }

  /** One backward sweep of the adjoint from `nodes` at the end of the period. */
  #sweepBack(nodes: Float64Array, stages: Float64Array, stageWeights: Float64Array): void {
    const { steps } = this;
    const { r } = this.coordinates;
    const s = this.method.stages;
    const work = this.#stageWork;
    for (let step = steps - 1; step >= 0; step--) {
      const w = nodes.subarray((step + 1) * r, (step + 2) * r);
      work.fill(0);
      this.#solveBack(step, w, work);
      this.#readStages(step, { w, work, stages });
      for (let row = 0; row < r; row++) {
        let value = w[row]!;
        for (let i = 0; i < s; i++) {
          value += work[row * s + i]!;
          stageWeights[(step * s + i) * r + row] = work[row * s + i]!;
        }
        nodes[step * r + row] = value;
      }
    }
  }

  /**
   * The adjoint of the period map for a response that turns by `turn` per period, from the factors of
   * the last full pass: how a functional of the stage states answers to a rate injected at each
   * stage.
   *
   * @param functional real and imaginary weights of the scaled stage states, shape (steps, s, n) each
   * @param turn angle per period [rad]
   * @param flow scaled flow at the first mesh point, shape (r,), and `sensitivity` its adjoint with
   * sensitivity . flow = 1: along it the multiplier is put to exactly 1
   * @returns real and imaginary answers per scaled row, shape (steps, s, n) each, charge rows first
   */
  turningAdjoint(
    functional: { readonly re: Float64Array; readonly im: Float64Array },
    { turn, flow, sensitivity }: {
      turn: number;
      flow: Float64Array;
      sensitivity: Float64Array;
    },
  ): { re: Float64Array; im: Float64Array } {
    const { r } = this.coordinates;
    const { re, im } = functional;
    const zero = new Float64Array(r);
    const direct = { re: this.#answer(re, zero), im: this.#answer(im, zero) };
    // (exp(i turn) - M^T) end = direct, with M's multiplier along the flow corrected to 1.
    let unit = 0;
    for (let i = 0; i < r; i++) {
      for (let j = 0; j < r; j++) {
        unit += sensitivity[i]! * this.monodromy[i * r + j]! * flow[j]!;
      }
    }
    const size = 2 * r;
    const matrix = new Float64Array(size * size);
    const end = new Float64Array(size);
    for (let i = 0; i < r; i++) {
      end[i] = direct.re.start[i]!;
      end[r + i] = direct.im.start[i]!;
      for (let j = 0; j < r; j++) {
        const own = this.monodromy[j * r + i]! + (1 - unit) * flow[j]! * sensitivity[i]!;
        matrix[i * size + j] = -own;
        matrix[(r + i) * size + r + j] = -own;
      }
      matrix[i * size + i]! += Math.cos(turn);
      matrix[(r + i) * size + r + i]! += Math.cos(turn);
      matrix[i * size + r + i]! -= Math.sin(turn);
      matrix[(r + i) * size + i]! += Math.sin(turn);
    }
    const pivots = new Int32Array(size);
    factor(matrix, pivots, { n: size });
    solve(matrix, pivots, end, { n: size });
    return {
      re: this.#answer(re, end.subarray(0, r)).stages,
      im: this.#answer(im, end.subarray(r)).stages,
    };
  }

  /** One backward sweep with a functional of the stage states and the answer to charges at the end. */
  #answer(
    functional: Float64Array,
    end: Float64Array,
  ): { start: Float64Array; stages: Float64Array } {
    const { steps } = this;
    const { n, r } = this.coordinates;
    const s = this.method.stages;
    const size = s * n;
    const w = end.slice();
    const stages = new Float64Array(steps * size);
    const work = this.#stageWork;
    for (let step = steps - 1; step >= 0; step--) {
      for (let j = 0; j < s; j++) {
        for (let k = 0; k < n; k++) work[k * s + j] = functional[(step * s + j) * n + k]!;
      }
      this.#solveBack(step, w, work);
      this.#readStages(step, { w, work, stages });
      for (let row = 0; row < r; row++) {
        for (let i = 0; i < s; i++) w[row]! += work[row * s + i]!;
      }
    }
    return { start: w, stages };
  }

  /** Adds what the end of a step answers to the stages in `work` and solves the transposed stage matrix. */
  #solveBack(step: number, w: Float64Array, work: Float64Array): void {
    const { n, r } = this.coordinates;
    const size = this.method.stages * n;
    const output = this.#output;
    for (let row = 0; row < r; row++) {
      const outputAt = (step * r + row) * size;
      const weight = w[row]!;
      for (let k = 0; k < size; k++) work[k]! += output[outputAt + k]! * weight;
    }
    solveTransposed(this.#J, this.#pivots, work, {
      n: size,
      at: step * size * size,
      pivotsAt: step * size,
    });
  }

  /** Answers per unit of rate injected at the stages of a step. */
  #readStages(
    step: number,
    { w, work, stages }: { w: Float64Array; work: Float64Array; stages: Float64Array },
  ): void {
    const { n, r } = this.coordinates;
    const { stages: s, matrix, weights } = this.method;
    const h = this.#stepLength(step);
    for (let j = 0; j < s; j++) {
      const at = (step * s + j) * n;
      for (let row = 0; row < r; row++) {
        let value = w[row]!;
        for (let i = 0; i < s; i++) {
          value += matrix[i * s + j]! / weights[j]! * work[row * s + i]!;
        }
        stages[at + row] = value;
      }
      for (let row = r; row < n; row++) {
        stages[at + row] = work[row * s + j]! / (h * weights[j]!);
      }
    }
  }
}
