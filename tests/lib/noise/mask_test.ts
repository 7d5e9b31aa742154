import fc from "fast-check";
import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import {
  maskAt,
  maskFrom,
  type MaskPiece,
  mergeMasks,
  translateMask,
  translationShift,
} from "../../../lib/noise/mask.ts";

function piece(
  label: string,
  { from, to = from, level, slope = 0 }: {
    from: number;
    to?: number;
    level: number;
    slope?: number;
  },
): MaskPiece {
  return { from, to, level, slope, origin: { label, basis: "given" } };
}

const FREQUENCY = 2.4e9;
const LINE = piece("line", { from: 1e5, to: 1e7, level: -90, slope: -20 });
const FLAT = piece("flat", { from: 3e5, to: Infinity, level: -120 });

Deno.test("maskFrom: the lower of two demands with its origin, cut where they cross", () => {
  const mask = maskFrom([LINE, FLAT], { frequency: FREQUENCY });
  // -90 - 20 log(f / 100 kHz) = -120 at 10^1.5 times 100 kHz.
  const crossing = 1e5 * 10 ** 1.5;
  assertEquals(mask.pieces.map(({ origin }) => origin.label), ["line", "flat", "line", "flat"]);
  assertClose(
    mask.pieces.map(({ from }) => from),
    [1e5, 3e5, crossing, 1e7],
    { rtol: 1e-12, atol: 0 },
  );
  assertEquals(mask.pieces.at(-1)?.to, Infinity);
  assertClose(maskAt(mask, 2e5)!.level, -90 - 20 * Math.log10(2), { rtol: 0, atol: 1e-12 });
  assertEquals(maskAt(mask, 1e6)?.level, -120);
  assertClose(maskAt(mask, 5e6)!.level, -90 - 20 * Math.log10(50), { rtol: 0, atol: 1e-12 });
  assertEquals(maskAt(mask, 5e6)?.origin.label, "line");
  assertEquals(maskAt(mask, 1e9)?.level, -120);
});

Deno.test("maskFrom: a demand at one offset counts where it is the lowest, even beside a plateau", () => {
  const point = piece("blocker", { from: 1e6, level: -125 });
  const mask = maskFrom([FLAT, point], { frequency: FREQUENCY });
  assertEquals(maskAt(mask, 1e6), { level: -125, origin: point.origin });
  assertEquals(maskAt(mask, 1.0001e6)?.level, -120);
  const weak = maskFrom([FLAT, piece("weak", { from: 1e6, level: -119 })], {
    frequency: FREQUENCY,
  });
  assertEquals(weak.pieces.map(({ origin }) => origin.label), ["flat"]);
});

Deno.test("maskFrom: of several demands at one offset the lowest is kept, and equal ones once", () => {
  const at = (level: number) => piece(`${level}`, { from: 1e6, level });
  const mask = maskFrom([at(-100), at(-110), at(-105), at(-110)], { frequency: FREQUENCY });
  assertEquals(mask.pieces.map(({ level }) => level), [-110]);
});

Deno.test("maskFrom: a demand at the geometric middle of a plateau does not spread over it", () => {
  const plateau = piece("plateau", { from: 1e5, to: 1e7, level: -100 });
  const mask = maskFrom([plateau, piece("point", { from: 1e6, level: -140 })], {
    frequency: FREQUENCY,
  });
  assertEquals(maskAt(mask, 2e5)?.level, -100);
  assertEquals(maskAt(mask, 1e6)?.level, -140);
});

Deno.test("maskFrom: nothing is demanded in a gap", () => {
  const mask = maskFrom([
    piece("near", { from: 1e4, to: 1e5, level: -80 }),
    piece("far", { from: 1e6, to: 1e7, level: -120 }),
  ], { frequency: FREQUENCY });
  assertEquals(maskAt(mask, 3e5), undefined);
  assertEquals(maskAt(mask, 1e3), undefined);
});

const pieces = fc.array(
  fc.record({
    from: fc.double({ min: 3, max: 7, noNaN: true }).map((x) => 10 ** x),
    width: fc.oneof(
      fc.constant(1),
      fc.constant(Infinity),
      fc.double({ min: 1.001, max: 1e3, noNaN: true }),
    ),
    level: fc.double({ min: -150, max: -70, noNaN: true }),
    slope: fc.constantFrom(-30, -20, 0, 10),
  }),
  { minLength: 1, maxLength: 6 },
).map((list) =>
  list.map(({ from, width, level, slope }, i) =>
    piece(`${i}`, { from, to: from * width, level, slope })
  )
);

Deno.test("maskFrom: is the lowest of all demands at any offset, whatever they are", () => {
  fc.assert(
    fc.property(pieces, fc.double({ min: 2.5, max: 8, noNaN: true }), (demands, logarithm) => {
      const mask = maskFrom(demands, { frequency: FREQUENCY });
      for (const offset of [10 ** logarithm, ...demands.map(({ from }) => from)]) {
        const levels = demands.filter(({ from, to }) => from <= offset && offset <= to)
          .map(({ from, level, slope }) => level + slope * Math.log10(offset / from));
        const found = maskAt(mask, offset);
        if (levels.length === 0) assertEquals(found, undefined);
        else assertClose(found!.level, Math.min(...levels), { rtol: 0, atol: 1e-8 });
      }
    }),
    { numRuns: 300 },
  );
});

Deno.test("mergeMasks: the lowest of both, origins kept, in any order", () => {
  const a = maskFrom([LINE], { frequency: FREQUENCY });
  const b = maskFrom([FLAT], { frequency: FREQUENCY });
  const both = maskFrom([LINE, FLAT], { frequency: FREQUENCY });
  assertEquals(mergeMasks([a, b]), both);
  for (const offset of [1e5, 4e5, 1e6, 4e6, 5e7]) {
    assertEquals(maskAt(mergeMasks([b, a]), offset), maskAt(both, offset));
  }
});

Deno.test("mergeMasks: masks at different carriers are refused", () => {
  const a = maskFrom([LINE], { frequency: 2.4e9 });
  const b = maskFrom([FLAT], { frequency: 4.8e9 });
  assertThrows(() => mergeMasks([a, b]), RangeError, /2400000000 Hz and 4800000000 Hz/);
  assertThrows(() => mergeMasks([]), TypeError, /at least 1/);
});

Deno.test("translateMask: a divider by N shifts by exactly 20 log N and says so", () => {
  const mask = maskFrom([LINE, FLAT], { frequency: 1e9 });
  for (const n of [2, 3, 4, 8, 10]) {
    const before = translateMask(mask, n * 1e9);
    const shift = 20 * Math.log10(n);
    assertEquals(before.frequency, n * 1e9);
    assertEquals(before.pieces.map(({ from }) => from), mask.pieces.map(({ from }) => from));
    assertEquals(before.pieces.map(({ level }) => level), mask.pieces.map((p) => p.level + shift));
    const back = translateMask(before, 1e9);
    assertClose(back.pieces.map(({ level }) => level), mask.pieces.map(({ level }) => level), {
      rtol: 0,
      atol: 1e-12,
    });
  }
  const [first] = translateMask(mask, 4e9).pieces;
  assertEquals(first?.origin, { label: "line", basis: "given, +12.04 dB from 1 GHz to 4 GHz" });
  assertEquals(translationShift(4e9, 1e9), 20 * Math.log10(1 / 4));
});

Deno.test("maskFrom: faulty demands are named", () => {
  const make = (faulty: MaskPiece) => () => maskFrom([LINE, faulty], { frequency: FREQUENCY });
  assertThrows(make({ ...FLAT, from: 0 }), RangeError, /"flat": the offset where it begins/);
  assertThrows(make({ ...FLAT, to: 1e5 }), RangeError, /at or above 300000 Hz.*got 100000 Hz/);
  assertThrows(make({ ...FLAT, level: NaN }), RangeError, /its level/);
  assertThrows(make({ ...FLAT, slope: Infinity }), RangeError, /its slope/);
  assertThrows(() => maskFrom([], { frequency: FREQUENCY }), TypeError, /at least 1 demand/);
  assertThrows(() => maskFrom([FLAT], { frequency: 0 }), RangeError, /frequency must be > 0 Hz/);
  const mask = maskFrom([FLAT], { frequency: FREQUENCY });
  assertThrows(() => maskAt(mask, -1), RangeError, /offset must be > 0 Hz/);
  assertThrows(() => translateMask(mask, 0), RangeError, /taken to must be > 0 Hz/);
  assert(mask.pieces.length === 1);
});
