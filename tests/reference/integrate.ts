/**
 * An integrator the project did not write, as reference: odex, the extrapolation code of E. Hairer and
 * G. Wanner (Solving Ordinary Differential Equations I, 1993, II.9), for x' = flow(x).
 */
import { Solver } from "odex";

/** Writes x' at `x` into `into`. */
export type Flow = (x: Float64Array, into: Float64Array) => void;

const STEP_LIMIT = 1_000_000;
const CROSSING_ITERATIONS = 20;

function solverFor(flow: Flow, n: number, tolerance: number) {
  const solver = new Solver(n);
  solver.relativeTolerance = solver.absoluteTolerance = tolerance;
  solver.maxSteps = STEP_LIMIT;
  const state = new Float64Array(n);
  const rate = new Float64Array(n);
  const derivative = (_t: number, y: number[]) => {
    for (let i = 0; i < n; i++) state[i] = y[i]!;
    flow(state, rate);
    return Array.from(rate);
  };
  return { solver, derivative };
}

/** The state `duration` later; a negative duration integrates backward. */
export function integrate(
  flow: Flow,
  start: Float64Array,
  { duration, tolerance = 1e-13 }: { duration: number; tolerance?: number },
): Float64Array {
  if (duration === 0) return start.slice();
  const { solver, derivative } = solverFor(flow, start.length, tolerance);
  // The solver chooses its own sign of the step; a duration below its first step needs a shorter one.
  solver.initialStepSize = Math.min(1e-4, Math.abs(duration) / 4);
  const { y, outcome } = solver.solve(derivative, 0, Array.from(start), duration);
  if (outcome !== 0) throw new Error(`the reference integrator stopped with outcome ${outcome}`);
  return Float64Array.from(y);
}

/** Signed time from `state` to the plane through `point` with the given normal, near by. */
export function timeToPlane(
  flow: Flow,
  state: Float64Array,
  { point, normal }: { point: Float64Array; normal: Float64Array },
): number {
  const rate = new Float64Array(state.length);
  let time = 0;
  for (let iteration = 0; iteration < CROSSING_ITERATIONS; iteration++) {
    const now = integrate(flow, state, { duration: time });
    flow(now, rate);
    let gap = 0;
    let slope = 0;
    for (let i = 0; i < now.length; i++) {
      gap += normal[i]! * (point[i]! - now[i]!);
      slope += normal[i]! * rate[i]!;
    }
    const change = gap / slope;
    time += change;
    if (Math.abs(change) < 1e-15 * (1 + Math.abs(time))) break;
  }
  return time;
}

/**
 * The period of the cycle that `start` settles on: integration alone, then the time between one
 * passage through a plane and the next near it.
 *
 * @returns the period and the point on the cycle it was measured from
 */
export function referencePeriod(
  flow: Flow,
  start: Float64Array,
  { settle, tolerance = 1e-13 }: { settle: number; tolerance?: number },
): { period: number; point: Float64Array } {
  const n = start.length;
  const point = integrate(flow, start, { duration: settle, tolerance });
  const normal = new Float64Array(n);
  flow(point, normal);
  const { solver, derivative } = solverFor(flow, n, tolerance);
  const low = point.slice();
  const high = point.slice();
  let before = 0;
  let near: { time: number; state: Float64Array } | undefined;
  solver.solve(derivative, 0, Array.from(point), 1e9, (_number, _from, time, y) => {
    let side = 0;
    let distance = 0;
    for (let i = 0; i < n; i++) {
      low[i] = Math.min(low[i]!, y[i]!);
      high[i] = Math.max(high[i]!, y[i]!);
      side += normal[i]! * (y[i]! - point[i]!);
    }
    for (let i = 0; i < n; i++) {
      const range = high[i]! - low[i]!;
      if (range > 0) distance = Math.max(distance, Math.abs(y[i]! - point[i]!) / range);
    }
    if (before < 0 && side >= 0 && distance < 0.5) {
      near = { time, state: Float64Array.from(y) };
      return false;
    }
    before = side;
    return true;
  });
  if (!near) throw new Error("the reference motion did not return");
  return { period: near.time + timeToPlane(flow, near.state, { point, normal }), point };
}

/**
 * The phase advance that a displacement of the state leaves for ever, per unit of displacement [s per
 * unit], by integrating displaced motions until they have settled: central differences in the
 * displacement, extrapolated once.
 */
export function measuredSensitivity(
  flow: Flow,
  at: Float64Array,
  { row, size, settle }: { row: number; size: number; settle: number },
): number {
  const point = integrate(flow, at, { duration: settle });
  const normal = new Float64Array(at.length);
  flow(point, normal);
  const advance = (displacement: number) => {
    const displaced = at.slice();
    displaced[row]! += displacement;
    return -timeToPlane(flow, integrate(flow, displaced, { duration: settle }), { point, normal });
  };
  const central = (h: number) => (advance(h) - advance(-h)) / (2 * h);
  return (4 * central(size / 2) - central(size)) / 3;
}
