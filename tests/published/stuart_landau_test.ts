/**
 * The normal form of an oscillator, z' = (lambda + i w0) z - (a + i b) |z|^2 z, whose orbit, isochrons and
 * phase sensitivity are known in closed form: Y. Kuramoto, Chemical Oscillations, Waves and Turbulence
 * (1984); J. Guckenheimer, J. Math. Biol. 1 (1975) 259 (both from memory; every formula follows by
 * differentiating the phase angle - (b/a) ln r).
 */
import { assert, assertClose } from "../assert.ts";
import { orbitOf, stuartLandau, unitSource } from "../lib/orbit/_systems.ts";
import { phaseSensitivity } from "../../lib/orbit/phase_sensitivity.ts";
import { phaseDiffusion } from "../../lib/orbit/phase_diffusion.ts";
import { findEquilibrium } from "../../lib/orbit/equilibrium.ts";

const CASES = [
  { growth: 1, frequency: 5, damping: 1, shear: 0.7 },
  { growth: 0.3, frequency: 5, damping: 0.6, shear: 0.6 },
  { growth: 0.02, frequency: 1, damping: 0.5, shear: 0 },
  { growth: 1, frequency: 1, damping: 1, shear: 3 },
];

for (const parameters of CASES) {
  const { growth, frequency, damping, shear } = parameters;
  const radius = Math.sqrt(growth / damping);
  const angular = frequency - shear * growth / damping;
  const twist = shear / damping;
  const named = `Stuart-Landau with lambda ${growth}, w0 ${frequency}, a ${damping}, b ${shear}`;

  Deno.test(`${named}: radius, frequency and exponents`, () => {
    const { system, start } = stuartLandau(parameters);
    const orbit = orbitOf(system, { start, tolerance: 1e-12 });
    assertClose(orbit.period, 2 * Math.PI / Math.abs(angular), { rtol: 2e-12, atol: 0 });
    for (let k = 0; k < 37; k++) {
      const x = orbit.at(k * orbit.period / 37);
      assertClose(Math.hypot(x[0]!, x[1]!), radius, { rtol: 1e-11, atol: 0, what: "radius" });
    }
    assertClose(orbit.exponents[0]!.re, 0, { rtol: 0, atol: 1e-11 });
    assertClose(orbit.exponents[1]!.re, -2 * growth, { rtol: 1e-9, atol: 0, what: "exponent" });
    assertClose(
      orbit.multipliers[1]!.re,
      Math.exp(-2 * growth * orbit.period),
      { rtol: 1e-8, atol: 0, what: "multiplier" },
    );
  });

  Deno.test(`${named}: sensitivity at any time and diffusion`, () => {
    const { system, start } = stuartLandau(parameters);
    const orbit = orbitOf(system, { start, tolerance: 1e-12 });
    const sensitivity = phaseSensitivity(orbit);
    for (let k = 0; k < 41; k++) {
      const time = (k - 3.3) * orbit.period / 41;
      const [x, y] = orbit.at(time);
      const angle = Math.atan2(y!, x!);
      // Phase per displacement over the angular frequency: seconds of advance.
      const exact = [
        (-Math.sin(angle) - twist * Math.cos(angle)) / radius / angular,
        (Math.cos(angle) - twist * Math.sin(angle)) / radius / angular,
      ];
      const largest = Math.hypot(...exact);
      assertClose(sensitivity.at(time), exact, { rtol: 0, atol: 1e-9 * largest });
    }
    const [x, y] = [0, 1].map((row) => phaseDiffusion(sensitivity, [unitSource(row)]).total);
    const exact = (1 + twist ** 2) / (2 * radius ** 2 * angular ** 2);
    assertClose([x!, y!], [exact, exact], { rtol: 1e-9, atol: 0, what: "diffusion" });
  });

  Deno.test(`${named}: at default settings period to 1e-8 and sensitivity to 1e-6`, () => {
    const { system, start } = stuartLandau(parameters);
    const orbit = orbitOf(system, { start });
    assertClose(orbit.period, 2 * Math.PI / Math.abs(angular), { rtol: 1e-8, atol: 0 });
    const sensitivity = phaseSensitivity(orbit);
    let error = 0;
    const largest = Math.hypot(1, twist) / radius / Math.abs(angular);
    for (let k = 0; k < 53; k++) {
      const time = k * orbit.period / 53;
      const [x, y] = orbit.at(time);
      const angle = Math.atan2(y!, x!);
      const v = sensitivity.at(time);
      const exact = (-Math.sin(angle) - twist * Math.cos(angle)) / radius / angular;
      error = Math.max(error, Math.abs(v[0]! - exact) / largest);
    }
    assert(error < 1e-6, `error ${error}`);
    // The estimate speaks for the true error, which it may not understate by more than rounding.
    assert(error <= orbit.estimate.sensitivity, `${error} above ${orbit.estimate.sensitivity}`);
  });
}

Deno.test("Stuart-Landau starts by itself: from the equilibrium, whose poles are lambda +- i w0", () => {
  const { system } = stuartLandau(CASES[1]!);
  const equilibrium = findEquilibrium(system);
  assert(equilibrium.status === "found");
  assertClose(equilibrium.poles.map((pole) => pole.re), [0.3, 0.3], { rtol: 1e-12, atol: 0 });
  assertClose(equilibrium.poles.map((pole) => pole.im), [5, -5], { rtol: 1e-12, atol: 0 });
  const orbit = orbitOf(system, { start: equilibrium });
  assertClose(orbit.period, 2 * Math.PI / 4.7, { rtol: 1e-8, atol: 0 });
});
