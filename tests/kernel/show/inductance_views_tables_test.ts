import {
  inductanceTable,
  inductanceTrendChart,
  inductanceTrendTable,
  inductorFamilyChart,
} from "../../../kernel/show/inductance_views_tables.ts";
import { smallestByTrial, smallestInductance } from "../../../lib/design/inductance.ts";
import { checkInductance } from "../../../lib/design/inductance_check.ts";
import { inductanceTrend } from "../../../lib/design/inductance_map.ts";
import { ruleFamily } from "../../../lib/design/inductor_family.ts";
import { formatQuantity } from "../../../lib/quantity/format_quantity.ts";
import { assert, assertEquals } from "../../assert.ts";
import { FREQUENCY, PAIR, RULE } from "../../lib/design/_inductance_samples.ts";
import { pageOf } from "./_bias_samples.ts";
import {
  KNEE_MULTIPLE,
  OFFSET,
  OPTIONS,
  PROPOSED,
  sampleAnswers,
  sampleMap,
} from "./_inductance_samples.ts";

const LINE = {
  name: "at 0.7 of the knee current",
  points: inductanceTrend(PAIR, sampleMap(), {
    ...OPTIONS,
    offset: OFFSET,
    amplitude: "computed",
    currentOf: ({ sweep: { knee } }) => knee === undefined ? undefined : KNEE_MULTIPLE * knee,
  }),
};

/** The cells of a row of a table's plain text. */
function row(page: string, name: string): string[] {
  const found = page.split("\n").find((text) => text.startsWith(`${name}  `));
  assert(found !== undefined, `no row "${name}"`);
  return found.split(/ {2,}/);
}

Deno.test("inductanceTrendChart: one panel for each line, computed and closed form in each", () => {
  const fixed = { name: "at 2.2 mA", points: LINE.points.slice(1) };
  const page = pageOf(inductanceTrendChart([LINE, fixed], {
    offset: OFFSET,
    marks: [{ at: 1.9e-9, label: "proposed" }],
  }));
  assertEquals(page.match(/<svg [^>]*role="img"/g)?.length, 2);
  for (const name of ["computed at 2.2 mA", "closed form at 0.7 of the knee current"]) {
    assert(page.includes(`- ${name}: `), name);
  }
  assert(page.includes("proposed at 1.9 nH: "));
});

Deno.test("inductanceTrendTable: deviations and exponents are those of its own columns", () => {
  const page = String(inductanceTrendTable(LINE).bundle["text/plain"]);
  const rows = page.split("\n").slice(3).map((text) => text.trim().split(/ {2,}/));
  assertEquals(rows.length, LINE.points.length);
  for (const [k, cells] of rows.entries()) {
    const { computed, hand } = LINE.points[k]!;
    assertEquals(Number(cells[4]), Number((computed! - hand!).toFixed(1)));
  }
  // The first exponent is the parabola's; between its ends it is near the chord's.
  const [first, third] = [LINE.points[0]!, LINE.points[2]!];
  const chord = (third.computed! - first.computed!) / 10 * Math.LN10 /
    Math.log(third.inductance / first.inductance);
  assert(Math.abs(Number(rows[1]![5]) - chord) < 0.1);
});

Deno.test("inductanceTrendTable: a point without an orbit says so", () => {
  const points = LINE.points.map((point, k) => k === 0 ? { ...point, computed: undefined } : point);
  const page = pageOf(inductanceTrendTable({ name: LINE.name, points }));
  assert(page.includes("no orbit"));
});

Deno.test("inductanceTable: sets the proposed, the smallest and the recommended side by side", () => {
  const { smallest, recommended } = sampleAnswers();
  const inductances = Array.from({ length: 30 }, (_, k) => 0.4e-9 * 1.09 ** k);
  const page = pageOf(inductanceTable({
    proposed: checkInductance(PAIR, PROPOSED, OPTIONS),
    smallest,
    recommended,
    byTrial: {
      found: smallestByTrial(PAIR, PROPOSED.current, { ...OPTIONS, inductances }),
      count: 30,
      step: 1.09,
    },
    frequency: FREQUENCY,
  }));
  const henry = (value: number) => formatQuantity(value, "H", { digits: 3 });
  assertEquals(row(page, "inductance"), [
    "inductance",
    "1.9 nH",
    henry(smallest.check.inductance),
    henry(recommended.check.inductance),
  ]);
  assertEquals(row(page, "what binds").slice(2), [smallest.binding, recommended.binding]);
  assert(/agrees within its step/.test(row(page, "by trial of 30 inductances").join(" ")));
  assert(!page.includes("why none"), "a row without content must be left out");
});

Deno.test("inductanceTable: a search that disagrees with the trial is not passed over", () => {
  const { smallest, recommended } = sampleAnswers();
  const proposed = checkInductance(PAIR, PROPOSED, OPTIONS);
  const shown = (found: typeof proposed | undefined) =>
    pageOf(inductanceTable({
      proposed,
      smallest,
      recommended,
      byTrial: { found, count: 9, step: 1.05 },
      frequency: FREQUENCY,
    }));
  assert(shown({ ...proposed, inductance: 4e-9 }).includes("4 nH: disagrees with the search"));
  assert(shown(undefined).includes("none: disagrees with the search"));
});

Deno.test("inductanceTable: where nothing does it gives the reason", () => {
  const options = { ...OPTIONS, mostPower: 1e-3 };
  const none = smallestInductance(PAIR, PROPOSED.current, options);
  const page = pageOf(inductanceTable({
    proposed: checkInductance(PAIR, PROPOSED, options),
    smallest: none,
    recommended: none,
    byTrial: { found: undefined, count: 9, step: 1.05 },
    frequency: FREQUENCY,
  }));
  assert(page.includes("no, nearest shown") && page.includes("none either"));
  assert(/why none.*at most 1 mW is allowed/.test(page));
});

Deno.test("inductorFamilyChart: a family ends where it ends, a set is joined between its members", () => {
  const narrow = {
    ...ruleFamily({
      quality: 20,
      referenceInductance: 1e-9,
      smallest: 1e-9,
      largest: 2e-9,
    }),
    name: "narrow",
  };
  const set = { ...RULE, name: "set", smallest: 1e-9, largest: 3e-9, inductances: [1e-9, 3e-9] };
  const page = pageOf(inductorFamilyChart([RULE, narrow, set], { frequency: FREQUENCY }));
  assert(page.includes("- quality factor: narrow: 20"));
  // 20 GHz at 2 nH falls as 1/L: 40 GHz at 1 nH, 13.33 GHz at 3 nH.
  assert(page.includes("- self-resonance: set: 13.33 GHz to 40 GHz"));
  assert(page.includes("- self-resonance: narrow: no values"));
});
