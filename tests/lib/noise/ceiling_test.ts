import fc from "fast-check";
import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { ceiling, type CeilingValues, judgeFigureOfMerit } from "../../../lib/noise/ceiling.ts";
import { figureOfMerit, leesonPhaseNoise } from "../../../lib/noise/phase_noise.ts";
import { BOLTZMANN } from "../../../lib/quantity/constants.ts";

const VALUES = { quality: 12, efficiency: 0.4, noiseFactor: 2.5, temperature: 320 };

Deno.test("ceiling: Leeson's formula for a sinusoid reaches it exactly, whatever the numbers", () => {
  const within = (min: number, max: number) => fc.double({ min, max, noNaN: true });
  fc.assert(
    fc.property(
      within(1, 100),
      within(0.01, 1),
      within(1, 20),
      within(200, 450),
      within(10, 2000),
      (quality, efficiency, noiseFactor, temperature, resistance) => {
        const amplitude = 0.7;
        const [frequency, offset] = [3e9, 1e6];
        const level = leesonPhaseNoise({
          thermalEnergy: BOLTZMANN * temperature,
          resistance,
          amplitude,
          quality,
          noiseFactor,
          frequency,
          offset,
        });
        const power = amplitude ** 2 / (2 * resistance) / efficiency;
        const judged = judgeFigureOfMerit(figureOfMerit(level, { frequency, offset, power }), {
          quality,
          efficiency,
          noiseFactor,
          temperature,
        });
        assertEquals(judged.status, "below");
        assertClose(judged.margin, 0, { rtol: 0, atol: 1e-9 });
      },
    ),
    { numRuns: 100 },
  );
});

Deno.test("ceiling: the losses sum up exactly, also of a judged figure", () => {
  const sum = (losses: readonly { decibels: number }[]) =>
    losses.reduce((total, { decibels }) => total + decibels, 0);
  const plain = ceiling(VALUES);
  assertEquals(plain.limit - sum(plain.losses), plain.ceiling);
  assertEquals(plain.losses.map(({ name }) => name), ["efficiency", "noise factor"]);
  const [efficiency, noiseFactor] = plain.losses;
  assertClose(efficiency!.decibels, -10 * Math.log10(0.4), { rtol: 1e-14, atol: 0 });
  assertClose(noiseFactor!.decibels, 10 * Math.log10(2.5), { rtol: 1e-14, atol: 0 });
  const judged = judgeFigureOfMerit(186, { ...VALUES, distortion: 0.02 });
  assertEquals(judged.losses.map(({ name }) => name), [
    "efficiency",
    "noise factor",
    "distortion",
    "not accounted for",
  ]);
  assertClose(judged.limit - sum(judged.losses), 186, { rtol: 0, atol: 1e-12 });
});

Deno.test("ceiling: without a loss it is the limit, and none of its losses is negative zero", () => {
  const { limit, ceiling: top, losses } = ceiling({ quality: 10, temperature: 300 });
  assertEquals(top, limit);
  assert(losses.every(({ decibels }) => Object.is(decibels, 0)));
});

Deno.test("judgeFigureOfMerit: a planted result above is impossible, and says by how much", () => {
  const top = ceiling(VALUES).ceiling;
  const judged = judgeFigureOfMerit(top + 0.5, VALUES);
  assert(judged.status === "impossible");
  assertClose(judged.margin, -0.5, { rtol: 0, atol: 1e-10 });
  assert(/0\.50 dB above the thermodynamic limit/.test(judged.reason), judged.reason);
  assertEquals(judgeFigureOfMerit(top - 0.5, VALUES).status, "below");
});

Deno.test("judgeFigureOfMerit: a distortion that accounts for the excess makes it possible", () => {
  const above = ceiling(VALUES).ceiling + 0.5;
  const needed = 10 ** 0.05 - 1;
  const judge = (distortion: number) => judgeFigureOfMerit(above, { ...VALUES, distortion }).status;
  assertEquals([judge(0.99 * needed), judge(1.01 * needed)], ["impossible", "below"]);
});

Deno.test("ceiling: values out of range are refused", () => {
  const of = (change: Partial<CeilingValues>) => () => ceiling({ ...VALUES, ...change });
  assertThrows(of({ efficiency: 1.01 }), RangeError, /efficiency must be above 0 and at most 1/);
  assertThrows(of({ efficiency: 0 }), RangeError, /efficiency/);
  assertThrows(of({ noiseFactor: 0.9 }), RangeError, /noise factor must be >= 1/);
  assertThrows(of({ quality: NaN }), RangeError, /quality factor must be > 0/);
  assertThrows(of({ temperature: 0 }), RangeError, /temperature must be > 0 K/);
  assertThrows(of({ distortion: -0.1 }), RangeError, /distortion must be >= 0/);
  assertThrows(() => judgeFigureOfMerit(NaN, VALUES), RangeError, /figure of merit/);
});
