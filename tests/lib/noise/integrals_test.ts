import { assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { integratePhaseNoise, phaseNoiseLevel } from "../../../lib/noise/integrals.ts";

/** -120 dBc/Hz at 1 MHz, 20 dB per decade, in both forms. */
const LAW = { inverseSquare: 1 };
const CURVE = [{ offset: 1e3, level: -60 }, { offset: 1e8, level: -160 }];

Deno.test("integratePhaseNoise: variance is twice the area, in radians, degrees and seconds", () => {
  const { area, level, variance, phaseError, phaseErrorDeg, jitter } = integratePhaseNoise(LAW, {
    from: 1e4,
    to: 1e7,
    frequency: 2.4e9,
  });
  assertClose(area, 1e-4 - 1e-7, { rtol: 1e-13, atol: 0 });
  assertClose(level, 10 * Math.log10(9.99e-5), { rtol: 1e-13, atol: 0 });
  assertClose(variance, 2 * 9.99e-5, { rtol: 1e-13, atol: 0 });
  assertClose(phaseError ** 2, 2 * 9.99e-5, { rtol: 1e-13, atol: 0 });
  assertClose(phaseErrorDeg, phaseError * 180 / Math.PI, { rtol: 1e-15, atol: 0 });
  assertClose(jitter!, phaseError / (2 * Math.PI * 2.4e9), { rtol: 1e-15, atol: 0 });
});

Deno.test("integratePhaseNoise: a curve and the power law it follows agree", () => {
  const limits = { from: 3e3, to: 7e7 };
  assertClose(
    integratePhaseNoise(CURVE, limits).area,
    integratePhaseNoise(LAW, limits).area,
    { rtol: 1e-12, atol: 0 },
  );
  assertClose(phaseNoiseLevel(CURVE, 5e5), phaseNoiseLevel(LAW, 5e5), { rtol: 0, atol: 1e-11 });
});

Deno.test("integratePhaseNoise: no jitter without a carrier, and refused limits", () => {
  assertEquals("jitter" in integratePhaseNoise(LAW, { from: 1, to: 2 }), false);
  assertThrows(() => integratePhaseNoise(LAW, { from: 2, to: 1 }), RangeError, /0 Hz < from < to/);
  assertThrows(() => integratePhaseNoise([], { from: 1, to: 2 }), TypeError, /at least 2 points/);
  assertThrows(
    () => integratePhaseNoise(LAW, { from: 1, to: 2, frequency: 0 }),
    RangeError,
    /frequency must be > 0 Hz/,
  );
});
