import { biasSweep, logarithmicCurrents } from "../../../lib/design/bias.ts";
import { checkInductance, trimTank } from "../../../lib/design/inductance_check.ts";
import {
  familyLimits,
  type InductanceColumn,
  inductanceColumn,
  inductanceTrend,
  smallestOnKneeLine,
} from "../../../lib/design/inductance_map.ts";
import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { asked, CARD, PAIR, RULE } from "./_inductance_samples.ts";

const CURRENTS = logarithmicCurrents({ from: 0.4e-3, to: 10e-3, count: 20 });
const OFFSET = 1e6;
const MULTIPLE = 0.7;

let kept: InductanceColumn[] | undefined;

/** Eight inductances from 0.7 nH to 4 nH; made once. */
function map(): InductanceColumn[] {
  kept ??= Array.from({ length: 8 }, (_, k) => 0.7e-9 * (4 / 0.7) ** (k / 7)).flatMap(
    (inductance) =>
      inductanceColumn(PAIR, inductance, { ...asked(), currents: CURRENTS, offset: OFFSET }) ?? [],
  );
  return kept;
}

Deno.test("inductanceColumn: its startup and power currents lie on the limits", () => {
  const options = asked();
  for (const { inductance, startupCurrent, powerCurrent } of [map()[3]!, map()[5]!]) {
    const at = (current: number) => checkInductance(PAIR, { inductance, current }, options);
    assertClose(at(startupCurrent!).worstLoopGain, 2, { rtol: 1e-3, atol: 0 });
    // Between the points of the sweep the power is interpolated.
    assertClose(at(powerCurrent!).power!, options.mostPower, { rtol: 0.01, atol: 0 });
  }
});

Deno.test("inductanceColumn: boundaries beyond the sweep are undefined or its first current", () => {
  const few = { ...asked(), currents: [2.0e-3, 2.2e-3, 2.4e-3], offset: OFFSET };
  const small = inductanceColumn(PAIR, 0.5e-9, few)!;
  assertEquals(small.startupCurrent, undefined);
  assertEquals(small.powerCurrent, undefined);
  const large = inductanceColumn(PAIR, 3e-9, few)!;
  assertEquals(large.startupCurrent, 2.0e-3);
  const poor = inductanceColumn(PAIR, 3e-9, { ...few, mostPower: 0.1e-3 })!;
  assertEquals(poor.powerCurrent, 2.0e-3);
});

Deno.test("inductanceColumn: is undefined where no capacitance is left", () => {
  const family = { ...RULE, largest: 100e-9 };
  const options = { ...asked({ family }), currents: CURRENTS, offset: OFFSET };
  assertEquals(inductanceColumn(PAIR, 40e-9, options), undefined);
});

Deno.test("inductanceColumn: the knee current falls with the inductance, as 1/L would have it", () => {
  const knees = map().map(({ sweep: { knee } }) => knee ?? NaN);
  for (const [k, knee] of knees.entries()) {
    if (k > 0) assert(!(knee >= knees[k - 1]!), String(knees));
  }
});

Deno.test("familyLimits: on one side of each every check keeps it, on the other none does", () => {
  const options = asked({ leastCapacitance: 250e-15, resonanceRatio: 2.5 });
  const current = 2.2e-3;
  const limits = familyLimits(PAIR, current, options);
  assertEquals(limits.map(({ limit }) => limit).sort(), [
    "fixed capacitance",
    "largest of the family",
    "self-resonance",
    "smallest of the family",
  ]);
  for (const { limit, inductance, forbids } of limits) {
    const factor = forbids === "above" ? 1.001 : 0.999;
    const breaks = (at: number) =>
      checkInductance(PAIR, { inductance: at, current }, options).broken.includes(limit);
    assertEquals([breaks(inductance / factor), breaks(inductance * factor)], [false, true], limit);
  }
  // 20 GHz at 2 nH falls as 1/L: 2.5 times 5 GHz at 3.2 nH.
  const resonance = limits.find(({ limit }) => limit === "self-resonance")!;
  assertClose(resonance.inductance, 3.2e-9, { rtol: 1e-3, atol: 0 });
});

Deno.test("familyLimits: of a set they lie between the last that keeps them and the first that does not", () => {
  const inductances = [1e-9, 2e-9, 3e-9, 4e-9];
  const options = asked({ family: { ...RULE, inductances }, resonanceRatio: 2.5 });
  const limit = familyLimits(PAIR, 2.2e-3, options).find((one) => one.limit === "self-resonance")!;
  assert(limit.inductance > 3e-9 && limit.inductance < 4e-9);
});

Deno.test("smallestOnKneeLine: keeps every limit on the line, and a little less does not", () => {
  const options = asked();
  const found = smallestOnKneeLine(PAIR, map(), { ...options, kneeMultiple: MULTIPLE });
  assert(found.status === "found");
  const { inductance, current, broken } = found.check;
  assertEquals([...broken], []);
  // The knee between the columns, against a sweep of its own.
  const { tank } = trimTank(PAIR, { inductance, current }, options);
  const { knee } = biasSweep(PAIR, options.designWith(tank), {
    card: CARD,
    condition: options.conditions[0],
    currents: logarithmicCurrents({ from: 0.4e-3, to: 10e-3, count: 60 }),
    offset: OFFSET,
  });
  assertClose(current, MULTIPLE * knee!, { rtol: 0.02, atol: 0 });
  const less = {
    inductance: inductance * 0.995,
    current: current * 0.995 ** (Math.log(map()[0]!.sweep.knee! / map()[7]!.sweep.knee!) /
          Math.log(map()[0]!.inductance / map()[7]!.inductance)),
  };
  assert(checkInductance(PAIR, less, options).broken.includes(found.binding));
});

Deno.test("smallestOnKneeLine: startup, power and the end of the family each bind when they should", () => {
  const binding = (changes: Parameters<typeof asked>[0], columns = map()) => {
    const found = smallestOnKneeLine(PAIR, columns, { ...asked(changes), kneeMultiple: MULTIPLE });
    return `${found.status}: ${found.binding}`;
  };
  assertEquals(binding({ mostPower: 20e-3 }), "found: startup");
  assertEquals(binding({ mostPower: 2.5e-3 }), "found: power");
  assertEquals(binding({}, map().slice(-4)), "found: smallest of the family");
  assertEquals(binding({ mostPower: 0.2e-3 }).slice(0, 5), "none:");
  assertEquals(binding({ leastCapacitance: 5e-12 }), "none: fixed capacitance");
});

Deno.test("smallestOnKneeLine: a map without a knee says so", () => {
  const few = { ...asked(), currents: [1e-3, 1.1e-3, 1.2e-3], offset: OFFSET };
  const column = inductanceColumn(PAIR, 1e-9, few)!;
  assertThrows(
    () => smallestOnKneeLine(PAIR, [column], { ...asked(), kneeMultiple: MULTIPLE }),
    RangeError,
    /at least one column must reach its knee/,
  );
});

Deno.test("inductanceTrend: each point is trimmed and solved at its own current", () => {
  const options = asked();
  const columns = map().slice(2, 5);
  const trend = inductanceTrend(PAIR, columns, {
    ...options,
    offset: OFFSET,
    amplitude: "computed",
    currentOf: ({ inductance }) => inductance < 1.3e-9 ? undefined : 3e-3 * 1e-9 / inductance * 2,
  });
  assertEquals(
    trend.map(({ inductance }) => inductance),
    columns.map(({ inductance }) => inductance).filter((value) => value >= 1.3e-9),
  );
  for (const { point, computed, hand, current } of trend) {
    assertEquals(point.current, current);
    assertEquals(point.figures!.phaseNoise, computed);
    assertClose(point.startup!.frequency, options.frequency, { rtol: 1e-6, atol: 0 });
    assert(hand !== undefined && Math.abs(hand - computed!) < 5);
  }
});
