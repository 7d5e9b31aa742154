/**
 * States at the mesh points of a discrete orbit, and what its defect between the collocation points
 * says about the orbit's error.
 *
 * Indices stay inside the arrays by construction; `!` says so to the compiler.
 *
 * @module
 */
import {
  gaussLegendre,
  type GaussMethod,
  lagrangeBasis,
  lagrangeIntegrals,
} from "../numeric/gauss.ts";
import { factor, solve } from "../numeric/lu.ts";
import type { ChargeCoordinates } from "./charge_coordinates.ts";
import type { Adjoint, Path } from "./period_map.ts";

const NODE_ITERATIONS = 12;
/** Largest correction of a state at a mesh point that needs no further one: it leaves its square. */
const NODE_TOLERANCE = 1e-6;
/** The estimate is the error to leading order; the rest of the series is smaller than this margin. */
const PERIOD_SAFETY = 1.5;
/** The deviation of v1 . dq/dt is seen along the motion only. */
const SENSITIVITY_SAFETY = 3;
/** A relative error of the period shifts the phase by up to this many times itself, in radians. */
const PERIOD_TO_PHASE = 2 * Math.PI;

/**
 * Constants of the error estimate of a Gauss method; they depend on the number of stages only.
 *
 * @internal
 */
export interface DefectRule {
  /** Points inside a step at which the defect is looked at besides its ends, shape (s - 1,). */
  readonly points: Float64Array;
  /** Lagrange values at the points on [start, stages, end], shape (s - 1, s + 2). */
  readonly states: Float64Array;
  /** Integrals of the stages' Lagrange polynomials up to the points, shape (s - 1, s). */
  readonly integrals: Float64Array;
  /** Values of the stages' Lagrange polynomials at start, end and points, shape (s + 1, s). */
  readonly slopes: Float64Array;
  /**
   * Integral of sensitivity times defect over a unit step from the defect at [start, end, points] and
   * the sensitivity at [start, stages, end], shape (s + 1, s + 2).
   */
  readonly weights: Float64Array;
}

/**
 * The defect of a collocation path vanishes at the s stages: it is the polynomial with those zeros
 * times one of degree s, which s + 1 further points determine.
 *
 * @internal
 */
export function defectRule(method: GaussMethod): DefectRule {
  const { nodes, stages: s } = method;
  const points = Float64Array.from(
    { length: s - 1 },
    (_, k) => (nodes[k]! + nodes[k + 1]!) / 2,
  );
  const sensed = [0, ...nodes, 1];
  const looked = [0, 1, ...points];
  const zeros = (x: number) => nodes.reduce((product, node) => product * (x - node), 1);
  const rule = gaussLegendre(s + 2);
  const weights = new Float64Array((s + 1) * (s + 2));
  rule.nodes.forEach((node, k) => {
    const defect = lagrangeBasis(looked, node);
    const sensitivity = lagrangeBasis(sensed, node);
    defect.forEach((value, i) => {
      const size = value * zeros(node) / zeros(looked[i]!);
      sensitivity.forEach((own, j) => {
        weights[i * (s + 2) + j]! += rule.weights[k]! * size * own;
      });
    });
  });
  const flat = (rows: readonly Float64Array[]) =>
    Float64Array.from(rows.flatMap((row) => [...row]));
  return {
    points,
    states: flat([...points].map((point) => lagrangeBasis(sensed, point))),
    integrals: flat([...points].map((point) => lagrangeIntegrals(nodes, { from: 0, to: point }))),
    slopes: flat(looked.map((point) => lagrangeBasis(nodes, point))),
    weights,
  };
}

/**
 * What the mesh points tell.
 *
 * @internal
 */
export interface NodeValues {
  /** Scaled states at the mesh points, shape (steps, n). */
  readonly states: Float64Array;
  /** Size of each step's defect against the range of its charge, squared: of the order of 2s + 2. */
  readonly localError: Float64Array;
  /** Estimated error of the period, relative. */
  readonly periodError: number;
  /**
   * Estimated error of the sensitivity, relative to its largest value: from the largest deviation of
   * v1 . dq/dt from 1 at the mesh points. An estimate and no bound: it does not see what lies across
   * the motion, where slow-fast systems may be some ten times worse.
   */
  readonly sensitivityError: number;
}

/** Evaluates the flow of the charges at states near given charges; owns its work arrays. */
class FlowReader {
  readonly #coordinates: ChargeCoordinates;
  readonly #q: Float64Array;
  readonly #f: Float64Array;
  readonly #C: Float64Array;
  readonly #G: Float64Array;
  readonly #matrix: Float64Array;
  readonly #pivots: Int32Array;
  readonly #change: Float64Array;

  constructor(coordinates: ChargeCoordinates) {
    const { n, r } = coordinates;
    this.#coordinates = coordinates;
    this.#q = new Float64Array(r);
    this.#f = new Float64Array(n);
    this.#C = new Float64Array(r * n);
    this.#G = new Float64Array(n * n);
    this.#matrix = new Float64Array(n * n);
    this.#pivots = new Int32Array(n);
    this.#change = new Float64Array(n);
  }

  /**
   * One Newton correction of the state at `x[xAt...]` towards the charges, and the flow there, to the
   * square of the correction.
   *
   * @returns the size of the correction; NaN where the equations cannot be solved
   */
  read(
    charges: Float64Array,
    chargesAt: number,
    { x, xAt, flow, flowAt }: { x: Float64Array; xAt: number; flow: Float64Array; flowAt: number },
  ): number {
    const { n, r } = this.#coordinates;
    const change = this.#change;
    this.#coordinates.evaluate(x, xAt, this.#q, 0, this.#f, 0, this.#C, 0, this.#G, 0);
    this.#matrix.set(this.#C);
    for (let k = r * n; k < n * n; k++) this.#matrix[k] = this.#G[k]!;
    if (!factor(this.#matrix, this.#pivots, { n })) return NaN;
    for (let i = 0; i < n; i++) {
      change[i] = i < r ? charges[chargesAt + i]! - this.#q[i]! : -this.#f[i]!;
    }
    solve(this.#matrix, this.#pivots, change, { n });
    let size = 0;
    for (let k = 0; k < n; k++) {
      size = Math.max(size, Math.abs(change[k]!));
      x[xAt + k]! += change[k]!;
    }
    for (let i = 0; i < r; i++) {
      let value = -this.#f[i]!;
      for (let k = 0; k < n; k++) value -= this.#G[i * n + k]! * change[k]!;
      flow[flowAt + i] = value;
    }
    return size;
  }
}

/**
 * States at the mesh points, and the error estimate: the defect of the collocation path, looked at
 * between the collocation points and weighted with the sensitivity, is the error of the period to
 * leading order. The sensitivity is judged by how well it keeps v1 . dq/dt = 1 at the mesh points.
 *
 * @returns the values, or undefined where a state at a mesh point could not be found
 * @see N. Pierce, M. Giles, SIAM Rev. 42 (2000) 247, adjoint error estimates
 *
 * @internal
 */
export function nodeValues(
  coordinates: ChargeCoordinates,
  path: Path,
  { adjoint, method, rule, stageFlow }: {
    adjoint: Adjoint;
    method: GaussMethod;
    rule: DefectRule;
    /** Scaled currents at the stages, shape (steps, s, n). */
    stageFlow: Float64Array;
  },
): NodeValues | undefined {
  const { n, r } = coordinates;
  const { mesh, charges, period, stages } = path;
  const steps = mesh.length - 1;
  const s = method.stages;
  const atStart = lagrangeBasis(method.nodes, 0);
  const atEnd = lagrangeBasis(method.nodes, 1);
  const reader = new FlowReader(coordinates);
  const states = new Float64Array(steps * n);
  const flow = new Float64Array((steps + 1) * r);
  let deviation = 0;
  for (let step = 0; step < steps; step++) {
    const before = (step + steps - 1) % steps * s * n;
    const after = step * s * n;
    for (let k = 0; k < n; k++) {
      let value = 0;
      for (let j = 0; j < s; j++) {
        value += atStart[j]! * stages[after + j * n + k]! + atEnd[j]! * stages[before + j * n + k]!;
      }
      states[step * n + k] = value / 2;
    }
    let size = Infinity;
    for (let iteration = 0; !(size < NODE_TOLERANCE); iteration++) {
      if (iteration === NODE_ITERATIONS) return undefined;
      size = reader.read(charges, step * r, {
        x: states,
        xAt: step * n,
        flow,
        flowAt: step * r,
      });
      if (!(size < Infinity)) return undefined;
    }
    let along = -1;
    for (let i = 0; i < r; i++) along += flow[step * r + i]! * adjoint.nodes[step * r + i]!;
    deviation = Math.max(deviation, Math.abs(along));
  }
  for (let i = 0; i < r; i++) flow[steps * r + i] = flow[i]!;

  const range = rangeOf(charges, r, steps);
  const localError = new Float64Array(steps);
  const defect = new Float64Array((s + 1) * r);
  const inside = new Float64Array(r);
  const insideFlow = new Float64Array(r);
  const state = new Float64Array(n);
  let periodError = 0;
  for (let step = 0; step < steps; step++) {
    const h = period * (mesh[step + 1]! - mesh[step]!);
    const stage = step * s * n;
    const next = (step + 1) % steps * n;
    for (let look = 0; look <= s; look++) {
      let known = flow;
      let knownAt = (step + look) * r;
      if (look > 1) {
        const point = look - 2;
        const basis = point * (s + 2);
        for (let k = 0; k < n; k++) {
          let value = rule.states[basis]! * states[step * n + k]! +
            rule.states[basis + s + 1]! * states[next + k]!;
          for (let j = 0; j < s; j++) {
            value += rule.states[basis + 1 + j]! * stages[stage + j * n + k]!;
          }
          state[k] = value;
        }
        for (let i = 0; i < r; i++) {
          let value = charges[step * r + i]!;
          for (let j = 0; j < s; j++) {
            value -= h * rule.integrals[point * s + j]! * stageFlow[stage + j * n + i]!;
          }
          inside[i] = value;
        }
        reader.read(inside, 0, { x: state, xAt: 0, flow: insideFlow, flowAt: 0 });
        known = insideFlow;
        knownAt = 0;
      }
      for (let i = 0; i < r; i++) {
        let slope = 0;
        for (let j = 0; j < s; j++) {
          slope -= rule.slopes[look * s + j]! * stageFlow[stage + j * n + i]!;
        }
        const value = slope - known[knownAt + i]!;
        defect[look * r + i] = value;
        if (range[i]! > 0) {
          const size = Math.abs(h * value) / range[i]!;
          if (size > localError[step]!) localError[step] = size;
        }
      }
    }
    localError[step]! **= 2;
    for (let look = 0; look <= s; look++) {
      const weightAt = look * (s + 2);
      for (let i = 0; i < r; i++) {
        let sensitivity = rule.weights[weightAt]! * adjoint.nodes[step * r + i]! +
          rule.weights[weightAt + s + 1]! * adjoint.nodes[(step + 1) * r + i]!;
        for (let j = 0; j < s; j++) {
          sensitivity += rule.weights[weightAt + 1 + j]! * adjoint.stages[stage + j * n + i]!;
        }
        periodError += h * sensitivity * defect[look * r + i]!;
      }
    }
  }
  periodError = PERIOD_SAFETY * Math.abs(periodError) / period;
  return {
    states,
    localError,
    periodError,
    sensitivityError: SENSITIVITY_SAFETY * deviation + PERIOD_TO_PHASE * periodError +
      adjoint.closure,
  };
}

/**
 * Range of each scaled charge over the mesh points, shape (r,).
 *
 * @internal
 */
export function rangeOf(charges: Float64Array, r: number, count: number): Float64Array {
  const low = new Float64Array(r).fill(Infinity);
  const high = new Float64Array(r).fill(-Infinity);
  for (let k = 0; k < count * r; k++) {
    low[k % r] = Math.min(low[k % r]!, charges[k]!);
    high[k % r] = Math.max(high[k % r]!, charges[k]!);
  }
  return high.map((value, i) => value - low[i]!);
}
