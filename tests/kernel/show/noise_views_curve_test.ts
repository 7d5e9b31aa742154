import {
  amplitudeNoiseChart,
  contributorGroups,
  contributorsChart,
  noiseCurveChart,
} from "../../../kernel/show/noise_views_curve.ts";
import { compareWithMask } from "../../../lib/noise/mask_comparison.ts";
import { formatQuantity } from "../../../lib/quantity/format_quantity.ts";
import { assert, assertClose, assertEquals } from "../../assert.ts";
import { pageOf } from "./_bias_samples.ts";
import { MASK, OFFSETS, sampleFound, samplePoint } from "./_noise_samples.ts";

Deno.test("noiseCurveChart: total, asymptotes, floor and mask, with the least margin and the corner read off", () => {
  const { budget, curve } = sampleFound();
  const comparison = compareWithMask(curve, MASK);
  const page = pageOf(noiseCurveChart(budget, { title: "Noise", mask: MASK, comparison }));
  for (const name of ["total", "1/f^3", "1/f^2", "floor", "mask, the free side below it"]) {
    assert(page.includes(name), name);
  }
  const { worst } = comparison;
  assert(page.includes(`least margin ${formatQuantity(worst.margin, "dB")} at `), "least margin");
  assert(page.includes(worst.origin.label));
  assert(page.includes(`1/f^3 corner at ${formatQuantity(budget.corner!, "Hz")}`));
});

Deno.test("noiseCurveChart: draws each piece of the mask at its level, and a demand at one offset as a triangle", () => {
  const { budget } = sampleFound();
  const html = String(noiseCurveChart(budget, { mask: MASK }).bundle["text/html"]);
  const thick = [...html.matchAll(/stroke-width="3"/g)].length;
  assertEquals(thick, 2, "two lines");
  // Without a mask there is none of it.
  const bare = String(noiseCurveChart(budget).bundle["text/html"]);
  assert(!/stroke-width="3"/.test(bare) && !bare.includes("mask"));
});

Deno.test("noiseCurveChart: a measured curve is drawn as points inside the range", () => {
  const { budget } = sampleFound();
  const measured = {
    name: "bench, sample 3",
    curve: [{ offset: 1e3, level: -50 }, { offset: 1e5, level: -80 }, { offset: 1e6, level: -110 }],
  };
  const count = (html: string) => [...html.matchAll(/<path[^>]*transform="translate/g)].length;
  const [without, own] = [{}, { measured }].map((options) =>
    String(noiseCurveChart(budget, options).bundle["text/html"])
  );
  assertEquals(count(own!) - count(without!), 2);
  assert(own!.includes("bench, sample 3"));
});

Deno.test("contributorGroups: gathers sources by part and kind, and keeps their sum", () => {
  const { budget } = sampleFound();
  const groups = contributorGroups(budget, samplePoint().oscillator);
  assertEquals(groups.map(({ name }) => name).sort(), [
    "buffer",
    "mirror",
    "mirror, 1/f",
    "pair",
    "pair, 1/f",
    "regulator",
    "tail",
    "tail, 1/f",
    "tank",
  ]);
  OFFSETS.forEach((_, k) => {
    const sum = groups.reduce((total, { phase }) => total + phase[k]!, 0);
    assertClose(10 * Math.log10(sum), budget.total[k]!, { rtol: 0, atol: 1e-10 });
  });
});

Deno.test("contributorsChart: names what matters and puts the small ones together", () => {
  const { budget } = sampleFound();
  const page = pageOf(contributorsChart(budget, samplePoint().oscillator));
  for (const name of ["mirror, 1/f", "pair", "tank", "others"]) assert(page.includes(name), name);
});

Deno.test("amplitudeNoiseChart: both curves with what they span", () => {
  const { budget } = sampleFound();
  const page = pageOf(amplitudeNoiseChart(budget));
  const low = formatQuantity(Math.min(...budget.amplitude), "dBc/Hz");
  assert(page.includes(`- amplitude: ${low}`), page.slice(0, 400));
});
