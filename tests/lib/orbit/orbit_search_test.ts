import { assert, assertClose } from "../../assert.ts";
import { FEWEST_STEPS } from "../../../lib/orbit/orbit_search.ts";
import { fitzHughNagumo, orbitOf, stuartLandau, vanDerPol } from "./_systems.ts";

Deno.test("OrbitSearch: tighter tolerances take more steps, at the method's order", () => {
  const { system, start } = vanDerPol(5);
  const tolerances = [1e-4, 1e-6, 1e-8, 1e-10, 1e-12];
  const orbits = tolerances.map((tolerance) => orbitOf(system, { start, tolerance }));
  orbits.forEach((orbit, k) => {
    const tolerance = tolerances[k]!;
    assert(orbit.estimate.period <= tolerance);
    assert(orbit.estimate.sensitivity <= 100 * tolerance);
    // The true error keeps the tolerance too.
    assertClose(orbit.period, 11.612230667719570034, { rtol: tolerance, atol: 0 });
    if (k > 0) assert(orbit.steps >= orbits[k - 1]!.steps);
  });
  // Order six: a factor of 1e4 in the tolerance is a factor of 4.6 in the steps, less what the looser one
  // overshot, at most twice that.
  const ratio = orbits[4]!.steps / orbits[2]!.steps;
  assert(ratio > 1.5 && ratio < 9.2, `ratio ${ratio}`);
});

Deno.test("OrbitSearch: the mesh is dense where the motion is fast", () => {
  const { system, start } = fitzHughNagumo();
  const orbit = orbitOf(system, { start });
  const { mesh } = orbit.discrete.path;
  const lengths = Array.from({ length: orbit.steps }, (_, k) => mesh[k + 1]! - mesh[k]!);
  assert(Math.max(...lengths) > 3 * Math.min(...lengths));
  // The fastest step lies where |v'| is largest.
  const { states } = orbit.samples;
  const speed = (k: number) => {
    const [v, w] = [states[2 * k]!, states[2 * k + 1]!];
    return Math.abs(v - v ** 3 / 3 - w + 0.5);
  };
  const shortest = lengths.indexOf(Math.min(...lengths));
  const speeds = lengths.map((_, k) => speed(k));
  assert(speed(shortest) > 0.1 * Math.max(...speeds));
});

Deno.test("OrbitSearch: a smooth orbit at a loose tolerance takes few steps, never below the fewest", () => {
  const { system, start } = stuartLandau({ growth: 1, frequency: 5, damping: 1, shear: 0 });
  const orbit = orbitOf(system, { start, tolerance: 1e-3 });
  assert(orbit.steps >= FEWEST_STEPS && orbit.steps < 40, `${orbit.steps} steps`);
});
