import { type GaussMethod, gaussMethod } from "../numeric/gauss.ts";
import { ChargeCoordinates } from "./charge_coordinates.ts";
import type { Equilibrium, NoEquilibrium } from "./equilibrium.ts";
import { rangeOf } from "./node_values.ts";
import { Orbit, type OrbitFailure, type OrbitResult } from "./orbit.ts";
import { orbitFailure } from "./orbit_failure.ts";
import type { OrbitGuess } from "./orbit_guess.ts";
import { FEWEST_STEPS, OrbitSearch, type SearchSettings } from "./orbit_search.ts";
import { stableOrbit } from "./orbit_stability.ts";
import type { Path } from "./period_map.ts";
import type { OscillatorSystem } from "./system.ts";
import { Transient } from "./transient.ts";

/** Relative error of the period asked for unless the caller says otherwise. */
const DEFAULT_TOLERANCE = 1e-8;
const SMALLEST_TOLERANCE = 1e-14;
const DEFAULT_STAGES = 3;
/** An orbit must keep this part of the motion it was guessed from; less is a shrunken guess. */
const KEPT_SIZE = 0.2;
/** Growth per cycle below which a cycle is worth a Newton attempt. */
const STEADY_GROWTH = 0.1;
/** Attempts are made at the 2nd, 4th, 7th, ... steady cycle. */
const ATTEMPT_SPACING = 1.6;
const TRANSIENT_STEPS = 80_000;
/** A round that comes this close to its start, in parts of the range, has come back to it. */
const SAME_POINT = 1e-5;
const MOST_ROUNDS = 8;
/** Deflection along the unstable mode from an equilibrium, in units of the scale. */
const DEFLECTION = 0.1;
/** Steps per period of the fastest unstable mode at the start of a transient. */
const STEPS_PER_MODE = 36;

/** Options of {@linkcode findOrbit}. */
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
      return orbitFailure(
        "no equilibrium",
        `there is no equilibrium to start from: ${start.reason}`,
      );
    }
  }
  return fromTransient(system, start, settings);
}

function check(system: OscillatorSystem, options: FindOrbitOptions): SearchSettings {
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

function continueFrom(
  system: OscillatorSystem,
  path: Path,
  neighbour: Orbit,
  settings: SearchSettings,
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
  const search = new OrbitSearch(coordinates, { ...settings, method });
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
  settings: SearchSettings,
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
      return orbitFailure("settles", "the equilibrium is stable: a deflection from it dies out");
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
    return orbitFailure(
      "no convergence",
      "no state with the start's charges satisfies the equations",
    );
  }
  const { flow } = coordinates.reducedFlow(scaled);
  if (!(firstStep > 0)) {
    const rate = flow.reduce((largest, value) => Math.max(largest, Math.abs(value)), 0);
    if (!(rate > 0)) {
      return orbitFailure("settles", "the start is an equilibrium: nothing moves");
    }
    firstStep = 1e-2 / rate;
  }
  const transient = new Transient(coordinates, settings.method, {
    start: scaled,
    charges,
    firstStep,
    longestStep,
  });
  const search = new OrbitSearch(coordinates, settings);
  let last: OrbitFailure | undefined;
  let steady = 0;
  let nextAttempt = 2;
  for (;;) {
    const cycle = transient.nextCycle(settings.transientSteps);
    search.transientSteps = transient.steps;
    if (cycle.status === "at rest") {
      return orbitFailure("settles", "the motion dies out and settles at an equilibrium", {
        work: search.work(),
      });
    }
    if (cycle.status === "lost") {
      return last
        ? { ...last, work: search.work() }
        : orbitFailure("no convergence", cycle.reason, { work: search.work() });
    }
    if (!(Math.abs(cycle.growth) < STEADY_GROWTH)) continue;
    steady++;
    if (steady < nextAttempt) continue;
    nextAttempt = Math.ceil(nextAttempt * ATTEMPT_SPACING);
    const rounds = search.refine(cycle.path);
    const result = rounds instanceof Orbit ? singleRound(rounds, search) : rounds;
    if (result instanceof Orbit) {
      const size = Math.max(...rangeOf(result.discrete.path.charges, r, result.steps));
      if (!(size > KEPT_SIZE * cycle.size)) {
        last = orbitFailure("no convergence", "Newton shrank the motion towards the equilibrium", {
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

/** An orbit that goes around more than once is cut to one round and solved again. */
function singleRound(orbit: Orbit, search: OrbitSearch): OrbitResult {
  const { n, r } = orbit.discrete.coordinates;
  const { method, path } = orbit.discrete;
  const range = rangeOf(path.charges, r, orbit.steps);
  const begin = path.charges.subarray(0, r);
  const place = (part: number) => orbit.scaledAt(orbit.placeOf(part * orbit.period));
  for (let rounds = MOST_ROUNDS; rounds > 1; rounds--) {
    const { charges } = place(1 / rounds);
    const miss = charges.reduce(
      (most, value, i) => Math.max(most, Math.abs(value - begin[i]!) / range[i]!),
      0,
    );
    if (!(miss < SAME_POINT)) continue;
    const steps = Math.max(FEWEST_STEPS, Math.ceil(orbit.steps / rounds));
    const mesh = Float64Array.from({ length: steps + 1 }, (_, k) => k / steps);
    const stages = new Float64Array(steps * method.stages * n);
    const nodes = new Float64Array((steps + 1) * r);
    for (let step = 0; step < steps; step++) {
      nodes.set(place(mesh[step]! / rounds).charges, step * r);
      method.nodes.forEach((node, j) => {
        const { state } = place((mesh[step]! + node / steps) / rounds);
        stages.set(state, (step * method.stages + j) * n);
      });
    }
    nodes.copyWithin(steps * r, 0, r);
    return search.refine({ mesh, stages, charges: nodes, period: orbit.period / rounds });
  }
  return orbit;
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
