import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { crossCoupledPair } from "../../../lib/circuit/cross_coupled_pair.ts";
import {
  biasSweep,
  type BiasSweepOptions,
  cornerBias,
  cornerConditions,
  logarithmicCurrents,
} from "../../../lib/design/bias.ts";
import type { Regime } from "../../../lib/design/regime.ts";
import { findOrbit } from "../../../lib/orbit/find_orbit.ts";
import { Orbit } from "../../../lib/orbit/orbit.ts";
import { CARD, DESIGN, fullSweep, NOMINAL, OFFSET } from "./_pair.ts";

const BASE = { card: CARD, condition: NOMINAL, offset: OFFSET };

function sweep(currents: readonly number[], options: Partial<BiasSweepOptions> = {}) {
  return biasSweep(crossCoupledPair, DESIGN, { ...BASE, currents, ...options });
}

Deno.test("logarithmicCurrents: even in the logarithm, ends included", () => {
  const found = logarithmicCurrents({ from: 1e-4, to: 1e-2, count: 5 });
  assertClose(found, [1e-4, 10 ** -3.5, 1e-3, 10 ** -2.5, 1e-2], { rtol: 1e-14, atol: 0 });
});

Deno.test("logarithmicCurrents: refuses empty and upside-down ranges", () => {
  for (const [from, to] of [[0, 1], [-1, 1], [2, 1], [1, 1], [NaN, 1], [1, NaN]]) {
    const range = { from: from!, to: to!, count: 5 };
    assertThrows(() => logarithmicCurrents(range), RangeError, /from must be > 0 A and below to/);
  }
  for (const count of [2, 3.5, NaN]) {
    const range = { from: 1, to: 2, count };
    assertThrows(() => logarithmicCurrents(range), RangeError, /count must be an integer >= 3/);
  }
});

Deno.test("biasSweep: refuses currents that do not rise", () => {
  for (const currents of [[1e-3, 1e-3], [2e-3, 1e-3], [0, 1e-3], [-1e-3, 1e-3], [1e-3, NaN]]) {
    assertThrows(() => sweep(currents), RangeError, /currents must be > 0 A and increasing/);
  }
});

Deno.test("biasSweep: regimes come in order, from no start to voltage-limited", () => {
  const order: readonly Regime[] = [
    "does not start",
    "sustains but does not start",
    "current-limited",
    "at the knee",
    "voltage-limited",
  ];
  const places = fullSweep().points.map(({ regime }) => order.indexOf(regime));
  assertEquals(places, places.toSorted((a, b) => a - b), "out of order");
  for (const regime of ["does not start", "current-limited", "at the knee", "voltage-limited"]) {
    assert(places.includes(order.indexOf(regime as Regime)), `no point is ${regime}`);
  }
});

Deno.test("biasSweep: a point without an orbit says why, and its loop gain is below 1", () => {
  for (const point of fullSweep().points) {
    const { orbit, figures, reason, startup, amplitudeExponent, noiseExponent } = point;
    assert(startup, "no startup figures");
    assertEquals(startup.starts, startup.loopGain > 1);
    if (orbit) {
      assertEquals(reason, undefined);
      assert(figures && Number.isFinite(amplitudeExponent) && Number.isFinite(noiseExponent));
      continue;
    }
    assert(startup.loopGain < 1, `no orbit at a = ${startup.loopGain}`);
    assert(/stable|dies out|zero/.test(reason ?? ""), `reason: ${reason}`);
    assertEquals([figures, amplitudeExponent, noiseExponent], [undefined, undefined, undefined]);
  }
});

Deno.test("biasSweep: continued orbits are those found afresh", () => {
  const alive = fullSweep().points.filter(({ orbit }) => orbit !== undefined);
  for (const { orbit, oscillator, startup, figures } of [alive[1]!, alive[8]!, alive.at(-1)!]) {
    const own = findOrbit(oscillator.circuit.system, { start: startup!.equilibrium });
    assert(own instanceof Orbit);
    // Each good to 1e-8.
    assertClose(own.period, orbit!.period, { rtol: 2e-8, atol: 0, what: "period" });
    const { re, im } = own.phasor((x) => oscillator.circuit.voltage("plus", "minus", x));
    assertClose(Math.hypot(re, im), figures!.amplitude, { rtol: 1e-6, atol: 0, what: "amplitude" });
  }
});

Deno.test("biasSweep: knee and quietest point lie where the curves say", () => {
  const { points, knee, quietest, kneeExponent } = fullSweep();
  assert(knee && quietest);
  assertEquals(kneeExponent, 0.5);
  const above = points.findIndex(({ current }) => current > knee);
  assert(points[above - 1]!.amplitudeExponent! > 0.5 && points[above]!.amplitudeExponent! <= 0.5);
  const noise = points.flatMap(({ figures }) => figures ? [figures.phaseNoise] : []);
  const best = points.find(({ current }) => current === quietest)!;
  assertEquals(best.figures!.phaseNoise, Math.min(...noise));
});

Deno.test("biasSweep: exponents are the slopes of solved orbits", () => {
  const { points } = fullSweep();
  const index = points.findIndex(({ current }) => current > 1.5e-3);
  const { current, amplitudeExponent, noiseExponent } = points[index]!;
  const step = 1.005;
  const near = sweep([current / step, current, current * step]).points.map(({ figures }) =>
    figures!
  );
  const slope = (of: (figures: typeof near[number]) => number) =>
    Math.log(of(near[2]!) / of(near[0]!)) / (2 * Math.log(step));
  // Points lie 18 % apart: local parabolas miss the curve's third derivative.
  assertClose(amplitudeExponent!, slope(({ amplitude }) => amplitude), { rtol: 0, atol: 0.01 });
  const exact = slope(({ diffusion, frequency }) => diffusion * frequency ** 2);
  assertClose(noiseExponent!, exact, { rtol: 0, atol: 0.15 });
});

Deno.test("biasSweep: one or two orbits have slopes all the same", () => {
  for (const currents of [[1e-3], [1e-4, 2e-4, 1e-3], [1e-4, 1e-3, 1.1e-3]]) {
    const { points, quietest } = sweep(currents);
    assertEquals(points.map(({ current }) => current), currents);
    const { regime, amplitudeExponent, noiseExponent } = points.find(({ current }) =>
      current === 1e-3
    )!;
    assertEquals(regime, "current-limited");
    // The slopes of the long sweep at 1 mA: 1.10 and -1.87.
    assertClose(amplitudeExponent!, 1.1, { rtol: 0, atol: 0.02 });
    assertClose(noiseExponent!, -1.87, { rtol: 0, atol: 0.05 });
    assert(currents.includes(quietest!), `quietest at ${quietest} A is no point of the sweep`);
  }
});

Deno.test("biasSweep: nothing oscillates, and that is an answer", () => {
  const { points, knee, quietest } = sweep([1e-4, 1.5e-4, 2e-4]);
  assertEquals(points.map(({ regime }) => regime), Array(3).fill("does not start"));
  assertEquals([knee, quietest], [undefined, undefined]);
});

Deno.test("biasSweep: progress reaches its end once, and a thrown error stops the sweep", () => {
  const seen: number[] = [];
  const currents = [0.3e-3, 0.6e-3, 1.2e-3, 2.4e-3];
  sweep(currents, {
    onPoint: (done, total) => {
      assertEquals(total, 4);
      seen.push(done);
    },
  });
  assertEquals(seen, [1, 2, 3, 4]);
  const stop = () => {
    throw new TypeError("enough");
  };
  assertThrows(() => sweep(currents, { onPoint: stop }), TypeError, /enough/);
});

Deno.test("biasSweep: the lead's knee exponent moves the knee", () => {
  const currents = logarithmicCurrents({ from: 2e-3, to: 9e-3, count: 12 });
  const [early, late] = [0.7, 0.3].map((kneeExponent) => sweep(currents, { kneeExponent }).knee!);
  assert(early! < fullSweep().knee! && late! > fullSweep().knee!, `${early}, ${late}`);
});

Deno.test("cornerConditions: thirteen, the nominal one first, each once", () => {
  const supply = { lowest: 0.9, nominal: 1, highest: 1.1 };
  const found = cornerConditions(CARD, { supply });
  assertEquals(found.length, 13);
  assertEquals(found[0], {
    corner: "typical",
    temperature: CARD.temperature.nominal,
    supply: 1,
  });
  assertEquals(new Set(found.map((condition) => JSON.stringify(condition))).size, 13);
  const { lowest, highest } = CARD.temperature;
  for (const { temperature, supply: volts } of found.slice(1)) {
    assert(temperature === lowest || temperature === highest, `${temperature} K`);
    assert(volts === 0.9 || volts === 1.1, `${volts} V`);
  }
  for (const corner of ["slow", "typical", "fast"]) {
    assertEquals(found.slice(1).filter((condition) => condition.corner === corner).length, 4);
  }
});

Deno.test("cornerBias: knee, recommended current and distance of the proposed one", () => {
  const found = cornerBias(crossCoupledPair, DESIGN, {
    ...BASE,
    currents: logarithmicCurrents({ from: 1e-3, to: 10e-3, count: 14 }),
    proposed: 4e-3,
    kneeMultiple: 0.8,
  });
  // The sweep's own points are 18 % apart, those of the long one 18 % too, elsewhere.
  assertClose(found.knee!, fullSweep().knee!, { rtol: 0.02, atol: 0, what: "knee" });
  assertClose(found.recommended!, 0.8 * found.knee!, { rtol: 1e-15, atol: 0 });
  assertClose(found.distance!, 4e-3 / found.knee!, { rtol: 1e-15, atol: 0 });
  assertEquals(found.proposed.current, 4e-3);
  assertEquals(found.proposed.regime, "current-limited");
  assertEquals(found.condition, NOMINAL);
});

Deno.test("cornerBias: a proposed current that is a point of the sweep is there once", () => {
  const currents = [1e-3, 2e-3, 4e-3, 8e-3];
  let points = 0;
  const options = { ...BASE, currents, proposed: 2e-3, kneeMultiple: 1 };
  cornerBias(crossCoupledPair, DESIGN, { ...options, onPoint: (_, total) => points = total });
  assertEquals(points, 4);
});

Deno.test("cornerBias: without a knee in the sweep there is no distance to it", () => {
  const found = cornerBias(crossCoupledPair, DESIGN, {
    ...BASE,
    currents: [0.8e-3, 1e-3, 1.3e-3],
    proposed: 1e-3,
    kneeMultiple: 0.8,
  });
  assertEquals([found.knee, found.recommended, found.distance], [undefined, undefined, undefined]);
  assert(found.proposed.figures);
});
