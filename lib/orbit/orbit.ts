/**
 * A found periodic orbit and the outcomes of looking for one.
 *
 * Indices stay inside the arrays by construction; `!` says so to the compiler.
 *
 * @module
 */
import { type GaussMethod, lagrangeBasis } from "../numeric/gauss.ts";
import type { ChargeCoordinates } from "./charge_coordinates.ts";
import type { Complex } from "./equilibrium.ts";
import { GaussStepper } from "./gauss_step.ts";
import { type Multiplier, multipliersOf, multiplierValue } from "./multipliers.ts";
import type { NodeValues } from "./node_values.ts";
import type { Adjoint, Path, PeriodMap } from "./period_map.ts";
import type { OscillatorSystem } from "./system.ts";

/** Accuracy to which a state between mesh points is solved, scaled. */
const INSIDE_TOLERANCE = 1e-13;

/** Work spent on a result. */
export interface Work {
  /** Evaluations of the system. */
  readonly evaluations: number;
  /** Factorised step matrices. */
  readonly factorizations: number;
  /** Passes of Newton over the period. */
  readonly passes: number;
  /** Time steps of the transient. */
  readonly transientSteps: number;
}

/** Estimated errors. */
export interface Estimate {
  /** Of the period, relative [1]. */
  readonly period: number;
  /**
   * Of the phase sensitivity, relative to its largest value, judged along the motion [1]: no bound, on
   * slow-fast systems it may be some ten times too small.
   */
  readonly sensitivity: number;
}

/** Points at which integrals over the period are taken: the stages of all steps. */
export interface Quadrature {
  /** Number of points m. */
  readonly count: number;
  /** Times [s], shape (m,). */
  readonly times: Float64Array;
  /** Weights [s], shape (m,), sum = period. */
  readonly weights: Float64Array;
  /** States, shape (m, n), row-major. */
  readonly states: Float64Array;
}

/** States at the mesh points, which are as accurate as the orbit. */
export interface OrbitSamples {
  /** Times [s], shape (m,), from 0, the period not included. */
  readonly times: Float64Array;
  /** States, shape (m, n), row-major. */
  readonly states: Float64Array;
}

/**
 * Where inside the mesh a time lies.
 *
 * @internal
 */
export interface Place {
  readonly step: number;
  /** Time since the start of the step [s]. */
  readonly inside: number;
  /** Length of the step [s]. */
  readonly length: number;
}

/** A periodic steady state. */
export class Orbit {
  readonly status = "found";
  readonly system: OscillatorSystem;
  /** Period [s]. */
  readonly period: number;
  /** Largest remaining residual of the scaled discrete equations [1]. */
  readonly residual: number;
  readonly estimate: Estimate;
  readonly work: Work;
  /** The discrete orbit in scaled charge coordinates, for the engine's own use. */
  readonly discrete: {
    readonly coordinates: ChargeCoordinates;
    readonly method: GaussMethod;
    readonly path: Path;
    readonly adjoint: Adjoint;
    readonly nodes: NodeValues;
    /** Work arrays, reused by the orbits continued from this one. */
    readonly map: PeriodMap;
  };
  readonly #stepMaps: Float64Array;
  #multipliers: readonly Multiplier[] | undefined;
  #quadrature: Quadrature | undefined;
  #stepper: GaussStepper | undefined;

  constructor({ residual, estimate, work, discrete, stepMaps }: {
    residual: number;
    estimate: Estimate;
    work: Work;
    discrete: Orbit["discrete"];
    stepMaps: Float64Array;
  }) {
    this.system = discrete.coordinates.system;
    this.period = discrete.path.period;
    this.residual = residual;
    this.estimate = estimate;
    this.work = work;
    this.discrete = discrete;
    this.#stepMaps = stepMaps;
  }

  /** Number of steps in the mesh. */
  get steps(): number {
    return this.discrete.path.mesh.length - 1;
  }

  /** Frequency [Hz]. */
  get frequency(): number {
    return 1 / this.period;
  }

  #moduli(): readonly Multiplier[] {
    this.#multipliers ??= multipliersOf(this.#stepMaps, this.discrete.coordinates.r);
    return this.#multipliers;
  }

  /** Multipliers of the period map, largest modulus first; exactly one is 1. */
  get multipliers(): Complex[] {
    return this.#moduli().map(multiplierValue);
  }

  /**
   * Exponents [1/s]: logarithms of the multipliers over the period, also where a multiplier underflows.
   * They are those of the discrete map: a mode that dies within one step is seen to die only as fast
   * as the step resolves, which a tighter tolerance mends.
   */
  get exponents(): Complex[] {
    return this.#moduli().map(({ logModulus, argument }) => ({
      re: logModulus / this.period,
      im: argument / this.period,
    }));
  }

  /** Points, weights and states for integrals over the period. */
  get quadrature(): Quadrature {
    if (this.#quadrature) return this.#quadrature;
    const { coordinates, method, path } = this.discrete;
    const { n, unknownScale } = coordinates;
    const s = method.stages;
    const count = this.steps * s;
    const times = new Float64Array(count);
    const weights = new Float64Array(count);
    for (let k = 0; k < count; k++) {
      const step = Math.floor(k / s);
      const start = path.mesh[step]! * this.period;
      const length = path.mesh[step + 1]! * this.period - start;
      times[k] = start + method.nodes[k % s]! * length;
      weights[k] = method.weights[k % s]! * length;
    }
    const states = path.stages.map((value, k) => value * unknownScale[k % n]!);
    this.#quadrature = { count, times, weights, states };
    return this.#quadrature;
  }

  /** States at the mesh points. */
  get samples(): OrbitSamples {
    const { coordinates, path, nodes } = this.discrete;
    const { n, unknownScale } = coordinates;
    return {
      times: path.mesh.slice(0, this.steps).map((part) => part * this.period),
      states: nodes.states.map((value, k) => value * unknownScale[k % n]!),
    };
  }

  /**
   * Mean over the period of a function of the state.
   *
   * @param value the function; its argument, shape (n,), is reused
   */
  mean(value: (x: Float64Array) => number): number {
    const { count, weights, states } = this.quadrature;
    const { n } = this.discrete.coordinates;
    let sum = 0;
    for (let k = 0; k < count; k++) {
      sum += weights[k]! * value(states.subarray(k * n, (k + 1) * n));
    }
    return sum / this.period;
  }

  /**
   * Complex Fourier coefficient of a function of the state: its `harmonic`-th peak phasor
   * (2/T) integral of value exp(-i harmonic w t) dt; the mean for harmonic 0.
   */
  phasor(
    value: (x: Float64Array) => number,
    { harmonic = 1 }: { harmonic?: number } = {},
  ): Complex {
    const { count, times, weights, states } = this.quadrature;
    const { n } = this.discrete.coordinates;
    const scale = (harmonic === 0 ? 1 : 2) / this.period;
    let re = 0;
    let im = 0;
    for (let k = 0; k < count; k++) {
      const angle = 2 * Math.PI * harmonic * times[k]! / this.period;
      const share = scale * weights[k]! * value(states.subarray(k * n, (k + 1) * n));
      re += share * Math.cos(angle);
      im -= share * Math.sin(angle);
    }
    return { re, im };
  }

  /** The step of the mesh in which a time lies; times wrap around the period. */
  placeOf(time: number): Place {
    if (!Number.isFinite(time)) {
      throw new RangeError(`Cannot place a time on the orbit: it must be finite, got ${time} s`);
    }
    const { mesh } = this.discrete.path;
    const part = time / this.period - Math.floor(time / this.period);
    let low = 0;
    let high = this.steps;
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if (mesh[middle]! <= part) low = middle;
      else high = middle;
    }
    return {
      step: low,
      inside: (part - mesh[low]!) * this.period,
      length: (mesh[low + 1]! - mesh[low]!) * this.period,
    };
  }

  /**
   * Solves the part of a step from `from` to `to` [s since its start]: `charges` at `from` become
   * those at `to`. The stepper holds the solved part afterwards.
   */
  partOfStep(place: Place, { from, to, charges }: {
    from: number;
    to: number;
    charges: Float64Array;
  }): GaussStepper {
    const { coordinates, method, path } = this.discrete;
    const { n } = coordinates;
    const s = method.stages;
    this.#stepper ??= new GaussStepper(coordinates, method);
    const stepper = this.#stepper;
    const h = to - from;
    for (let i = 0; i < s; i++) {
      const basis = lagrangeBasis(method.nodes, (from + method.nodes[i]! * h) / place.length);
      for (let k = 0; k < n; k++) {
        let value = 0;
        for (let j = 0; j < s; j++) {
          value += basis[j]! * path.stages[(place.step * s + j) * n + k]!;
        }
        stepper.stages[i * n + k] = value;
      }
    }
    // Rounding may keep the last correction just above the tolerance; the values are then as good.
    stepper.solve(charges, { h, tolerance: INSIDE_TOLERANCE });
    stepper.advance(charges, { h, end: charges });
    return stepper;
  }

  /** Scaled charges and state at a place in the mesh. */
  scaledAt(place: Place): { charges: Float64Array; state: Float64Array } {
    const { coordinates, path, nodes } = this.discrete;
    const { n, r } = coordinates;
    const charges = path.charges.slice(place.step * r, (place.step + 1) * r);
    const state = nodes.states.slice(place.step * n, (place.step + 1) * n);
    if (place.inside > 0) {
      const stepper = this.partOfStep(place, { from: 0, to: place.inside, charges });
      state.set(stepper.stages.subarray(stepper.stages.length - n));
      coordinates.stateOf(charges, 0, state, 0);
    }
    return { charges, state };
  }

  /**
   * State at a time.
   *
   * @param time [s]; any finite time, the orbit being periodic
   * @returns the state, shape (n,), to the accuracy of the mesh points
   */
  at(time: number): Float64Array {
    const { unknownScale } = this.discrete.coordinates;
    return this.scaledAt(this.placeOf(time)).state.map((value, j) => value * unknownScale[j]!);
  }
}

/** Why no orbit was found. */
export interface OrbitFailure {
  readonly status: "settles" | "unstable" | "no convergence" | "no equilibrium";
  /** In words, for the user. */
  readonly reason: string;
  /** Sizes of the Newton updates of the last attempt, relative. */
  readonly history: readonly number[];
  readonly work: Work;
  /** The unstable orbit itself, when one was found. */
  readonly orbit?: Orbit;
}

/** What looking for an orbit gives: the orbit, or why there is none. */
export type OrbitResult = Orbit | OrbitFailure;
