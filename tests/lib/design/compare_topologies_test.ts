import { crossCoupledPair } from "../../../lib/circuit/cross_coupled_pair.ts";
import { topologies, type TopologyName } from "../../../lib/circuit/topologies.ts";
import { cornerConditions } from "../../../lib/design/bias.ts";
import { onCommonTank } from "../../../lib/design/common_tank.ts";
import {
  contender,
  type ContenderOptions,
  type TopologyResult,
} from "../../../lib/design/compare_topologies.ts";
import { operatingFigures } from "../../../lib/design/operating_figures.ts";
import { oscillation } from "../../../lib/design/oscillation.ts";
import { startup } from "../../../lib/design/startup.ts";
import { Orbit } from "../../../lib/orbit/orbit.ts";
import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { CARD, FREQUENCY } from "./_inductance_samples.ts";

const SUPPLY = 0.9;
const CONDITIONS = cornerConditions(CARD, {
  supply: { lowest: 0.85, nominal: SUPPLY, highest: 0.95 },
});
const OPTIONS: ContenderOptions = {
  card: CARD,
  condition: CONDITIONS[0],
  frequency: FREQUENCY,
  offset: 1e6,
  power: 2.5e-3,
  current: 2e-3,
};
const COMMON = {
  card: CARD,
  supply: SUPPLY,
  inductance: 1.8e-9,
  quality: 14,
  frequency: FREQUENCY,
  pair: { width: 30e-6, length: 60e-9 },
  tail: { width: 70e-6, length: 180e-9 },
  mirrorRatio: 4,
  tap: 0.35,
  loadCapacitance: 20e-15,
};
const NAMES = Object.keys(topologies) as TopologyName[];

const solved = new Map<TopologyName, TopologyResult>();

function result(name: TopologyName): TopologyResult {
  const known = solved.get(name) ?? onCommonTank(name, COMMON).solve(OPTIONS);
  solved.set(name, known);
  return known;
}

for (const name of NAMES) {
  Deno.test(`contender: ${name} draws the power at the frequency, or says why it has no orbit`, () => {
    const { figures, reason, loopGain, schematic, title } = result(name);
    assertEquals(title, topologies[name].title);
    if (!figures) {
      assert(reason !== undefined && reason.length > 0);
      assert(loopGain !== undefined && loopGain < 1, `${reason} at ${loopGain}`);
      return;
    }
    assertClose(figures.power, OPTIONS.power, { rtol: 1e-3, atol: 0 });
    assertClose(figures.frequency, FREQUENCY, { rtol: 1e-4, atol: 0 });
    assert(schematic !== undefined);
  });
}

Deno.test("contender: most topologies oscillate at that power, so the comparison says something", () => {
  assert(NAMES.filter((name) => result(name).figures).length >= 7);
});

Deno.test("contender: its figures are those of the design it found", () => {
  const { current, capacitance, figures } = result("n_pair");
  const design = {
    tank: { inductance: 1.8e-9, quality: 14, qualityFrequency: FREQUENCY, capacitance },
    pair: COMMON.pair,
    tail: COMMON.tail,
    mirrorRatio: 4,
    loadCapacitance: 20e-15,
    current,
  };
  const oscillator = crossCoupledPair.build(design, { card: CARD, condition: CONDITIONS[0] });
  const started = startup(oscillator);
  assert(started.status === "found");
  const orbit = oscillation(oscillator, { started });
  assert(orbit instanceof Orbit);
  const own = operatingFigures(oscillator, orbit, { supply: SUPPLY, offset: 1e6 });
  assertClose(figures!.phaseNoise, own.phaseNoise, { rtol: 0, atol: 1e-6 });
  assertClose(figures!.amplitude, own.amplitude, { rtol: 1e-7, atol: 0 });
});

Deno.test("contender: in another condition the design stays as it was found", () => {
  const { in: at, loopGainIn, loopGain } = result("n_pair");
  assertClose(loopGainIn(CONDITIONS[0])!, loopGain!, { rtol: 1e-12, atol: 0 });
  const worst = CONDITIONS.map((condition) => loopGainIn(condition) ?? 0);
  const slow = at(CONDITIONS[worst.indexOf(Math.min(...worst))]!);
  assertEquals(slow.loopGain, Math.min(...worst));
  assertEquals(slow.condition.corner, "slow");
  assert(slow.figures !== undefined);
  // The capacitors are 10 % larger at the slow corner and nothing is trimmed again.
  assert(slow.figures!.frequency < FREQUENCY * 0.98);
});

Deno.test("contender: stresses come with the nearest to its limit first", () => {
  const { stresses } = result("class_c_pair");
  const shares = stresses.map(({ peak, limit }) => peak / limit);
  assert(shares.length > 4);
  assertEquals(shares, [...shares].sort((a, b) => b - a));
});

Deno.test("contender: where the devices' own capacitance is too much it says so", () => {
  const wide = { ...COMMON, inductance: 5e-9, pair: { width: 900e-6, length: 60e-9 } };
  const lost = onCommonTank("n_pair", wide).solve(OPTIONS);
  assertEquals(lost.figures, undefined);
  assertEquals(lost.reason, "its devices' own capacitance is too much at the frequency");
  assertEquals(lost.schematic, undefined);
  assertEquals(lost.in(CONDITIONS[1]!).reason, lost.reason);
  assertEquals(lost.loopGainIn(CONDITIONS[1]!), undefined);
});

Deno.test("contender: a power no current reaches is said, not approached in silence", () => {
  // A pair of 30 um with its sources at ground through a resistor cannot carry an ampere.
  const lost = onCommonTank("n_pair_resistor_tail", COMMON).solve({ ...OPTIONS, power: 1 });
  assertEquals(lost.figures, undefined);
  assert(/pair must carry more than/.test(lost.reason!), lost.reason);
});

Deno.test("contender: too little power leaves it without an orbit, with its loop gain", () => {
  const weak = onCommonTank("n_pair", COMMON).solve({ ...OPTIONS, power: 0.1e-3 });
  assertEquals(weak.figures, undefined);
  assert(weak.loopGain! < 1 && weak.reason !== undefined);
});

Deno.test("contender: refuses a power or a frequency that is not positive", () => {
  const own = contender({
    topology: crossCoupledPair,
    inductance: 1e-9,
    designAt: () => {
      throw new Error("must not be asked");
    },
  });
  assertThrows(() => own.solve({ ...OPTIONS, power: 0 }), RangeError, /power and frequency/);
  assertThrows(() => own.solve({ ...OPTIONS, frequency: NaN }), RangeError, /got .* NaN Hz/);
});
