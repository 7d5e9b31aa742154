/**
 * Oscillators of chemistry, nerve and chaos theory against an integrator the project did not write: the
 * period by integration alone, the orbit closed under it, and the sensitivity by displaced motions.
 */
import { assert, assertClose } from "../assert.ts";
import { integrate, measuredSensitivity, referencePeriod } from "../reference/integrate.ts";
import {
  brusselator,
  type Example,
  fitzHughNagumo,
  orbitOf,
  repressilator,
  rossler,
} from "../lib/orbit/_systems.ts";
import { phaseSensitivity } from "../../lib/orbit/phase_sensitivity.ts";

const CASES: readonly {
  readonly name: string;
  readonly example: Example;
  /** Time until the motion has settled to rounding. */
  readonly settle: number;
}[] = [
  { name: "Brusselator", example: brusselator(), settle: 60 },
  { name: "FitzHugh-Nagumo", example: fitzHughNagumo(), settle: 400 },
  { name: "repressilator", example: repressilator(), settle: 1500 },
  { name: "Rossler, one loop", example: rossler({ a: 0.2, b: 0.2, c: 2.5 }), settle: 900 },
];

for (const { name, example, settle } of CASES) {
  Deno.test(`${name}: period by integration alone, and a return to the same state`, () => {
    const { system, start, flow } = example;
    const { period } = referencePeriod(flow, start, { settle });
    const orbit = orbitOf(system, { start, tolerance: 1e-11 });
    // What remains of the transient after `settle`, and the integrator's own 1e-13 a step, stay below.
    assertClose(orbit.period, period, { rtol: 1e-10, atol: 0, what: "period" });
    const first = orbit.at(0);
    const back = integrate(flow, first, { duration: orbit.period });
    const size = Math.max(...first.map(Math.abs));
    assertClose(back, first, { rtol: 0, atol: 1e-8 * size, what: "state after one period" });
    // The orbit follows the integrator between its ends too.
    for (const part of [0.137, 0.5, 0.811]) {
      const there = integrate(flow, first, { duration: part * orbit.period });
      assertClose(orbit.at(part * orbit.period), there, { rtol: 0, atol: 1e-8 * size });
    }
  });

  Deno.test(`${name}: sensitivity as measured by displaced motions`, () => {
    const { system, start, flow } = example;
    const orbit = orbitOf(system, { start, tolerance: 1e-10 });
    const sensitivity = phaseSensitivity(orbit);
    const second = orbit.exponents[1]!.re;
    assert(second < 0);
    // Until a displacement across the motion has died out to 1e-11 of itself.
    const cycles = Math.ceil(25 / (-second * orbit.period));
    const rows = new Float64Array(system.dimension);
    const time = 0.31 * orbit.period;
    const v = sensitivity.at(time);
    const state = orbit.at(time);
    const scale = system.scale ?? rows.map(() => 1);
    for (const row of [0, system.dimension - 1]) {
      const measured = measuredSensitivity(flow, state, {
        row,
        size: 1e-3 * scale[row]!,
        settle: cycles * orbit.period,
      });
      // Displacement of 1e-3 with the error of order h^4 left, the integrator's 1e-13 over it.
      const largest = Math.max(...v.map(Math.abs));
      assertClose(v[row]!, measured, { rtol: 0, atol: 1e-6 * largest, what: `row ${row}` });
    }
  });
}
