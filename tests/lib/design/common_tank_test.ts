import { topologies, type TopologyName } from "../../../lib/circuit/topologies.ts";
import { onCommonTank } from "../../../lib/design/common_tank.ts";
import type { TopologyResult } from "../../../lib/design/compare_topologies.ts";
import { assert, assertClose, assertEquals } from "../../assert.ts";
import { CARD, FREQUENCY } from "./_inductance_samples.ts";

const COMMON = {
  card: CARD,
  supply: 0.9,
  inductance: 1.8e-9,
  quality: 14,
  frequency: FREQUENCY,
  pair: { width: 30e-6, length: 60e-9 },
  tail: { width: 70e-6, length: 180e-9 },
  mirrorRatio: 4,
  tap: 0.35,
  loadCapacitance: 20e-15,
};
const OPTIONS = {
  card: CARD,
  condition: { corner: "typical", temperature: 300.15, supply: 0.9 },
  frequency: FREQUENCY,
  offset: 1e6,
  power: 2.5e-3,
  current: 2e-3,
} as const;
const NAMES = Object.keys(topologies) as TopologyName[];

/** Value of a symbol of the schematic of a topology's design. */
function valueOf({ schematic }: TopologyResult, symbol: RegExp): number {
  const found = schematic?.symbols.find(({ name }) => symbol.test(name));
  assert(found?.value !== undefined, `no ${symbol}`);
  return found.value.value;
}

Deno.test("onCommonTank: every topology has a design, under its own name", () => {
  for (const name of NAMES) {
    const { name: own, title } = onCommonTank(name, COMMON);
    assertEquals(own, topologies[name].name);
    assertEquals(title, topologies[name].title);
  }
});

Deno.test("onCommonTank: all have the coil's inductance and the loss that goes with it", () => {
  for (const name of NAMES) {
    const result = onCommonTank(name, COMMON).solve(OPTIONS);
    assertClose(valueOf(result, /^coil/), 1.8e-9, { rtol: 1e-12, atol: 0, what: name });
    assertClose(valueOf(result, /^tank loss/), 14 * 2 * Math.PI * FREQUENCY * 1.8e-9, {
      rtol: 1e-9,
      atol: 0,
      what: name,
    });
  }
});

Deno.test("onCommonTank: the supply alone decides the current of a pair without a tail", () => {
  const { current } = onCommonTank("n_pair_no_tail", COMMON).solve(OPTIONS);
  const doubled = onCommonTank("n_pair_no_tail", {
    ...COMMON,
    pair: { width: 60e-6, length: 60e-9 },
  }).solve(OPTIONS);
  // Its width follows from the current, whatever the pair's: the capacitance is then the same as well.
  assertClose(doubled.current, current, { rtol: 1e-9, atol: 0 });
});

Deno.test("onCommonTank: the divider holds the tap and, in series, the whole capacitance", () => {
  const one = onCommonTank("colpitts", COMMON).solve(OPTIONS);
  const [first, second] = [/^first capacitor/, /^second capacitor/].map((name) =>
    valueOf(one, name)
  );
  assertClose(first! / (first! + second!), 0.35, { rtol: 1e-9, atol: 0 });
  const series = first! * second! / (first! + second!);
  assertClose(series + COMMON.loadCapacitance, one.capacitance, { rtol: 1e-9, atol: 0 });
});

Deno.test("onCommonTank: a tap outside 0 to 1 is a reason, not a crash", () => {
  const lost = onCommonTank("colpitts", { ...COMMON, tap: 1 }).solve(OPTIONS);
  assertEquals(lost.figures, undefined);
  assert(/tap must lie between 0 and 1, got 1/.test(lost.reason!), lost.reason);
});

Deno.test("onCommonTank: a P pair is wider by the ratio of the transconductance parameters", () => {
  const result = onCommonTank("p_pair", COMMON).solve(OPTIONS);
  // 270 uA/V^2 over 95 uA/V^2 on the illustrative card.
  assertClose(valueOf(result, /^pair plus/), 30e-6 * 270 / 95, { rtol: 1e-9, atol: 0 });
});
