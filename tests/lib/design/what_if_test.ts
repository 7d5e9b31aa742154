import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import {
  crossCoupledPair,
  type CrossCoupledPairDesign,
} from "../../../lib/circuit/cross_coupled_pair.ts";
import { type DesignParameter, whatIf } from "../../../lib/design/what_if.ts";
import { noiseBudget } from "../../../lib/noise/budget.ts";
import { CARD, DESIGN, NOMINAL, pairOrbit } from "../../published/_pair.ts";
import { operatingFigures } from "../../../lib/design/operating_figures.ts";

const OFFSET = 1e6;
const CURRENT: DesignParameter<CrossCoupledPairDesign> = {
  name: "programmed current",
  unit: "A",
  read: ({ current }) => current,
  write: (design, current) => ({ ...design, current }),
};
const QUALITY: DesignParameter<CrossCoupledPairDesign> = {
  name: "quality factor",
  unit: "1",
  read: ({ tank }) => tank.quality,
  write: (design, quality) => ({ ...design, tank: { ...design.tank, quality } }),
};
const LOAD: DesignParameter<CrossCoupledPairDesign> = {
  name: "mirror capacitance",
  unit: "F",
  read: ({ mirrorCapacitance = 0 }) => mirrorCapacitance,
  write: (design, mirrorCapacitance) => ({ ...design, mirrorCapacitance }),
};
const OPTIONS = { card: CARD, condition: NOMINAL, offset: OFFSET, improvement: 2 };

const figuresOf = (design: CrossCoupledPairDesign) => {
  const { oscillator, orbit } = pairOrbit(design, NOMINAL, { tolerance: 1e-10 });
  return operatingFigures(oscillator, orbit, { supply: NOMINAL.supply, offset: OFFSET });
};

Deno.test("whatIf: derivatives are those of designs solved one by one, to 1e-4", () => {
  const result = whatIf(crossCoupledPair, DESIGN, { ...OPTIONS, parameters: [CURRENT, QUALITY] });
  assert(result);
  for (const parameter of [CURRENT, QUALITY]) {
    const own = result.derivatives.find(({ name }) => name === parameter.name)!;
    // Central differences over e-folds, at 0.8 % and half of it, extrapolated.
    const at = (fold: number) =>
      figuresOf(parameter.write(DESIGN, parameter.read(DESIGN) * Math.exp(fold)));
    const slope = (read: (figures: ReturnType<typeof figuresOf>) => number) => {
      const central = (h: number) => (read(at(h)) - read(at(-h))) / (2 * h);
      return (4 * central(0.004) - central(0.008)) / 3;
    };
    // A step of 1 % to either side errs by 1e-4 of the third derivative; found 4e-5 of 8.7 dB at most.
    const tolerance = { rtol: 1e-4, atol: 1e-4 };
    assertClose(own.noise!, slope(({ phaseNoise }) => phaseNoise), {
      ...tolerance,
      what: parameter.name,
    });
    assertClose(own.amplitude!, slope(({ amplitude }) => Math.log(amplitude)), tolerance);
    assertClose(own.power!, slope(({ power }) => Math.log(power)), tolerance);
    assertClose(own.frequency!, slope(({ frequency }) => Math.log(frequency)), tolerance);
  }
});

Deno.test("whatIf: every suggestion is solved again, and its promise is the derivative's", () => {
  const result = whatIf(crossCoupledPair, DESIGN, { ...OPTIONS, parameters: [CURRENT, QUALITY] });
  assert(result);
  assertEquals(result.suggestions.length, 2);
  for (const { name, from, to, promised, after } of result.suggestions) {
    const parameter = [CURRENT, QUALITY].find((own) => own.name === name)!;
    const { noise } = result.derivatives.find((own) => own.name === name)!;
    assertEquals(from, parameter.read(DESIGN));
    assertClose(promised, noise! * Math.log(to / from), { rtol: 1e-12, atol: 0 });
    assert(to / from <= 2 && to / from >= 0.5, `${name} to ${to}`);
    const own = figuresOf(parameter.write(DESIGN, to));
    assertClose(after!.noise, own.phaseNoise, { rtol: 0, atol: 1e-4, what: name });
    assert(after!.noise < result.now.noise, `${name}: ${after!.noise} from ${result.now.noise}`);
  }
  const noises = result.suggestions.map(({ after }) => after!.noise);
  assertEquals(noises, [...noises].sort((a, b) => a - b), "the best first");
});

Deno.test("whatIf: judges any noise it is given, such as the budget's total with 1/f sources", () => {
  const offset = 1e4;
  const result = whatIf(crossCoupledPair, DESIGN, {
    ...OPTIONS,
    parameters: [CURRENT],
    noise: (oscillator, orbit) => noiseBudget(oscillator, orbit, { offsets: [offset] }).total[0]!,
  });
  assert(result);
  const { oscillator, orbit } = pairOrbit(DESIGN, NOMINAL);
  const [total] = noiseBudget(oscillator, orbit, { offsets: [offset] }).total;
  assertClose(result.now.noise, total!, { rtol: 0, atol: 1e-3 });
  const white = result.now.figures.phaseNoise + 20 * Math.log10(OFFSET / offset);
  assert(total! > white + 3, "1/f noise counts at 10 kHz");
});

Deno.test("whatIf: stays within a parameter's limits, with a derivative from one side", () => {
  const { value, ...free } = { ...QUALITY, value: QUALITY.read(DESIGN) };
  const of = (limits: { atLeast?: number; atMost?: number }) =>
    whatIf(crossCoupledPair, DESIGN, { ...OPTIONS, parameters: [{ ...free, ...limits }] })!;
  const open = of({});
  for (const limits of [{ atLeast: value }, { atMost: value }]) {
    const held = of(limits);
    assertClose(held.derivatives[0]!.noise!, open.derivatives[0]!.noise!, { rtol: 1e-3, atol: 0 });
  }
  // A higher quality factor is better, but not to be had: no suggestion; or only to its limit.
  assertEquals(of({ atMost: value }).suggestions, []);
  const [own] = of({ atMost: 1.05 * value }).suggestions;
  assertEquals(own!.to, 1.05 * value);
  const { noise } = open.derivatives[0]!;
  assertClose(own!.promised, noise! * Math.log(1.05), { rtol: 1e-3, atol: 0 });
});

Deno.test("whatIf: a parameter at zero has no derivative and no suggestion; no orbit, no answer", () => {
  const result = whatIf(crossCoupledPair, DESIGN, { ...OPTIONS, parameters: [LOAD] });
  assert(result);
  assertEquals(result.derivatives[0]!.noise, undefined);
  assertEquals(result.suggestions, []);
  const dead = { ...DESIGN, current: 0.1e-3 };
  assertEquals(
    whatIf(crossCoupledPair, dead, { ...OPTIONS, parameters: [CURRENT] }),
    undefined,
  );
});

Deno.test("whatIf: refuses an improvement that is none", () => {
  for (const improvement of [0, -1, NaN]) {
    assertThrows(
      () => whatIf(crossCoupledPair, DESIGN, { ...OPTIONS, parameters: [], improvement }),
      RangeError,
      /improvement must be > 0 dB/,
    );
  }
});
