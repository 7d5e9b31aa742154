/**
 * States at the mesh points of a discrete orbit, and what a formula of higher order says about the
 * orbit's error there.
 *
 * Indices stay inside the arrays by construction; `!` says so to the compiler.
 *
 * @module
 */
import { type GaussMethod, lagrangeBasis, lagrangeIntegrals } from "../numeric/gauss.ts";
import { factor, solve } from "../numeric/lu.ts";
import type { ChargeCoordinates } from "./charge_coordinates.ts";
import type { Adjoint, Path } from "./period_map.ts";

/** Mesh points in the error estimate's quadrature: exact to degree 9, above the order of 4 stages. */
const STENCIL = 16;
const NODE_ITERATIONS = 12;
/** A correction this small leaves an error of its square. */
const NODE_TOLERANCE = 1e-8;
/** The deviation of v1 . dq/dt is seen along the motion only: what lies across it is of its size. */
const SENSITIVITY_SAFETY = 3;
/** A relative error of the period shifts the phase by up to this many times itself, in radians. */
const PERIOD_TO_PHASE = 2 * Math.PI;

/** Quadrature weights of each step on the mesh points around it, shape (steps, 10). */
export function stencilWeights(mesh: Float64Array): Float64Array {
  const steps = mesh.length - 1;
  const weights = new Float64Array(steps * STENCIL);
  const points = new Float64Array(STENCIL);
  for (let step = 0; step < steps; step++) {
    const h = mesh[step + 1]! - mesh[step]!;
    for (let k = 0; k < STENCIL; k++) {
      const index = step - STENCIL / 2 + 1 + k;
      const turns = Math.floor(index / steps);
      points[k] = (mesh[index - turns * steps]! + turns - mesh[step]!) / h;
    }
    weights.set(lagrangeIntegrals(points, { from: 0, to: 1 }), step * STENCIL);
  }
  return weights;
}

/** What the mesh points tell. */
export interface NodeValues {
  /** Scaled states at the mesh points, shape (steps, n). */
  readonly states: Float64Array;
  /** Local error of each step relative to the range of each charge, the largest, shape (steps,). */
  readonly localError: Float64Array;
  /** Estimated error of the period, relative. */
  readonly periodError: number;
  /**
   * Estimated error of the sensitivity, relative to its largest value: from the largest deviation of
   * v1 . dq/dt from 1 at the mesh points.
   */
  readonly sensitivityError: number;
}

/**
 * States at the mesh points, and the error estimate: the charges at the mesh points are put into a
 * quadrature of higher order (10 points), and what remains in each step is carried to the period by
 * the adjoint. The sensitivity is judged by how well it keeps v1 . dq/dt = 1 at the mesh points.
 *
 * @returns the values, or undefined where a state at a mesh point could not be found
 * @see N. Pierce, M. Giles, SIAM Rev. 42 (2000) 247, adjoint error estimates
 */
export function nodeValues(
  coordinates: ChargeCoordinates,
  path: Path,
  { adjoint, weights, method }: {
    adjoint: Adjoint;
    weights: Float64Array;
    method: GaussMethod;
  },
): NodeValues | undefined {
  const { n, r } = coordinates;
  const { mesh, charges, period } = path;
  const steps = mesh.length - 1;
  const s = method.stages;
  const atStart = lagrangeBasis(method.nodes, 0);
  const atEnd = lagrangeBasis(method.nodes, 1);
  const states = new Float64Array(steps * n);
  const flow = new Float64Array(steps * r);
  const q = new Float64Array(r);
  const f = new Float64Array(n);
  const C = new Float64Array(r * n);
  const G = new Float64Array(n * n);
  const matrix = new Float64Array(n * n);
  const pivots = new Int32Array(n);
  const change = new Float64Array(n);
  let deviation = 0;
  for (let step = 0; step < steps; step++) {
    const before = (step + steps - 1) % steps * s * n;
    const after = step * s * n;
    for (let k = 0; k < n; k++) {
      let value = 0;
      for (let j = 0; j < s; j++) {
        value += atStart[j]! * path.stages[after + j * n + k]! +
          atEnd[j]! * path.stages[before + j * n + k]!;
      }
      states[step * n + k] = value / 2;
    }
    let size = Infinity;
    for (let iteration = 0; !(size < NODE_TOLERANCE); iteration++) {
      if (iteration === NODE_ITERATIONS) return undefined;
      coordinates.evaluate(states, step * n, q, 0, f, 0, C, 0, G, 0);
      matrix.set(C);
      for (let k = r * n; k < n * n; k++) matrix[k] = G[k]!;
      if (!factor(matrix, pivots, { n })) return undefined;
      for (let i = 0; i < n; i++) change[i] = i < r ? charges[step * r + i]! - q[i]! : -f[i]!;
      solve(matrix, pivots, change, { n });
      size = 0;
      for (let k = 0; k < n; k++) {
        size = Math.max(size, Math.abs(change[k]!));
        states[step * n + k]! += change[k]!;
      }
      if (!(size < Infinity)) return undefined;
    }
    let along = -1;
    for (let i = 0; i < r; i++) {
      let value = -f[i]!;
      for (let k = 0; k < n; k++) value -= G[i * n + k]! * change[k]!;
      flow[step * r + i] = value;
      along += value * adjoint.nodes[step * r + i]!;
    }
    deviation = Math.max(deviation, Math.abs(along));
  }
  const range = rangeOf(charges, r, steps);
  const localError = new Float64Array(steps);
  let periodError = 0;
  for (let step = 0; step < steps; step++) {
    const h = period * (mesh[step + 1]! - mesh[step]!);
    for (let i = 0; i < r; i++) {
      let charge = charges[(step + 1) * r + i]! - charges[step * r + i]!;
      for (let k = 0; k < STENCIL; k++) {
        const at = (step - STENCIL / 2 + 1 + k + steps) % steps * r + i;
        charge -= h * weights[step * STENCIL + k]! * flow[at]!;
      }
      periodError += adjoint.nodes[(step + 1) * r + i]! * charge;
      if (range[i]! > 0) {
        localError[step] = Math.max(localError[step]!, Math.abs(charge) / range[i]!);
      }
    }
  }
  periodError = Math.abs(periodError) / period;
  return {
    states,
    localError,
    periodError,
    sensitivityError: SENSITIVITY_SAFETY * deviation + PERIOD_TO_PHASE * periodError +
      adjoint.closure,
  };
}

/** Range of each scaled charge over the mesh points, shape (r,). */
export function rangeOf(charges: Float64Array, r: number, count: number): Float64Array {
  const low = new Float64Array(r).fill(Infinity);
  const high = new Float64Array(r).fill(-Infinity);
  for (let k = 0; k < count * r; k++) {
    low[k % r] = Math.min(low[k % r]!, charges[k]!);
    high[k % r] = Math.max(high[k % r]!, charges[k]!);
  }
  return high.map((value, i) => value - low[i]!);
}
