/**
 * One orbit with its sensitivity against the usual script: settle by time stepping with a library
 * integrator, find the period from crossings, then displace each state at 16 phases and settle again.
 * A tank with Q = 10 and a tanh conductor of loop gain 3; both to about 1e-8.
 */
import { Solver } from "odex";
import { findEquilibrium } from "../../../lib/orbit/equilibrium.ts";
import { findOrbit } from "../../../lib/orbit/find_orbit.ts";
import { odeSystem } from "../../../lib/orbit/ode_system.ts";
import { phaseSensitivity } from "../../../lib/orbit/phase_sensitivity.ts";
import { Orbit } from "../../../lib/orbit/orbit.ts";

const QUALITY = 10;
const GAIN = 3;
const SETTLING_CYCLES = 60;
const PHASES = 16;
const DISPLACEMENT = 1e-4;

const system = odeSystem({
  dimension: 2,
  flow: (x, into) => {
    const [v = 0, i = 0] = x;
    into[0] = -i + (GAIN * Math.tanh(v) - v) / QUALITY;
    into[1] = v;
  },
  jacobian: (x, into) => {
    const slope = 1 - Math.tanh(x[0] ?? 0) ** 2;
    into[0] = (GAIN * slope - 1) / QUALITY;
    into[1] = -1;
    into[2] = 1;
    into[3] = 0;
  },
});

/** Integrates from a state and returns the times at which the voltage rises through zero. */
function crossings(from: readonly number[], until: number): number[] {
  const solver = new Solver(2);
  solver.absoluteTolerance = solver.relativeTolerance = 1e-10;
  solver.maxSteps = 100_000;
  const found: number[] = [];
  let [timeBefore, before] = [0, from[0] ?? 0];
  let rateBefore = 0;
  const flow = (_t: number, [v = 0, i = 0]: number[]) => [
    -i + (GAIN * Math.tanh(v) - v) / QUALITY,
    v,
  ];
  solver.solve(flow, 0, [...from], until, (_step, _start, time, y) => {
    const after = y[0] ?? 0;
    const [rate = 0] = flow(time, y);
    if (before < 0 && after >= 0 && time > timeBefore) {
      // Cubic through both ends, inverted by bisection.
      const h = time - timeBefore;
      const at = (p: number) =>
        before * (1 + 2 * p) * (1 - p) ** 2 + rateBefore * h * p * (1 - p) ** 2 +
        after * p * p * (3 - 2 * p) + rate * h * p * p * (p - 1);
      let [low, high] = [0, 1];
      for (let k = 0; k < 50; k++) {
        const middle = (low + high) / 2;
        if (at(middle) < 0) low = middle;
        else high = middle;
      }
      found.push(timeBefore + h * high);
    }
    [timeBefore, before, rateBefore] = [time, after, rate];
  });
  return found;
}

function usualScript(): number {
  const settled = crossings([1, 0], 2 * Math.PI * SETTLING_CYCLES);
  const [last = NaN, previous = NaN] = settled.slice(-2).reverse();
  const period = last - previous;
  for (let phase = 0; phase < PHASES; phase++) {
    for (const displaced of [0, 1]) {
      const start = [1 + (displaced === 0 ? DISPLACEMENT : 0), displaced === 1 ? DISPLACEMENT : 0];
      crossings(start, period * (SETTLING_CYCLES / 2));
    }
  }
  return period;
}

Deno.bench(
  "orbit and sensitivity from the equilibrium",
  { group: "tank, Q = 10", baseline: true },
  () => {
    const orbit = findOrbit(system, { start: findEquilibrium(system) });
    if (!(orbit instanceof Orbit)) throw new RangeError(orbit.reason);
    phaseSensitivity(orbit);
  },
);

Deno.bench("settle with a library integrator, then displace", { group: "tank, Q = 10" }, () => {
  usualScript();
});
