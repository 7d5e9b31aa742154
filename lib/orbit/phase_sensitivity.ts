/**
 * Phase sensitivity of an orbit.
 *
 * Indices stay inside the arrays by construction; `!` says so to the compiler.
 *
 * @module
 */
import { factor, solveTransposed } from "../numeric/lu.ts";
import type { Orbit } from "./orbit.ts";

/** The phase sensitivity v1 over one period. */
export interface PhaseSensitivity {
  readonly orbit: Orbit;
  /**
   * Sensitivity at a time [s]: seconds of phase advance per unit of each row's conserved quantity
   * (s/C on node rows, s/Wb on inductor rows), shape (n,).
   */
  at(time: number): Float64Array;
  /** At the mesh points (times of `orbit.samples`), shape (m, n), row-major. */
  readonly samples: Float64Array;
  /** At the points of `orbit.quadrature`, shape (m, n), row-major. */
  readonly quadrature: Float64Array;
}

/**
 * The phase sensitivity of an orbit: the left eigenvector of the discrete period map on its unit
 * multiplier, carried around the period by the transposed step maps and normalised to
 * v1 . dq/dt = 1.
 *
 * A charge injected into a row at time t advances the phase, in seconds, by v1(t) times the charge, to
 * first order; it is the derivative of the same discrete map that Newton solved.
 *
 * @see A. Demir, A. Mehrotra, J. Roychowdhury, IEEE Trans. Circuits Syst. I 47 (2000) 655
 */
export function phaseSensitivity(orbit: Orbit): PhaseSensitivity {
  const { coordinates, path, adjoint } = orbit.discrete;
  const { n, r } = coordinates;
  const quadrature = new Float64Array(adjoint.stages.length);
  for (let k = 0; k < quadrature.length / n; k++) toRows(orbit, adjoint.stages, quadrature, k * n);
  let samples: Float64Array | undefined;
  const scaledRows = (w: Float64Array, state: Float64Array) => {
    const rows = new Float64Array(n);
    for (let i = 0; i < r; i++) rows[i] = w[i]!;
    if (r < n) algebraicRows(orbit, w, state, rows);
    return rows;
  };
  return {
    orbit,
    quadrature,
    get samples() {
      if (samples) return samples;
      samples = new Float64Array(orbit.steps * n);
      for (let step = 0; step < orbit.steps; step++) {
        const w = adjoint.nodes.subarray(step * r, (step + 1) * r);
        const state = orbit.discrete.nodes.states.slice(step * n, (step + 1) * n);
        const rows = new Float64Array(n);
        toRows(orbit, scaledRows(w, state), rows, 0);
        samples.set(rows, step * n);
      }
      return samples;
    },
    at(time) {
      const place = orbit.placeOf(time);
      const { charges, state } = orbit.scaledAt(place);
      const w = adjoint.nodes.slice((place.step + 1) * r, (place.step + 2) * r);
      if (place.inside < place.length) {
        const stepper = orbit.partOfStep(place, {
          from: place.inside,
          to: place.length,
          charges,
        });
        stepper.pullBack(w, { h: place.length - place.inside });
      }
      const rows = new Float64Array(n);
      toRows(orbit, scaledRows(w, state), rows, 0);
      return path.period > 0 ? rows : rows.fill(NaN);
    },
  };
}

/** Sensitivity of the algebraic rows at a state from that of the charges. */
function algebraicRows(
  orbit: Orbit,
  w: Float64Array,
  state: Float64Array,
  rows: Float64Array,
): void {
  const { coordinates } = orbit.discrete;
  const { n, r } = coordinates;
  const q = new Float64Array(r);
  const f = new Float64Array(n);
  const C = new Float64Array(r * n);
  const G = new Float64Array(n * n);
  coordinates.evaluate(state, 0, q, 0, f, 0, C, 0, G, 0);
  const matrix = Float64Array.from({ length: n * n }, (_, k) => k < r * n ? C[k]! : G[k]!);
  const pivots = new Int32Array(n);
  const z = new Float64Array(n);
  for (let k = 0; k < n; k++) {
    for (let i = 0; i < r; i++) z[k]! += G[i * n + k]! * w[i]!;
  }
  factor(matrix, pivots, { n });
  solveTransposed(matrix, pivots, z, { n });
  // A current into an algebraic row moves the state at once, and with it the flow of the charges.
  for (let k = r; k < n; k++) rows[k] = -z[k]!;
}

/**
 * Scaled sensitivities of the reordered rows at `from[at...]` to those of the system's own rows.
 *
 * @internal
 */
export function toRows(orbit: Orbit, from: Float64Array, into: Float64Array, at: number): void {
  const { n, r, rows, rowScale, mix } = orbit.discrete.coordinates;
  for (let i = 0; i < n; i++) into[at + rows[i]!] = from[at + i]! * rowScale[i]!;
  for (let k = r; k < n; k++) {
    const own = into[at + rows[k]!]!;
    for (let i = 0; i < r; i++) into[at + rows[i]!]! -= mix[(k - r) * r + i]! * own;
  }
}
