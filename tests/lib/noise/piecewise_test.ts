import fc from "fast-check";
import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { simpsonOverOffsets } from "./_simpson.ts";
import {
  checkCurve,
  curveArea,
  curveLevel,
  type PhaseNoiseCurve,
  sumLevels,
} from "../../../lib/noise/piecewise.ts";

const CURVE: PhaseNoiseCurve = [
  { offset: 1e4, level: -80 },
  { offset: 1e5, level: -110 },
  { offset: 1e6, level: -130 },
  { offset: 1e7, level: -130 },
];

Deno.test("curveLevel: straight in dB over the logarithm of the offset", () => {
  assertEquals(curveLevel(CURVE, 1e5), -110);
  assertEquals(curveLevel(CURVE, 1e7), -130);
  // Half a decade above 100 kHz on a slope of -20 dB per decade.
  assertClose(curveLevel(CURVE, 10 ** 5.5), -120, { rtol: 0, atol: 1e-12 });
});

Deno.test("curveLevel: is not continued beyond the ends", () => {
  assertThrows(() => curveLevel(CURVE, 9999), RangeError, /runs from 10000 Hz to 10000000 Hz/);
  assertThrows(() => curveLevel(CURVE, 1.1e7), RangeError, /at 11000000 Hz/);
  assertThrows(() => curveLevel(CURVE, NaN), RangeError, /at NaN Hz/);
});

Deno.test("curveArea: the slopes -1 and 0, and a slope next to -1, in closed form", () => {
  const of = (slope: number) =>
    curveArea([{ offset: 1e3, level: -90 }, { offset: 1e5, level: -90 + 20 * slope }], {
      from: 1e3,
      to: 1e5,
    });
  const start = 1e-9 * 1e3;
  assertClose(of(-1), start * Math.log(100), { rtol: 1e-13, atol: 0 });
  assertClose(of(0), start * 99, { rtol: 1e-13, atol: 0 });
  assertClose(of(-2), start * 0.99, { rtol: 1e-13, atol: 0 });
  // Next to -1, ln r (1 + (s + 1) ln r / 2) to second order.
  const near = 1e-7;
  assertClose(of(-1 + near), start * Math.log(100) * (1 + near * Math.log(100) / 2), {
    rtol: 1e-12,
    atol: 0,
  });
});

Deno.test("curveArea: any curve between any limits against dense Simpson", () => {
  fc.assert(
    fc.property(
      fc.array(fc.double({ min: -160, max: -60, noNaN: true }), { minLength: 2, maxLength: 5 }),
      fc.double({ min: 0, max: 0.4, noNaN: true }),
      fc.double({ min: 0.6, max: 1, noNaN: true }),
      (levels, low, high) => {
        const curve = levels.map((level, i) => ({ offset: 1e3 * 4 ** i, level }));
        const last = 1e3 * 4 ** (levels.length - 1);
        const at = (share: number) => Math.min(last, 1e3 * (last / 1e3) ** share);
        const edges = [
          at(low),
          ...curve.map(({ offset }) => offset).filter((f) => f > at(low) && f < at(high)),
          at(high),
        ];
        // Piece by piece, since Simpson's rule needs a smooth function.
        const expected = edges.slice(1).reduce(
          (sum, to, i) =>
            sum + simpsonOverOffsets((f) => 10 ** (curveLevel(curve, f) / 10), {
              from: edges[i]!,
              to,
              panels: 400,
            }),
          0,
        );
        assertClose(curveArea(curve, { from: at(low), to: at(high) }), expected, {
          rtol: 1e-8,
          atol: 0,
        });
      },
    ),
    { numRuns: 30 },
  );
});

Deno.test("curveArea: parts add up to the whole", () => {
  const whole = curveArea(CURVE, { from: 2e4, to: 9e6 });
  const parts = curveArea(CURVE, { from: 2e4, to: 3e5 }) + curveArea(CURVE, { from: 3e5, to: 9e6 });
  assertClose(parts, whole, { rtol: 1e-13, atol: 0 });
});

Deno.test("curveArea: limits out of order or beyond the curve are refused", () => {
  assertThrows(() => curveArea(CURVE, { from: 1e6, to: 1e5 }), RangeError, /from 1000000 Hz/);
  assertThrows(() => curveArea(CURVE, { from: 1e3, to: 1e5 }), RangeError, /it runs from/);
  assertThrows(() => curveArea(CURVE, { from: 1e4, to: Infinity }), RangeError, /finite/);
});

Deno.test("checkCurve: names what is wrong with a curve and where", () => {
  const [a, b] = [CURVE[0]!, CURVE[1]!];
  assertThrows(() => checkCurve([]), TypeError, /at least 2 points, got 0/);
  assertThrows(() => checkCurve([a]), TypeError, /at least 2 points, got 1/);
  assertThrows(() => checkCurve([b, a]), RangeError, /point 2 has 10000 Hz after 100000 Hz/);
  assertThrows(() => checkCurve([a, a]), RangeError, /point 2 repeats the offset 10000 Hz/);
  assertThrows(() => checkCurve([a, { ...b, level: NaN }]), RangeError, /level of point 2/);
  assertThrows(() => checkCurve([{ ...a, offset: -1 }, b]), RangeError, /offset of point 1/);
  assertThrows(
    () => checkCurve(CURVE, { frequency: 1e6 }),
    RangeError,
    /below the carrier's 1000000 Hz/,
  );
  checkCurve(CURVE, { frequency: 1e9 });
});

Deno.test("sumLevels: equal levels add 3.01 dB, nothing adds nothing", () => {
  assertClose(sumLevels([-168, -168]), -168 + 10 * Math.log10(2), { rtol: 0, atol: 1e-12 });
  assertEquals(sumLevels([-120, -Infinity]), -120);
  assertEquals(sumLevels([-Infinity, -Infinity]), -Infinity);
  assert(Number.isFinite(sumLevels([-4000, -4000])));
  assertThrows(() => sumLevels([]), TypeError, /at least 1/);
});
