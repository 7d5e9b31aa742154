/**
 * The transistor against the charge form of the EKV model.
 *
 * Source of the closed forms: C. C. Enz, F. Krummenacher, E. A. Vittoz, Analog Integr. Circuits Signal
 * Process. 8 (1995) 83; J.-M. Sallese, M. Bucher, F. Krummenacher, P. Fazan, Solid-State Electron. 47 (2003)
 * 677; C. C. Enz, E. A. Vittoz, Charge-Based MOS Transistor Modeling (Wiley, 2006). The formulas are from
 * memory; the digits below were computed from them independently of this code.
 */
import { assert, assertClose } from "../assert.ts";
import { inversionCharge } from "../../lib/device/inversion.ts";
import { Transistor, TRANSISTOR_VALUES } from "../../lib/device/transistor.ts";
import type { TransistorParameters } from "../../lib/device/transistor_parameters.ts";
import { BOLTZMANN } from "../../lib/quantity/constants.ts";

/** Long channel: no velocity saturation, no output conductance, no overlap, no junctions. */
const longChannel: TransistorParameters = {
  kind: "n",
  temperature: 300,
  minimumLength: 1e-6,
  threshold: 0.4,
  slopeFactor: 1.3,
  transconductanceParameter: 300e-6,
  oxideCapacitance: 10e-3,
  saturationVelocity: Infinity,
  outputConductanceLength: 0,
  overlapCapacitance: 0,
  junction: {
    diffusionLength: 1e-6,
    areaCapacitance: 0,
    perimeterCapacitance: 0,
    builtInPotential: 0.7,
    grading: 0.5,
    saturationCurrent: 0,
    emission: 1,
  },
  flickerCoefficient: 0,
  thresholdMismatch: 0,
  gainMismatch: 0,
};
const device = new Transistor(longChannel, { width: 10e-6, length: 1e-6 });
const { thermalVoltage, specificCurrent } = device;
const { slopeFactor, threshold } = longChannel;

/** Gate voltage that puts the source end, at zero volts, at normalised charge q. */
function gateFor(q: number): number {
  return threshold + slopeFactor * thermalVoltage * (2 * q + Math.log(q));
}

/** Drain voltage that puts the drain end at normalised charge q when the source end has `source`. */
function drainFor(q: number, source: number): number {
  return thermalVoltage * (2 * (source - q) + Math.log(source / q));
}

/** IC, q, v_p - v_s, gm n U_T / I_D, gamma to the source transconductance. */
const SATURATION: readonly (readonly [number, number, number, number, number])[] = [
  [0.001, 0.000999001995, -6.9067557783, 0.999001995014, 0.5001663342],
  [0.01, 0.009901951359, -4.5952195315, 0.990195135928, 0.5016341440],
  [0.1, 0.091607978310, -2.2070209550, 0.916079783100, 0.5139867028],
  [0.5, 0.366025403784, -0.2730017312, 0.732050807569, 0.5446581987],
  [1, 0.618033988750, 0.7548561524, 0.618033988750, 0.5636610019],
  [2, 1, 2, 0.5, 0.5833333333],
  [5, 1.791287847478, 4.1655105240, 0.358257569496, 0.6069570718],
  [10, 2.701562118716, 6.3969544056, 0.270156211872, 0.6216406314],
  [50, 6.588723439379, 15.0628064967, 0.131774468788, 0.6447042552],
  [100, 9.512492197250, 21.2775902974, 0.095124921973, 0.6508125130],
  [1000, 31.126729201737, 65.6915253134, 0.031126729202, 0.6614788785],
];

Deno.test("Transistor has the charge, gm/ID and gamma of the charge form at the tabulated inversions", () => {
  for (const [coefficient, q, v, efficiency, gamma] of SATURATION) {
    // The digits are printed to 12 decimals and the voltage to 10: q = e^v to 1e-9 at the weak end.
    assertClose(inversionCharge(v), q, { rtol: 1e-9, atol: 1e-11 });
    const gate = threshold + slopeFactor * thermalVoltage * v;
    const point = device.operatingPoint(gate + 3, gate, 0, 0);
    const rtol = 2e-9;
    assertClose(point.inversionCoefficient, coefficient, { rtol, atol: 0 });
    assertClose(point.current, specificCurrent * coefficient, { rtol, atol: 0 });
    const found = point.gm * slopeFactor * thermalVoltage / point.current;
    assertClose(found, efficiency, { rtol, atol: 0 });
    assertClose(point.gms, slopeFactor * point.gm, { rtol: 1e-12, atol: 0 });
    assertClose(point.noiseConductance / point.gms, gamma, { rtol, atol: 0 });
  }
});

Deno.test("Transistor follows gm/ID = 2 / (n U_T (1 + sqrt(1 + 4 IC))) over eight decades", () => {
  for (let decade = -4; decade <= 4; decade += 0.25) {
    const coefficient = 10 ** decade;
    const q = (Math.sqrt(1 + 4 * coefficient) - 1) / 2;
    const gate = gateFor(q);
    const { current, gm } = device.operatingPoint(gate + 3, gate, 0, 0);
    // The root loses digits in weak inversion: 1e-16 of 4e-4 leaves 2.5e-13.
    assertClose(current / specificCurrent, coefficient, { rtol: 1e-12, atol: 0 });
    const expected = 2 / (slopeFactor * thermalVoltage * (1 + Math.sqrt(1 + 4 * coefficient)));
    assertClose(gm / current, expected, { rtol: 1e-12, atol: 0 });
  }
});

Deno.test("specificCurrent is 2 n mu C_ox (W/L) U_T^2: 5.212942 uA", () => {
  // n = 1.3, mu C_ox = 300 uA/V^2, W/L = 10, 300 K; half the last printed digit.
  assertClose(specificCurrent, 5.212942e-6, { rtol: 0, atol: 0.5e-12 });
  const gate = gateFor((Math.sqrt(5) - 1) / 2);
  const { gm, current } = device.operatingPoint(gate + 3, gate, 0, 0);
  assertClose(gm / current, 18.389709, { rtol: 0, atol: 0.5e-6 });
});

Deno.test("channelNoise over the source conductance: 1, 0.7375 and 0.638889 from triode to saturation", () => {
  const gate = gateFor(5);
  const sourceConductance = specificCurrent / thermalVoltage * 5;
  for (const [qd, ratio] of [[5, 1], [2, 0.7375], [1e-30, 0.75 * 23 / 27]] as const) {
    const density = device.channelNoise(drainFor(qd, 5), gate, 0, 0) ** 2;
    assertClose(density / (4 * BOLTZMANN * 300 * sourceConductance), ratio, {
      rtol: 1e-12,
      atol: 0,
    });
  }
  assertClose(0.75 * 23 / 27, 0.638889, { rtol: 0, atol: 0.5e-6 });
});

Deno.test("channelNoise tends to 2/3 of the source transconductance in strong, to 2qI in weak inversion", () => {
  const factor = (q: number) => {
    const gate = gateFor(q);
    const point = device.operatingPoint(gate + 3, gate, 0, 0);
    return { point, gamma: point.noiseConductance / point.gms };
  };
  // gamma = 2/3 (q + 3/4) / (q + 1): the distance to the limits is 1/(6 q) and q/6.
  assertClose(factor(1e4).gamma, 2 / 3 - 1 / 6e4, { rtol: 0, atol: 2e-9 });
  const { point, gamma } = factor(1e-6);
  assertClose(gamma, 0.5 + 1e-6 / 6, { rtol: 0, atol: 1e-11 });
  // W. Schottky, Ann. Phys. 362 (1918) 541: the shot noise of the current.
  const shot = 2 * 1.602176634e-19 * point.current;
  assertClose(4 * BOLTZMANN * 300 * point.noiseConductance, shot, { rtol: 2e-6, atol: 0 });
});

Deno.test("Transistor has two thirds of its oxide capacitance from gate to source in saturation", () => {
  // J. E. Meyer, RCA Review 32 (1971) 42; drain share 4/15: D. E. Ward, R. W. Dutton, IEEE J. Solid-State
  // Circuits 13 (1978) 703 (both from memory). The approach to the limit goes as 1/q.
  const oxide = 10e-3 * 10e-6 * 1e-6;
  const out = new Float64Array(TRANSISTOR_VALUES);
  const gate = gateFor(2000);
  device.evaluate(gate + 3, gate, 0, 0, out);
  assertClose(-out[30]!, 2 / 3 * oxide, { rtol: 1e-3, atol: 0 });
  assertClose(-out[28]!, 0, { rtol: 0, atol: 1e-3 * oxide });
  assertClose(out[25]! / oxide, -4 / 15, { rtol: 1e-3, atol: 0 });
  device.evaluate(0, gate, 0, 0, out);
  assertClose([-out[30]!, -out[28]!], [oxide / 2, oxide / 2], { rtol: 1e-3, atol: 0 });
  // Off, what is left is the oxide in series with the depletion layer.
  device.evaluate(0, -1, 0, 0, out);
  assertClose(-out[31]!, oxide * (1 - 1 / slopeFactor), { rtol: 1e-9, atol: 0 });
  assert(Math.abs(out[30]!) < 1e-9 * oxide);
});
