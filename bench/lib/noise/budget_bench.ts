/**
 * The noise budget of the example's pair: one at 40 offsets with all sources, and a sweep of 60 bias
 * points with a budget at each.
 */
import { crossCoupledPair } from "../../../lib/circuit/cross_coupled_pair.ts";
import { biasSweep, logarithmicCurrents } from "../../../lib/design/bias.ts";
import { noiseBudget } from "../../../lib/noise/budget.ts";
import { card, condition, design } from "../../_buoy_pair.ts";

const OFFSETS = Array.from({ length: 40 }, (_, k) => 1e3 * 10 ** (5 * k / 39));

function sweep(points: number) {
  return biasSweep(crossCoupledPair, design, {
    card,
    condition,
    currents: logarithmicCurrents({ from: 0.5e-3, to: 6e-3, count: points }),
    offset: 1e6,
  }).points;
}

const [point] = sweep(3).filter(({ orbit }) => orbit);

Deno.bench("budget at 40 offsets with all sources", () => {
  if (!point?.orbit) throw new RangeError("No orbit to make a budget of");
  noiseBudget(point.oscillator, point.orbit, { offsets: OFFSETS });
});

Deno.bench("sweep of 60 bias points with startup and figures", () => {
  sweep(60);
});

Deno.bench("sweep of 60 bias points, a budget at 40 offsets at each", () => {
  for (const { orbit, oscillator } of sweep(60)) {
    if (orbit) noiseBudget(oscillator, orbit, { offsets: OFFSETS });
  }
});
