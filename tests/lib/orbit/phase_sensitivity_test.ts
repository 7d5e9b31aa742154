import { assert, assertClose, assertEquals } from "../../assert.ts";
import { measuredSensitivity } from "../../reference/integrate.ts";
import { phaseSensitivity } from "../../../lib/orbit/phase_sensitivity.ts";
import type { Orbit } from "../../../lib/orbit/orbit.ts";
import {
  brusselator,
  type Example,
  fitzHughNagumo,
  orbitOf,
  repressilator,
  rossler,
  stuartLandau,
  tanhOscillator,
  vanDerPol,
} from "./_systems.ts";

/** Largest |v1 . flow - 1| at times that are no mesh points. */
function deviation(orbit: Orbit, { flow }: Example): number {
  const sensitivity = phaseSensitivity(orbit);
  const rate = new Float64Array(orbit.system.dimension);
  let largest = 0;
  for (let k = 0; k < 97; k++) {
    const time = (k + 0.377) * orbit.period / 97;
    flow(orbit.at(time), rate);
    const v = sensitivity.at(time);
    largest = Math.max(largest, Math.abs(v.reduce((sum, x, i) => sum + x * rate[i]!, -1)));
  }
  return largest;
}

const EXAMPLES: Readonly<Record<string, Example>> = {
  "van der Pol, 0.1": vanDerPol(0.1),
  "van der Pol, 1": vanDerPol(1),
  "van der Pol, 5": vanDerPol(5),
  "tank, Q 10": tanhOscillator({ quality: 10, gain: 3 }),
  "Stuart-Landau": stuartLandau({ growth: 1, frequency: 5, damping: 1, shear: 0.7 }),
  "Brusselator": brusselator(),
  "FitzHugh-Nagumo": fitzHughNagumo(),
  "repressilator": repressilator(),
  "Rossler": rossler({ a: 0.2, b: 0.2, c: 2.5 }),
};

for (const [name, example] of Object.entries(EXAMPLES)) {
  Deno.test(`phaseSensitivity() of ${name}: v1 . dx/dt is 1 at any time, within the estimate`, () => {
    const plain = orbitOf(example.system, { start: example.start });
    const error = deviation(plain, example);
    assert(plain.estimate.sensitivity <= 1e-6, `estimate ${plain.estimate.sensitivity}`);
    assert(error <= plain.estimate.sensitivity, `${error} above ${plain.estimate.sensitivity}`);
    const tight = orbitOf(example.system, { start: example.start, tolerance: 1e-12 });
    assert(deviation(tight, example) < 1e-9, `${deviation(tight, example)} when tightened`);
  });
}

/** Systems whose displaced motions settle within a few periods. */
const MEASURED = [
  { name: "van der Pol, 1", cycles: 5, size: 1e-3 },
  { name: "Stuart-Landau", cycles: 12, size: 1e-3 },
  { name: "Brusselator", cycles: 4, size: 1e-3 },
] as const;

for (const { name, cycles, size } of MEASURED) {
  Deno.test(`phaseSensitivity() of ${name} is the time shift that displaced motions keep`, () => {
    const { system, start, flow } = EXAMPLES[name]!;
    const orbit = orbitOf(system, { start, tolerance: 1e-12 });
    const sensitivity = phaseSensitivity(orbit);
    for (const part of [0.05, 0.42, 0.77]) {
      const time = part * orbit.period;
      const v = sensitivity.at(time);
      const measured = [0, 1].map((row) =>
        measuredSensitivity(flow, orbit.at(time), { row, size, settle: cycles * orbit.period })
      );
      // Error of order size^4 after one extrapolation, and 1e-13 of integration over the size.
      const largest = Math.max(...v.map(Math.abs));
      assertClose(v, measured, { rtol: 0, atol: 1e-7 * largest });
    }
  });
}

Deno.test("phaseSensitivity().samples are its values at the mesh points", () => {
  const { system, start } = fitzHughNagumo();
  const sensitivity = phaseSensitivity(orbitOf(system, { start }));
  const { times } = sensitivity.orbit.samples;
  times.forEach((time, k) => {
    const v = sensitivity.samples.slice(2 * k, 2 * k + 2);
    const largest = Math.max(...sensitivity.samples.map(Math.abs));
    assertClose(sensitivity.at(time), v, { rtol: 0, atol: 1e-9 * largest });
  });
});

Deno.test("phaseSensitivity().quadrature are its values at the quadrature points, to stage order", () => {
  const { system, start } = vanDerPol(1);
  const orbit = orbitOf(system, { start, tolerance: 1e-12 });
  const sensitivity = phaseSensitivity(orbit);
  assertEquals(sensitivity.quadrature.length, 2 * orbit.quadrature.count);
  let worst = 0;
  for (let k = 0; k < orbit.quadrature.count; k += 7) {
    const v = sensitivity.at(orbit.quadrature.times[k]!);
    const stage = sensitivity.quadrature.slice(2 * k, 2 * k + 2);
    worst = Math.max(worst, Math.abs(v[0]! - stage[0]!), Math.abs(v[1]! - stage[1]!));
  }
  // Stages have order 3 only: 1e-12 of the sixth order is 1e-6 here.
  assert(worst < 1e-6, `${worst}`);
});

Deno.test("phaseSensitivity() is periodic", () => {
  const { system, start } = brusselator();
  const orbit = orbitOf(system, { start, tolerance: 1e-11 });
  const { at } = phaseSensitivity(orbit);
  for (const part of [0, 0.2, 0.9]) {
    const v = at(part * orbit.period);
    assertClose(at((part + 2) * orbit.period), v, { rtol: 1e-9, atol: 1e-10 });
  }
});
