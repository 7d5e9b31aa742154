import {
  ceilingTable,
  contributorsTable,
  derivativesTable,
  explanationsTable,
  integralsTable,
  suggestionsTable,
} from "../../../kernel/show/noise_views_tables.ts";
import { ceilingValues } from "../../../lib/design/noise_point.ts";
import type { WhatIf } from "../../../lib/design/what_if.ts";
import { judgeFigureOfMerit } from "../../../lib/noise/ceiling.ts";
import { integratePhaseNoise } from "../../../lib/noise/integrals.ts";
import { assert, assertClose } from "../../assert.ts";
import { pageOf } from "./_bias_samples.ts";
import { sampleFound, samplePoint } from "./_noise_samples.ts";

const lineOf = (page: string, start: string) => {
  const found = page.split("\n").find((line) => line.startsWith(start));
  assert(found !== undefined, `no line begins with "${start}"`);
  return found!;
};

Deno.test("contributorsTable: levels and shares at the offsets asked for, ended by the total", () => {
  const { budget } = sampleFound();
  const page = pageOf(
    contributorsTable(budget, { parts: samplePoint().oscillator.parts, offsets: [1.1e5, 1e6] }),
  );
  assert(page.includes("at 100 kHz, dBc/Hz") && page.includes("share at 1 MHz, %"));
  const total = lineOf(page, "total ");
  assert(total.includes("100") && total.includes(budget.total[10]!.toFixed(1)), total);
  const floor = lineOf(page, "buffer ");
  assert(floor.includes("-150"), floor);
});

Deno.test("integralsTable: phase error in degrees, jitter in the unit that fits", () => {
  // -100 dBc/Hz over 1 MHz: 0.81 degrees; at 1 GHz 2.25 ps (arithmetic of phi^2 = 2 times the area).
  const integral = integratePhaseNoise({ floor: 1e-10 }, { from: 1e-3, to: 1e6, frequency: 1e9 });
  const page = pageOf(integralsTable([{ name: "flat", integral }], { caption: "An example" }));
  assert(/flat +-40\.0 +0\.81\d* +2\.25/.test(page), page);
});

Deno.test("ceilingTable: the steps lead from the limit to the figure of merit", () => {
  const values = ceilingValues(samplePoint())!;
  const judgement = judgeFigureOfMerit(sampleFound().figures.figureOfMerit, values);
  const page = pageOf(ceilingTable(judgement));
  const sum = judgement.losses.reduce((total, { decibels }) => total + decibels, 0);
  assertClose(judgement.limit - sum, judgement.figureOfMerit, { rtol: 1e-12, atol: 0 });
  for (
    const step of ["limit for", "efficiency", "noise factor", "not accounted for", "figure of"]
  ) {
    lineOf(page, step);
  }
  assert(page.includes("parallel conductance"), "assumptions are printed");
});

Deno.test("explanationsTable: the best first, and whether the curve can tell the others from it", () => {
  const page = pageOf(explanationsTable({
    offsets: [1e5, 1e6],
    residuals: [6, 0],
    rms: 4.24,
    explanations: [
      { name: "tail, 1/f", decibels: 10, rms: 0.1, asGood: true },
      { name: "mirror, 1/f", decibels: 7, rms: 0.2, asGood: true },
      { name: "tank", decibels: 3, rms: 2, asGood: false },
    ],
  }));
  assert(/4\.2 dB rms/.test(page), page);
  assert(/tail, 1\/f .* it is the best/.test(lineOf(page, "tail")), page);
  assert(/ no$/.test(lineOf(page, "mirror")) && / yes$/.test(lineOf(page, "tank")), page);
});

const figures = sampleFound().figures;
const answer: WhatIf = {
  now: { figures, noise: -110, loopGain: 3 },
  step: 0.002,
  derivatives: [
    { name: "current", unit: "A", value: 2e-3, noise: -8.7, amplitude: 1, power: 1, frequency: 0 },
    {
      name: "filter",
      unit: "F",
      value: 0,
      noise: undefined,
      amplitude: undefined,
      power: undefined,
      frequency: undefined,
    },
  ],
  suggestions: [
    {
      name: "current",
      unit: "A",
      from: 2e-3,
      to: 4e-3,
      promised: -6,
      after: { figures, noise: -115, loopGain: 5 },
    },
    { name: "width", unit: "m", from: 2e-5, to: 1e-5, promised: -2, after: undefined },
  ],
};

Deno.test("derivativesTable: changes for one per cent, a dash where there is no derivative", () => {
  const page = pageOf(derivativesTable(answer));
  // -8.7 ln 1.01 = -0.087 dB.
  assert(/current +2\u00a0mA +-0\.087 /.test(page), page);
  assert(/filter +0\u00a0F +- +- +- +-/.test(page), page);
});

Deno.test("suggestionsTable: what was found beside what was promised; a dead end says so", () => {
  const page = pageOf(suggestionsTable(answer));
  assert(/current 2 mA to 4 mA +-115 +-5 +-6 /.test(page), page);
  assert(/width 20 um to 10 um: no orbit +- +- +-2 /.test(page), page);
});
