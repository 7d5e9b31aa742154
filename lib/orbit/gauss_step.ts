/**
 * One Gauss collocation step of a system in charge coordinates: stage equations, their matrix and
 * their solution. The transient and the interpolation inside a step use it; the period map shares
 * its two assembly functions.
 *
 * Indices stay inside the arrays by construction; `!` says so to the compiler.
 *
 * @module
 */
import { factor, solve, solveTransposed } from "../numeric/lu.ts";
import type { GaussMethod } from "../numeric/gauss.ts";
import type { ChargeCoordinates } from "./charge_coordinates.ts";

const STEP_ITERATIONS = 12;
/** A correction that shrinks less than this asks for a fresh matrix. */
const SLOW_CONTRACTION = 0.2;
/** Longest change of a scaled stage value in one iteration. */
const STEP_BOUND = 3;

/**
 * Values of the stages of one step or of many, one after the other.
 *
 * @internal
 */
export interface StageValues {
  /** Scaled charges, shape (stages, r). */
  readonly q: Float64Array;
  /** Scaled currents, shape (stages, n). */
  readonly f: Float64Array;
  /** Scaled dq/dx, shape (stages, r, n). */
  readonly C: Float64Array;
  /** Scaled df/dx, shape (stages, n, n). */
  readonly G: Float64Array;
}

/**
 * Arrays for the values of `stages` stages.
 *
 * @internal
 */
export function stageValues(stages: number, { n, r }: { n: number; r: number }): StageValues {
  return {
    q: new Float64Array(stages * r),
    f: new Float64Array(stages * n),
    C: new Float64Array(stages * r * n),
    G: new Float64Array(stages * n * n),
  };
}

/**
 * Evaluates the system at the stages `first ... first + count` of `X`, shape (stages, n).
 *
 * @internal
 */
export function evaluateStages(
  coordinates: ChargeCoordinates,
  X: Float64Array,
  values: StageValues,
  { first, count }: { first: number; count: number },
): void {
  const { n, r } = coordinates;
  for (let i = first; i < first + count; i++) {
    coordinates.evaluate(
      X,
      i * n,
      values.q,
      i * r,
      values.f,
      i * n,
      values.C,
      i * r * n,
      values.G,
      i * n * n,
    );
  }
}

/**
 * Writes the stage matrix of the step whose stages begin at `first` into `J[JAt...]`.
 *
 * Its rows and columns go through the stages of one unknown before the next: unknowns that come first
 * in the system and meet few others, such as winding currents, are then eliminated cheaply.
 *
 * @internal
 */
export function assembleMatrix(
  coordinates: ChargeCoordinates,
  method: GaussMethod,
  values: StageValues,
  { h, first, J, JAt }: { h: number; first: number; J: Float64Array; JAt: number },
): void {
  const { n, r } = coordinates;
  const s = method.stages;
  const size = s * n;
  for (let row = 0; row < n; row++) {
    for (let i = 0; i < s; i++) {
      const out = JAt + (row * s + i) * size;
      const own = (first + i) * r * n + row * n;
      for (let j = 0; j < s; j++) {
        const from = (first + j) * n * n + row * n;
        if (row >= r) {
          for (let k = 0; k < n; k++) J[out + k * s + j] = i === j ? values.G[from + k]! : 0;
          continue;
        }
        const weight = h * method.matrix[i * s + j]!;
        for (let k = 0; k < n; k++) J[out + k * s + j] = weight * values.G[from + k]!;
        if (i === j) {
          for (let k = 0; k < n; k++) J[out + k * s + j]! += values.C[own + k]!;
        }
      }
    }
  }
}

/**
 * Writes the negative residual of the stage equations, in the order of the stage matrix, into
 * `out[outAt...]` with the given stride and returns its largest entry.
 *
 * @internal
 */
export function stageResidual(
  coordinates: ChargeCoordinates,
  method: GaussMethod,
  values: StageValues,
  { h, first, y, yAt, out, outAt, stride }: {
    h: number;
    first: number;
    y: Float64Array;
    yAt: number;
    out: Float64Array;
    outAt: number;
    stride: number;
  },
): number {
  const { n, r } = coordinates;
  const s = method.stages;
  let largest = 0;
  for (let i = 0; i < s; i++) {
    for (let row = 0; row < n; row++) {
      let value: number;
      if (row < r) {
        value = y[yAt + row]! - values.q[(first + i) * r + row]!;
        for (let j = 0; j < s; j++) {
          value -= h * method.matrix[i * s + j]! * values.f[(first + j) * n + row]!;
        }
      } else {
        value = -values.f[(first + i) * n + row]!;
      }
      out[outAt + (row * s + i) * stride] = value;
      const size = Math.abs(value);
      largest = Math.max(largest, size);
    }
  }
  return largest;
}

/**
 * Solves single steps; owns the work arrays of one step.
 *
 * @internal
 */
export class GaussStepper {
  readonly coordinates: ChargeCoordinates;
  readonly method: GaussMethod;
  /** Stage states of the last step, scaled, shape (s, n); also the start of the next solution. */
  readonly stages: Float64Array;
  readonly values: StageValues;
  factorizations = 0;
  readonly #J: Float64Array;
  readonly #pivots: Int32Array;
  readonly #change: Float64Array;

  constructor(coordinates: ChargeCoordinates, method: GaussMethod) {
    const size = method.stages * coordinates.n;
    this.coordinates = coordinates;
    this.method = method;
    this.stages = new Float64Array(size);
    this.values = stageValues(method.stages, coordinates);
    this.#J = new Float64Array(size * size);
    this.#pivots = new Int32Array(size);
    this.#change = new Float64Array(size);
  }

  /**
   * Solves the stage equations of a step of length `h` [s] from the scaled charges `y`, starting
   * from the states in `stages`.
   *
   * @returns whether the last correction fell below `tolerance`
   */
  solve(y: Float64Array, { h, tolerance }: { h: number; tolerance: number }): boolean {
    const { coordinates, method, stages, values } = this;
    const { n } = coordinates;
    const s = method.stages;
    const size = s * n;
    let fresh = false;
    let previous = Infinity;
    for (let iteration = 0; iteration < STEP_ITERATIONS; iteration++) {
      evaluateStages(coordinates, stages, values, { first: 0, count: method.stages });
      if (!fresh) {
        assembleMatrix(coordinates, method, values, { h, first: 0, J: this.#J, JAt: 0 });
        if (!factor(this.#J, this.#pivots, { n: size })) return false;
        this.factorizations++;
        fresh = true;
      }
      stageResidual(coordinates, method, values, {
        h,
        first: 0,
        y,
        yAt: 0,
        out: this.#change,
        outAt: 0,
        stride: 1,
      });
      solve(this.#J, this.#pivots, this.#change, { n: size });
      let change = 0;
      for (let k = 0; k < size; k++) change = Math.max(change, Math.abs(this.#change[k]!));
      if (!(change < Infinity)) return false;
      const damping = change > STEP_BOUND ? STEP_BOUND / change : 1;
      for (let k = 0; k < n; k++) {
        for (let i = 0; i < s; i++) stages[i * n + k]! += damping * this.#change[k * s + i]!;
      }
      if (change < tolerance) {
        evaluateStages(coordinates, stages, values, { first: 0, count: method.stages });
        return true;
      }
      if (change > SLOW_CONTRACTION * previous || damping < 1) fresh = false;
      previous = change;
    }
    return false;
  }

  /** Writes the charges at the end of the solved step of length `h` from `y` into `end`. */
  advance(y: Float64Array, { h, end }: { h: number; end: Float64Array }): void {
    const { n, r } = this.coordinates;
    for (let row = 0; row < r; row++) {
      let value = y[row]!;
      for (let j = 0; j < this.method.stages; j++) {
        value -= h * this.method.weights[j]! * this.values.f[j * n + row]!;
      }
      end[row] = value;
    }
  }

  /**
   * Carries a sensitivity backward over the solved step: `w` at the end becomes `w` at the start.
   *
   * @param w scaled sensitivity to the charges, shape (r,), overwritten
   * @returns whether the step's matrix could be factored
   */
  pullBack(w: Float64Array, { h }: { h: number }): boolean {
    const { n, r } = this.coordinates;
    const { method, values } = this;
    const s = method.stages;
    assembleMatrix(this.coordinates, method, values, { h, first: 0, J: this.#J, JAt: 0 });
    if (!factor(this.#J, this.#pivots, { n: s * n })) return false;
    this.factorizations++;
    for (let j = 0; j < s; j++) {
      for (let k = 0; k < n; k++) {
        let value = 0;
        for (let row = 0; row < r; row++) value += values.G[(j * n + row) * n + k]! * w[row]!;
        this.#change[k * s + j] = -h * method.weights[j]! * value;
      }
    }
    solveTransposed(this.#J, this.#pivots, this.#change, { n: s * n });
    for (let row = 0; row < r; row++) {
      for (let i = 0; i < s; i++) w[row]! += this.#change[row * s + i]!;
    }
    return true;
  }
}
