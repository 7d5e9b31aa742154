import { closeIn } from "../../../lib/design/_close_in.ts";
import { smallestByTrial, smallestInductance } from "../../../lib/design/inductance.ts";
import { type BindingLimit, checkInductance } from "../../../lib/design/inductance_check.ts";
import { geometryFamily, type InductorFamily } from "../../../lib/design/inductor_family.ts";
import { assert, assertClose, assertEquals } from "../../assert.ts";
import { asked, FREQUENCY, LAYERS, PAIR, RULE } from "./_inductance_samples.ts";

const CURRENT = 2.2e-3;
/** Ratio of neighbours in the lists that are tried. */
const STEP = 1.01;

const GEOMETRY = geometryFamily({
  shape: "octagonal",
  turns: [1, 2, 3, 4],
  widths: [6e-6, 9e-6],
  spacing: 3e-6,
  outerDiameter: { smallest: 60e-6, largest: 260e-6 },
  layers: LAYERS,
  temperature: 300,
  frequency: FREQUENCY,
});

/** Members of the rule as a set, at uneven steps. */
const SET: InductorFamily = {
  ...RULE,
  name: "a set",
  inductances: [0.4e-9, 0.9e-9, 1.3e-9, 1.55e-9, 1.7e-9, 2.4e-9, 5e-9],
};

function list({ smallest, largest }: InductorFamily, step = STEP): number[] {
  const count = Math.floor(Math.log(largest / smallest) / Math.log(step)) + 1;
  return Array.from({ length: count }, (_, k) => smallest * step ** k);
}

for (const [name, family] of [["a rule", RULE], ["geometry", GEOMETRY]] as const) {
  Deno.test(`smallestInductance: agrees with trying every inductance of a fine list, ${name}`, () => {
    const options = asked({ family, conditions: asked().conditions.slice(0, 5) as never });
    const found = smallestInductance(PAIR, CURRENT, options);
    const tried = smallestByTrial(PAIR, CURRENT, { ...options, inductances: list(family) });
    assert(found.status === "found" && tried !== undefined);
    const ratio = tried.inductance / found.check.inductance;
    assert(ratio >= 1 - 2e-4 && ratio <= STEP * (1 + 2e-4), `ratio ${ratio}`);
    assertEquals(found.binding, "startup");
    assertClose(found.check.worstLoopGain, 2, { rtol: 2e-4, atol: 0 });
  });
}

Deno.test("smallestInductance: of a set it finds the smallest member that keeps every limit", () => {
  const options = asked({ family: SET });
  const found = smallestInductance(PAIR, CURRENT, options);
  const tried = smallestByTrial(PAIR, CURRENT, { ...options, inductances: SET.inductances! });
  assert(found.status === "found" && tried !== undefined);
  assertEquals(found.check.inductance, tried.inductance);
  assertEquals(found.qualitySensitivity, undefined);
  const before = SET.inductances![SET.inductances!.indexOf(tried.inductance) - 1]!;
  const { broken } = checkInductance(PAIR, { inductance: before, current: CURRENT }, options);
  assertEquals([...broken], ["startup"]);
});

Deno.test("smallestInductance: a loop gain that does not rise all the way does no harm", () => {
  // A dip of the quality factor above the first inductance that starts.
  const family: InductorFamily = {
    ...RULE,
    member: (inductance) => {
      const member = RULE.member(inductance);
      const dip = Math.exp(-(Math.log(inductance / 2.4e-9) ** 2) / 0.01);
      return { ...member, quality: member.quality * (1 - 0.6 * dip) };
    },
  };
  const options = asked({ family });
  const found = smallestInductance(PAIR, CURRENT, options);
  const inductances = list(family).filter((value) => value < 2e-9);
  const tried = smallestByTrial(PAIR, CURRENT, { ...options, inductances });
  assert(found.status === "found" && tried !== undefined);
  assertClose(found.check.inductance, tried.inductance, { rtol: STEP - 1, atol: 0 });
  const inDip = checkInductance(PAIR, { inductance: 2.4e-9, current: CURRENT }, options);
  assert(inDip.broken.includes("startup"), "the dip must forbid what lies above");
});

Deno.test("smallestInductance: a family that starts at its small end is bound by that end", () => {
  const options = asked({ family: { ...RULE, smallest: 2.5e-9 } });
  const found = smallestInductance(PAIR, CURRENT, options);
  assert(found.status === "found");
  assertEquals(found.binding, "smallest of the family");
  assertEquals(found.check.inductance, 2.5e-9);
  assertEquals(found.qualitySensitivity, undefined);
});

Deno.test("smallestInductance: says which limit would have to give way where nothing does", () => {
  const cases: readonly [BindingLimit, Parameters<typeof asked>[0], number][] = [
    ["power", { mostPower: 1e-3 }, CURRENT],
    ["fixed capacitance", { leastCapacitance: 1e-12 }, CURRENT],
    ["self-resonance", { resonanceRatio: 8 }, CURRENT],
    ["largest of the family", { family: { ...RULE, largest: 1.1e-9 } }, CURRENT],
    // So much gain is asked for that the capacitance runs out first.
    ["fixed capacitance", { loopGain: 30, family: { ...RULE, largest: 60e-9 } }, CURRENT],
  ];
  for (const [binding, changes, current] of cases) {
    const options = asked(changes);
    const found = smallestInductance(PAIR, current, options);
    assert(found.status === "none", binding);
    assertEquals(found.binding, binding);
    const inductances = list(options.family, 1.15);
    assertEquals(smallestByTrial(PAIR, current, { ...options, inductances }), undefined);
    assert(found.reason.startsWith("at ") && !found.reason.includes("NaN"), found.reason);
  }
});

Deno.test("smallestInductance: its sensitivity is the slope between answers solved again", () => {
  const answer = (quality: number) => {
    const member = (inductance: number) => ({ ...RULE.member(inductance), quality });
    const found = smallestInductance(PAIR, CURRENT, asked({ family: { ...RULE, member } }));
    assert(found.status === "found");
    return found;
  };
  const slope = Math.log(answer(14.7).check.inductance / answer(13.3).check.inductance) /
    Math.log(14.7 / 13.3);
  const { qualitySensitivity } = answer(14);
  // Answers are good to 1e-4, which is 5e-3 of a slope over 2 %.
  assertClose(qualitySensitivity!, slope, { rtol: 0, atol: 0.01 });
  // -1 when the coil alone decides; the capacitor and the output conductance take their part.
  assert(qualitySensitivity! > -1 && qualitySensitivity! < -0.7, `${qualitySensitivity}`);
});

Deno.test("smallestInductance: more current needs less inductance", () => {
  const answers = [1.6e-3, 2.2e-3, 3e-3].map((current) => {
    const found = smallestInductance(PAIR, current, asked({ mostPower: 5e-3 }));
    assert(found.status === "found");
    return found.check.inductance;
  });
  assert(answers[0]! > answers[1]! && answers[1]! > answers[2]!, String(answers));
});

Deno.test("closeIn: ends within 1e-4 of where it turns true, on either side of it", () => {
  const { low, high } = closeIn({ low: 1, high: 1000 }, (x) => x >= 37);
  assert(low < 37 && high >= 37 && high / low <= 1 + 1e-4);
});
