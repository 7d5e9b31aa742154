import { assert, assertClose, assertEquals } from "../../assert.ts";
import { findOrbit } from "../../../lib/orbit/find_orbit.ts";
import { Orbit } from "../../../lib/orbit/orbit.ts";
import { stableOrbit } from "../../../lib/orbit/orbit_stability.ts";
import {
  bautin,
  orbitOf,
  repressilator,
  rossler,
  stuartLandau,
  tanhOscillator,
  vanDerPol,
} from "./_systems.ts";

Deno.test("stableOrbit() lets stable orbits pass, also ones that barely attract", () => {
  const cases = [
    vanDerPol(5),
    repressilator(),
    rossler({ a: 0.2, b: 0.2, c: 2.5 }),
    tanhOscillator({ quality: 100, gain: 3 }),
    // A second multiplier of 0.9987: an attraction of 2e-4 per unit time.
    stuartLandau({ growth: 1e-4, frequency: 1, damping: 1e-4, shear: 0 }),
  ];
  for (const { system, start } of cases) {
    const orbit = orbitOf(system, { start });
    assertEquals(stableOrbit(orbit), orbit);
  }
});

Deno.test("stableOrbit() names the second multiplier of an orbit that doubles its period", () => {
  // Past the first doubling of Rossler's family (c near 2.83, from memory) the orbit of one loop goes on
  // with a multiplier below -1.
  let start: Orbit | Float64Array = rossler({ a: 0.2, b: 0.2, c: 2.5 }).start;
  let failure: ReturnType<typeof findOrbit> | undefined;
  for (const c of [2.5, 2.6, 2.7, 2.8, 2.9, 3]) {
    const result = findOrbit(rossler({ a: 0.2, b: 0.2, c }).system, { start });
    if (result instanceof Orbit) {
      start = result;
      assert(c < 2.85, `no doubling yet at c = ${c}`);
      continue;
    }
    assertEquals(result.status, "unstable");
    assert(c > 2.8, `unstable already at c = ${c}`);
    failure = result;
    start = result.orbit!;
  }
  assert(failure && !(failure instanceof Orbit));
  const largest = failure.orbit!.multipliers[0]!;
  assert(largest.re < -1 && Math.abs(largest.im) < 1e-9);
  assert(failure.reason.includes(Math.abs(largest.re).toPrecision(4)), failure.reason);
});

Deno.test("stableOrbit() refuses the inner cycle of a pair", () => {
  const square = (1 - Math.sqrt(1 - 4 * 0.2)) / 2;
  const inner = orbitOf(
    stuartLandau({ growth: square, frequency: 2, damping: 1, shear: 0 }).system,
    { start: Float64Array.of(Math.sqrt(square), 0) },
  );
  const result = findOrbit(bautin({ growth: -0.2, frequency: 2 }).system, { start: inner });
  assert(!(result instanceof Orbit) && result.orbit);
  const again = stableOrbit(result.orbit);
  assert(!(again instanceof Orbit));
  assertEquals(again.status, "unstable");
  const slope = -0.2 + 3 * square - 5 * square ** 2;
  assertClose(result.orbit.exponents[0]!.re, slope, { rtol: 1e-7, atol: 0 });
});
