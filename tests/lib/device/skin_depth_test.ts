import { assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { effectiveThickness, skinDepth } from "../../../lib/device/skin_depth.ts";

Deno.test("skinDepth falls as the root of frequency and has no end at direct current", () => {
  const depth = skinDepth(2e-8, 1e9);
  assertClose(skinDepth(2e-8, 4e9), depth / 2, { rtol: 1e-15, atol: 0 });
  assertClose(skinDepth(8e-8, 1e9), depth * 2, { rtol: 1e-15, atol: 0 });
  assertEquals(skinDepth(2e-8, 0), Infinity);
});

Deno.test("effectiveThickness tends to the film's where it is thin and to the depth where it is thick", () => {
  assertEquals(effectiveThickness(2e-6, Infinity), 2e-6);
  // t_eff = t (1 - t/(2 delta) + ...), with the digits that 1 - exp would lose.
  assertClose(effectiveThickness(1e-12, 1e-3), 1e-12 * (1 - 0.5e-9), { rtol: 1e-15, atol: 0 });
  assertClose(effectiveThickness(50e-6, 1e-6), 1e-6, { rtol: 1e-15, atol: 0 });
});

Deno.test("skinDepth and effectiveThickness refuse figures out of range", () => {
  assertThrows(() => skinDepth(0, 1e9), RangeError, /resistivity must be > 0 ohm m, got 0 ohm m$/);
  assertThrows(() => skinDepth(1e-8, NaN), RangeError, /frequency must be >= 0 Hz, got NaN Hz$/);
  assertThrows(() => effectiveThickness(-1, 1), RangeError, /thickness must be > 0 m, got -1 m$/);
  assertThrows(() => effectiveThickness(1, 0), RangeError, /skin depth must be > 0 m, got 0 m$/);
});
