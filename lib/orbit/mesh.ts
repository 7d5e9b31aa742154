import { lagrangeBasis } from "../numeric/gauss.ts";
import type { GaussMethod } from "../numeric/gauss.ts";
import type { Path } from "./period_map.ts";

/** Part of the mean error density that every step carries: keeps the mesh from starving smooth parts. */
const EVENNESS = 0.1;
/** Neighbouring steps may differ by about this part of their length. */
const GRADING = 0.2;
/** Mesh points used to interpolate charges onto a new mesh. */
const CHARGE_POINTS = 6;

/**
 * A mesh of `steps` steps on which the local error is spread evenly.
 *
 * @param localError local error of each step of the present mesh, shape (steps,)
 * @param order order of the local error in the step length
 * @see C. de Boor, in Lecture Notes in Mathematics 363 (1974) 12; Ascher, Mattheij, Russell ch. 9
 *
 * @internal
 */
export function spreadMesh(
  mesh: Float64Array,
  localError: Float64Array,
  { steps, order }: { steps: number; order: number },
): Float64Array {
  const present = mesh.length - 1;
  const density = new Float64Array(present);
  const length = (k: number) => mesh[k + 1]! - mesh[k]!;
  for (let k = 0; k < present; k++) density[k] = localError[k]! ** (1 / order) / length(k);
  const mean = density.reduce((sum, value, k) => sum + value * length(k), 0);
  const floor = mean > 0 ? EVENNESS * mean : 1;
  for (let k = 0; k < present; k++) density[k]! += floor;
  // Steps grow no faster than the grading, twice around in both directions.
  const unit = density.reduce((sum, value, k) => sum + value * length(k), 0) / steps;
  const grade = (from: number, to: number) => {
    const longest = unit / density[from]! + GRADING * length(to);
    density[to] = Math.max(density[to]!, unit / longest);
  };
  for (let k = 0; k < 2 * present; k++) grade(k % present, (k + 1) % present);
  for (let k = 2 * present; k > 0; k--) grade(k % present, (k - 1) % present);
  const total = new Float64Array(present + 1);
  for (let k = 0; k < present; k++) total[k + 1] = total[k]! + density[k]! * length(k);
  const spread = new Float64Array(steps + 1);
  let k = 0;
  for (let i = 1; i < steps; i++) {
    const target = total[present]! * i / steps;
    while (total[k + 1]! < target) k++;
    const part = (target - total[k]!) / (total[k + 1]! - total[k]!);
    spread[i] = mesh[k]! + part * (mesh[k + 1]! - mesh[k]!);
  }
  spread[steps] = 1;
  return spread;
}

/**
 * The path on another mesh, by local polynomials: a start for Newton, not a result.
 *
 * @internal
 */
export function moveToMesh(
  path: Path,
  mesh: Float64Array,
  { method, n, r }: { method: GaussMethod; n: number; r: number },
): Path {
  const s = method.stages;
  const old = path.mesh;
  const oldSteps = old.length - 1;
  const steps = mesh.length - 1;
  const stages = new Float64Array(steps * s * n);
  const charges = new Float64Array((steps + 1) * r);
  // Stage states: the step's own stages, the one before and the one after.
  const points = new Float64Array(s + 2);
  const interpolateStage = (time: number, step: number, out: number) => {
    const at = (index: number) => {
      const turns = Math.floor(index / (oldSteps * s));
      const inside = index - turns * oldSteps * s;
      const k = Math.floor(inside / s);
      const length = old[k + 1]! - old[k]!;
      return { inside, time: old[k]! + method.nodes[inside % s]! * length + turns };
    };
    const entries = Array.from(points, (_, k) => at(step * s - 1 + k));
    entries.forEach((entry, k) => points[k] = entry.time);
    const basis = lagrangeBasis(points, time);
    entries.forEach((entry, k) => {
      for (let j = 0; j < n; j++) {
        stages[out + j]! += basis[k]! * path.stages[entry.inside * n + j]!;
      }
    });
  };
  const chargePoints = new Float64Array(CHARGE_POINTS);
  const interpolateCharge = (time: number, step: number, out: number) => {
    const indices = Array.from(chargePoints, (_, k) => step - CHARGE_POINTS / 2 + 1 + k);
    indices.forEach((index, k) => {
      const turns = Math.floor(index / oldSteps);
      chargePoints[k] = old[index - turns * oldSteps]! + turns;
    });
    const basis = lagrangeBasis(chargePoints, time);
    indices.forEach((index, k) => {
      const from = ((index % oldSteps) + oldSteps) % oldSteps * r;
      for (let i = 0; i < r; i++) charges[out + i]! += basis[k]! * path.charges[from + i]!;
    });
  };
  let place = 0;
  for (let step = 0; step < steps; step++) {
    while (place < oldSteps - 1 && old[place + 1]! <= mesh[step]!) place++;
    interpolateCharge(mesh[step]!, place, step * r);
    let inside = place;
    for (let j = 0; j < s; j++) {
      const time = mesh[step]! + method.nodes[j]! * (mesh[step + 1]! - mesh[step]!);
      while (inside < oldSteps - 1 && old[inside + 1]! <= time) inside++;
      interpolateStage(time, inside, (step * s + j) * n);
    }
  }
  for (let i = 0; i < r; i++) charges[steps * r + i] = charges[i]!;
  return { mesh, stages, charges, period: path.period };
}
