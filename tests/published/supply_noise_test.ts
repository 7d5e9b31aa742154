/**
 * Noise and tones on supply and control lines.
 *
 * Thermal noise 4kTR: J. Johnson, H. Nyquist, Phys. Rev. 32 (1928) 97 and 110. L = S_phi / 2: IEEE Std 1139-2008 (from
 * memory), from which the square root of two follows; one published case of a regulator target counts without it.
 * The figures are hand arithmetic on invented designs.
 */
import { assert, assertClose } from "../assert.ts";
import { allowedSupplyNoise, supplyPhaseNoise } from "../../lib/noise/supply_noise.ts";
import { resistorPhaseNoise } from "../../lib/noise/supply_noise_resistor.ts";
import { toneSpur } from "../../lib/noise/supply_noise_tone.ts";

Deno.test("resistorPhaseNoise: 10 kilohm on 60 MHz/V is -125.3 dBc/Hz at 1 MHz, the convention with it", () => {
  const { level, convention } = resistorPhaseNoise(
    { gain: 60e6, resistance: 10e3, temperature: 300 },
    1e6,
  );
  assertClose(level, -125.3, { rtol: 0, atol: 0.05 });
  assert(/sqrt\(2\)/.test(convention) && /S_phi\/2/.test(convention), convention);
});

Deno.test("resistorPhaseNoise: 10 pF takes 1.4 dB at 1 MHz and 22 dB at 20 MHz", () => {
  const plain = { gain: 60e6, resistance: 10e3, temperature: 300 };
  const loss = (offset: number) =>
    resistorPhaseNoise(plain, offset).level -
    resistorPhaseNoise({ ...plain, capacitance: 10e-12 }, offset).level;
  assertClose(loss(1e6), 1.4, { rtol: 0, atol: 0.05 });
  assertClose(loss(20e6), 22, { rtol: 0, atol: 0.05 });
});

Deno.test("supplyPhaseNoise: 5 MHz/mA and 200 pA/sqrt(Hz) are 1 Hz/sqrt(Hz), -103.0 dBc/Hz at 100 kHz", () => {
  const { level, frequencyDensity } = supplyPhaseNoise({ gain: 5e9, density: 200e-12 }, 1e5);
  assertClose(frequencyDensity, 1, { rtol: 1e-12, atol: 0 });
  assertClose(level, -103.0, { rtol: 0, atol: 0.05 });
});

Deno.test("allowedSupplyNoise: with the half of L a regulator may have 45 nV where 32 nV are counted without", () => {
  // Two densities for one level, as the two conventions give them.
  const gain = 31.25e6;
  const offset = 1e6;
  const without = 32e-9;
  const level = 20 * Math.log10(gain * without / offset);
  assertClose(allowedSupplyNoise(level, { gain, offset }), 45e-9, { rtol: 0, atol: 0.5e-9 });
});

Deno.test("toneSpur: 1 mV at 1 MHz on 20 MHz/V is -40 dBc", () => {
  // 20 log(K Vm / (2 fm)): index 0.02.
  const { level } = toneSpur({ gain: 20e6, amplitude: 1e-3, frequency: 1e6 });
  assertClose(level, -40, { rtol: 0, atol: 1e-9 });
});
