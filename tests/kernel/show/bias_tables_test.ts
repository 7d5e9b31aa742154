import {
  biasTable,
  cornersTable,
  handTable,
  startupTable,
  stressRows,
} from "../../../kernel/show/bias_tables.ts";
import { stress } from "../../../kernel/show/stress.ts";
import { crossCoupledPair } from "../../../lib/circuit/cross_coupled_pair.ts";
import type { CornerBias } from "../../../lib/design/bias.ts";
import { type HandComparison, handComparisons } from "../../../lib/design/hand_values.ts";
import type { Startup } from "../../../lib/design/startup.ts";
import { assert, assertEquals } from "../../assert.ts";
import {
  deadPoint,
  deadSweep,
  nominal,
  OFFSET,
  pageOf,
  sampleCorner,
  sampleSweep,
} from "./_bias_samples.ts";

/** Body rows of a table's plain text, cell by cell. */
function rowsOf(text: string): string[][] {
  return text.split("\n").slice(3).map((line) => line.trim().split(/\s{2,}/));
}

function fileOf(html: string): string[] {
  const [, address] = /href="data:text\/csv;charset=utf-8,([^"]*)"/.exec(html)!;
  return decodeURIComponent(address!).trimEnd().split("\r\n");
}

Deno.test("biasTable: shows every point of a short sweep and hands over all figures", () => {
  const sweep = sampleSweep();
  const showable = biasTable(sweep, { csv: "bias_sweep" });
  const page = pageOf(showable);
  assert(page.startsWith("Bias sweep: typical, 27 °C, 1 V\n"));
  assert(page.includes('download="bias_sweep.csv"'));
  assertEquals(rowsOf(showable.bundle["text/plain"]).map((row) => row[2]), [
    ...sweep.points.map(({ regime }) => regime),
  ]);
  const [head, ...lines] = fileOf(page);
  const columns = head!.split(",");
  assertEquals(lines.length, sweep.points.length);
  lines.forEach((line, k) => {
    const cells = line.split(",");
    const { current, figures, startup } = sweep.points[k]!;
    const of = (name: string) => cells[columns.indexOf(name)];
    assertEquals(of("programmed current [A]"), String(current));
    assertEquals(of("white phase noise [dBc/Hz]"), figures ? String(figures.phaseNoise) : "");
    assertEquals(of("startup loop gain"), String(startup!.loopGain));
    assertEquals(of("frequency [Hz]"), figures ? String(figures.frequency) : "");
  });
});

Deno.test("biasTable: thins the rows of a long sweep but keeps both ends and the whole file", () => {
  const showable = biasTable(deadSweep(64), { csv: "long.csv" });
  const page = pageOf(showable);
  assert(/; (\d+) of 64 currents/.test(page));
  const rows = rowsOf(showable.bundle["text/plain"]);
  assert(rows.length <= 21 && rows.length >= 15, `${rows.length} rows`);
  assertEquals([rows[0]![0], rows[rows.length - 1]![0]].map(Number), [1, 64]);
  assertEquals(fileOf(page).length, 65);
  assert(fileOf(page)[1]!.endsWith("there is no operating point"));
});

Deno.test("biasTable: slopes that are no numbers are a dash", () => {
  const sweep = sampleSweep();
  const points = sweep.points.slice(4, 6).map((point) => ({
    ...point,
    amplitudeExponent: NaN,
    noiseExponent: NaN,
  }));
  const rows = rowsOf(biasTable({ ...sweep, points }).bundle["text/plain"]);
  assertEquals(rows.map((row) => [row[5], row[7]]), [["-", "-"], ["-", "-"]]);
});

Deno.test("cornersTable: says of what each condition is the worst", () => {
  const corners = [
    sampleCorner(nominal),
    sampleCorner({ corner: "slow", temperature: 398.15, supply: 0.95 }),
    sampleCorner({ corner: "fast", temperature: 233.15, supply: 1.05 }),
  ];
  const showable = cornersTable(corners, { csv: "corners" });
  const page = pageOf(showable);
  assert(page.startsWith("The proposed current of 4 mA in every condition\n"));
  const rows = rowsOf(showable.bundle["text/plain"]);
  assertEquals(rows.map(([condition]) => condition), [
    "typical, 27\u00a0°C, 1\u00a0V",
    "slow, 125\u00a0°C, 0.95\u00a0V",
    "fast, -40\u00a0°C, 1.05\u00a0V",
  ]);
  const least = (values: number[]) => values.indexOf(Math.min(...values));
  const words = (k: number) => rows[k]![1]!.split(", ");
  const proposed = corners.map((corner) => corner.proposed);
  const expected = [
    ["lowest loop gain", least(proposed.map(({ startup }) => startup!.loopGain))],
    ["lowest amplitude", least(proposed.map(({ figures }) => figures!.amplitude))],
    ["highest noise", least(proposed.map(({ figures }) => -figures!.phaseNoise))],
    ["highest power", least(proposed.map(({ figures }) => -figures!.power))],
    ["highest proposed / knee", least(corners.map(({ distance }) => -(distance ?? -Infinity)))],
  ] as const;
  for (const [word, k] of expected) assert(words(k).includes(word), `${word} in row ${k + 1}`);
  assertEquals(rows.flatMap((_, k) => words(k)).filter((word) => word !== "-").length, 5);
  assertEquals(fileOf(page)[2]!.split(",").slice(0, 3), ["slow", "398.15", "0.95"]);
});

Deno.test("cornersTable: a condition without an orbit is the worst, and nothing else is said of it", () => {
  const dead: CornerBias = {
    condition: { ...nominal, corner: "slow" },
    knee: undefined,
    recommended: undefined,
    distance: undefined,
    proposed: deadPoint(4e-3),
  };
  const rows = rowsOf(cornersTable([sampleCorner(nominal), dead]).bundle["text/plain"]);
  assertEquals(rows[1], [
    "slow, 27\u00a0°C, 1\u00a0V",
    "no orbit",
    ...["-", "-", "-", "does not start", "-", "-", "-", "-", "-"],
  ]);
  assert(pageOf(cornersTable([])).startsWith("The proposed current in every condition\n"));
});

Deno.test("handTable: hand and computed values of a real point with their outcomes", () => {
  const point = sampleSweep().points[5]!;
  const comparisons = handComparisons(crossCoupledPair, point, {
    offset: OFFSET,
    temperature: nominal.temperature,
  });
  const page = pageOf(handTable(comparisons));
  assertEquals(comparisons.length, 4);
  for (const { name, outcome, source } of comparisons) {
    const line = page.split("\n").find((text) => text.startsWith(name))!;
    assert(line.includes(outcome) && line.includes(source), name);
  }
});

Deno.test("handTable: deviations in dB between levels, else in per cent, and n/a for what is none", () => {
  const one: HandComparison = {
    name: "a",
    formula: "a",
    source: "made up",
    unit: "V",
    hand: 1.1,
    computed: 1,
    deviation: 0.1,
    allowance: 0.05,
    broken: [],
    outcome: "disagrees",
  };
  const rows = rowsOf(
    handTable([
      one,
      {
        ...one,
        unit: "dBc/Hz",
        hand: -110,
        computed: -108,
        deviation: -2,
        allowance: 3,
        outcome: "agrees",
      },
      {
        ...one,
        hand: NaN,
        deviation: NaN,
        broken: ["first", "second"],
        outcome: "does not hold here",
      },
    ]).bundle["text/plain"],
  );
  assertEquals(rows[0], ["a", "1.1 V", "1 V", "+10 %", "±5 %", "✗ disagrees", "-", "made up"]);
  assertEquals(rows[1]!.slice(1, 6), [
    "-110.0 dBc/Hz",
    "-108.0 dBc/Hz",
    "-2.0 dB",
    "±3.0 dB",
    "✓ agrees",
  ]);
  assertEquals(rows[2]!.slice(1), [
    "n/a",
    "1 V",
    "n/a",
    "±5 %",
    "◇ does not hold here",
    "first; second",
    "made up",
  ]);
});

Deno.test("startupTable: figures of a real start, one row for each pole or pair of poles", () => {
  const { startup } = sampleSweep().points[6]!;
  const text = startupTable(startup, { startTime: 1.9e-9 }).bundle["text/plain"];
  const rows = rowsOf(text);
  assertEquals(rows[0]!.slice(0, 2), ["starts by itself", "yes"]);
  assertEquals(rows.find(([name]) => name === "start time")![1], "1.9 ns");
  const poles = rows.filter(([name]) => name!.startsWith("pole of the "));
  assertEquals(poles.length, startup!.poles.filter(({ im }) => im >= 0).length);
  assert(/^rings at [\d.]+ GHz, grows$/.test(poles[0]![2]!), poles[0]![2]);
  pageOf(startupTable(startup));
});

Deno.test("startupTable: no start, no equilibrium and a second unstable pole are said in words", () => {
  const real = sampleSweep().points[6]!.startup!;
  const bad = { name: "common mode", re: 1e9, im: 0 };
  const startup: Startup = {
    ...real,
    starts: false,
    poles: [...real.poles, bad],
    otherUnstable: [bad],
  };
  const rows = rowsOf(startupTable(startup, { startTime: Infinity }).bundle["text/plain"]);
  assertEquals(rows[0]!.slice(0, 2), ["starts by itself", "no"]);
  assertEquals(rows.find(([name]) => name === "start time")![1], "does not start");
  assertEquals(rows[rows.length - 1], [
    "pole of the common mode",
    "1e9 1/s",
    "real, grows, unstable besides the tank",
  ]);
  assert(pageOf(startupTable(undefined)).includes("there is no equilibrium to start from"));
});

Deno.test("stressRows: keeps the worst of each device and quantity and where it occurs", () => {
  const entry = (peak: number, device = "pair plus") =>
    ({ device, quantity: "gate-drain", peak, limit: 1.32, origin: "made up" }) as const;
  const rows = stressRows([
    { condition: nominal, stresses: [entry(1), entry(0.4, "tail")] },
    { condition: { ...nominal, corner: "fast", supply: 1.1 }, stresses: [entry(1.4)] },
    { condition: "on the bench", stresses: [entry(1.2), entry(0.5, "tail")] },
  ]);
  const common = { quantity: "gate to drain voltage, peak", limit: 1.32, unit: "V" };
  assertEquals(rows, [
    { ...common, device: "pair plus", value: 1.4, at: "fast, 27 °C, 1.1 V" },
    { ...common, device: "tail", value: 0.5, at: "on the bench" },
  ]);
  assert(stress(rows).bundle["text/plain"].includes("over the limit"));
});
