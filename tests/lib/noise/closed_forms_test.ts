import { assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { pairNoiseFactor, type PairNoiseValues } from "../../../lib/noise/closed_forms.ts";

const VALUES: PairNoiseValues = {
  pairGamma: 0.7,
  tailGamma: 0.9,
  tailTransconductance: 5e-3,
  resistance: 400,
  loopGain: 2.5,
};

Deno.test("pairNoiseFactor: parts and total", () => {
  const { tank, pair, tail, total } = pairNoiseFactor(VALUES);
  assertEquals(tank, 1);
  assertEquals(pair, 0.7);
  // 0.9 * 5 mS * 400 ohm / 4 * (1 - 0.4).
  assertClose([tail, total], [0.27, 1.97], { rtol: 1e-14, atol: 0 });
});

Deno.test("pairNoiseFactor: a pair that does not start passes no tail noise", () => {
  assertEquals(pairNoiseFactor({ ...VALUES, loopGain: 1 }).tail, 0);
  assertEquals(pairNoiseFactor({ ...VALUES, loopGain: 0.5 }).tail, 0);
});

Deno.test("pairNoiseFactor: refuses what is not positive by its name", () => {
  for (const name of Object.keys(VALUES)) {
    for (const value of [0, -1, NaN, Infinity]) {
      const wording = new RegExp(`${name} must be > 0, got ${value}$`);
      assertThrows(() => pairNoiseFactor({ ...VALUES, [name]: value }), RangeError, wording);
    }
  }
});
