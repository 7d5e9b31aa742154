import type { OscillatorSystem } from "./system.ts";

/** Relative step of the central difference, the cube root of machine epsilon. */
const DIFFERENCE_STEP = Math.cbrt(Number.EPSILON);

/** An ordinary differential equation x' = flow(x). */
export interface OdeDescription {
  /** Number of unknowns n. */
  readonly dimension: number;
  /** Writes x' at `x` into `into`, each shape (n,). */
  readonly flow: (x: Float64Array, into: Float64Array) => void;
  /** Writes d(flow)/dx into `into`, shape (n, n), row-major. @default central differences */
  readonly jacobian?: (x: Float64Array, into: Float64Array) => void;
  /** Typical size of each unknown, shape (n,). @default ones */
  readonly scale?: Float64Array;
}

/**
 * Wraps x' = flow(x) as an {@linkcode OscillatorSystem} with q = x and f = -flow.
 *
 * @throws RangeError for a dimension below 2: one state cannot oscillate
 * @throws TypeError for a scale of the wrong length
 */
export function odeSystem({ dimension, flow, jacobian, scale }: OdeDescription): OscillatorSystem {
  if (!(Number.isInteger(dimension) && dimension >= 2)) {
    throw new RangeError(
      `Cannot build an oscillator: dimension must be an integer >= 2, got ${dimension}`,
    );
  }
  if (scale && scale.length !== dimension) {
    throw new TypeError(
      `Cannot build an oscillator: scale must have ${dimension} entries, found ${scale.length}`,
    );
  }
  const n = dimension;
  const shifted = new Float64Array(n);
  const above = new Float64Array(n);
  const below = new Float64Array(n);
  const differences = (x: Float64Array, into: Float64Array) => {
    shifted.set(x);
    for (let j = 0; j < n; j++) {
      const step = DIFFERENCE_STEP * Math.max(Math.abs(x[j]!), scale?.[j] ?? 1);
      shifted[j] = x[j]! + step;
      flow(shifted, above);
      shifted[j] = x[j]! - step;
      flow(shifted, below);
      shifted[j] = x[j]!;
      for (let i = 0; i < n; i++) into[i * n + j] = (above[i]! - below[i]!) / (2 * step);
    }
  };
  const slope = jacobian ?? differences;
  return {
    dimension,
    ...(scale ? { scale } : {}),
    evaluate(x, { q, f, C, G }) {
      q.set(x);
      flow(x, f);
      slope(x, G);
      for (let i = 0; i < n; i++) f[i] = -f[i]!;
      for (let i = 0; i < n * n; i++) G[i] = -G[i]!;
      C.fill(0);
      for (let i = 0; i < n; i++) C[i * n + i] = 1;
    },
  };
}
