import { assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { simpsonOverOffsets } from "./_simpson.ts";
import { type PhaseNoise, phaseNoiseLevel } from "../../../lib/noise/integrals.ts";
import { firstOrderLoop, typeTwoLoop } from "../../../lib/noise/loop_view.ts";
import { integrateLockedNoise, lockedLevels } from "../../../lib/noise/loop_view_locked_noise.ts";
import { powerLawThrough } from "../../../lib/noise/power_law.ts";

const OSCILLATOR = powerLawThrough({
  inverseCube: { offset: 1e5, level: -95 },
  inverseSquare: { offset: 1e6, level: -115 },
  floor: { offset: 1e6, level: -155 },
});
const REFERENCE = powerLawThrough({
  inverse: { offset: 1e4, level: -150 },
  floor: { offset: 1e4, level: -155 },
});
const LIMITS = { from: 1e3, to: 1e8 };

Deno.test("integrateLockedNoise: both parts against dense Simpson, also with a sharp resonance", () => {
  for (const loop of [firstOrderLoop(2e5), typeTwoLoop(1e5, 0.7), typeTwoLoop(1e5, 0.01)]) {
    const found = integrateLockedNoise({
      oscillator: OSCILLATOR,
      reference: REFERENCE,
      multiplication: 96,
    }, { loop, ...LIMITS });
    const oscillator = simpsonOverOffsets(
      (f) => 10 ** (phaseNoiseLevel(OSCILLATOR, f) / 10) * loop.oscillatorGain(f),
      LIMITS,
    );
    const reference = simpsonOverOffsets(
      (f) => 96 ** 2 * 10 ** (phaseNoiseLevel(REFERENCE, f) / 10) * loop.referenceGain(f),
      LIMITS,
    );
    assertClose(found.oscillator.area, oscillator, { rtol: 1e-8, atol: 0 });
    assertClose(found.reference!.area, reference, { rtol: 1e-8, atol: 0 });
    assertClose(found.total.area, oscillator + reference, { rtol: 1e-8, atol: 0 });
    assertClose(found.oscillatorShare, oscillator / (oscillator + reference), {
      rtol: 1e-8,
      atol: 0,
    });
  }
});

Deno.test("integrateLockedNoise: 1/f^3 behind a first-order loop in closed form", () => {
  const [fc, { from, to }] = [2e5, LIMITS];
  const { oscillator } = integrateLockedNoise({ oscillator: { inverseCube: 3 } }, {
    loop: firstOrderLoop(fc),
    ...LIMITS,
  });
  // Integral of 1 / (f (f^2 + fc^2)).
  const primitive = (f: number) => Math.log(f * f / (f * f + fc * fc)) / (2 * fc * fc);
  assertClose(oscillator.area, 3 * (primitive(to) - primitive(from)), { rtol: 1e-9, atol: 0 });
});

Deno.test("integrateLockedNoise: a curve and the power law it follows agree", () => {
  const curve: PhaseNoise = [{ offset: 1e3, level: -60 }, { offset: 1e5, level: -100 }, {
    offset: 1e8,
    level: -160,
  }];
  const loop = typeTwoLoop(1e5, 1);
  const of = (oscillator: PhaseNoise) =>
    integrateLockedNoise({ oscillator }, { loop, frequency: 2e9, ...LIMITS });
  const [a, b] = [of(curve), of({ inverseSquare: 1 })];
  assertClose(a.total.area, b.total.area, { rtol: 1e-9, atol: 0 });
  assertClose(a.total.jitter!, a.total.phaseError / (4e9 * Math.PI), { rtol: 1e-14, atol: 0 });
  assertEquals([a.oscillatorShare, "reference" in a], [1, false]);
});

Deno.test("lockedLevels: the reference rules far inside the loop, the oscillator far outside", () => {
  const sources = { oscillator: OSCILLATOR, reference: REFERENCE, multiplication: 10 };
  const loop = firstOrderLoop(1e5);
  const inside = lockedLevels(sources, { loop, offset: 10 });
  assertClose(inside.reference, phaseNoiseLevel(REFERENCE, 10) + 20, { rtol: 0, atol: 1e-6 });
  const outside = lockedLevels(sources, { loop, offset: 1e8 });
  assertClose(outside.oscillator, phaseNoiseLevel(OSCILLATOR, 1e8), { rtol: 0, atol: 1e-5 });
  const { oscillator, reference, total } = lockedLevels(sources, { loop, offset: 1e5 });
  assertClose(total, 10 * Math.log10(10 ** (oscillator / 10) + 10 ** (reference / 10)), {
    rtol: 0,
    atol: 1e-12,
  });
  assertEquals(
    lockedLevels({ oscillator: OSCILLATOR }, { loop, offset: 1e5 }).reference,
    -Infinity,
  );
});

Deno.test("integrateLockedNoise: limits, curves and factors out of range are refused", () => {
  const loop = firstOrderLoop(1e5);
  const oscillator = [{ offset: 1e4, level: -80 }, { offset: 1e6, level: -120 }];
  const of = (change: object) => () =>
    integrateLockedNoise({ oscillator, ...change }, { loop, from: 1e4, to: 1e6, ...change });
  of({})();
  assertThrows(of({ from: 0 }), RangeError, /limits must be 0 Hz < from < to/);
  assertThrows(of({ to: 2e6 }), RangeError, /it runs from 10000 Hz to 1000000 Hz/);
  assertThrows(of({ multiplication: 0 }), RangeError, /multiplication must be > 0/);
  assertThrows(of({ oscillator: {} }), RangeError, /at least one coefficient/);
  assertThrows(
    () => lockedLevels({ oscillator }, { loop, offset: 0 }),
    RangeError,
    /offset must be > 0 Hz/,
  );
});
