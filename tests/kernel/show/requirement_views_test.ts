import { maskChart, maskTable } from "../../../kernel/show/requirement_views.ts";
import { maskFrom } from "../../../lib/noise/mask.ts";
import { assert, assertEquals } from "../../assert.ts";
import { pageOf } from "./_bias_samples.ts";
import { DEMANDS, MASK } from "./_noise_samples.ts";

Deno.test("maskChart: every demand in the key with what it spans, the mask hatched over them", () => {
  const page = pageOf(maskChart(MASK, { demands: DEMANDS, range: { from: 1e5, to: 1e8 } }));
  assert(page.includes("- phase error: -80.0 dBc/Hz to -100.0 dBc/Hz"), page.slice(0, 600));
  assert(page.includes("- neighbour: -104.0 dBc/Hz to -104.0 dBc/Hz"));
  assertEquals([...page.matchAll(/stroke-width="3"/g)].length, 2);
});

Deno.test("maskChart: cuts demands off at the range", () => {
  const page = pageOf(maskChart(MASK, { demands: DEMANDS, range: { from: 1e6, to: 1e7 } }));
  assert(!page.includes("spur"), "outside the range");
  assert(page.includes("neighbour"));
});

Deno.test("maskTable: one row for each piece with its origin, numbers kept with their units", () => {
  const open = maskFrom([{ ...DEMANDS[1]!, to: Infinity }], { frequency: 5e9 });
  const page = pageOf(maskTable(open));
  assert(/1\u00a0MHz +no end +-104 +0 +neighbour +C\/I -20 dB/.test(page), page);
  assertEquals(
    pageOf(maskTable(MASK)).split("\n").filter((line) => /^\d+\u00a0/.test(line)).length,
    3,
  );
});
