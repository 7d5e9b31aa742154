import { EigenvalueDecomposition, Matrix } from "ml-matrix";
import { factor, solve } from "../numeric/lu.ts";
import { ChargeCoordinates } from "./charge_coordinates.ts";
import type { OscillatorSystem, SystemValues } from "./system.ts";

const NEWTON_ITERATIONS = 60;
const NEWTON_TOLERANCE = 1e-13;
/** Longest change of an unknown, in units of its scale, in one iteration. */
const NEWTON_STEP = 0.5;
/** Ladder of extra conductances, relative to the largest own, that leads a hard case to its solution. */
const LADDER = [1, 0.1, 1e-2, 1e-3, 1e-4, 1e-6, 1e-8, 0];

/** A complex number; in poles, 1/s. */
export interface Complex {
  readonly re: number;
  readonly im: number;
}

/** A pole of the linearised system with its direction in the unknowns. */
export interface Pole extends Complex {
  /** Real and imaginary part of the mode in the system's unknowns, each shape (n,). */
  readonly mode: { readonly re: Float64Array; readonly im: Float64Array };
}

/** An equilibrium f(x) = 0. */
export interface Equilibrium {
  readonly status: "found";
  readonly system: OscillatorSystem;
  /** The state, shape (n,). */
  readonly state: Float64Array;
  /** Poles of the linearised system [1/s], largest real part first. */
  readonly poles: readonly Pole[];
  /** Largest remaining |f|, in the units of its row. */
  readonly residual: number;
  readonly iterations: number;
}

/** Why no equilibrium was found. */
export interface NoEquilibrium {
  readonly status: "no equilibrium";
  readonly reason: string;
  readonly residual: number;
  readonly iterations: number;
}

/** Options of {@linkcode findEquilibrium}. */
export interface EquilibriumOptions {
  /** Where to begin, shape (n,). @default zeros */
  readonly guess?: Float64Array;
}

/**
 * Finds an equilibrium of `d/dt q(x) + f(x) = 0` by damped Newton iteration on f(x) = 0, with a
 * ladder of shrinking extra conductances where that fails, and the poles there: the eigenvalues of
 * the reduced flow in charge coordinates.
 *
 * @returns the equilibrium, or a named failure with the reason
 * @throws TypeError for a guess of the wrong shape
 * @throws RangeError for a system that is not of index 1
 */
export function findEquilibrium(
  system: OscillatorSystem,
  { guess }: EquilibriumOptions = {},
): Equilibrium | NoEquilibrium {
  const n = system.dimension;
  if (guess && guess.length !== n) {
    throw new TypeError(
      `Cannot find the equilibrium: guess must have ${n} entries, found ${guess.length}`,
    );
  }
  const start = guess ?? new Float64Array(n);
  const direct = newton(system, start, 0);
  let outcome = direct;
  if (!outcome.converged) {
    let state = start;
    let iterations = direct.iterations;
    for (const extra of LADDER) {
      outcome = newton(system, state, extra);
      iterations += outcome.iterations;
      if (!outcome.converged) break;
      state = outcome.state;
    }
    outcome = { ...outcome, iterations };
  }
  const { state, residual, iterations, converged } = outcome;
  if (!converged) {
    return {
      status: "no equilibrium",
      reason: Number.isFinite(residual)
        ? `f(x) could not be brought to zero: ${residual.toExponential(2)} remains`
        : "f(x) is not finite near the guess",
      residual,
      iterations,
    };
  }
  return { status: "found", system, state, poles: polesAt(system, state), residual, iterations };
}

interface NewtonOutcome {
  readonly converged: boolean;
  readonly state: Float64Array;
  readonly residual: number;
  readonly iterations: number;
}

/** Newton on f(x) + extra g (x - start) = 0, g the largest conductance of the row at `start`. */
function newton(system: OscillatorSystem, start: Float64Array, extra: number): NewtonOutcome {
  const n = system.dimension;
  const scale = system.scale ?? new Float64Array(n).fill(1);
  const values: SystemValues = {
    q: new Float64Array(n),
    f: new Float64Array(n),
    C: new Float64Array(n * n),
    G: new Float64Array(n * n),
  };
  const state = Float64Array.from(start);
  const matrix = new Float64Array(n * n);
  const change = new Float64Array(n);
  const pivots = new Int32Array(n);
  const added = new Float64Array(n);
  let residual = Infinity;
  for (let iteration = 1; iteration <= NEWTON_ITERATIONS; iteration++) {
    system.evaluate(state, values);
    if (iteration === 1 && extra > 0) {
      for (let i = 0; i < n; i++) {
        const row = values.G.subarray(i * n, (i + 1) * n);
        added[i] = extra * Math.max(...Array.from(row, Math.abs));
      }
    }
    residual = 0;
    for (let i = 0; i < n; i++) {
      const value = values.f[i]! + added[i]! * (state[i]! - start[i]!);
      change[i] = -value;
      residual = Math.max(residual, Math.abs(value));
      // Rows and columns to about one, so that pivoting compares like with like.
      let largest = 0;
      for (let j = 0; j < n; j++) {
        const slope = (values.G[i * n + j]! + (i === j ? added[i]! : 0)) * scale[j]!;
        matrix[i * n + j] = slope;
        largest = Math.max(largest, Math.abs(slope));
      }
      if (largest > 0) {
        for (let j = 0; j < n; j++) matrix[i * n + j]! /= largest;
        change[i]! /= largest;
      }
    }
    if (!Number.isFinite(residual) || !factor(matrix, pivots, { n })) {
      return { converged: false, state, residual, iterations: iteration };
    }
    solve(matrix, pivots, change, { n });
    let size = 0;
    for (let j = 0; j < n; j++) size = Math.max(size, Math.abs(change[j]!));
    const damping = size > NEWTON_STEP ? NEWTON_STEP / size : 1;
    for (let j = 0; j < n; j++) state[j]! += damping * change[j]! * scale[j]!;
    if (size < NEWTON_TOLERANCE * (1 + largestRatio(state, scale))) {
      return { converged: true, state, residual, iterations: iteration };
    }
  }
  return { converged: false, state, residual, iterations: NEWTON_ITERATIONS };
}

function largestRatio(state: Float64Array, scale: Float64Array): number {
  return state.reduce((largest, value, j) => Math.max(largest, Math.abs(value / scale[j]!)), 0);
}

/**
 * Poles of `system` linearised at `state` with their modes, largest real part first.
 *
 * @throws RangeError for a system that is not of index 1 there
 */
export function polesAt(system: OscillatorSystem, state: Float64Array): Pole[] {
  const coordinates = new ChargeCoordinates(system, state);
  const { n, r, unknownScale } = coordinates;
  const scaled = state.map((value, j) => value / unknownScale[j]!);
  const { jacobian, response } = coordinates.reducedFlow(scaled);
  // Frequencies of 1e10 and time constants of 1e-6 s in one matrix: work in units of its norm.
  const unit = Math.max(...Array.from(jacobian, Math.abs)) || 1;
  const matrix = new Matrix(r, r);
  for (let i = 0; i < r; i++) {
    for (let j = 0; j < r; j++) matrix.set(i, j, jacobian[i * r + j]! / unit);
  }
  const decomposition = new EigenvalueDecomposition(matrix, { assumeSymmetric: false });
  const re = decomposition.realEigenvalues;
  const im = decomposition.imaginaryEigenvalues;
  const vectors = decomposition.eigenvectorMatrix;
  const unknowns = (column: number) => {
    const mode = new Float64Array(n);
    for (let k = 0; k < n; k++) {
      for (let j = 0; j < r; j++) {
        mode[k]! += response[k * r + j]! * vectors.get(j, column) * unknownScale[k]!;
      }
    }
    return mode;
  };
  const poles = re.map((real, k): Pole => {
    const imaginary = im[k]!;
    // A complex pair occupies two columns: the real and the imaginary part of the first one's vector.
    const first = imaginary < 0 ? k - 1 : k;
    const imaginaryPart = imaginary === 0 ? new Float64Array(n) : unknowns(first + 1);
    return {
      re: real * unit,
      im: imaginary * unit,
      mode: {
        re: unknowns(first),
        im: imaginary < 0 ? imaginaryPart.map((value) => -value) : imaginaryPart,
      },
    };
  });
  return poles.sort((a, b) => b.re - a.re || b.im - a.im);
}
