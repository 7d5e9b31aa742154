import { assert, assertClose, assertThrows } from "../../assert.ts";
import {
  firstOrderLoop,
  type Loop,
  typeTwoLoop,
  typeTwoLoopOfMargin,
} from "../../../lib/noise/loop_view.ts";

/** Complex number as [re, im]. */
type Complex = readonly [number, number];
const divide = ([a, b]: Complex, [c, d]: Complex): Complex => {
  const size = c * c + d * d;
  return [(a * c + b * d) / size, (b * c - a * d) / size];
};
const power = ([a, b]: Complex) => a * a + b * b;

/** |H|^2 and |1 - H|^2 of an open loop G by complex arithmetic: H = G / (1 + G). */
function closed([re, im]: Complex): { reference: number; oscillator: number } {
  return {
    reference: power(divide([re, im], [1 + re, im])),
    oscillator: power(divide([1, 0], [1 + re, im])),
  };
}

function agrees(loop: Loop, open: (offset: number) => Complex): void {
  for (const offset of [1e2, 3e4, 9e4, 1e5, 2e5, 7e5, 1e8]) {
    const { reference, oscillator } = closed(open(offset));
    assertClose(loop.referenceGain(offset), reference, { rtol: 1e-10, atol: 0 });
    assertClose(loop.oscillatorGain(offset), oscillator, { rtol: 1e-10, atol: 0 });
  }
}

Deno.test("firstOrderLoop: both gains follow from the open loop fc / jf", () => {
  agrees(firstOrderLoop(1e5), (f) => [0, -1e5 / f]);
});

Deno.test("typeTwoLoop: both gains follow from the open loop (2 zeta wn s + wn^2) / s^2", () => {
  for (const damping of [0.05, 0.7, 3]) {
    agrees(typeTwoLoop(1e5, damping), (f) => [-((1e5 / f) ** 2), -2 * damping * 1e5 / f]);
  }
});

Deno.test("typeTwoLoop, typeTwoLoopOfMargin: at the bandwidth the open loop is one, by its margin off -180 degrees", () => {
  for (const margin of [20, 45, 60, 75]) {
    const loop = typeTwoLoopOfMargin(1e5, margin);
    assertClose(loop.bandwidth, 1e5, { rtol: 1e-12, atol: 0 });
    // |1 + G| with G = -exp(j margin), and |H| = |G| / |1 + G|.
    const squared = (2 * Math.sin(margin * Math.PI / 360)) ** 2;
    assertClose(loop.oscillatorGain(1e5), 1 / squared, { rtol: 1e-12, atol: 0 });
    assertClose(loop.referenceGain(1e5), 1 / squared, { rtol: 1e-12, atol: 0 });
  }
  assert(typeTwoLoopOfMargin(1e5, 60).description.includes("phase margin 60 degrees"));
});

Deno.test("typeTwoLoop: a 1/f^2 oscillator is flat between zero and crossover, and falls below", () => {
  // Damping 20 sets zero and crossover 1600 apart.
  const loop = typeTwoLoop(1e5, 20);
  const zero = 1e5 / 40;
  const level = (f: number) => 10 * Math.log10(loop.oscillatorGain(f) / f ** 2);
  const middle = Math.sqrt(zero * loop.bandwidth);
  // A zero and a pole, each a factor of 40 away, bend a flat level by less than 0.01 dB.
  assertClose(level(2 * middle), level(middle / 2), { rtol: 0, atol: 0.02 });
  assertClose(level(zero / 100) - level(zero / 1000), 20, { rtol: 0, atol: 0.01 });
  assertClose(level(loop.bandwidth * 1000) - level(loop.bandwidth * 100), -20, {
    rtol: 0,
    atol: 0.01,
  });
});

Deno.test("loops: bad values are refused with their unit", () => {
  assertThrows(() => firstOrderLoop(0), RangeError, /bandwidth must be > 0 Hz/);
  assertThrows(() => typeTwoLoop(-1, 1), RangeError, /natural frequency must be > 0 Hz/);
  assertThrows(() => typeTwoLoop(1e5, 0), RangeError, /damping must be > 0/);
  assertThrows(() => typeTwoLoopOfMargin(1e5, 90), RangeError, /below 90 degrees, got 90 degrees/);
  assertThrows(() => typeTwoLoopOfMargin(NaN, 60), RangeError, /bandwidth/);
});
