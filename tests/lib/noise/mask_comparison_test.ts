import fc from "fast-check";
import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { type PhaseNoise, phaseNoiseLevel } from "../../../lib/noise/integrals.ts";
import { maskAt, maskFrom } from "../../../lib/noise/mask.ts";
import { compareWithMask } from "../../../lib/noise/mask_comparison.ts";
import { maskThroughPoints } from "../../../lib/noise/mask_through_points.ts";
import { powerLawThrough } from "../../../lib/noise/power_law.ts";

const MASK = maskFrom([
  ...maskThroughPoints(
    [{ offset: 1e5, level: -90 }, { offset: 1e6, level: -115 }, { offset: 1e7, level: -145 }],
    { label: "table", basis: "given" },
  ),
  {
    from: 2e7,
    to: Infinity,
    level: -148,
    slope: 0,
    origin: { label: "far", basis: "given" },
  },
], { frequency: 1e9 });

Deno.test("compareWithMask: the least margin, its place and where the mask comes from", () => {
  const curve = [
    { offset: 1e4, level: -60 },
    { offset: 3e6, level: -120 },
    { offset: 1e9, level: -160 },
  ];
  const { worst, pieces, uncovered } = compareWithMask(curve, MASK);
  assertEquals(pieces.length, 3);
  assertEquals(uncovered, []);
  assertEquals(worst.offset, 1e7);
  assertClose(worst.margin, -145 - phaseNoiseLevel(curve, 1e7), { rtol: 0, atol: 1e-10 });
  assertEquals(worst.origin.label, "table");
  assertClose(worst.limit - worst.level, worst.margin, { rtol: 0, atol: 1e-12 });
});

Deno.test("compareWithMask: no finer search finds less, for curves and for power laws", () => {
  const curve = fc.array(fc.double({ min: -170, max: -60, noNaN: true }), {
    minLength: 2,
    maxLength: 8,
  }).map((levels): PhaseNoise =>
    levels.map((level, i) => ({
      offset: 1e5 * (1e4) ** (i / (levels.length - 1)),
      level,
    }))
  );
  const law = fc.tuple(
    fc.double({ min: -120, max: -80, noNaN: true }),
    fc.double({ min: -140, max: -100, noNaN: true }),
    fc.double({ min: -170, max: -130, noNaN: true }),
  ).map(([a, b, c]): PhaseNoise =>
    powerLawThrough({
      inverseCube: { offset: 1e5, level: a },
      inverseSquare: { offset: 1e6, level: b },
      floor: { offset: 1e6, level: c },
    })
  );
  fc.assert(
    fc.property(fc.oneof(curve, law), (noise) => {
      const { worst } = compareWithMask(noise, MASK);
      let least = Infinity;
      for (let i = 0; i <= 2000; i++) {
        const offset = Math.min(1e9 * (1 - 1e-12), 1e5 * 1e4 ** (i / 2000));
        const limit = maskAt(MASK, offset);
        if (limit) least = Math.min(least, limit.level - phaseNoiseLevel(noise, offset));
      }
      assert(worst.margin <= least + 1e-9, `worst ${worst.margin}, found ${least}`);
      // The grid comes within a slope of 200 dB per decade and half a step of the worst.
      assert(worst.margin > least - 1.5, `worst ${worst.margin}, found ${least}`);
    }),
    { numRuns: 60 },
  );
});

Deno.test("compareWithMask: says which parts of the mask the curve does not reach", () => {
  const curve = [{ offset: 5e5, level: -110 }, { offset: 4e7, level: -150 }];
  const { uncovered, pieces } = compareWithMask(curve, MASK);
  assertEquals(pieces.length, 3);
  assertEquals(uncovered.map(({ from, to }) => [from, to]), [[1e5, 5e5], [4e7, 1e9]]);
  assertEquals(uncovered.map(({ origin }) => origin.label), ["table", "far"]);
});

Deno.test("compareWithMask: a curve that reaches nothing of the mask is refused", () => {
  const near = [{ offset: 10, level: -40 }, { offset: 1e3, level: -80 }];
  assertThrows(() => compareWithMask(near, MASK), RangeError, /runs from 10 Hz to 1000 Hz/);
  assertThrows(() => compareWithMask([], MASK), TypeError, /at least 2 points/);
});
