import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { fitCurve } from "../../../lib/noise/curve_fit.ts";
import type { PhaseNoiseCurve } from "../../../lib/noise/piecewise.ts";
import { type PowerLaw, powerLawLevel, powerLawThrough } from "../../../lib/noise/power_law.ts";

const LAW = powerLawThrough({
  inverseCube: { offset: 1e5, level: -103 },
  inverseSquare: { offset: 1e6, level: -118 },
  floor: { offset: 1e7, level: -155 },
});

function curveOf(law: PowerLaw, offsets: readonly number[]): PhaseNoiseCurve {
  return offsets.map((offset) => ({ offset, level: powerLawLevel(law, offset) }));
}

function grid(from: number, to: number, count: number): number[] {
  return Array.from({ length: count }, (_, i) => from * (to / from) ** (i / (count - 1)));
}

/** Even spread of -1 to 1 from a linear congruential generator (Numerical Recipes, 2nd ed., 7.1). */
function spread(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 31 - 1;
  };
}

/** Decibels between a fitted coefficient and the one put in. */
function error(fitted: number | undefined, put: number | undefined): number {
  return 10 * Math.log10(fitted! / put!);
}

Deno.test("fitCurve: recovers slopes and floor of a clean curve", () => {
  const { law, rms, flickerCorner, floorCorner, status, iterations } = fitCurve(
    curveOf(LAW, grid(1e3, 1e8, 40)),
  );
  assertEquals(status, "found");
  assert(iterations < 10, `${iterations} iterations`);
  assertClose(
    [
      error(law.inverseCube, LAW.inverseCube),
      error(law.inverseSquare, LAW.inverseSquare),
      error(law.floor, LAW.floor),
    ],
    [0, 0, 0],
    { rtol: 0, atol: 1e-6 },
  );
  assertClose(rms, 0, { rtol: 0, atol: 1e-6 });
  assertClose(flickerCorner!, 10 ** 4.5, { rtol: 1e-6, atol: 0 });
  assertClose(floorCorner!, 1e6 * 10 ** (37 / 20), { rtol: 1e-6, atol: 0 });
});

Deno.test("fitCurve: recovers them within 0.1 dB through half a decibel of scatter", () => {
  const draw = spread(7);
  const curve = curveOf(LAW, grid(1e3, 1e9, 600)).map(({ offset, level }) => ({
    offset,
    level: level + 0.5 * draw(),
  }));
  const { law, rms, points, worst } = fitCurve(curve);
  assertClose(
    [
      error(law.inverseCube, LAW.inverseCube),
      error(law.inverseSquare, LAW.inverseSquare),
      error(law.floor, LAW.floor),
    ],
    [0, 0, 0],
    { rtol: 0, atol: 0.1 },
  );
  // rms of an even spread of +-0.5 dB.
  assertClose(rms, 0.5 / Math.sqrt(3), { rtol: 0.1, atol: 0 });
  assert(points.every(({ residual }) => Math.abs(residual) <= Math.abs(worst.residual)));
  assertClose(worst.level - worst.fitted, worst.residual, { rtol: 0, atol: 1e-12 });
});

Deno.test("fitCurve: a dense part of the sweep does not outweigh the rest", () => {
  // 1 dB too high in one dense decade; at equal weight per point the whole fit would follow it.
  const dense = grid(1.02e6, 1.2e6, 400).map((offset) => ({
    offset,
    level: powerLawLevel(LAW, offset) + 1,
  }));
  const curve = [
    ...curveOf(LAW, grid(1e3, 1e6, 30)),
    ...dense,
    ...curveOf(LAW, grid(1.3e6, 1e9, 30)),
  ];
  const { law } = fitCurve(curve);
  assert(Math.abs(error(law.inverseSquare, LAW.inverseSquare)) < 0.1);
});

Deno.test("fitCurve: a term that the curve does not show is zero, never negative", () => {
  const pure = { inverseSquare: LAW.inverseSquare! };
  const bent = grid(1e4, 1e7, 30).map((offset, i) => ({
    offset,
    // Bent upwards at neither end: a free fit would want a negative floor.
    level: powerLawLevel(pure, offset) - 0.3 * (i / 29) ** 2,
  }));
  const { law, terms, floorCorner } = fitCurve(bent);
  assertEquals(law.floor, 0);
  assertEquals(floorCorner, undefined);
  assertEquals(terms.map(({ term }) => term), ["inverseCube", "inverseSquare", "floor"]);
  assertEquals(terms[2]?.largestShare, 0);
  assert(terms[1]!.largestShare > 0.9);
});

Deno.test("fitCurve: no small change of a coefficient lowers the residual", () => {
  const draw = spread(3);
  const curve = curveOf(LAW, grid(1e3, 1e9, 60)).map(({ offset, level }) => ({
    offset,
    level: level + draw(),
  }));
  const { law, rms } = fitCurve(curve);
  // On an even grid the end points stand for half a step.
  const rmsOf = (changed: PowerLaw) =>
    Math.sqrt(
      curve.reduce((sum, { offset, level }, i) => {
        const weight = (i === 0 || i === 59 ? 0.5 : 1) / 59;
        return sum + weight * (level - powerLawLevel(changed, offset)) ** 2;
      }, 0),
    );
  assertClose(rmsOf(law), rms, { rtol: 1e-9, atol: 0 });
  for (const term of ["inverseCube", "inverseSquare", "floor"] as const) {
    for (const factor of [0.99, 1.01]) {
      assert(rmsOf({ ...law, [term]: law[term]! * factor }) > rms, `${term} times ${factor}`);
    }
  }
});

Deno.test("fitCurve: terms can be chosen", () => {
  const { law, terms } = fitCurve(curveOf({ floor: 1e-15 }, grid(1e3, 1e6, 5)), {
    terms: ["floor"],
  });
  assertEquals(terms.length, 1);
  assertClose(law.floor!, 1e-15, { rtol: 1e-9, atol: 0 });
  assertEquals(law.inverseSquare, undefined);
});

Deno.test("fitCurve: too few points, no terms and faulty curves are refused", () => {
  const two = curveOf(LAW, [1e4, 1e6]);
  assertThrows(() => fitCurve(two), RangeError, /3 terms need at least 3 points, got 2/);
  assertThrows(() => fitCurve(two, { terms: [] }), TypeError, /one or more different terms/);
  assertThrows(() => fitCurve(two, { terms: ["floor", "floor"] }), TypeError, /floor, floor/);
  assertThrows(() => fitCurve([]), TypeError, /at least 2 points/);
  assertThrows(() => fitCurve([...two].reverse()), RangeError, /offsets must rise/);
});
