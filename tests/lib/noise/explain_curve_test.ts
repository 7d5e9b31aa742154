import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { explainCurve } from "../../../lib/noise/explain_curve.ts";
import type { PhaseNoiseCurve } from "../../../lib/noise/piecewise.ts";

const OFFSETS = Array.from({ length: 31 }, (_, k) => 10 ** (4 + k / 10));
/** Invented contributors of 1/f^3, 1/f^2 and flat noise; pair and tank have the same shape. */
const SUSPECTS = [
  { name: "tail, 1/f", phase: OFFSETS.map((f) => 1e6 / f ** 3) },
  { name: "pair", phase: OFFSETS.map((f) => 6 / f ** 2) },
  { name: "tank", phase: OFFSETS.map((f) => 4 / f ** 2) },
  { name: "buffer", phase: OFFSETS.map(() => 1e-15) },
];

function totalWith(factors: Readonly<Record<string, number>>): number[] {
  return OFFSETS.map((_, k) =>
    10 * Math.log10(
      SUSPECTS.reduce((sum, { name, phase }) => sum + (factors[name] ?? 1) * phase[k]!, 0),
    )
  );
}

const BUDGET = { offsets: OFFSETS, total: totalWith({}) };
const curveOf = (levels: readonly number[]): PhaseNoiseCurve =>
  OFFSETS.map((offset, k) => ({ offset, level: levels[k]! }));

Deno.test("explainCurve: recovers the contributor that was planted, and by how much it is off", () => {
  for (const [name, factor] of [["tail, 1/f", 8], ["buffer", 3000], ["tail, 1/f", 0.2]] as const) {
    const { explanations, rms } = explainCurve(BUDGET, {
      curve: curveOf(totalWith({ [name]: factor })),
      suspects: SUSPECTS,
    });
    const [best, ...others] = explanations;
    assertEquals(best!.name, name);
    assertClose(best!.decibels, 10 * Math.log10(factor), { rtol: 0, atol: 1e-3 });
    assertClose(best!.rms, 0, { rtol: 0, atol: 1e-3 });
    assert(rms > 1 && others.every(({ asGood }) => !asGood), JSON.stringify(explanations));
  }
});

Deno.test("explainCurve: says so where the curve cannot tell two contributors apart", () => {
  const { explanations } = explainCurve(BUDGET, {
    curve: curveOf(totalWith({ pair: 3 })),
    suspects: SUSPECTS,
  });
  const own = explanations.filter(({ asGood }) => asGood).map(({ name }) => name).sort();
  assertEquals(own, ["pair", "tank"]);
  // 6 times three is 18: the tank's 4 would have to be 16.
  const tank = explanations.find(({ name }) => name === "tank")!;
  assertClose(tank.decibels, 10 * Math.log10(4), { rtol: 0, atol: 1e-3 });
});

Deno.test("explainCurve: residuals at the budget's offsets inside a shorter curve", () => {
  const curve = [{ offset: 1e5, level: -90 }, { offset: 2e5, level: -98 }];
  const { offsets, residuals, rms } = explainCurve(BUDGET, { curve, suspects: [] });
  assert(offsets.every((offset) => offset >= 1e5 && offset <= 2e5) && offsets.length >= 3);
  assertEquals(residuals.length, offsets.length);
  const mean = residuals.reduce((sum, value) => sum + value ** 2, 0) / residuals.length;
  assertClose(rms, Math.sqrt(mean), { rtol: 1e-12, atol: 0 });
});

Deno.test("explainCurve: refuses curves that are unsorted or elsewhere, and contributors of another length", () => {
  const curve = curveOf(BUDGET.total);
  const suspects = SUSPECTS;
  assertThrows(
    () => explainCurve(BUDGET, { curve: curve.toReversed(), suspects }),
    RangeError,
    /offsets must rise/,
  );
  const elsewhere = [{ offset: 1e8, level: -150 }, { offset: 1e9, level: -150 }];
  assertThrows(
    () => explainCurve(BUDGET, { curve: elsewhere, suspects }),
    RangeError,
    /at least 2 of the budget's offsets, got 0/,
  );
  assertThrows(
    () => explainCurve(BUDGET, { curve, suspects: [{ name: "tank", phase: [1] }] }),
    TypeError,
    /tank must have 31 values, found 1/,
  );
});
