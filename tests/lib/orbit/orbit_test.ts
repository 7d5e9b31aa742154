import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { integrate } from "../../reference/integrate.ts";
import { brusselator, orbitOf, stuartLandau, tanhOscillator, vanDerPol } from "./_systems.ts";

Deno.test("Orbit.at() is periodic, and as accurate inside a step as at the mesh points", () => {
  const { system, start, flow } = brusselator();
  const orbit = orbitOf(system, { start });
  const first = orbit.at(0);
  for (const part of [0, 0.01, 0.3, 0.6180339, 0.999]) {
    const time = part * orbit.period;
    const state = orbit.at(time);
    // Wrapping multiplies the period's rounding only.
    assertClose(orbit.at(time + 3 * orbit.period), state, { rtol: 0, atol: 1e-12 });
    assertClose(orbit.at(time - 2 * orbit.period), state, { rtol: 0, atol: 1e-12 });
    // The default tolerance is 1e-8 on the period.
    assertClose(state, integrate(flow, first, { duration: time }), { rtol: 0, atol: 1e-7 });
  }
  const { times, states } = orbit.samples;
  assertEquals(times[0], 0);
  times.forEach((time, k) => {
    assertClose(orbit.at(time), states.slice(2 * k, 2 * k + 2), { rtol: 0, atol: 1e-12 });
  });
});

Deno.test("Orbit.at() and placeOf() refuse a time that is not finite", () => {
  const orbit = orbitOf(vanDerPol(1).system, { start: vanDerPol(1).start });
  for (const time of [NaN, Infinity]) {
    assertThrows(() => orbit.at(time), RangeError, /^Cannot place a time on the orbit: it must be/);
  }
});

Deno.test("Orbit.quadrature: weights sum to the period and integrate smooth functions", () => {
  const { system, start } = stuartLandau({ growth: 1, frequency: 5, damping: 1, shear: 0.7 });
  const orbit = orbitOf(system, { start, tolerance: 1e-12 });
  const { weights, times, count, states } = orbit.quadrature;
  assertClose(weights.reduce((sum, w) => sum + w, 0), orbit.period, { rtol: 1e-13, atol: 0 });
  assertEquals(states.length, 2 * count);
  for (let k = 1; k < count; k++) assert(times[k]! > times[k - 1]! && weights[k]! > 0);
  // cos^4 of the angle has mean 3/8, cos^3 none.
  assertClose(orbit.mean(([x]) => x! ** 4), 3 / 8, { rtol: 1e-11, atol: 0 });
  assertClose(orbit.mean(([x]) => x! ** 3), 0, { rtol: 0, atol: 1e-11 });
});

Deno.test("Orbit.phasor() gives peak phasors: of a circle, of its square, and the mean", () => {
  const { system, start } = stuartLandau({ growth: 0.64, frequency: 2, damping: 1, shear: 0 });
  const orbit = orbitOf(system, { start, tolerance: 1e-12 });
  const [x, y] = orbit.at(0);
  const bound = { rtol: 0, atol: 1e-10 };
  const p = orbit.phasor((state) => state[0]!);
  // x = 0.8 cos(wt + angle), so the phasor is x(0) + i y(0).
  assertClose([p.re, p.im], [x!, y!], bound);
  const q = orbit.phasor((state) => state[1]!);
  assertClose([q.re, q.im], [y!, -x!], bound);
  const second = orbit.phasor((state) => state[0]! ** 2, { harmonic: 2 });
  assertClose(Math.hypot(second.re, second.im), 0.32, bound);
  const mean = orbit.phasor((state) => state[0]! ** 2, { harmonic: 0 });
  assertClose([mean.re, mean.im], [0.32, 0], bound);
  const third = orbit.phasor((state) => state[0]!, { harmonic: 3 });
  assertClose([third.re, third.im], [0, 0], bound);
});

Deno.test("Orbit.phasor() keeps Parseval's sum: half the squares of the peaks is the mean square", () => {
  const { system, start } = vanDerPol(2);
  const orbit = orbitOf(system, { start, tolerance: 1e-12, stages: 4, steps: 400 });
  let sum = orbit.mean((x) => x[0]!) ** 2;
  for (let harmonic = 1; harmonic < 60; harmonic++) {
    const { re, im } = orbit.phasor((x) => x[0]!, { harmonic });
    sum += (re * re + im * im) / 2;
  }
  assertClose(sum, orbit.mean((x) => x[0]! ** 2), { rtol: 1e-11, atol: 0 });
});

Deno.test("Orbit: the energy a tank loses over a period is what its driver gives", () => {
  const [quality, gain] = [5, 3];
  const { system, start } = tanhOscillator({ quality, gain });
  const orbit = orbitOf(system, { start, tolerance: 1e-12 });
  const loss = orbit.mean(([v]) => v! * v! / quality);
  const drive = orbit.mean(([v]) => gain / quality * v! * Math.tanh(v!));
  assertClose(drive, loss, { rtol: 1e-11, atol: 0 });
  assertClose(orbit.mean(([v]) => v!), 0, { rtol: 0, atol: 1e-12 });
});

Deno.test("Orbit: frequency, exponents and multipliers agree with each other", () => {
  const orbit = orbitOf(vanDerPol(1).system, { start: vanDerPol(1).start });
  assertClose(orbit.frequency * orbit.period, 1, { rtol: 1e-15, atol: 0 });
  orbit.exponents.forEach(({ re }, k) => {
    const { re: x, im: y } = orbit.multipliers[k]!;
    assertClose(Math.hypot(x, y), Math.exp(re * orbit.period), { rtol: 1e-12, atol: 0 });
  });
});
