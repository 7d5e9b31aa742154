import { assert, assertClose, assertEquals } from "../../assert.ts";
import { crossCoupledPair } from "../../../lib/circuit/cross_coupled_pair.ts";
import { ceilingValues, noisePoint } from "../../../lib/design/noise_point.ts";
import { judgeFigureOfMerit } from "../../../lib/noise/ceiling.ts";
import { noiseBudget } from "../../../lib/noise/budget.ts";
import { CARD, DESIGN, NOMINAL, pairOrbit } from "../../published/_pair.ts";

const OPTIONS = { card: CARD, condition: NOMINAL, offset: 1e6, offsets: [1e5, 1e6] };

Deno.test("noisePoint: orbit, figures and budget as by hand, and the total as a curve", () => {
  const { found } = noisePoint(crossCoupledPair, DESIGN, OPTIONS);
  assert(found);
  const { oscillator, orbit, amplitude } = pairOrbit(DESIGN, NOMINAL);
  const { total } = noiseBudget(oscillator, orbit, { offsets: [1e5, 1e6] });
  assertClose(found.budget.total, total, { rtol: 0, atol: 1e-4 });
  assertClose(found.figures.amplitude, amplitude, { rtol: 1e-6, atol: 0 });
  assertEquals(found.curve.map(({ offset }) => offset), [1e5, 1e6]);
  assertEquals(found.curve.map(({ level }) => level), [...found.budget.total]);
});

Deno.test("noisePoint: no orbit is a reason, not an error", () => {
  const dead = noisePoint(crossCoupledPair, { ...DESIGN, current: 0.1e-3 }, OPTIONS);
  assertEquals(dead.found, undefined);
  assert(dead.reason && dead.reason.length > 10, dead.reason);
  assertEquals(ceilingValues(dead), undefined);
});

Deno.test("ceilingValues: its losses lead from the limit to the figure of merit within a fraction of a decibel", () => {
  const point = noisePoint(crossCoupledPair, { ...DESIGN, current: 1.5e-3 }, OPTIONS);
  const values = ceilingValues(point)!;
  const { losses } = judgeFigureOfMerit(point.found!.figures.figureOfMerit, values);
  // A nearly sinusoidal waveform below the knee: found 0.01 dB left over.
  assertClose(losses.at(-1)!.decibels, 0, { rtol: 0, atol: 0.1 });
  assert(values.efficiency > 0.05 && values.efficiency < 2 / Math.PI, `${values.efficiency}`);
});
