import type { GaussMethod } from "../numeric/gauss.ts";
import type { ChargeCoordinates } from "./charge_coordinates.ts";
import { moveToMesh, spreadMesh } from "./mesh.ts";
import { type DefectRule, defectRule, nodeValues } from "./node_values.ts";
import { Orbit, type OrbitResult, type Work } from "./orbit.ts";
import { orbitFailure } from "./orbit_failure.ts";
import { type Path, PeriodMap } from "./period_map.ts";

/** The sensitivity may be this many times less accurate than the period. */
const SENSITIVITY_ALLOWANCE = 100;
const MOST_STEPS = 6000;
const NEWTON_PASSES = 24;
/** Full passes in a row whose update did not shrink before giving up. */
const STALLED_PASSES = 5;
/** Longest Newton update of a scaled state. */
const NEWTON_BOUND = 0.5;
/**
 * A full pass whose update is below this multiple of the tolerance may end the iteration: it has
 * linearised near the orbit, and its update leaves the square of itself.
 */
const LINEARISED_WITHIN = 10;
/** Below this tolerance the iteration goes on to rounding, so that the adjoint is that of the orbit. */
const TIGHT = 1e-9;
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

/**
 * Fewest steps of a mesh.
 *
 * @internal
 */
export const FEWEST_STEPS = 16;

/**
 * What a search goes by.
 *
 * @internal
 */
export interface SearchSettings {
  readonly method: GaussMethod;
  readonly tolerance: number;
  readonly steps: number | undefined;
  readonly period: number | undefined;
  readonly transientSteps: number;
}

/**
 * Newton and mesh refinement for one system; keeps count of the work.
 *
 * @internal
 */
export class OrbitSearch {
  readonly #coordinates: ChargeCoordinates;
  readonly #settings: SearchSettings;
  #map: PeriodMap | undefined;
  readonly #rule: DefectRule;
  #passes = 0;
  #factorizations = 0;
  transientSteps = 0;
  history: number[] = [];

  constructor(coordinates: ChargeCoordinates, settings: SearchSettings) {
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
        return orbitFailure("no convergence", "the cycle has too few steps to begin with", {
          work: this.work(),
        });
      }
      path = moveToMesh(path, mesh, { method, n, r });
    }
    const tooGood = kept ? TOO_GOOD_KEPT : TOO_GOOD;
    let refined = false;
    for (let round = 1;; round++) {
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
      if (next > MOST_STEPS || round === MESH_ROUNDS) {
        return orbitFailure(
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
  }

  #newton(begin: Path): OrbitResult {
    const { method, tolerance } = this.#settings;
    const steps = begin.mesh.length - 1;
    if (!this.#map || this.#map.steps !== steps || this.#map.method !== method) {
      this.#map = new PeriodMap(this.#coordinates, method, steps);
    }
    const map = this.#map;
    map.load(begin, this.#coordinates);
    const near = LINEARISED_WITHIN * tolerance;
    const target = tolerance < TIGHT ? ROUNDING : near;
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
        return orbitFailure(
          "no convergence",
          "the equations cannot be evaluated on Newton's path",
          {
            history: this.history,
            work: this.work(),
          },
        );
      }
      const update = map.update(NEWTON_BOUND);
      const size = Math.max(update.state, update.period);
      this.history.push(size);
      if (!(size < Infinity && map.period > 0)) break;
      // An update that no longer shrinks is rounding, which a stiff system amplifies.
      const shrinks = size < smallest / 2;
      if (!reuse && (size < target || (size < near && !shrinks))) {
        return this.#finish(map, residual);
      }
      stalled = size < smallest ? 0 : stalled + 1;
      if (stalled >= STALLED_PASSES) break;
      smallest = Math.min(smallest, size);
      // What a full pass leaves is about its update squared; where that is still too much and one
      // pass with the same factors mends it, the factors are reused.
      reuse = !reuse && size ** 2 > target && size ** 3 < target;
    }
    return orbitFailure("no convergence", "Newton did not converge on a closed path", {
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
      return orbitFailure("no convergence", "no state at a mesh point satisfies the equations", {
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
