import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { toneSpur } from "../../../lib/noise/supply_noise_tone.ts";

/** First sideband over carrier of frequency modulation, from the spectrum of cos(wt + index sin x). */
function sidebandOverCarrier(index: number): number {
  const points = 4096;
  let carrier = 0;
  let sideband = 0;
  for (let i = 0; i < points; i++) {
    const x = 2 * Math.PI * i / points;
    carrier += Math.cos(index * Math.sin(x));
    sideband += Math.cos(index * Math.sin(x) - x);
  }
  return sideband / carrier;
}

Deno.test("toneSpur: the first sideband of frequency modulation, within 0.05 dB where it says so", () => {
  for (const index of [1e-4, 1e-2, 0.1, 0.2]) {
    const { level, modulationIndex, smallAngle } = toneSpur({
      gain: -10e6,
      amplitude: index * 2e6 / 10e6,
      frequency: 2e6,
    });
    assert(smallAngle || index === 0.2);
    assertClose(modulationIndex, index, { rtol: 1e-12, atol: 0 });
    assertClose(level, 20 * Math.log10(sidebandOverCarrier(index)), { rtol: 0, atol: 0.05 });
  }
});

Deno.test("toneSpur: tells when the angle is not small, and a tone of nothing", () => {
  const wide = toneSpur({ gain: 10e6, amplitude: 0.1, frequency: 1e6 });
  assertEquals(wide.smallAngle, false);
  assert(20 * Math.log10(sidebandOverCarrier(1)) - wide.level > 0.5);
  assertEquals(toneSpur({ gain: 10e6, amplitude: 0, frequency: 1e6 }).level, -Infinity);
});

Deno.test("toneSpur: bad values are refused", () => {
  const tone = { gain: 1e6, amplitude: 1e-3, frequency: 1e6 };
  assertThrows(() => toneSpur({ ...tone, amplitude: -1 }), RangeError, /amplitude must be >= 0 V/);
  assertThrows(() => toneSpur({ ...tone, frequency: 0 }), RangeError, /frequency must be > 0 Hz/);
  assertThrows(() => toneSpur({ ...tone, gain: Infinity }), RangeError, /gain/);
});
