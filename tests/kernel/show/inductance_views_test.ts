import { inductanceMap } from "../../../kernel/show/inductance_views.ts";
import { formatQuantity } from "../../../lib/quantity/format_quantity.ts";
import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { pageOf } from "./_bias_samples.ts";
import {
  KNEE_MULTIPLE,
  OFFSET,
  PROPOSED,
  sampleAnswers,
  sampleMap,
} from "./_inductance_samples.ts";

const ASKED = { offset: OFFSET, kneeMultiple: KNEE_MULTIPLE, loopGain: 2, mostPower: 3e-3 };

function line(page: string, start: string): string {
  const found = page.split("\n").find((text) => text.startsWith(start));
  assert(found !== undefined, `no line begins with "${start}"`);
  return found;
}

function texts(html: string): string[] {
  return [...html.matchAll(/<text[^>]*>([^<]*)</g)].map(([, text]) => text!);
}

Deno.test("inductanceMap: names lines, shades, limits and points, and what binds", () => {
  const { smallest, recommended, limits } = sampleAnswers();
  const page = pageOf(inductanceMap(sampleMap(), {
    ...ASKED,
    limits,
    points: [
      { label: "proposed", ...PROPOSED },
      { label: "recommended", ...recommended.check },
    ],
    binding: [
      { where: "at the proposed current", limit: smallest.binding },
      { where: "at the recommended current", limit: recommended.binding },
    ],
  }));
  for (
    const name of [
      "knee",
      "recommended, 0.7 of the knee",
      "quietest at that current",
      "loop gain below 2 at the worst corner",
      "more than 3 mW",
      "outside the family or its limits",
    ]
  ) {
    assert(page.includes(` ${name}</span>`), `no key for "${name}"`);
  }
  for (const name of ["\u25cb proposed", "\u25c7 recommended", "self-resonance"]) {
    assert(texts(page).includes(name), `"${name}" is not on the map`);
  }
  line(page, "- \u25cb proposed: 1.9 nH at 2.2 mA, read off about -1");
  const resonance = limits.find(({ limit }) => limit === "self-resonance")!;
  line(
    page,
    `- self-resonance: no larger than ${formatQuantity(resonance.inductance, "H", { digits: 3 })}`,
  );
  line(
    page,
    `- what keeps the inductance from being smaller at the proposed current: ${smallest.binding}`,
  );
});

Deno.test("inductanceMap: says both truths with their figures", () => {
  const columns = sampleMap();
  const page = pageOf(inductanceMap(columns, {
    ...ASKED,
    points: [{ label: "proposed", current: 0.8e-3, inductance: 1.9e-9 }],
  }));
  const along = line(page, "- along the recommended current the noise falls by ");
  assert(/ from 4 nH down to [\d.]+ (p|n)H$/.test(along), along);
  // At a third of the knee current a larger inductance is quieter.
  const fixed = line(page, "- at 800 uA the noise falls by ");
  assert(/ up to [\d.]+ nH, where it is 0\.\d+ of the knee current$/.test(fixed), fixed);
  const read = (start: string) => Number(/falls by ([\d.]+) dB/.exec(start)![1]);
  const noise = (k: number, current: number) =>
    columns[k]!.sweep.points.reduce((best, point) =>
      Math.abs(Math.log(point.current / current)) < Math.abs(Math.log(best.current / current))
        ? point
        : best
    ).figures!.phaseNoise;
  // The nearest points of the sweep are up to 15 % of the current off, about 1.5 dB at each end.
  const knees = columns.map(({ sweep }) => KNEE_MULTIPLE * (sweep.knee ?? NaN));
  const first = knees.findIndex((knee) => knee <= 9e-3);
  const drop = noise(5, knees[5]!) - noise(first, knees[first]!);
  assertClose(read(along), drop, { rtol: 0, atol: 3 });
});

Deno.test("inductanceMap: contours are labelled with round levels that the map holds", () => {
  const page = pageOf(inductanceMap(sampleMap(), ASKED));
  const values = sampleMap().flatMap(({ sweep }) =>
    sweep.points.flatMap(({ figures }) => figures?.phaseNoise ?? [])
  );
  const levels = texts(page).filter((text) => /^\u2212\d+/.test(text)).map((text) =>
    Number(text.replace("\u2212", "-"))
  );
  assert(levels.length >= 3, `labels: ${levels}`);
  for (const level of levels) {
    assert(level > Math.min(...values) && level < Math.max(...values));
    assertEquals(level % 0.5, -0);
  }
});

Deno.test("inductanceMap: the startup boundary is drawn where the columns have it", () => {
  const columns = sampleMap();
  const html = String(inductanceMap(columns, ASKED).bundle["text/html"]);
  const inside = columns.filter(({ startupCurrent }) => startupCurrent !== undefined);
  assert(inside.length >= 3);
  const { inductance, startupCurrent } = inside[1]!;
  // 520 px from 60 px over the currents, 356 px up to 30 px over the inductances.
  const x = 60 + 520 * Math.log(startupCurrent! / 0.2e-3) / Math.log(9 / 0.2);
  const y = 386 - 356 * Math.log(inductance / 0.7e-9) / Math.log(4 / 0.7);
  const points = [...html.matchAll(/([\d.]+),([\d.]+)/g)].map(([, px, py]) => [px, py].map(Number));
  const distance = Math.min(...points.map(([px, py]) => Math.hypot(px! - x, py! - y)));
  assert(distance < 0.5, `the nearest drawn point is ${distance} px away`);
});

Deno.test("inductanceMap: the same map twice is the same to the byte", () => {
  const [one, two] = [1, 2].map(() => inductanceMap(sampleMap(), ASKED).bundle["text/html"]);
  assertEquals(one, two);
});

Deno.test("inductanceMap: a map without any orbit says so and shows no number that is none", () => {
  const columns = sampleMap().map((column) => ({
    ...column,
    startupCurrent: undefined,
    powerCurrent: undefined,
    sweep: {
      ...column.sweep,
      knee: undefined,
      points: column.sweep.points.map((point) => ({ ...point, figures: undefined })),
    },
  }));
  const page = pageOf(inductanceMap(columns, {
    ...ASKED,
    points: [{ label: "proposed", ...PROPOSED }, { label: "far", current: 1, inductance: 1 }],
  }));
  assert(page.includes("no contour, too few orbits"));
  assert(page.includes("proposed: 1.9 nH at 2.2 mA, no orbit beside it"));
  assert(page.includes("far: 1 H at 1 A, outside the map"));
});

Deno.test("inductanceMap: refuses one column, columns out of order and columns of other currents", () => {
  const [first, second] = [sampleMap()[0]!, sampleMap()[1]!];
  assertThrows(() => inductanceMap([first], ASKED), RangeError, /at least 2 columns, got 1/);
  assertThrows(() => inductanceMap([second, first], ASKED), RangeError, /inductances must rise/);
  const fewer = { ...second, sweep: { ...second.sweep, points: second.sweep.points.slice(1) } };
  assertThrows(() => inductanceMap([first, fewer], ASKED), TypeError, /the same currents/);
});
