import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { crossCoupledPair } from "../../../lib/circuit/cross_coupled_pair.ts";
import type { BiasPoint } from "../../../lib/design/bias.ts";
import {
  type HandComparison,
  handComparisons,
  transistorAt,
} from "../../../lib/design/hand_values.ts";
import { DESIGN, fullSweep, NOMINAL, OFFSET } from "./_pair.ts";

const points = fullSweep().points;
const options = { offset: OFFSET, temperature: NOMINAL.temperature };

function compared(point: BiasPoint): HandComparison[] {
  return handComparisons(crossCoupledPair, point, options);
}

function nearest(current: number): BiasPoint {
  return points.reduce((a, b) =>
    Math.abs(Math.log(b.current / current)) < Math.abs(Math.log(a.current / current)) ? b : a
  );
}

Deno.test("handComparisons: the outcome follows from deviation, allowance and assumptions", () => {
  for (const point of points) {
    for (const { deviation, allowance, broken, outcome, hand, computed, unit } of compared(point)) {
      const expected = unit === "dBc/Hz" ? hand - computed : hand / computed - 1;
      assertClose(deviation, expected, { rtol: 1e-14, atol: 0 });
      const within = Math.abs(deviation) <= allowance;
      assertEquals(
        outcome,
        within ? "agrees" : broken.length > 0 ? "does not hold here" : "disagrees",
      );
      assert(broken.every((text) => text.length > 0 && !text.endsWith(".")), broken.join("; "));
    }
  }
});

Deno.test("handComparisons: empty without an orbit, four formulas with one", () => {
  for (const point of points) assertEquals(compared(point).length, point.orbit ? 4 : 0);
});

Deno.test("handComparisons: in hard switching below the knee every formula holds and agrees", () => {
  const found = compared(nearest(1.8e-3));
  assertEquals(found.map(({ outcome }) => outcome), Array(4).fill("agrees"));
  assertEquals(found.flatMap(({ broken }) => broken), []);
});

Deno.test("handComparisons: just above startup the amplitude's law does not hold, and says why", () => {
  const started = points.find(({ orbit }) => orbit !== undefined)!;
  const amplitude = compared(started).find(({ unit }) => unit === "V")!;
  assertEquals(amplitude.outcome, "does not hold here");
  assert(amplitude.deviation > 0.5, `${amplitude.deviation}`);
  assert(/loop gain 1\.\d\d is below 2\.5/.test(amplitude.broken.join()), amplitude.broken.join());
});

Deno.test("handComparisons: past the knee the amplitude's law does not hold, and says why", () => {
  const amplitude = compared(points.at(-1)!).find(({ unit }) => unit === "V")!;
  assertEquals(amplitude.outcome, "does not hold here");
  assert(/near or past the knee/.test(amplitude.broken.join()), amplitude.broken.join());
});

Deno.test("handComparisons: where the mirror's noise counts, the formula without it does not hold", () => {
  const point = nearest(3e-3);
  const noise = compared(point).find(({ unit }) => unit === "dBc/Hz")!;
  const mirror = point.figures!.shares.find(({ device }) => device === "mirror")!.share;
  assert(mirror > 0.2, `the mirror's share is ${mirror}`);
  assertEquals(noise.outcome, "does not hold here");
  assert(
    /\d % of the noise comes from (the )?mirror/.test(noise.broken.join()),
    noise.broken.join(),
  );
});

Deno.test("handComparisons: a formula that is off where it should hold disagrees", () => {
  const doubled = {
    ...crossCoupledPair,
    amplitude: (values: { current: number; resistance: number }) =>
      2 * crossCoupledPair.amplitude(values),
  };
  const found = handComparisons(doubled, nearest(1.8e-3), options);
  const amplitude = found.find(({ unit }) => unit === "V")!;
  assertEquals(amplitude.outcome, "disagrees");
  assertClose(amplitude.deviation, 1, { rtol: 0, atol: 0.1 });
});

Deno.test("transistorAt: the operating point of a named device", () => {
  const { oscillator, startup } = nearest(2e-3);
  const { state } = startup!.equilibrium;
  const sides = ["pair plus", "pair minus"].map((name) => transistorAt(oscillator, name, state));
  assertClose(sides[0]!.current, sides[1]!.current, { rtol: 1e-9, atol: 0 });
  const tail = transistorAt(oscillator, "tail", state);
  assertClose(tail.current, 2 * sides[0]!.current, { rtol: 1e-7, atol: 0 });
  const mirror = transistorAt(oscillator, "mirror", state);
  assertClose(mirror.current * DESIGN.mirrorRatio, nearest(2e-3).current, { rtol: 1e-7, atol: 0 });
  assertEquals(tail.region, "saturation");
});

Deno.test("transistorAt: refuses a name that is none or no transistor's", () => {
  const { oscillator, startup } = nearest(2e-3);
  const { state } = startup!.equilibrium;
  for (const name of ["buffer", "coil", ""]) {
    const wording = new RegExp(`there is no transistor "${name}"`);
    assertThrows(() => transistorAt(oscillator, name, state), RangeError, wording);
  }
});
