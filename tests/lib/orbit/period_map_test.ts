import { assert, assertClose } from "../../assert.ts";
import { GaussStepper } from "../../../lib/orbit/gauss_step.ts";
import { odeSystem } from "../../../lib/orbit/ode_system.ts";
import type { Orbit } from "../../../lib/orbit/orbit.ts";
import { phaseSensitivity } from "../../../lib/orbit/phase_sensitivity.ts";
import { orbitOf, rossler, vanDerPol } from "./_systems.ts";

/** One turn of the discrete map by single steps, from scaled charges, with any period. */
function turn(orbit: Orbit, start: Float64Array, { period = orbit.period } = {}): Float64Array {
  const { coordinates, method, path } = orbit.discrete;
  const { n } = coordinates;
  const stepper = new GaussStepper(coordinates, method);
  const y = start.slice();
  for (let step = 0; step < orbit.steps; step++) {
    const from = step * method.stages * n;
    stepper.stages.set(path.stages.subarray(from, from + method.stages * n));
    const h = period * (path.mesh[step + 1]! - path.mesh[step]!);
    // A correction that rounding keeps above the tolerance is as good.
    stepper.solve(y, { h, tolerance: 1e-15 });
    stepper.advance(y, { h, end: y });
  }
  return y;
}

const CASES = [
  { name: "van der Pol, 20 steps of two stages", example: vanDerPol(1), steps: 20, stages: 2 },
  { name: "van der Pol, 40 steps of three stages", example: vanDerPol(1), steps: 40, stages: 3 },
  {
    name: "Rossler, 30 steps of two stages",
    example: rossler({ a: 0.2, b: 0.2, c: 2.5 }),
    steps: 30,
    stages: 2,
  },
] as const;

for (const { name, example: { system, start }, steps, stages } of CASES) {
  const options = { start, steps, stages, tolerance: 1e-13 };

  Deno.test(`PeriodMap: the path is a fixed point of the map of its own steps: ${name}`, () => {
    const orbit = orbitOf(system, options);
    const y = orbit.discrete.path.charges.slice(0, system.dimension);
    const size = Math.max(...y.map(Math.abs));
    assertClose(turn(orbit, y), y, { rtol: 0, atol: 1e-12 * size });
  });

  Deno.test(`PeriodMap: monodromy and adjoint are derivatives of this very map: ${name}`, () => {
    const orbit = orbitOf(system, options);
    const n = system.dimension;
    const { path, adjoint, map } = orbit.discrete;
    const y = path.charges.slice(0, n);
    const slope = (along: (step: number) => Float64Array, h: number) => {
      const central = (step: number) => {
        const [above, below] = [along(step), along(-step)];
        return above.map((value, i) => (value - below[i]!) / (2 * step));
      };
      const [coarse, fine] = [central(h), central(h / 2)];
      return fine.map((value, i) => (4 * value - coarse[i]!) / 3);
    };
    const w = adjoint.nodes.slice(steps * n);
    const first = adjoint.nodes.slice(0, n);
    const largest = Math.max(...first.map(Math.abs));
    for (let j = 0; j < n; j++) {
      const column = slope((step) => turn(orbit, y.map((v, i) => v + (i === j ? step : 0))), 2e-3);
      for (let i = 0; i < n; i++) {
        assertClose(map.monodromy[i * n + j]!, column[i]!, { rtol: 1e-8, atol: 1e-8 });
      }
      // Swept back over the period the adjoint is the one at the start, to differences of h^4 and rounding.
      const back = column.reduce((sum, value, i) => sum + w[i]! * value, 0);
      assertClose(back, first[j]!, { rtol: 0, atol: 1e-9 * largest });
    }
    // Its scale: a longer period by dT carries the end forward by w . (dy/dT) dT = dT.
    const end = slope((step) => turn(orbit, y, { period: orbit.period + step }), 2e-3);
    assertClose(end.reduce((sum, value, i) => sum + w[i]! * value, 0), 1, { rtol: 1e-9, atol: 0 });
  });
}

Deno.test("PeriodMap: the adjoint closes over the period as the map's translation does", () => {
  // On a refined mesh the sensitivity returns to itself; that is the left vector on the multiplier 1.
  const { system, start } = vanDerPol(1);
  const closures = [1e-6, 1e-9, 1e-12].map((tolerance) => {
    const orbit = orbitOf(system, { start, tolerance });
    assert(orbit.estimate.sensitivity >= orbit.discrete.adjoint.closure);
    return orbit.discrete.adjoint.closure;
  });
  assert(closures[2]! < 1e-10, `${closures}`);
  const orbit = orbitOf(system, { start, tolerance: 1e-12 });
  const { at } = phaseSensitivity(orbit);
  assertClose(at(orbit.period * (1 - 1e-9)), at(0), { rtol: 1e-6, atol: 1e-7 });
});

Deno.test("PeriodMap: a full pass allocates nothing per step", () => {
  // Van der Pol's equation again, written so that it allocates nothing itself.
  const system = odeSystem({
    dimension: 2,
    flow: (x, into) => {
      into[0] = x[1]!;
      into[1] = (1 - x[0]! * x[0]!) * x[1]! - x[0]!;
    },
    jacobian: (x, into) => {
      into[0] = 0;
      into[1] = 1;
      into[2] = -2 * x[0]! * x[1]! - 1;
      into[3] = 1 - x[0]! * x[0]!;
    },
  });
  const steps = 80;
  const { map } = orbitOf(system, { start: Float64Array.of(2, 0), steps }).discrete;
  const passes = 1000;
  // Compiled code first; what is left is a few objects a pass, whatever the number of steps.
  for (let k = 0; k < 2 * passes; k++) map.linearise();
  const before = Deno.memoryUsage().heapUsed;
  for (let k = 0; k < passes; k++) map.linearise();
  const perStep = (Deno.memoryUsage().heapUsed - before) / (passes * steps);
  assert(perStep < 24, `${perStep} bytes a step`);
});
