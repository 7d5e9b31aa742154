import { assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { maskFrom, type MaskPiece } from "../../../lib/noise/mask.ts";
import { maskCoverage } from "../../../lib/noise/mask_coverage.ts";

const piece = (from: number, to: number): MaskPiece => ({
  from,
  to,
  level: -100,
  slope: 0,
  origin: { label: "demand", basis: "invented" },
});
const maskOf = (...pieces: MaskPiece[]) => maskFrom(pieces, { frequency: 5e9 });

Deno.test("maskCoverage: decades with a demand, and the gaps between", () => {
  // Four decades, of which 1 MHz to 10 MHz and the last are free.
  const mask = maskOf(piece(1e5, 1e6), piece(1e7, 1e8));
  const { covered, gaps } = maskCoverage(mask, { from: 1e5, to: 1e9 });
  assertClose(covered, 0.5, { rtol: 1e-12, atol: 0 });
  assertEquals(gaps, [{ from: 1e6, to: 1e7 }, { from: 1e8, to: 1e9 }]);
});

Deno.test("maskCoverage: overlapping and endless pieces leave no gap; a demand at one offset fills none", () => {
  const full = maskOf(piece(1e5, 2e6), piece(1e6, Infinity));
  assertEquals(maskCoverage(full, { from: 2e5, to: 1e9 }), { covered: 1, gaps: [] });
  const point = maskCoverage(maskOf(piece(1e6, 1e6)), { from: 1e5, to: 1e7 });
  assertClose(point.covered, 0, { rtol: 0, atol: 1e-12 });
  assertEquals(point.gaps, [{ from: 1e5, to: 1e6 }, { from: 1e6, to: 1e7 }]);
});

Deno.test("maskCoverage: refuses a range that is none", () => {
  assertThrows(
    () => maskCoverage(maskOf(piece(1e5, 1e6)), { from: 1e6, to: 1e5 }),
    RangeError,
    /Cannot judge the mask: the limits must be/,
  );
});
