import { assert, assertClose, assertEquals } from "../../assert.ts";
import { crossCoupledPair } from "../../../lib/circuit/cross_coupled_pair.ts";
import { startTime, startup } from "../../../lib/design/startup.ts";
import { transistorAt } from "../../../lib/design/hand_values.ts";
import { BOLTZMANN } from "../../../lib/quantity/constants.ts";
import { CARD, DESIGN, idealPair, NOMINAL } from "./_pair.ts";

const TANK = { resistance: 300, inductance: 2e-9, capacitance: 2.2e-12 };

for (const transconductance of [2e-3, 6.6e-3, 20e-3]) {
  Deno.test(`startup: loop gain is gm R / 2 for a plain tank and an ideal pair of ${transconductance} S`, () => {
    const { resistance, inductance, capacitance } = TANK;
    const found = startup(idealPair({ ...TANK, transconductance }));
    assert(found.status === "found");
    const gain = transconductance * resistance / 2;
    assertClose(found.loopGain, gain, { rtol: 1e-6, atol: 0, what: "loop gain" });
    // Rounding only: the secant ends at 1e-13 of the frequency.
    assertClose(found.loopGain, gain, { rtol: 1e-11, atol: 0, what: "loop gain" });
    const resonance = 1 / Math.sqrt(inductance * capacitance);
    assertClose(found.frequency, resonance / (2 * Math.PI), { rtol: 1e-11, atol: 0 });
    // Poles of s^2 C + s (1 - a) / R + 1 / L.
    const rate = (gain - 1) / (2 * resistance * capacitance);
    assertClose(found.growthRate, rate, { rtol: 1e-9, atol: 0, what: "growth rate" });
    assertEquals(found.starts, gain > 1);
    const tank = found.poles.filter(({ name }) => name === "tank");
    assertClose(
      tank.map(({ im }) => im),
      [1, -1].map((sign) => sign * Math.sqrt(resonance ** 2 - rate ** 2)),
      {
        rtol: 1e-11,
        atol: 0,
        what: "pole",
      },
    );
    // The common mode has no loss at all here and is no one else's pole.
    const common = found.poles.filter(({ name }) => name === "common mode");
    assertEquals(common.length, 2);
    assertEquals(found.otherUnstable.filter(({ re }) => re > 1e-6 * resonance), []);
  });
}

Deno.test("startup: a gain far above the quality factor makes the tank's poles real; it starts all the same", () => {
  const { resistance, inductance, capacitance } = TANK;
  const transconductance = 0.4;
  const found = startup(idealPair({ ...TANK, transconductance }));
  assert(found.status === "found");
  const gain = transconductance * resistance / 2;
  assertClose(found.loopGain, gain, { rtol: 1e-9, atol: 0, what: "loop gain" });
  const resonance = 1 / Math.sqrt(inductance * capacitance);
  assertClose(found.frequency, resonance / (2 * Math.PI), { rtol: 1e-9, atol: 0 });
  // The larger root of s^2 C + s (1 - a) / R + 1 / L.
  const rate = (gain - 1) / (2 * resistance * capacitance);
  assert(rate > resonance, "the poles are real");
  assertClose(found.growthRate, rate + Math.sqrt(rate ** 2 - resonance ** 2), {
    rtol: 1e-9,
    atol: 0,
  });
  assert(found.starts);
});

Deno.test("startup: loop gain of the pair is 1 where the tank's pole crosses the axis", () => {
  const at = (current: number) => {
    const found = startup(
      crossCoupledPair.build({ ...DESIGN, current }, { card: CARD, condition: NOMINAL }),
    );
    assert(found.status === "found");
    return found;
  };
  let [low, high] = [0.2e-3, 0.8e-3];
  for (let k = 0; k < 40; k++) {
    const middle = (low + high) / 2;
    if (at(middle).growthRate < 0) low = middle;
    else high = middle;
  }
  const edge = at(high);
  assertClose(edge.loopGain, 1, { rtol: 0, atol: 1e-9, what: "loop gain" });
  // On the edge the pole's own frequency is the port's.
  const tank = edge.poles.find(({ name, im }) => name === "tank" && im > 0)!;
  assertClose(tank.im / (2 * Math.PI), edge.frequency, { rtol: 1e-9, atol: 0 });
  assert(!at(0.999 * high).starts && at(1.001 * high).starts);
});

Deno.test("startup: of the real pair, gm R / 2 less the output conductance's part", () => {
  const oscillator = crossCoupledPair.build(DESIGN, { card: CARD, condition: NOMINAL });
  const found = startup(oscillator);
  assert(found.status === "found");
  const { gm, gds } = transistorAt(oscillator, "pair plus", found.equilibrium.state);
  const resistance = 1 / oscillator.tank.conductance(0);
  // Quasi-static transistors and no series resistance: nothing else is in the port's conductance.
  assertClose(found.loopGain, (gm - gds) * resistance / 2, { rtol: 1e-12, atol: 0 });
  // Growth (a - 1) G / (2 C) with the capacitance the frequency says: a parallel tank in every respect.
  const angular = 2 * Math.PI * found.frequency;
  const capacitance = 1 / (angular ** 2 * DESIGN.tank.inductance);
  const rate = (found.loopGain - 1) / (2 * resistance * capacitance);
  assertClose(found.growthRate, rate, { rtol: 1e-12, atol: 0, what: "growth rate" });
  assertEquals(found.otherUnstable, []);
  assertEquals(found.poles.filter(({ name }) => name === "tank").length, 2);
  assert(found.poles.some(({ name }) => name === "common mode"), "no common-mode pole");
});

Deno.test("startTime: the growth from 1/1000 to 0.9 of the final amplitude", () => {
  // Van der Pol's averaging (from memory): s = (a - 1) w0 / (2 Q) = 1.130973e9 / s at a = 2.5, Q = 10, 2.4 GHz; the
  // averaged cubic needs 6.748841 ns, of which exponential growth leaves out ln(1/sqrt(1 - 0.81)) / s.
  const rate = 1.5 * 2 * Math.PI * 2.4e9 / 20;
  assertClose(rate, 1.130973e9, { rtol: 1e-6, atol: 0 });
  const temperature = 300;
  const amplitude = 1;
  // A capacitance whose thermal voltage is 1/1000 of the amplitude.
  const capacitance = BOLTZMANN * temperature / (amplitude / 1000) ** 2;
  const time = startTime(rate, { amplitude, capacitance, temperature });
  assertClose(time, Math.log(900) / rate, { rtol: 1e-12, atol: 0 });
  const averaged = time + Math.log((1 - 1e-6) / (1 - 0.81)) / 2 / rate;
  assertClose(averaged, 6.748841e-9, { rtol: 1e-6, atol: 0, what: "averaged cubic" });
  // "Within about 2/s" of the real thing.
  assert(averaged - time < 2 / rate);
});

Deno.test("startTime: never, at once, and no nonsense", () => {
  const values = { amplitude: 1, capacitance: 1e-12, temperature: 300 };
  assertEquals(startTime(0, values), Infinity);
  assertEquals(startTime(-1e9, values), Infinity);
  assertEquals(startTime(NaN, values), Infinity);
  // An amplitude within the noise is there from the beginning.
  assertEquals(startTime(1e9, { ...values, amplitude: 1e-6 }), 0);
});
