import { type GaussMethod, gaussMethod } from "../numeric/gauss.ts";
import { ChargeCoordinates } from "./charge_coordinates.ts";
import type { Equilibrium, NoEquilibrium } from "./equilibrium.ts";
import { moveToMesh, spreadMesh } from "./mesh.ts";
import { type DefectRule, defectRule, nodeValues, rangeOf } from "./node_values.ts";
import { Orbit, type OrbitFailure, type OrbitResult, type Work } from "./orbit.ts";
import { type Path, PeriodMap } from "./period_map.ts";
import type { OscillatorSystem } from "./system.ts";
import { Transient } from "./transient.ts";

/** Relative error of the period asked for unless the caller says otherwise. */
const DEFAULT_TOLERANCE = 1e-8;
/** The sensitivity may be this many times less accurate than the period. */
const SENSITIVITY_ALLOWANCE = 100;
const SMALLEST_TOLERANCE = 1e-14;
const DEFAULT_STAGES = 3;
const FEWEST_STEPS = 16;
const MOST_STEPS = 6000;
const NEWTON_PASSES = 24;
/** Full passes in a row whose update did not shrink before giving up. */
const STALLED_PASSES = 5;
/** Longest Newton update of a scaled state. */
const NEWTON_BOUND = 0.5;
/**
 * A full pass whose update is below this multiple of the tolerance ends the iteration: it has
 * linearised at the orbit, and its update leaves the square of itself.
 */
const LINEARISED_WITHIN = 10;
/** Rounding floor of an update. */
const ROUNDING = 2e-13;
/** Refinements of the mesh before giving up. */
const MESH_ROUNDS = 8;
/** Aim below the tolerance by this factor when choosing the number of steps. */
const MESH_MARGIN = 0.3;
const LARGEST_REFINEMENT = 3;
/** A mesh whose estimate is this part of the tolerance is coarsened. */
const TOO_GOOD = 0.03;
/** The mesh of a neighbour is kept longer: a new mesh spoils the extrapolation. */
const TOO_GOOD_KEPT = 1e-3;
/** An orbit must keep this part of the motion it was guessed from; less is a shrunken guess. */
const KEPT_SIZE = 0.2;
/** Growth per cycle below which a cycle is worth a Newton attempt. */
const STEADY_GROWTH = 0.1;
/** Attempts are made at the 2nd, 4th, 7th, ... steady cycle. */
const ATTEMPT_SPACING = 1.6;
const TRANSIENT_STEPS = 80_000;
/** Deflection along the unstable mode from an equilibrium, in units of the scale. */
const DEFLECTION = 0.1;
/** Most orbits an extrapolation goes through. */
const EXTRAPOLATED = 4;
/** Steps per period of the fastest unstable mode at the start of a transient. */
const STEPS_PER_MODE = 36;
/** A second multiplier above 1 by more than this is unstable. */
const STABILITY_MARGIN = 1e-6;
/** Above this norm of the deflated monodromy's power the multipliers are computed. */
const STABILITY_DOUBT = 0.999;
const POWER_SQUARINGS = 10;

/** A path near an orbit of a neighbouring system, from {@linkcode extrapolateOrbits}. */
export interface OrbitGuess {
  readonly status: "guess";
  readonly path: Path;
  /** The orbit whose mesh, coordinates and work arrays are taken over. */
  readonly neighbour: Orbit;
}

export interface FindOrbitOptions {
  /** A state, shape (n,), an equilibrium, a neighbouring orbit or a guess made from several. */
  readonly start: Float64Array | Equilibrium | NoEquilibrium | Orbit | OrbitGuess;
  /** About the period [s], when known; speeds up a start from a state. */
  readonly period?: number;
  /** Number of steps, held; without it the error estimate chooses. */
  readonly steps?: number;
  /**
   * Relative error of the period that the estimate must reach; the sensitivity's may be 100 times it.
   * @default 1e-8
   */
  readonly tolerance?: number;
  /** Stages of the Gauss method, 2 to 4; its order is twice that. @default 3 */
  readonly stages?: number;
  /** Most time steps of the transient. @default 80000 */
  readonly transientSteps?: number;
}

/**
 * Finds a stable periodic orbit of `d/dt q(x) + f(x) = 0`.
 *
 * From a state or an equilibrium a transient runs until a cycle nearly closes; Newton on the discrete
 * period map, the period and a phase condition does the rest, or the transient goes on. From a
 * neighbouring orbit Newton starts at once. The mesh is frozen during Newton and spread by the local
 * error between rounds until the estimated relative error of the period is at most the tolerance and
 * that of the sensitivity at most 100 tolerances.
 *
 * @returns the orbit (`status: "found"`) or a failure with its reason
 * @throws RangeError, TypeError for options outside their ranges
 */
export function findOrbit(system: OscillatorSystem, options: FindOrbitOptions): OrbitResult {
  const settings = check(system, options);
  const { start } = options;
  if (start instanceof Orbit) return continueFrom(system, start.discrete.path, start, settings);
  if (!(start instanceof Float64Array)) {
    if (start.status === "guess") {
      return continueFrom(system, start.path, start.neighbour, settings);
    }
    if (start.status === "no equilibrium") {
      return failure("no equilibrium", `there is no equilibrium to start from: ${start.reason}`);
    }
  }
  return fromTransient(system, start, settings);
}

interface Settings {
  readonly method: GaussMethod;
  readonly tolerance: number;
  readonly steps: number | undefined;
  readonly period: number | undefined;
  readonly transientSteps: number;
}

function check(system: OscillatorSystem, options: FindOrbitOptions): Settings {
  const {
    start,
    period,
    steps,
    tolerance = DEFAULT_TOLERANCE,
    stages = DEFAULT_STAGES,
    transientSteps = TRANSIENT_STEPS,
  } = options;
  const refuse = (what: string): never => {
    throw new RangeError(`Cannot find an orbit: ${what}`);
  };
  if (!(tolerance >= SMALLEST_TOLERANCE && tolerance < 1e-2)) {
    refuse(`tolerance must be from ${SMALLEST_TOLERANCE} to 1e-2, got ${tolerance}`);
  }
  if (period !== undefined && !(period > 0 && period < Infinity)) {
    refuse(`period must be > 0 s, got ${period} s`);
  }
  if (steps !== undefined && !(Number.isInteger(steps) && steps >= FEWEST_STEPS)) {
    refuse(`steps must be an integer >= ${FEWEST_STEPS}, got ${steps}`);
  }
  if (!(stages >= 2 && stages <= 4)) refuse(`stages must be 2, 3 or 4, got ${stages}`);
  if (!(transientSteps > 0)) refuse(`transientSteps must be > 0, got ${transientSteps}`);
  if (start instanceof Float64Array) {
    if (start.length !== system.dimension) {
      throw new TypeError(
        `Cannot find an orbit: start must have ${system.dimension} entries, found ${start.length}`,
      );
    }
    if (!start.every(Number.isFinite)) refuse("every entry of start must be finite");
  }
  return { method: gaussMethod(stages), tolerance, steps, period, transientSteps };
}

function failure(
  status: OrbitFailure["status"],
  reason: string,
  { history = [], work = NO_WORK, orbit }: {
    history?: readonly number[];
    work?: Work;
    orbit?: Orbit;
  } = {},
): OrbitFailure {
  return { status, reason, history, work, ...(orbit ? { orbit } : {}) };
}

const NO_WORK: Work = { evaluations: 0, factorizations: 0, passes: 0, transientSteps: 0 };

function continueFrom(
  system: OscillatorSystem,
  path: Path,
  neighbour: Orbit,
  settings: Settings,
): OrbitResult {
  if (system.dimension !== neighbour.system.dimension) {
    throw new TypeError(
      `Cannot continue an orbit: the system must have ${neighbour.system.dimension} unknowns, found ${system.dimension}`,
    );
  }
  const coordinates = new ChargeCoordinates(system, neighbour.discrete.coordinates);
  const method = settings.method.stages === neighbour.discrete.method.stages
    ? neighbour.discrete.method
    : settings.method;
  const search = new Search(coordinates, { ...settings, method });
  let begin = path;
  if (method !== neighbour.discrete.method) {
    // Another number of stages: take the neighbour's path over on the new method's points.
    begin = restage(neighbour, path, method);
  }
  search.adopt(neighbour);
  const result = search.refine(begin, { kept: true });
  return result instanceof Orbit ? stableOrbit(result) : result;
}

/** The stage states of another Gauss method on the same mesh. */
function restage(neighbour: Orbit, path: Path, method: GaussMethod): Path {
  const { n } = neighbour.discrete.coordinates;
  const steps = path.mesh.length - 1;
  const stages = new Float64Array(steps * method.stages * n);
  for (let step = 0; step < steps; step++) {
    const length = (path.mesh[step + 1]! - path.mesh[step]!) * neighbour.period;
    for (let j = 0; j < method.stages; j++) {
      const { state } = neighbour.scaledAt({ step, inside: method.nodes[j]! * length, length });
      stages.set(state, (step * method.stages + j) * n);
    }
  }
  return { ...path, stages };
}

function fromTransient(
  system: OscillatorSystem,
  start: Float64Array | Equilibrium,
  settings: Settings,
): OrbitResult {
  const state = start instanceof Float64Array ? start : start.state;
  const coordinates = new ChargeCoordinates(system, state);
  const { n, r, unknownScale } = coordinates;
  const scaled = state.map((value, j) => value / unknownScale[j]!);
  let longestStep = settings.period ? settings.period / FEWEST_STEPS : Infinity;
  let firstStep = settings.period ? settings.period / 100 : NaN;
  if (!(start instanceof Float64Array)) {
    const pole = start.poles[0]!;
    if (!(pole.re > 0)) {
      return failure("settles", "the equilibrium is stable: a deflection from it dies out");
    }
    let largest = 0;
    for (let j = 0; j < n; j++) {
      largest = Math.max(largest, Math.abs(pole.mode.re[j]! / unknownScale[j]!));
    }
    for (let j = 0; j < n; j++) {
      scaled[j]! += DEFLECTION * pole.mode.re[j]! / unknownScale[j]! / largest;
    }
    const rate = Math.hypot(pole.re, pole.im);
    firstStep = 2 * Math.PI / rate / STEPS_PER_MODE;
    longestStep = pole.im !== 0 ? 1.5 * firstStep : Infinity;
  }
  // The state must satisfy the algebraic rows: keep its charges and solve for the rest.
  const charges = chargesOf(coordinates, scaled);
  if (!coordinates.stateOf(charges, 0, scaled, 0)) {
    return failure("no convergence", "no state with the start's charges satisfies the equations");
  }
  const { flow } = coordinates.reducedFlow(scaled);
  if (!(firstStep > 0)) {
    const rate = flow.reduce((largest, value) => Math.max(largest, Math.abs(value)), 0);
    if (!(rate > 0)) {
      return failure("settles", "the start is an equilibrium: nothing moves");
    }
    firstStep = 1e-2 / rate;
  }
  const transient = new Transient(coordinates, settings.method, {
    start: scaled,
    charges,
    firstStep,
    longestStep,
  });
  const search = new Search(coordinates, settings);
  let last: OrbitFailure | undefined;
  let steady = 0;
  let nextAttempt = 2;
  for (;;) {
    const cycle = transient.nextCycle(settings.transientSteps);
    search.transientSteps = transient.steps;
    if (cycle.status === "at rest") {
      return failure("settles", "the motion dies out and settles at an equilibrium", {
        work: search.work(),
      });
    }
    if (cycle.status === "lost") {
      return last
        ? { ...last, work: search.work() }
        : failure("no convergence", cycle.reason, { work: search.work() });
    }
    if (!(Math.abs(cycle.growth) < STEADY_GROWTH)) continue;
    steady++;
    if (steady < nextAttempt) continue;
    nextAttempt = Math.ceil(nextAttempt * ATTEMPT_SPACING);
    const result = search.refine(cycle.path);
    if (result instanceof Orbit) {
      const size = Math.max(...rangeOf(result.discrete.path.charges, r, result.steps));
      if (!(size > KEPT_SIZE * cycle.size)) {
        last = failure("no convergence", "Newton shrank the motion towards the equilibrium", {
          history: search.history,
        });
        continue;
      }
      const stable = stableOrbit(result);
      if (stable instanceof Orbit) return stable;
      last = stable;
      // A second look after more of the transient, then it is the answer: the orbit is unstable.
      if (steady > 12) return { ...last, work: search.work() };
    } else {
      last = result;
    }
  }
}

function chargesOf(coordinates: ChargeCoordinates, state: Float64Array): Float64Array {
  const { n, r } = coordinates;
  const charges = new Float64Array(r);
  coordinates.evaluate(
    state,
    0,
    charges,
    0,
    new Float64Array(n),
    0,
    new Float64Array(r * n),
    0,
    new Float64Array(n * n),
    0,
  );
  return charges;
}

/** Refuses an orbit whose second multiplier lies outside the unit circle. */
function stableOrbit(orbit: Orbit): OrbitResult {
  if (!(deflatedPowerNorm(orbit) > STABILITY_DOUBT)) return orbit;
  const moduli = orbit.multipliers.map(({ re, im }) => Math.hypot(re, im));
  // One multiplier is 1; take out the one nearest to it.
  const unit = moduli.reduce(
    (best, value, k) => Math.abs(value - 1) < Math.abs(moduli[best]! - 1) ? k : best,
    0,
  );
  const second = Math.max(...moduli.filter((_, k) => k !== unit));
  if (!(second > 1 + STABILITY_MARGIN)) return orbit;
  return failure(
    "unstable",
    `the orbit is unstable: a second multiplier has modulus ${second.toPrecision(6)}`,
    { work: orbit.work, orbit },
  );
}

/** The 1024th root of the norm of the 1024th power of the monodromy without its unit direction. */
function deflatedPowerNorm(orbit: Orbit): number {
  const { coordinates, map, adjoint, path } = orbit.discrete;
  const { r } = coordinates;
  const { flow } = coordinates.reducedFlow(orbit.discrete.nodes.states.slice(0, coordinates.n));
  let power = new Float64Array(r * r);
  let unit = 0;
  for (let i = 0; i < r; i++) unit += flow[i]! * adjoint.nodes[i]!;
  for (let i = 0; i < r; i++) {
    for (let j = 0; j < r; j++) {
      power[i * r + j] = map.monodromy[i * r + j]! - flow[i]! * adjoint.nodes[j]! / unit;
    }
  }
  let logNorm = 0;
  for (let k = 0; k < POWER_SQUARINGS; k++) {
    const next = new Float64Array(r * r);
    let norm = 0;
    for (let i = 0; i < r; i++) {
      for (let j = 0; j < r; j++) {
        let value = 0;
        for (let m = 0; m < r; m++) value += power[i * r + m]! * power[m * r + j]!;
        next[i * r + j] = value;
        norm = Math.max(norm, Math.abs(value));
      }
    }
    logNorm *= 2;
    if (!(norm > 0)) return 0;
    logNorm += Math.log(norm);
    power = next.map((value) => value / norm);
  }
  return path.period > 0 ? Math.exp(logNorm / 2 ** POWER_SQUARINGS) : 0;
}

/** Newton and mesh refinement for one system; keeps count of the work. */
class Search {
  readonly #coordinates: ChargeCoordinates;
  readonly #settings: Settings;
  #map: PeriodMap | undefined;
  readonly #rule: DefectRule;
  #passes = 0;
  #factorizations = 0;
  transientSteps = 0;
  history: number[] = [];

  constructor(coordinates: ChargeCoordinates, settings: Settings) {
    this.#coordinates = coordinates;
    this.#settings = settings;
    this.#rule = defectRule(settings.method);
  }

  /** Takes over a neighbour's work arrays. */
  adopt({ discrete }: Orbit): void {
    if (discrete.method === this.#settings.method) this.#map = discrete.map;
  }

  work(): Work {
    return {
      evaluations: this.#coordinates.evaluations,
      factorizations: this.#factorizations,
      passes: this.#passes,
      transientSteps: this.transientSteps,
    };
  }

  /** From a path near the orbit to an orbit whose estimate meets the tolerance. */
  refine(begin: Path, { kept = false }: { kept?: boolean } = {}): OrbitResult {
    const { method, steps, tolerance } = this.#settings;
    const { n, r } = this.#coordinates;
    let path = begin;
    const present = path.mesh.length - 1;
    const wanted = steps ?? Math.min(Math.max(present, FEWEST_STEPS), MOST_STEPS);
    if (wanted !== present) {
      const mesh = spreadMesh(path.mesh, new Float64Array(present), { steps: wanted, order: 1 });
      if (present < FEWEST_STEPS / 2) {
        return failure("no convergence", "the cycle has too few steps to begin with", {
          work: this.work(),
        });
      }
      path = moveToMesh(path, mesh, { method, n, r });
    }
    const tooGood = kept ? TOO_GOOD_KEPT : TOO_GOOD;
    let refined = false;
    for (let round = 0; round < MESH_ROUNDS; round++) {
      const orbit = this.#newton(path);
      if (!(orbit instanceof Orbit)) return orbit;
      const excess = Math.max(
        orbit.estimate.period / tolerance,
        orbit.estimate.sensitivity / (SENSITIVITY_ALLOWANCE * tolerance),
      );
      const count = orbit.steps;
      const coarsen = !refined && excess < tooGood && count > FEWEST_STEPS;
      if (steps !== undefined || (excess <= 1 && !coarsen)) return orbit;
      refined ||= excess > 1;
      const ratio = (excess / MESH_MARGIN) ** (1 / (2 * method.stages));
      const next = Math.ceil(count * Math.min(Math.max(ratio, 0.5), LARGEST_REFINEMENT));
      if (next > MOST_STEPS || (round === MESH_ROUNDS - 1)) {
        return failure(
          "no convergence",
          `the tolerance ${tolerance} is out of reach: the estimate is ${
            orbit.estimate.period.toExponential(2)
          } for the period and ${
            orbit.estimate.sensitivity.toExponential(2)
          } for the sensitivity with ${count} steps`,
          { history: this.history, work: this.work(), orbit },
        );
      }
      const mesh = spreadMesh(path.mesh, orbit.discrete.nodes.localError, {
        steps: Math.max(next, FEWEST_STEPS),
        order: 2 * method.stages + 2,
      });
      path = moveToMesh(orbit.discrete.path, mesh, { method, n, r });
    }
    throw new Error("unreachable: every round returns or refines");
  }

  #newton(begin: Path): OrbitResult {
    const { method, tolerance } = this.#settings;
    const steps = begin.mesh.length - 1;
    if (!this.#map || this.#map.steps !== steps || this.#map.method !== method) {
      this.#map = new PeriodMap(this.#coordinates, method, steps);
    }
    const map = this.#map;
    map.load(begin, this.#coordinates);
    const target = Math.max(ROUNDING, LINEARISED_WITHIN * tolerance);
    this.history = [];
    let reuse = false;
    let smallest = Infinity;
    let stalled = 0;
    let residual = Infinity;
    for (let pass = 0; pass < NEWTON_PASSES; pass++) {
      const before = map.factorizations;
      residual = reuse ? map.reevaluate() : map.linearise();
      this.#passes++;
      this.#factorizations += map.factorizations - before;
      if (Number.isNaN(residual)) {
        return failure("no convergence", "the equations cannot be evaluated on Newton's path", {
          history: this.history,
          work: this.work(),
        });
      }
      const update = map.update(NEWTON_BOUND);
      const size = Math.max(update.state, update.period);
      this.history.push(size);
      if (!(size < Infinity && map.period > 0)) break;
      if (!reuse && size < target) return this.#finish(map, residual);
      stalled = size < smallest ? 0 : stalled + 1;
      if (stalled >= STALLED_PASSES) break;
      smallest = Math.min(smallest, size);
      // What a full pass leaves is about its update squared; where that is still too much and one
      // pass with the same factors mends it, the factors are reused.
      reuse = !reuse && size ** 2 > target && size ** 3 < target;
    }
    return failure("no convergence", "Newton did not converge on a closed path", {
      history: this.history,
      work: this.work(),
    });
  }

  #finish(map: PeriodMap, residual: number): OrbitResult {
    const { method } = this.#settings;
    const coordinates = this.#coordinates;
    const adjoint = map.adjoint();
    const path = map.copy();
    const nodes = nodeValues(coordinates, path, {
      adjoint,
      method,
      rule: this.#rule,
      stageFlow: map.stageCurrents,
    });
    if (!nodes) {
      return failure("no convergence", "no state at a mesh point satisfies the equations", {
        history: this.history,
        work: this.work(),
      });
    }
    return new Orbit({
      residual,
      estimate: { period: nodes.periodError, sensitivity: nodes.sensitivityError },
      work: this.work(),
      discrete: { coordinates, method, path, adjoint, nodes, map },
      stepMaps: map.stepMaps.slice(),
    });
  }
}

function sameMesh(a: Float64Array, b: Float64Array): boolean {
  return a.length === b.length && a.every((value, k) => value === b[k]);
}

/**
 * A guess of the orbit at a parameter value from up to four orbits at other values on the same mesh,
 * by polynomial extrapolation; fewer are used where meshes differ.
 *
 * @param orbits nearest last, at least one
 * @param at parameter values of the orbits and the value wanted, in any one unit
 */
export function extrapolateOrbits(
  orbits: readonly Orbit[],
  at: { readonly values: readonly number[]; readonly wanted: number },
): OrbitGuess {
  const neighbour = orbits[orbits.length - 1];
  if (!neighbour || at.values.length !== orbits.length) {
    throw new TypeError(
      `Cannot extrapolate orbits: as many values as orbits are needed, at least one, found ${orbits.length} orbits and ${at.values.length} values`,
    );
  }
  const usable: { path: Path; value: number }[] = [];
  for (let k = orbits.length - 1; k >= 0 && usable.length < EXTRAPOLATED; k--) {
    const { path } = orbits[k]!.discrete;
    if (!sameMesh(path.mesh, neighbour.discrete.path.mesh)) break;
    usable.push({ path, value: at.values[k]! });
  }
  const weights = usable.map((own, j) =>
    usable.reduce(
      (product, other, k) =>
        k === j ? product : product * (at.wanted - other.value) / (own.value - other.value),
      1,
    )
  );
  const combine = (read: (path: Path) => Float64Array) => {
    const sum = new Float64Array(read(neighbour.discrete.path).length);
    usable.forEach(({ path }, k) => {
      const values = read(path);
      const weight = weights[k]!;
      for (let i = 0; i < sum.length; i++) sum[i]! += weight * values[i]!;
    });
    return sum;
  };
  return {
    status: "guess",
    neighbour,
    path: {
      mesh: neighbour.discrete.path.mesh,
      stages: combine((path) => path.stages),
      charges: combine((path) => path.charges),
      period: usable.reduce((sum, { path }, k) => sum + weights[k]! * path.period, 0),
    },
  };
}
