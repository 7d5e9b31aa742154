import { assert, assertClose, assertEquals } from "../../assert.ts";
import { rangeOf } from "../../../lib/orbit/node_values.ts";
import { phaseSensitivity } from "../../../lib/orbit/phase_sensitivity.ts";
import {
  brusselator,
  type Example,
  fitzHughNagumo,
  orbitOf,
  repressilator,
  tanhOscillator,
  vanDerPol,
} from "./_systems.ts";

Deno.test("rangeOf() is largest less smallest of each charge", () => {
  assertEquals(Array.from(rangeOf(Float64Array.of(1, 5, -2, 5, 0, 7), 2, 3)), [3, 2]);
});

const EXAMPLES: readonly (readonly [string, Example])[] = [
  ["van der Pol", vanDerPol(1)],
  ["tank", tanhOscillator({ quality: 3, gain: 3 })],
  ["Brusselator", brusselator()],
  ["FitzHugh-Nagumo", fitzHughNagumo()],
  ["repressilator", repressilator()],
];

for (const [name, { system, start }] of EXAMPLES) {
  Deno.test(`the estimate of the period is above its error and not idle: ${name}`, () => {
    const exact = orbitOf(system, { start, tolerance: 1e-13, stages: 4 });
    for (const stages of [2, 3, 4]) {
      for (const tolerance of [1e-5, 1e-7, 1e-9, 1e-11]) {
        const orbit = orbitOf(system, { start, tolerance, stages });
        const error = Math.abs(orbit.period / exact.period - 1);
        const { period: estimate } = orbit.estimate;
        // Rounding of a thousand steps.
        const floor = 2e-13;
        const what = `${stages} stages, ${tolerance}: error ${error}, estimate ${estimate}`;
        assert(error <= estimate + floor, what);
      }
    }
  });

  Deno.test(`the estimate of the period follows its error on fixed meshes: ${name}`, () => {
    const exact = orbitOf(system, { start, tolerance: 1e-13, stages: 4 });
    const mesh = orbitOf(system, { start, tolerance: 1e-6, stages: 3 });
    for (const factor of [1.5, 2]) {
      const steps = Math.round(factor * mesh.steps);
      const orbit = orbitOf(system, { start, period: exact.period, steps, tolerance: 1e-12 });
      const error = Math.abs(orbit.period / exact.period - 1);
      const { period: estimate } = orbit.estimate;
      // Leading-order estimates meet the error; a factor of 30 leaves room for accidental cancellation.
      assert(
        estimate <= 30 * error + 1e-12,
        `${steps} steps: error ${error}, estimate ${estimate}`,
      );
    }
  });

  Deno.test(`the sensitivity's error keeps 100 times the tolerance: ${name}`, () => {
    const exact = phaseSensitivity(orbitOf(system, { start, tolerance: 1e-12, stages: 4 }));
    for (const stages of [2, 3, 4]) {
      const orbit = orbitOf(system, { start: exact.orbit, tolerance: 1e-7, stages });
      const found = phaseSensitivity(orbit);
      // Compare at equal phase: the orbits start at points a little apart along the motion.
      const there = orbit.at(0);
      let shift = 0;
      for (let round = 0; round < 5; round++) {
        const from = exact.orbit.at(shift);
        shift += exact.at(shift).reduce((sum, v, i) => sum + v * (there[i]! - from[i]!), 0);
      }
      let error = 0;
      const largest = new Float64Array(system.dimension);
      for (let k = 0; k < 60; k++) {
        const time = k * orbit.period / 60;
        const reference = exact.at(shift + time * exact.orbit.period / orbit.period);
        found.at(time).forEach((value, i) => {
          error = Math.max(error, Math.abs(value - reference[i]!) * (system.scale?.[i] ?? 1));
          largest[i] = Math.max(largest[i]!, Math.abs(reference[i]!) * (system.scale?.[i] ?? 1));
        });
      }
      const relative = error / Math.max(...largest);
      // The promise of findOrbit(). The estimate itself is no bound: it sees the deviation along the motion
      // and not across it, where a fast contraction leaves up to forty times as much (FitzHugh-Nagumo).
      assert(orbit.estimate.sensitivity <= 100 * 1e-7);
      assertClose(relative, 0, { rtol: 0, atol: 100 * 1e-7, what: `${stages} stages` });
    }
  });
}
