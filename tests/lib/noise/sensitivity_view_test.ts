import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { radiansPerMaximumCharge, sensitivityView } from "../../../lib/noise/sensitivity_view.ts";
import { phaseDiffusion } from "../../../lib/orbit/phase_diffusion.ts";
import { phaseSensitivity } from "../../../lib/orbit/phase_sensitivity.ts";
import type { NoiseSource } from "../../../lib/orbit/system.ts";
import { DESIGN, NOMINAL, pairOrbit } from "../../published/_pair.ts";
import { orbitOf, stuartLandau, unitSource } from "../orbit/_systems.ts";

const { oscillator, orbit } = pairOrbit(DESIGN, NOMINAL);

function modulated(amplitude: (x: Float64Array) => readonly [number, number]): NoiseSource {
  return {
    label: "noise",
    device: "test",
    color: "white",
    inject: (x, into) => into.set(amplitude(x)),
  };
}

Deno.test("sensitivityView: rms and mean carry the diffusion and the 1/f mean of every source of a pair", () => {
  const sensitivity = phaseSensitivity(orbit);
  const { sources } = phaseDiffusion(sensitivity, oscillator.circuit.sources);
  oscillator.circuit.sources.forEach((source, k) => {
    const view = sensitivityView(sensitivity, source);
    const own = sources[k]!;
    assertClose(view.rms.effective * view.largest, own.rms, { rtol: 1e-12, atol: 0 });
    // The reference's sign is free, the signed mean is not: it goes with the effective sensitivity's sign.
    assertClose(Math.abs(view.mean.effective) * view.largest, Math.abs(own.mean), {
      rtol: 1e-9,
      atol: 1e-12 * own.rms,
    });
    assertClose(Math.max(...view.modulation), 1, { rtol: 1e-12, atol: 0 });
    view.effective.forEach((value, i) =>
      assertClose(value, view.sensitivity[i]! * view.modulation[i]!, { rtol: 1e-14, atol: 0 })
    );
    const sum = view.foldings.reduce((total, part) => total + part, 0);
    assert(sum > 0.9 && sum < 1 + 1e-9, `${view.device}: foldings up to the eighth are ${sum}`);
  });
});

Deno.test("sensitivityView: a steady source along a circle has its noise from around the carrier alone", () => {
  // Stuart-Landau without shear: v1 is a sine wave (Y. Kuramoto, Chemical Oscillations, Waves and Turbulence, 1984).
  const { system, start } = stuartLandau({ growth: 1, frequency: 5, damping: 1, shear: 0 });
  const circle = orbitOf(system, { start, tolerance: 1e-11 });
  const view = sensitivityView(circle, unitSource(0));
  const expected = [0, 1, 0, 0, 0, 0, 0, 0, 0];
  assertClose(view.foldings, expected, { rtol: 0, atol: 1e-10 });
  // Amplitude 1/(r w0) = 1/5.
  assertClose(view.rms.sensitivity, 0.2 / Math.SQRT2, { rtol: 1e-9, atol: 0 });
  assertEquals([view.scale, view.largest], ["s/C", Math.SQRT2]);
  // Turned into radians per unit of charge, q_max = 1: w0 v1, whose rms is 1/sqrt(2).
  const scale = radiansPerMaximumCharge({ frequency: circle.frequency, maximumCharge: 1 });
  const own = sensitivityView(circle, unitSource(0), scale);
  assertClose(own.rms.sensitivity, Math.SQRT1_2, { rtol: 1e-9, atol: 0 });
  assertEquals(own.scale, "rad per maximum charge");
  // cos^2 modulation of that sine: (3 sin + sin 3) / 4, powers 9 : 1.
  const squared = sensitivityView(circle, modulated(([, y]) => [y! * y!, 0]));
  assertClose(squared.foldings.slice(0, 4), [0, 0.9, 0, 0.1], { rtol: 0, atol: 1e-10 });
});

Deno.test("sensitivityView: signs and turning directions of a source stay in the effective sensitivity", () => {
  const { system, start } = stuartLandau({ growth: 1, frequency: 5, damping: 1, shear: 0 });
  const circle = orbitOf(system, { start, tolerance: 1e-11 });
  // Changes sign over the cycle: x times the sensitivity -y/w0 has no mean, |x| would not change that; y has one.
  const signed = sensitivityView(circle, modulated(([x, y]) => [y!, 0 * x!]));
  assert(Math.min(...signed.modulation) < -0.99, "the modulation is signed");
  assertClose(Math.abs(signed.mean.effective) * signed.largest, 0.1, { rtol: 1e-8, atol: 0 });
  const rectified = sensitivityView(circle, modulated(([, y]) => [Math.abs(y!), 0]));
  assertClose(rectified.mean.effective, 0, { rtol: 0, atol: 1e-4 });
  // Along the motion, turning with it: (-y, x) against v1 = (-y, x)/5 is 1/5 throughout.
  const turning = sensitivityView(circle, modulated(([x, y]) => [-y!, x!]));
  const { rms } = phaseDiffusion(circle, [modulated(([x, y]) => [-y!, x!])]).sources[0]!;
  assertClose(turning.rms.effective * turning.largest, rms, { rtol: 1e-12, atol: 0 });
  assertClose(rms, 0.2, { rtol: 1e-9, atol: 0 });
  // Found 4e-8: the stages between the mesh points are good to a lower order.
  const spread = turning.effective.map((value) => Math.abs(value) * turning.largest);
  assertClose(spread, spread.map(() => 0.2), { rtol: 1e-7, atol: 0 });
});

Deno.test("sensitivityView: a source without noise has no effective sensitivity and no foldings", () => {
  const view = sensitivityView(orbit, {
    label: "none",
    device: "none",
    color: "white",
    inject: (_x, into) => into.fill(0),
  });
  assertEquals([view.largest, view.rms.effective, ...view.foldings].every((v) => v === 0), true);
});

Deno.test("radiansPerMaximumCharge: refuses what is not positive", () => {
  for (const values of [[0, 1], [1, 0], [NaN, 1]] as const) {
    assertThrows(
      () => radiansPerMaximumCharge({ frequency: values[0], maximumCharge: values[1] }),
      RangeError,
      /frequency and maximum charge must be > 0/,
    );
  }
});
