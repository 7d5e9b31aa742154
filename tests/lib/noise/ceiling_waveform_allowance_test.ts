import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { waveformAllowance } from "../../../lib/noise/ceiling_waveform_allowance.ts";
import { orbitOf, tanhOscillator, unitSource } from "../orbit/_systems.ts";
import { phaseDiffusion } from "../../../lib/orbit/phase_diffusion.ts";

Deno.test("waveformAllowance: nothing for a sinusoid, the written sum for one harmonic", () => {
  assertEquals(waveformAllowance([0.7]), 0);
  assertClose(waveformAllowance([0.7, 0, 0]), 0, { rtol: 0, atol: 1e-15 });
  const share = 0.1 ** 2;
  const ratio = (1 + 9 * share) / (1 + share);
  const expected = ((1 + ratio) / 2) ** 2 + share * ((3 + ratio / 3) / 2) ** 2 - 1;
  assertClose(waveformAllowance([2, 0, 0.2]), expected, { rtol: 1e-12, atol: 0 });
});

Deno.test("waveformAllowance: is mean((C v' - i)^2) of the orbit over that of its fundamental", () => {
  // C = L = 1: states v and i, v' = -i - conductor.
  const { system, start } = tanhOscillator({ quality: 3, gain: 3 });
  const orbit = orbitOf(system, { start, steps: 60 });
  const size = (k: number) => {
    const { re, im } = orbit.phasor((x) => x[0]!, { harmonic: k });
    return Math.hypot(re, im);
  };
  const harmonics = Array.from({ length: 41 }, (_, k) => size(k + 1));
  const n = system.dimension;
  const q = new Float64Array(n);
  const f = new Float64Array(n);
  const C = new Float64Array(n * n);
  const G = new Float64Array(n * n);
  const whole = orbit.mean((x) => {
    system.evaluate(x, { q, f, C, G });
    return (-f[0]! - x[1]!) ** 2;
  });
  const omega = 2 * Math.PI / orbit.period;
  const fundamental = (2 * omega * harmonics[0]!) ** 2 / 2;
  assertClose(1 + waveformAllowance(harmonics), whole / fundamental, { rtol: 1e-8, atol: 0 });
});

Deno.test("waveformAllowance: bounds the sensitivity of a tank with a memoryless conductor", () => {
  for (const quality of [1, 2, 5, 20]) {
    for (const gain of [1.5, 3, 10]) {
      const { system, start } = tanhOscillator({ quality, gain });
      const orbit = orbitOf(system, { start, steps: 60 });
      const size = (k: number) => {
        const { re, im } = orbit.phasor((x) => x[0]!, { harmonic: k });
        return Math.hypot(re, im);
      };
      const harmonics = Array.from({ length: 31 }, (_, k) => size(k + 1));
      const { total } = phaseDiffusion(orbit, [unitSource(0)]);
      const omega = 2 * Math.PI / orbit.period;
      // Diffusion over that of a sinusoid with the same fundamental, mean(v1^2) = 1 / (2 (w C A)^2).
      const factor = total * 2 * (omega * harmonics[0]!) ** 2;
      const bound = 1 / (1 + waveformAllowance(harmonics));
      assert(factor >= bound * (1 - 1e-6), `Q ${quality}, gain ${gain}: ${factor} below ${bound}`);
      // Not a bound without content: both go to 1 with the harmonics.
      if (quality === 20) assert(factor / bound < 1.01, `${factor} over ${bound}`);
    }
  }
});

Deno.test("waveformAllowance: bad harmonics are named", () => {
  assertThrows(() => waveformAllowance([]), TypeError, /at least the fundamental/);
  assertThrows(() => waveformAllowance([0, 0.1]), RangeError, /harmonic 1 must be > 0 V/);
  assertThrows(() => waveformAllowance([1, NaN]), RangeError, /harmonic 2 must be >= 0 V/);
});
