import { assertClose, assertThrows } from "../../assert.ts";
import { resistorDensity, resistorPhaseNoise } from "../../../lib/noise/supply_noise_resistor.ts";
import { simpsonOverOffsets } from "./_simpson.ts";

const FEED = { resistance: 10e3, temperature: 300, capacitance: 10e-12 };

Deno.test("resistorDensity: all of it is kT/C, whatever the resistance", () => {
  // J. Johnson, H. Nyquist, Phys. Rev. 32 (1928) 97 and 110; equipartition over the capacitor.
  for (const resistance of [100, 10e3, 1e6]) {
    const pole = 1 / (2 * Math.PI * resistance * 10e-12);
    const variance = simpsonOverOffsets(
      (f) => resistorDensity({ ...FEED, resistance }, f) ** 2,
      { from: pole * 1e-8, to: pole * 1e8 },
    );
    assertClose(variance, 1.380649e-23 * 300 / 10e-12, { rtol: 1e-6, atol: 0 });
  }
});

Deno.test("resistorPhaseNoise: 20 dB per decade below the pole, 40 above, 3.01 dB less at it", () => {
  const pole = 1 / (2 * Math.PI * 10e3 * 10e-12);
  const at = (f: number) => resistorPhaseNoise({ ...FEED, gain: 60e6 }, f).level;
  const white = (f: number) =>
    resistorPhaseNoise({ resistance: 10e3, temperature: 300, gain: 60e6 }, f).level;
  assertClose(at(pole / 1e4) - at(pole / 1e3), 20, { rtol: 0, atol: 1e-4 });
  assertClose(at(pole * 1e3) - at(pole * 1e4), 40, { rtol: 0, atol: 1e-4 });
  assertClose(white(pole) - at(pole), 10 * Math.log10(2), { rtol: 0, atol: 1e-10 });
});

Deno.test("resistorDensity: bad values are refused", () => {
  assertThrows(() => resistorDensity({ ...FEED, resistance: 0 }, 1e6), RangeError, /resistance/);
  assertThrows(() => resistorDensity({ ...FEED, temperature: -1 }, 1e6), RangeError, /temperature/);
  assertThrows(() => resistorDensity({ ...FEED, capacitance: 0 }, 1e6), RangeError, /capacitance/);
  assertThrows(() => resistorDensity(FEED, 0), RangeError, /frequency must be > 0 Hz/);
});
