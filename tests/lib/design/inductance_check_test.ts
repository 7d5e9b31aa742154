import {
  brokenText,
  checkInductance,
  trimTank,
  worstStart,
} from "../../../lib/design/inductance_check.ts";
import { startup } from "../../../lib/design/startup.ts";
import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { asked, CARD, FREQUENCY, PAIR, RULE } from "./_inductance_samples.ts";

const POINT = { inductance: 1.8e-9, current: 2.2e-3 };

Deno.test("trimTank: the port is resistive at the frequency, to the tolerance it states", () => {
  const options = asked();
  const { tank } = trimTank(PAIR, POINT, options);
  const design = PAIR.withCurrent(options.designWith(tank), POINT.current);
  const started = startup(PAIR.build(design, { card: CARD, condition: options.conditions[0] }));
  assert(started.status === "found");
  assertClose(started.frequency, FREQUENCY, { rtol: 1e-6, atol: 0 });
});

Deno.test("trimTank: coil and capacitor share the loss by their part of the capacitance", () => {
  const { tank, member, capacitanceLeft } = trimTank(PAIR, POINT, asked());
  const whole = 1 / ((2 * Math.PI * FREQUENCY) ** 2 * POINT.inductance);
  assertClose(tank.capacitance, capacitanceLeft + member.capacitance, { rtol: 1e-12, atol: 0 });
  const loss = 1 / member.quality + capacitanceLeft / whole / 100;
  assertClose(tank.quality, 1 / loss, { rtol: 1e-9, atol: 0 });
});

Deno.test("trimTank: a heavier load leaves just so much less", () => {
  const options = asked();
  const heavier = asked({
    designWith: (tank) => ({ ...options.designWith(tank), loadCapacitance: 60e-15 }),
  });
  const [light, heavy] = [options, heavier].map((own) =>
    trimTank(PAIR, POINT, own).capacitanceLeft
  );
  // 40 fF more on each side are 20 fF more between the outputs.
  assertClose(light! - heavy!, 20e-15, { rtol: 1e-3, atol: 0 });
});

Deno.test("trimTank: says that a frequency or quality factor is not positive", () => {
  assertThrows(() => trimTank(PAIR, POINT, asked({ frequency: 0 })), RangeError, /must be > 0/);
  assertThrows(
    () => trimTank(PAIR, POINT, asked({ capacitorQuality: NaN })),
    RangeError,
    /got 5000000000 Hz and NaN/,
  );
});

Deno.test("worstStart: is the least loop gain of the conditions, each at the trimmed tank", () => {
  const options = asked();
  const { trimmed, worstLoopGain, worstCondition } = worstStart(PAIR, POINT, options);
  const design = PAIR.withCurrent(options.designWith(trimmed.tank), POINT.current);
  const gains = options.conditions.map((condition) => {
    const started = startup(PAIR.build(design, { card: CARD, condition }));
    return started.status === "found" ? started.loopGain : 0;
  });
  assertEquals(worstLoopGain, Math.min(...gains));
  assertEquals(worstCondition, options.conditions[gains.indexOf(worstLoopGain)]);
  assertEquals(worstCondition.corner, "slow");
});

Deno.test("checkInductance: names every limit that is broken, and none of the others", () => {
  const cases = [
    [{}, POINT, []],
    [{ loopGain: 9 }, POINT, ["startup"]],
    [{ leastCapacitance: 1e-12 }, POINT, ["fixed capacitance"]],
    [{ resonanceRatio: 8 }, POINT, ["self-resonance"]],
    [{ mostPower: 1e-3 }, POINT, ["power"]],
    [{ family: { ...RULE, smallest: 2e-9 } }, POINT, ["smallest of the family"]],
    [{ family: { ...RULE, largest: 1e-9 } }, POINT, ["largest of the family"]],
    [{ mostPower: 1e-3, loopGain: 9 }, POINT, ["startup", "power"]],
  ] as const;
  for (const [changes, point, broken] of cases) {
    assertEquals([...checkInductance(PAIR, point, asked(changes)).broken], [...broken]);
  }
});

Deno.test("checkInductance: an inductance whose resonance the devices already pass has no tank", () => {
  const options = asked({ family: { ...RULE, largest: 100e-9 } });
  const check = checkInductance(PAIR, { ...POINT, inductance: 30e-9 }, options);
  assert(check.trimmed.capacitanceLeft < 0);
  assertEquals(check.worstLoopGain, 0);
  assertEquals(check.power, undefined);
  assert(check.broken.includes("startup") && check.broken.includes("fixed capacitance"));
});

Deno.test("checkInductance: the power is the mean over the orbit, reference branch included", () => {
  const { power } = checkInductance(PAIR, POINT, asked());
  // The mirror carries a quarter more; a short channel lifts the tail's copy by some per cent.
  assertClose(power!, 0.9 * POINT.current * 1.25, { rtol: 0.05, atol: 0 });
});

Deno.test("brokenText: gives the figures of what is broken with their units", () => {
  const options = asked({
    loopGain: 9,
    leastCapacitance: 1e-12,
    mostPower: 1e-3,
    resonanceRatio: 8,
  });
  const text = brokenText(checkInductance(PAIR, POINT, options), options);
  assert(/^at 1\.8 nH and 2\.2 mA the loop gain is [\d.]+, 9 is asked for; /.test(text), text);
  assert(/[\d.]+ fF is left for the capacitor, 1 pF is needed/.test(text), text);
  assert(/the coil resonates at 22\.2 GHz, 40 GHz is needed/.test(text), text);
  assert(/the power is [\d.]+ mW, at most 1 mW is allowed/.test(text), text);
});
