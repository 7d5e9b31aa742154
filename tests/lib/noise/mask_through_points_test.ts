import { assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { maskAt, maskFrom } from "../../../lib/noise/mask.ts";
import { maskThroughPoints } from "../../../lib/noise/mask_through_points.ts";

const POINTS = [{ offset: 1e5, level: -90 }, { offset: 1e6, level: -120 }];
const NAMED = { label: "table", basis: "given" };

Deno.test("maskThroughPoints: straight in dB over log f, ending with the last point", () => {
  const mask = maskFrom(maskThroughPoints(POINTS, NAMED), { frequency: 1e9 });
  assertClose(maskAt(mask, 10 ** 5.5)!.level, -105, { rtol: 0, atol: 1e-11 });
  assertClose(maskAt(mask, 1e6)!.level, -120, { rtol: 0, atol: 1e-11 });
  assertEquals(maskAt(mask, 1.1e6), undefined);
  assertEquals(maskAt(mask, 2e5)?.origin, NAMED);
});

Deno.test("maskThroughPoints: steps hold each level to the next point, the last as far as told", () => {
  const pieces = maskThroughPoints(POINTS, { ...NAMED, between: "step", upTo: Infinity });
  const mask = maskFrom(pieces, { frequency: 1e9 });
  assertEquals([1e5, 9e5, 1e6, 1e8].map((f) => maskAt(mask, f)?.level), [-90, -90, -120, -120]);
});

Deno.test("maskThroughPoints: a single point, and the last step's point, are demands at one offset", () => {
  const [single] = maskThroughPoints(POINTS.slice(0, 1), NAMED);
  assertEquals([single?.from, single?.to, single?.level], [1e5, 1e5, -90]);
  const steps = maskFrom(maskThroughPoints(POINTS, { ...NAMED, between: "step" }), {
    frequency: 1e9,
  });
  assertEquals(maskAt(steps, 1e6)?.level, -120);
});

Deno.test("maskThroughPoints: points out of order and a short end are refused", () => {
  const through = (points: typeof POINTS, upTo?: number) => () =>
    maskThroughPoints(points, { ...NAMED, ...(upTo === undefined ? {} : { upTo }) });
  assertThrows(through([]), TypeError, /"table": expected at least 1 point/);
  assertThrows(
    through([...POINTS].reverse()),
    RangeError,
    /point 2 has 100000 Hz after 1000000 Hz/,
  );
  assertThrows(through([POINTS[0]!, POINTS[0]!]), RangeError, /offsets must rise/);
  assertThrows(through([{ offset: 1e5, level: NaN }]), RangeError, /level of point 1/);
  assertThrows(through(POINTS, 5e5), RangeError, /got 500000 Hz/);
});
