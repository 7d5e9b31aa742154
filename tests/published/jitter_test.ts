/**
 * Phase error and jitter from phase noise.
 *
 * L = S_phi / 2 with one-sided S_phi, phi_rms^2 = 2 integral of L df: IEEE Std 1139-2008 (from memory).
 *
 * The worked examples of others: S. Wetterlin, "Calculating jitter from phase noise profile" (spreadsheet, after
 * Application Note 3359, "Clock (CLK) jitter and phase noise conversion"), whose slopes of -10 dB per decade need the
 * logarithm; and question 349610 of electronics.stackexchange.com, "Error with phase noise to jitter calculation",
 * in which two calculators agree. The other vectors were computed independently of this project by a closed form and
 * by dense Simpson quadrature, which agree.
 */
import { assertClose } from "../assert.ts";
import { integratePhaseNoise } from "../../lib/noise/integrals.ts";
import { diffusionFromLevel, jitterFromPhaseError, periodJitter } from "../../lib/noise/jitter.ts";
import { firstOrderLoop } from "../../lib/noise/loop_view.ts";
import { integrateLockedNoise } from "../../lib/noise/loop_view_locked_noise.ts";
import { carrierLine } from "../../lib/noise/phase_noise.ts";
import type { PhaseNoiseCurve } from "../../lib/noise/piecewise.ts";
import { flickerCorner, powerLawLevel, powerLawThrough } from "../../lib/noise/power_law.ts";

function curveOf(points: readonly (readonly [number, number])[]): PhaseNoiseCurve {
  return points.map(([offset, level]) => ({ offset, level }));
}

function whole(curve: PhaseNoiseCurve, frequency: number) {
  return integratePhaseNoise(curve, {
    from: curve[0]!.offset,
    to: curve.at(-1)!.offset,
    frequency,
  });
}

Deno.test("integratePhaseNoise: 1.99 ps of Wetterlin's example at 600 MHz", () => {
  const curve = curveOf([[10, -60], [100, -75], [1e3, -85], [1e4, -95], [10001, -95]]);
  assertClose(whole(curve, 600e6).jitter!, 1.99e-12, { rtol: 0, atol: 0.005e-12 });
});

Deno.test("integratePhaseNoise: 68.66 ps of question 349610 at 10 MHz", () => {
  const curve = curveOf([[1, -50], [10, -70], [100, -113], [1e3, -128], [1e4, -135], [1e5, -140]]);
  assertClose(whole(curve, 10e6).jitter!, 68.66e-12, { rtol: 0, atol: 0.005e-12 });
});

Deno.test("integratePhaseNoise: an integrated -80 dBc is 0.1414 mrad, 2.251 ps at 10 MHz", () => {
  // Arithmetic of sqrt(2 10^(A/10)) / (2 pi f0), as in clock jitter notes.
  const flat = integratePhaseNoise({ floor: 1e-14 }, { from: 1, to: 1e6 + 1, frequency: 10e6 });
  assertClose(flat.level, -80, { rtol: 0, atol: 1e-9 });
  assertClose(flat.phaseError, 1.41421e-4, { rtol: 0, atol: 5e-10 });
  assertClose(flat.jitter!, 2.25079e-12, { rtol: 0, atol: 5e-18 });
  assertClose(jitterFromPhaseError(flat.phaseError, 100e6), 0.225079e-12, { rtol: 0, atol: 5e-19 });
});

Deno.test("integratePhaseNoise: straight pieces in log f at 2.4 GHz", () => {
  const curve = curveOf([[1e3, -60], [1e4, -90], [1e5, -110], [1e6, -130], [1e7, -145]]);
  const { area, level, phaseError, phaseErrorDeg, jitter } = whole(curve, 2.4e9);
  assertClose(area, 5.050367545e-4, { rtol: 1e-9, atol: 0 });
  assertClose(level, -32.966770, { rtol: 0, atol: 1e-6 });
  assertClose(phaseError, 31.78165365e-3, { rtol: 1e-9, atol: 0 });
  assertClose(phaseErrorDeg, 1.820955, { rtol: 0, atol: 1e-6 });
  assertClose(jitter!, 2.107586366e-12, { rtol: 1e-9, atol: 0 });
});

Deno.test("integratePhaseNoise: slopes of -1 and a flat piece at 100 MHz", () => {
  const curve = curveOf([[10, -60], [100, -70], [1e3, -80], [1e4, -100], [1e5, -100]]);
  const { area, level, phaseError, jitter } = whole(curve, 100e6);
  assertClose(area, 6.405170186e-5, { rtol: 1e-9, atol: 0 });
  assertClose(level, -41.934693, { rtol: 0, atol: 1e-6 });
  assertClose(phaseError, 11.31827742e-3, { rtol: 1e-9, atol: 0 });
  assertClose(jitter!, 18.01359798e-12, { rtol: 1e-9, atol: 0 });
});

Deno.test("integratePhaseNoise: -120 dBc/Hz at 1 MHz and 1/f^2, 10 kHz to 10 MHz at 2.4 GHz", () => {
  const law = powerLawThrough({ inverseSquare: { offset: 1e6, level: -120 } });
  const found = integratePhaseNoise(law, { from: 1e4, to: 1e7, frequency: 2.4e9 });
  assertClose(found.area, 9.99e-5, { rtol: 1e-12, atol: 0 });
  assertClose(found.phaseError, 14.13506e-3, { rtol: 0, atol: 5e-9 });
  assertClose(found.phaseErrorDeg, 0.809879, { rtol: 0, atol: 5e-7 });
  assertClose(found.jitter!, 0.93736e-12, { rtol: 0, atol: 5e-18 });
});

Deno.test("integratePhaseNoise: a flat -100 dBc/Hz over 1 MHz is 0.81 degrees, either way given", () => {
  const limits = { from: 1e3, to: 1e6 + 1e3 };
  const curve = curveOf([[1e3, -100], [1e6 + 1e3, -100]]);
  for (const noise of [curve, { floor: 1e-10 }]) {
    assertClose(integratePhaseNoise(noise, limits).phaseErrorDeg, 0.81, { rtol: 0, atol: 0.005 });
  }
});

Deno.test("integrateLockedNoise: pure 1/f^2 behind a first-order high-pass is pi L1 f1^2 / fc to 0.1 %", () => {
  // phi^2 = 2 integral of L1 f1^2 / (f^2 + fc^2) over all offsets.
  const level = -113;
  const law = powerLawThrough({ inverseSquare: { offset: 1e6, level } });
  for (const bandwidth of [2e4, 2e5, 2e6]) {
    const { total } = integrateLockedNoise({ oscillator: law }, {
      loop: firstOrderLoop(bandwidth),
      from: bandwidth * 1e-4,
      to: bandwidth * 1e4,
    });
    const closed = Math.PI * 10 ** (level / 10) * 1e12 / bandwidth;
    assertClose(total.variance, closed, { rtol: 1e-3, atol: 0 });
  }
});

Deno.test("diffusionFromLevel, periodJitter: -100 dBc/Hz at 1 MHz from 1 GHz", () => {
  // A. Demir, A. Mehrotra, J. Roychowdhury, IEEE Trans. Circuits Syst. I 47 (2000) 655: c = L fm^2 / f0^2,
  // period jitter sqrt(c / f0), half width of the line pi f0^2 c (from memory; figures by arithmetic).
  const diffusion = diffusionFromLevel(-100, { frequency: 1e9, offset: 1e6 });
  assertClose(diffusion, 1e-16, { rtol: 1e-12, atol: 0 });
  assertClose(periodJitter(diffusion, 1e9), 0.316228e-12, { rtol: 0, atol: 5e-19 });
  const line = (offset: number) => carrierLine(diffusion, { frequency: 1e9, offset });
  assertClose(line(314.159) / line(0), 0.5, { rtol: 1e-5, atol: 0 });
});

Deno.test("powerLawThrough, flickerCorner: white and up-converted noise meet at 31.6 kHz", () => {
  // Invented design, by hand to 0.3 dB and 2 %: -118 dBc/Hz white at 1 MHz, -103.0 flicker at 100 kHz.
  const law = (flicker: number) =>
    powerLawThrough({
      inverseCube: { offset: 1e5, level: flicker },
      inverseSquare: { offset: 1e6, level: -118 },
    });
  assertClose(flickerCorner(law(-103))!, 31.6e3, { rtol: 0.02, atol: 0 });
  assertClose(powerLawLevel(law(-103), 1e5), -96.8, { rtol: 0, atol: 0.3 });
  // Four times the noise amplitude: -91.0, the corner at 505 kHz.
  const louder = -103.01 + 20 * Math.log10(4);
  assertClose(louder, -91.0, { rtol: 0, atol: 0.3 });
  assertClose(flickerCorner(law(louder))!, 505e3, { rtol: 0.02, atol: 0 });
});
