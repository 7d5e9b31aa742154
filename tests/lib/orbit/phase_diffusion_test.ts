import { assert, assertClose, assertEquals } from "../../assert.ts";
import { phaseDiffusion } from "../../../lib/orbit/phase_diffusion.ts";
import { phaseSensitivity } from "../../../lib/orbit/phase_sensitivity.ts";
import type { NoiseSource } from "../../../lib/orbit/system.ts";
import { brusselator, orbitOf, stuartLandau, unitSource, vanDerPol } from "./_systems.ts";

function source(
  label: string,
  amplitude: (x: Float64Array) => readonly number[],
  color: "white" | "1/f" = "white",
): NoiseSource {
  return { label, device: "device", color, inject: (x, into) => into.set(amplitude(x)) };
}

Deno.test("phaseDiffusion(): the total is the sum of the white sources", () => {
  const { system, start } = brusselator();
  const orbit = orbitOf(system, { start });
  const sources = [
    source("a", ([x]) => [Math.sqrt(x!), 0]),
    source("b", ([x, y]) => [x! * Math.sqrt(y!), -x! * Math.sqrt(y!)]),
    source("slow", () => [1, 0], "1/f"),
  ];
  const { sources: each, total } = phaseDiffusion(orbit, sources);
  assertClose(total, each.reduce((sum, { diffusion }) => sum + diffusion, 0), {
    rtol: 1e-14,
    atol: 0,
  });
  assertEquals(each.map(({ label }) => label), ["a", "b", "slow"]);
  assertEquals(each[2]!.diffusion, 0);
  // The white diffusion is half the mean square of v1 . b.
  for (const { rms, diffusion, color } of each) {
    if (color === "white") assertClose(diffusion, rms ** 2 / 2, { rtol: 1e-14, atol: 0 });
  }
  assertEquals(phaseDiffusion(orbit, []).total, 0);
});

Deno.test("phaseDiffusion(): a source through several rows keeps its signs", () => {
  const { system, start } = stuartLandau({ growth: 1, frequency: 5, damping: 1, shear: 0.7 });
  const orbit = orbitOf(system, { start, tolerance: 1e-12 });
  const sensitivity = phaseSensitivity(orbit);
  // Noise along the radius (cos, sin): v1 . b = -shear / angular; around it: 1 / angular; each constant.
  const radius = source("radial", ([x, y]) => [x!, y!]);
  const around = source("around", ([x, y]) => [-y!, x!]);
  const both = source("both", ([x, y]) => [x! - y!, y! + x!]);
  const { sources: [radial, tangential, sum] } = phaseDiffusion(sensitivity, [
    radius,
    around,
    both,
  ]);
  assertClose(radial!.mean, -0.7 / 4.3, { rtol: 1e-9, atol: 0 });
  assertClose(tangential!.mean, 1 / 4.3, { rtol: 1e-9, atol: 0 });
  assertClose(sum!.mean, 0.3 / 4.3, { rtol: 1e-9, atol: 0 });
  assertClose(sum!.rms, 0.3 / 4.3, { rtol: 1e-9, atol: 0 });
  assertClose(radial!.diffusion, (0.7 / 4.3) ** 2 / 2, { rtol: 1e-9, atol: 0 });
});

Deno.test("phaseDiffusion(): a 1/f source has no mean on a symmetric waveform, and one on a skew one", () => {
  const symmetric = vanDerPol(1);
  const orbit = orbitOf(symmetric.system, { start: symmetric.start, tolerance: 1e-12 });
  const steady = source("steady", () => [0, 1], "1/f");
  const even = source("even", ([x]) => [0, x! * x!], "1/f");
  const odd = source("odd", ([x]) => [0, x!], "1/f");
  const { sources: [a, b, c] } = phaseDiffusion(orbit, [steady, even, odd]);
  assertClose([a!.mean, b!.mean], [0, 0], { rtol: 0, atol: 1e-11 });
  // An amplitude that turns its sign with the waveform does convert: a density alone would hide it.
  assert(Math.abs(c!.mean) > 1e-3, `mean ${c!.mean}`);
  const skew = brusselator();
  const other = orbitOf(skew.system, { start: skew.start });
  const { sources: [d] } = phaseDiffusion(other, [source("steady", () => [1, 0], "1/f")]);
  assert(Math.abs(d!.mean) > 1e-3, `mean ${d!.mean}`);
});

Deno.test("phaseDiffusion(): the variance of the period of noisy motions grows as it says", () => {
  // 400 motions of a Stuart-Landau oscillator under weak white noise, integrated with Euler-Maruyama on its
  // exact phase: d(phase) = w dt + (gradient of the phase) . noise; here the phase is read from the state.
  const parameters = { growth: 1, frequency: 5, damping: 1, shear: 0.7 };
  const { system, start, flow } = stuartLandau(parameters);
  const orbit = orbitOf(system, { start });
  const intensity = 1e-4;
  const { total } = phaseDiffusion(orbit, [
    { ...unitSource(0), inject: (_x, into) => into.set([Math.sqrt(2 * intensity), 0]) },
    { ...unitSource(1), inject: (_x, into) => into.set([0, Math.sqrt(2 * intensity)]) },
  ]);
  let seed = 7;
  const uniform = () => {
    seed = (Math.imul(seed, 1664525) + 1013904223) >>> 0;
    return (seed + 0.5) / 2 ** 32;
  };
  const normal = () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform());
  const [motions, steps, dt] = [400, 400, 0.01];
  const rate = new Float64Array(2);
  let square = 0;
  let mean = 0;
  for (let motion = 0; motion < motions; motion++) {
    const x = Float64Array.of(1, 0);
    let phase = 0;
    for (let step = 0; step < steps; step++) {
      const before = Math.atan2(x[1]!, x[0]!) - 0.7 * Math.log(Math.hypot(x[0]!, x[1]!));
      flow(x, rate);
      for (let i = 0; i < 2; i++) {
        x[i]! += rate[i]! * dt + Math.sqrt(intensity * dt) * normal();
      }
      const after = Math.atan2(x[1]!, x[0]!) - 0.7 * Math.log(Math.hypot(x[0]!, x[1]!));
      phase += after - before - 2 * Math.PI * Math.round((after - before) / (2 * Math.PI));
    }
    const shift = phase / 4.3;
    mean += shift / motions;
    square += shift * shift / motions;
  }
  const variance = (square - mean * mean) * motions / (motions - 1);
  // The variance of 400 normal numbers is known to sqrt(2/399) = 7.1 %; four of these, and 2 % for the
  // steps of Euler's method.
  assertClose(variance / (steps * dt), total, { rtol: 0.3, atol: 0 });
});
