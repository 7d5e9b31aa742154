import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { crossCoupledPair } from "../../../lib/circuit/cross_coupled_pair.ts";
import { operatingFigures } from "../../../lib/design/operating_figures.ts";
import { noiseBudget, type NoiseBudgetOptions } from "../../../lib/noise/budget.ts";
import { flickerCorner } from "../../../lib/noise/power_law.ts";
import { supplyPhaseNoise } from "../../../lib/noise/supply_noise.ts";
import { findOrbit } from "../../../lib/orbit/find_orbit.ts";
import { inputSensitivity } from "../../../lib/orbit/input_sensitivity.ts";
import { Orbit } from "../../../lib/orbit/orbit.ts";
import { CARD, DESIGN, NOMINAL, pairOrbit } from "../../published/_pair.ts";

const { oscillator, orbit } = pairOrbit(DESIGN, NOMINAL);
const OFFSETS = Array.from({ length: 11 }, (_, k) => 10 ** (3 + k / 2));

function budget(options: Partial<NoiseBudgetOptions> = {}) {
  return noiseBudget(oscillator, orbit, { offsets: OFFSETS, ...options });
}

const sumOf = (k: number, { entries }: ReturnType<typeof noiseBudget>) =>
  entries.reduce((sum, { phase }) => sum + phase[k]!, 0);

Deno.test("noiseBudget: the parts add up to the total at every offset, with inputs and added noise", () => {
  const whole = budget({
    inputs: [{ input: "supply", label: "regulator", density: (f) => 20e-9 * Math.sqrt(1e5 / f) }],
    added: [{ label: "buffer", level: () => -158 }],
  });
  assertEquals(whole.entries.length, oscillator.circuit.sources.length + 2);
  OFFSETS.forEach((_, k) => {
    assertClose(10 ** (whole.total[k]! / 10), sumOf(k, whole), { rtol: 1e-12, atol: 0 });
    const amplitude = whole.entries.reduce((sum, entry) => sum + entry.amplitude[k]!, 0);
    assertClose(10 ** (whole.amplitude[k]! / 10), amplitude, { rtol: 1e-12, atol: 0 });
  });
  for (const { phase } of whole.entries) assert(phase.every((value) => value > 0));
  const first = whole.entries.map(({ phase }) => phase[0]!);
  assertEquals(first, [...first].sort((a, b) => b - a), "largest at the first offset first");
});

Deno.test("noiseBudget: white noise goes to the diffusion's at small offsets", () => {
  const offsets = [10, 100];
  const { entries, noiseFactor, asymptotes, frequency } = budget({ offsets });
  const figures = operatingFigures(oscillator, orbit, { supply: NOMINAL.supply, offset: 10 });
  const white = entries.filter(({ origin }) => origin === "white");
  const total = white.reduce((sum, { phase }) => sum + phase[0]!, 0);
  // Found 2e-7: the integrals of two different readings of one orbit.
  assertClose(10 * Math.log10(total), figures.phaseNoise, { rtol: 0, atol: 1e-5 });
  assertClose(noiseFactor, figures.noiseFactor, { rtol: 1e-12, atol: 0 });
  assertClose(asymptotes.inverseSquare!, frequency ** 2 * figures.diffusion, {
    rtol: 1e-12,
    atol: 0,
  });
  for (const { device, label, share } of figures.shares) {
    const own = white.find((entry) => entry.device === device && entry.label === label)!;
    assertClose(own.phase[0]! / total, share, { rtol: 1e-5, atol: 1e-9, what: device });
  }
});

Deno.test("noiseBudget: 30 and 20 dB per decade, and the corner where their asymptotes cross", () => {
  const offsets = [10, 20, 40, 1e3, 1e4, 1e5, 1e6, 3e6, 1e7, 2e7];
  const { slopes, corner, asymptotes } = budget({ offsets });
  // Found -29.999 and -19.9; the mirror's pole takes a little of its own part by 10 MHz.
  assertClose(slopes[1]!, -30, { rtol: 0, atol: 0.01 });
  assertClose(slopes[8]!, -20, { rtol: 0, atol: 0.3 });
  // Straight lines between a few offsets and the sloping white part: a few per cent.
  assertClose(corner!, flickerCorner(asymptotes)!, { rtol: 0.05, atol: 0 });
  assertEquals(budget({ offsets: [1e3] }).slopes, [undefined]);
  // Far above the corner they do not cross within the offsets.
  assertEquals(budget({ offsets: [1e8, 2e8] }).corner, undefined);
});

Deno.test("noiseBudget: an input comes in with the derivative of the frequency, against orbits solved again", () => {
  const density = 50e-9;
  const whole = budget({
    offsets: [1e4, 1e6],
    inputs: [{ input: "supply", label: "regulator", density: () => density }],
  });
  const own = whole.entries.find(({ origin }) => origin === "input")!;
  const step = 2e-3;
  const at = (supply: number) => {
    const other = crossCoupledPair.build(DESIGN, { card: CARD, condition: { ...NOMINAL, supply } });
    const found = findOrbit(other.circuit.system, { start: orbit, tolerance: 1e-10 });
    assert(found instanceof Orbit);
    return found.frequency;
  };
  const { supply } = NOMINAL;
  const gain = (8 * (at(supply + step) - at(supply - step)) - at(supply + 2 * step) +
    at(supply - 2 * step)) / (12 * step);
  whole.offsets.forEach((offset, k) => {
    const hand = supplyPhaseNoise({ gain, density }, offset).level;
    // Found 1e-5 dB: the orbit's own tolerance.
    assertClose(10 * Math.log10(own.phase[k]!), hand, { rtol: 0, atol: 1e-3 });
  });
  const [pushing] = inputSensitivity(orbit).filter(({ name }) => name === "supply");
  assertClose(pushing!.frequency, gain, { rtol: 1e-4, atol: 0 });
});

Deno.test("noiseBudget: added noise is a floor and no part of the 1/f^3 corner's search", () => {
  const offsets = [1e3, 1e4, 1e5, 1e6, 1e8, 1e9];
  const level = -150;
  const { total, asymptotes, corner } = budget({
    offsets,
    added: [{ label: "divider", level: () => level }],
  });
  assertClose(asymptotes.floor!, 1e-15, { rtol: 1e-12, atol: 0 });
  assertClose(total.at(-1)!, level, { rtol: 0, atol: 0.1 });
  assert(corner! > 1e4 && corner! < 1e7, `${corner}`);
});

Deno.test("noiseBudget: refuses offsets that are empty, unsorted, doubled, not positive or beyond half the carrier", () => {
  const cases: [readonly number[], new (...args: never[]) => Error, RegExp][] = [
    [[], TypeError, /expected at least 1 offset, got 0/],
    [[1e6, 1e5], RangeError, /must increase, got 100000 Hz after 1000000 Hz/],
    [[1e5, 1e5], RangeError, /100000 Hz is there twice/],
    [[0, 1e5], RangeError, /must be > 0 Hz, got 0 Hz/],
    [[-1e5], RangeError, /must be > 0 Hz/],
    [[NaN], RangeError, /must be > 0 Hz, got NaN/],
    [[1e5, 3e9], RangeError, /below half the carrier, \d+\.?\d* Hz, got 3000000000 Hz/],
  ];
  for (const [offsets, kind, wording] of cases) {
    assertThrows(() => budget({ offsets }), kind, wording);
  }
});

Deno.test("noiseBudget: refuses unknown inputs, negative densities and levels that are no dBc/Hz", () => {
  const density = () => 1e-9;
  assertThrows(
    () => budget({ inputs: [{ input: "battery", label: "regulator", density }] }),
    RangeError,
    /one of supply, .*got "battery"/,
  );
  for (const value of [-1e-9, NaN, Infinity]) {
    assertThrows(
      () => budget({ inputs: [{ input: "supply", label: "regulator", density: () => value }] }),
      RangeError,
      /density of regulator must be >= 0 V\/sqrt\(Hz\)/,
    );
  }
  // A linear density in place of a level.
  for (const value of [1e-15, 0, NaN]) {
    assertThrows(
      () => budget({ added: [{ label: "buffer", level: () => value }] }),
      RangeError,
      /buffer must be a level below 0 dBc\/Hz/,
    );
  }
});
