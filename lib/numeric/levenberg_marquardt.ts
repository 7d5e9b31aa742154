import { factor, solve } from "./lu.ts";

/** Options of {@linkcode levenbergMarquardt}. */
export interface LevenbergMarquardtOptions {
  /** Greatest number of accepted steps. @default 200 */
  readonly iterations?: number;
  /** Stops when a step lowers the sum of squares by less than this share [1]. @default 1e-12 */
  readonly tolerance?: number;
  /** Greatest change of any parameter in one step, in its own unit. @default 1 */
  readonly greatestStep?: number;
}

/** Where a least-squares search ended. */
export interface LeastSquares {
  /** `found` when no step lowers the sum any more; `not settled` when the iterations ran out. */
  readonly status: "found" | "not settled";
  /** Shape (n,). */
  readonly parameters: Float64Array;
  /** Shape (m,). */
  readonly residuals: Float64Array;
  readonly sumOfSquares: number;
  /** Accepted steps. */
  readonly iterations: number;
  /** Of the residual function, those for its derivatives included. */
  readonly evaluations: number;
  /**
   * (J^T J)^-1 at the end, shape (n, n), row-major; times the variance of a residual it is the covariance
   * of the parameters. None when the parameters cannot be told apart.
   */
  readonly inverseCurvature: Float64Array | undefined;
}

/** Step of the central differences: the cube root of the rounding, for parameters of order one. */
const DIFFERENCE = 6e-6;

const FIRST_DAMPING = 1e-3;
const DAMPING_DOWN = 0.3;
const DAMPING_UP = 4;

/** Above this damping the step is lost in rounding. */
const GREATEST_DAMPING = 1e12;

/** Share of the largest diagonal entry that keeps a direction without effect solvable. */
const DIAGONAL_FLOOR = 1e-14;

/**
 * Least squares by Levenberg and Marquardt: parameters that minimize sum r_i^2.
 *
 * Scale the parameters so that a change of one is large (a logarithm is such a scale): derivatives are
 * central differences of 6e-6. The search ends when the gain of an accepted step, relative to the sum, is
 * below `tolerance`, or when no step lowers the sum.
 *
 * @param residuals writes m residuals at parameters p, shape (n,), into `out`; not finite means outside
 * @param start shape (n,); the residuals there must be finite
 * @throws {RangeError} when there are fewer residuals than parameters or the start is outside
 * @see D. W. Marquardt, J. SIAM 11 (1963) 431
 */
export function levenbergMarquardt(
  residuals: (p: Float64Array, out: Float64Array) => void,
  start: ArrayLike<number>,
  options: LevenbergMarquardtOptions & {
    /** Number of residuals. */
    readonly count: number;
  },
): LeastSquares {
  const { count: m, iterations: limit = 200, tolerance = 1e-12, greatestStep = 1 } = options;
  const n = start.length;
  if (!(m >= n)) {
    throw new RangeError(
      `Cannot fit: residuals must be at least as many as parameters, ${n}, got ${m}`,
    );
  }
  let p = Float64Array.from(start);
  let r = new Float64Array(m);
  let evaluations = 1;
  residuals(p, r);
  let sum = sumOfSquares(r);
  if (!(sum < Infinity)) {
    throw new RangeError(
      `Cannot fit: the residuals at the start must be finite, got a sum of ${sum}`,
    );
  }
  let trial = new Float64Array(n);
  let trialR = new Float64Array(m);
  const jacobian = new Float64Array(m * n);
  const normal = new Float64Array(n * n);
  const damped = new Float64Array(n * n);
  const gradient = new Float64Array(n);
  const step = new Float64Array(n);
  const pivots = new Int32Array(n);
  let damping = FIRST_DAMPING;
  let accepted = 0;
  const differentiate = () => {
    for (let j = 0; j < n; j++) {
      for (const side of [1, -1]) {
        trial.set(p);
        trial[j]! += side * DIFFERENCE;
        residuals(trial, trialR);
        evaluations++;
        for (let i = 0; i < m; i++) {
          const share = side * trialR[i]! / (2 * DIFFERENCE);
          jacobian[i * n + j] = side === 1 ? share : jacobian[i * n + j]! + share;
        }
      }
    }
    for (let a = 0; a < n; a++) {
      let g = 0;
      for (let i = 0; i < m; i++) g += jacobian[i * n + a]! * r[i]!;
      gradient[a] = g;
      for (let b = 0; b <= a; b++) {
        let entry = 0;
        for (let i = 0; i < m; i++) entry += jacobian[i * n + a]! * jacobian[i * n + b]!;
        normal[a * n + b] = entry;
        normal[b * n + a] = entry;
      }
    }
  };
  differentiate();
  let status: LeastSquares["status"] = "not settled";
  while (accepted < limit) {
    if (!(sum > 0) || damping > GREATEST_DAMPING) {
      status = "found";
      break;
    }
    const floor = DIAGONAL_FLOOR * largestDiagonal(normal, n);
    damped.set(normal);
    for (let a = 0; a < n; a++) damped[a * n + a]! += damping * Math.max(normal[a * n + a]!, floor);
    for (let a = 0; a < n; a++) step[a] = -gradient[a]!;
    if (!factor(damped, pivots, { n })) {
      damping *= DAMPING_UP;
      continue;
    }
    solve(damped, pivots, step, { n });
    const largest = step.reduce((size, each) => Math.max(size, Math.abs(each)), 0);
    const shrink = largest > greatestStep ? greatestStep / largest : 1;
    for (let a = 0; a < n; a++) trial[a] = p[a]! + shrink * step[a]!;
    residuals(trial, trialR);
    evaluations++;
    const trialSum = sumOfSquares(trialR);
    if (!(trialSum < sum)) {
      damping *= DAMPING_UP;
      continue;
    }
    const gain = (sum - trialSum) / sum;
    [p, trial] = [trial, p];
    [r, trialR] = [trialR, r];
    sum = trialSum;
    accepted++;
    damping *= DAMPING_DOWN;
    differentiate();
    if (gain < tolerance) {
      status = "found";
      break;
    }
  }
  return {
    status,
    parameters: p,
    residuals: r,
    sumOfSquares: sum,
    iterations: accepted,
    evaluations,
    inverseCurvature: inverseOf(normal, n),
  };
}

function sumOfSquares(r: Float64Array): number {
  let sum = 0;
  for (const each of r) sum += each * each;
  return sum;
}

function largestDiagonal(a: Float64Array, n: number): number {
  let largest = 0;
  for (let k = 0; k < n; k++) largest = Math.max(largest, a[k * n + k]!);
  return largest;
}

function inverseOf(a: Float64Array, n: number): Float64Array | undefined {
  const factors = a.slice();
  const pivots = new Int32Array(n);
  if (!factor(factors, pivots, { n })) return undefined;
  const inverse = new Float64Array(n * n);
  for (let k = 0; k < n; k++) inverse[k * n + k] = 1;
  solve(factors, pivots, inverse, { n, columns: n });
  return inverse.every(Number.isFinite) ? inverse : undefined;
}
