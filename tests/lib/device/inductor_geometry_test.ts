import { assertClose, assertThrows } from "../../assert.ts";
import { spiralDimensions, type SpiralGeometry } from "../../../lib/device/inductor_geometry.ts";

const geometry: SpiralGeometry = {
  shape: "square",
  turns: 3,
  width: 10e-6,
  spacing: 2e-6,
  outerDiameter: 200e-6,
};

Deno.test("spiralDimensions counts one gap less than turns", () => {
  const { innerDiameter, averageDiameter, fillRatio, length } = spiralDimensions(geometry);
  const rounding = { rtol: 1e-14, atol: 0 };
  assertClose(innerDiameter, (200 - 2 * 30 - 2 * 4) * 1e-6, rounding);
  assertClose(averageDiameter, 166e-6, rounding);
  assertClose(fillRatio, 68 / 332, rounding);
  // Three squares whose sides, in the middle of the trace, are 190, 166 and 142 um.
  assertClose(length, 4 * (190 + 166 + 142) * 1e-6, rounding);
});

Deno.test("spiralDimensions measures polygons across the flats", () => {
  const lengthOf = (shape: SpiralGeometry["shape"]) =>
    spiralDimensions({ ...geometry, shape }).length;
  const circle = lengthOf("circular");
  const rounding = { rtol: 1e-14, atol: 0 };
  assertClose(circle, 3 * Math.PI * 166e-6, rounding);
  // The side of a hexagon is the distance across flats over the root of three; of an octagon it is that
  // over 1 plus the root of two.
  assertClose(lengthOf("hexagonal"), 3 * 6 * 166e-6 / Math.sqrt(3), rounding);
  assertClose(lengthOf("octagonal"), 3 * 8 * 166e-6 / (1 + Math.SQRT2), rounding);
});

Deno.test("spiralDimensions refuses turns that do not fit and figures out of range", () => {
  const refuse = (change: Partial<SpiralGeometry>, wording: RegExp) =>
    assertThrows(() => spiralDimensions({ ...geometry, ...change }), RangeError, wording);
  refuse(
    { turns: 9 },
    /outer diameter must leave an opening inside 9 turns, > 0\.00021\d* m, got 0\.0002 m$/,
  );
  refuse({ turns: 0.5 }, /turns must be a number >= 1, got 0\.5$/);
  refuse({ width: NaN }, /width must be > 0 m, got NaN m$/);
  refuse({ spacing: 0 }, /spacing must be > 0 m, got 0 m$/);
  refuse({ outerDiameter: Infinity }, /outer diameter must be > 0 m, got Infinity m$/);
  assertThrows(
    () => spiralDimensions({ ...geometry, shape: "oval" as "square" }),
    TypeError,
    /shape must be one of square, hexagonal, octagonal, circular, got oval$/,
  );
});
