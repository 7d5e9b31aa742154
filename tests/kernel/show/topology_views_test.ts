import {
  quietest,
  topologyChart,
  type TopologyEntry,
  topologyTable,
} from "../../../kernel/show/topology_views.ts";
import type { TopologyName } from "../../../lib/circuit/topologies.ts";
import { onCommonTank } from "../../../lib/design/common_tank.ts";
import { assert, assertEquals } from "../../assert.ts";
import { CARD, FREQUENCY } from "../../lib/design/_inductance_samples.ts";
import { pageOf } from "./_bias_samples.ts";

const CONDITION = { corner: "typical", temperature: 300.15, supply: 0.9 } as const;
const SLOW = { corner: "slow", temperature: 398.15, supply: 0.85 } as const;

function entry(name: TopologyName, power = 2.5e-3): TopologyEntry {
  const result = onCommonTank(name, {
    card: CARD,
    supply: 0.9,
    inductance: 1.8e-9,
    quality: 14,
    frequency: FREQUENCY,
    pair: { width: 30e-6, length: 60e-9 },
    tail: { width: 70e-6, length: 180e-9 },
    mirrorRatio: 4,
    tap: 0.35,
  }).solve({
    card: CARD,
    condition: CONDITION,
    frequency: FREQUENCY,
    offset: 1e6,
    power,
    current: 2e-3,
  });
  return { result, worstLoopGain: result.loopGainIn(SLOW) };
}

const ENTRIES = (["n_pair", "colpitts", "n_pair_resistor_tail", "differential_colpitts"] as const)
  .map((name) => entry(name));
const DEAD = entry("p_pair", 0.1e-3);
const CHART = { chosen: "n_pair", offset: 1e6, leastLoopGain: 2, noiseReach: 3 };

Deno.test("topologyTable: the quietest first, the chosen one marked, what is lost last with its reason", () => {
  const page = pageOf(topologyTable([DEAD, ...ENTRIES], { chosen: "n_pair" }));
  const rows = page.split("\n").slice(3, 8).map((text) => text.trim().split(/ {2,}/));
  const noises = ENTRIES.map(({ result }) => [result.figures!.phaseNoise, result.name] as const);
  const order = [...noises].sort(([a], [b]) => a - b).map(([, name]) => name);
  const marked = order.map((name) => name === "n_pair" ? "n_pair (chosen)" : name);
  assertEquals(rows.map(([name]) => name), [...marked, "p_pair"]);
  assert(page.includes(DEAD.result.reason!));
});

Deno.test("topologyChart: draws every topology with an orbit and reads its figures off", () => {
  const page = pageOf(topologyChart([...ENTRIES, DEAD], CHART));
  const texts = [...page.matchAll(/<text[^>]*>([^<]*)</g)].map(([, text]) => text!);
  for (const name of ["n_pair (chosen)", "colpitts", "n_pair_resistor_tail"]) {
    assert(texts.includes(name), `${name} is not drawn`);
  }
  assert(!texts.some((text) => text.startsWith("p_pair")));
  assert(page.includes(`- p_pair: not drawn, ${DEAD.result.reason}`));
  assert(/- n_pair: -1\d\d\.\d dBc\/Hz, worst loop gain \d/.test(page));
});

Deno.test("topologyChart: with nothing to draw it says why for each", () => {
  const page = pageOf(topologyChart([DEAD], CHART));
  assert(!page.includes("<svg"));
  assert(page.includes("- p_pair: not drawn, "));
});

Deno.test("quietest: counts only those that start everywhere", () => {
  const best = Math.min(...ENTRIES.map(({ result }) => result.figures!.phaseNoise));
  const lame = ENTRIES.map((one) =>
    one.result.figures!.phaseNoise === best ? { ...one, worstLoopGain: 1.5 } : one
  );
  assertEquals(quietest(ENTRIES, 0.5), best);
  assert(quietest(lame, 2)! > best);
  assertEquals(quietest(ENTRIES, 99), undefined);
});
