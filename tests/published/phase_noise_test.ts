/** Spectra, figure of merit and closed forms against published formulas and their worked numbers. */
import { assert, assertClose } from "../assert.ts";
import { crossCoupledPair } from "../../lib/circuit/cross_coupled_pair.ts";
import { tankResistance } from "../../lib/circuit/tank_resistance.ts";
import {
  carrierLine,
  figureOfMerit,
  leesonPhaseNoise,
  whitePhaseNoise,
} from "../../lib/noise/phase_noise.ts";
import { pairNoiseFactor } from "../../lib/noise/closed_forms.ts";
import { gaussLegendre } from "../../lib/numeric/gauss.ts";
import { BOLTZMANN } from "../../lib/quantity/constants.ts";

const decibel = (ratio: number) => 10 * Math.log10(ratio);

/** The oscillator of a band-pass filter and a comparator. */
const WORKED = { frequency: 6660, diffusion: 7.56e-8 };

Deno.test("carrierLine: the worked example of the Lorentzian paper", () => {
  // A. Demir, A. Mehrotra, J. Roychowdhury, IEEE Trans. Circuits Syst. I 47 (2000) 655, from memory: 6.66 kHz,
  // c = 7.56e-8 s^2 Hz, corner 10.56 Hz as printed; the rounded inputs give 10.535 Hz.
  const { frequency, diffusion } = WORKED;
  const at = (offset: number) => decibel(carrierLine(diffusion, { frequency, offset }));
  const corner = Math.PI * frequency ** 2 * diffusion;
  assertClose(corner, 10.5347, { rtol: 0, atol: 5e-5, what: "corner" });
  assertClose(corner, 10.56, { rtol: 3e-3, atol: 0, what: "corner as printed" });
  // Computed from the formula independently, to 1e-4 dB.
  assertClose([at(0), at(corner), at(100)], [-15.1977, -18.2080, -34.7932], {
    rtol: 0,
    atol: 1e-4,
    what: "line",
  });
  assertClose(at(0) - at(corner), decibel(2), { rtol: 1e-12, atol: 0, what: "half power" });
  assertClose(at(-100), at(100), { rtol: 1e-14, atol: 0, what: "even" });
});

Deno.test("carrierLine: its integral over all offsets is one", () => {
  const { frequency, diffusion } = WORKED;
  const corner = Math.PI * frequency ** 2 * diffusion;
  const rule = gaussLegendre(40);
  // Panels by decades from a thousandth to ten million corners, both sides; beyond, the 1/f^2 tail exactly.
  const edges = [0, ...Array.from({ length: 11 }, (_, k) => corner * 10 ** (k - 3))];
  let inside = 0;
  for (let k = 1; k < edges.length; k++) {
    const [from, to] = [edges[k - 1]!, edges[k]!];
    rule.nodes.forEach((node, i) => {
      const offset = from + node * (to - from);
      inside += 2 * rule.weights[i]! * (to - from) * carrierLine(diffusion, { frequency, offset });
    });
  }
  const last = edges.at(-1)!;
  const tail = 2 * frequency ** 2 * diffusion / last;
  // The tail neglects (corner / offset)^2 = 1e-14 of itself.
  assertClose(inside + tail, 1, { rtol: 1e-11, atol: 0 });
  assert(tail > 1e-9, `${tail}: the tail must matter for the check to mean something`);
});

Deno.test("whitePhaseNoise: -100 dBc/Hz at 1 MHz from 1 GHz is c = 1e-16 s", () => {
  // Same paper, and A. Demir, IEEE Trans. Circuits Syst. I 53 (2006) 1869 (from memory): c = L f^2 / f0^2, standard
  // deviation of a period sqrt(c / f0) = 0.316228 ps, corner 314.159 Hz.
  const [frequency, offset, diffusion] = [1e9, 1e6, 1e-16];
  const noise = whitePhaseNoise(diffusion, { frequency, offset });
  assertClose(noise, -100, { rtol: 1e-14, atol: 0 });
  assertClose(Math.sqrt(diffusion / frequency), 0.316228e-12, { rtol: 1e-6, atol: 0 });
  const corner = Math.PI * frequency ** 2 * diffusion;
  assertClose(corner, 314.159, { rtol: 1e-6, atol: 0 });
  // The two spectra differ by the corner's square: 1e-7 at 1 MHz, 3 dB at the corner.
  const line = (at: number) => decibel(carrierLine(diffusion, { frequency, offset: at }));
  assertClose(line(offset), noise, { rtol: 0, atol: 5e-7 });
  const flat = whitePhaseNoise(diffusion, { frequency, offset: corner });
  assertClose(flat - line(corner), decibel(2), { rtol: 1e-10, atol: 0 });
});

/** 2.4 GHz, 2 nH, Q = 10, 1 mA, 300 K, gamma = 2/3. */
const TANK = { inductance: 2e-9, quality: 10, qualityFrequency: 2.4e9, capacitance: 0 };
const GAMMA = 2 / 3;
const NOISE = -114.877056;

Deno.test("phase noise: Leeson's, the sensitivity's, the resistance's and the switching form agree", () => {
  const [frequency, offset, current] = [2.4e9, 1e6, 1e-3];
  const [angular, angularOffset] = [2 * Math.PI * frequency, 2 * Math.PI * offset];
  const resistance = tankResistance(TANK);
  const capacitance = 1 / (angular ** 2 * TANK.inductance);
  const amplitude = crossCoupledPair.amplitude({ current, resistance });
  assertClose(resistance, 301.592895, { rtol: 1e-8, atol: 0 });
  assertClose(capacitance, 2.198810e-12, { rtol: 1e-6, atol: 0 });
  assertClose(amplitude, 0.192, { rtol: 1e-12, atol: 0 });
  const thermal = BOLTZMANN * 300;
  const factor = 1 + GAMMA;
  const leeson = leesonPhaseNoise({
    thermalEnergy: thermal,
    resistance,
    amplitude,
    quality: 10,
    noiseFactor: factor,
    frequency,
    offset,
  });
  // Printed to 1e-6 dB, computed independently with the exact Boltzmann constant.
  assertClose(leeson, NOISE, { rtol: 0, atol: 1e-6, what: "D. Leeson, Proc. IEEE 54 (1966) 329" });
  // A. Hajimiri, T. Lee, IEEE J. Solid-State Circuits 33 (1998) 179, with the factor 2 of the Corrections, 928, that
  // makes it half of the phase's density (from memory). An ideal tank: mean square of the ISF 1/2.
  const density = 4 * thermal / resistance * factor;
  const charge = capacitance * amplitude;
  const sensitivity = decibel(0.5 / charge ** 2 * density / (2 * angularOffset ** 2));
  assertClose(leeson, sensitivity, { rtol: 1e-12, atol: 0, what: "ISF form" });
  // c of the same sinusoid: v1 = ISF / (q_max w), c = (1/2) <v1^2> S, and L = f0^2 c / f^2.
  const diffusion = 0.5 * density * 0.5 / (charge * angular) ** 2;
  const white = whitePhaseNoise(diffusion, { frequency, offset });
  assertClose(leeson, white, { rtol: 1e-12, atol: 0, what: "diffusion" });
  const plain = decibel(
    thermal * resistance * factor / amplitude ** 2 * (angular / (10 * angularOffset)) ** 2,
  );
  assertClose(leeson, plain, { rtol: 1e-12, atol: 0, what: "k T R F / A^2" });
  // J. Rael, A. Abidi, Proc. CICC 2000, 569 (from memory): F = 2 + 8 gamma R I / (pi A), R = loss per side.
  const side = resistance / 2;
  const switching = decibel(
    4 * (2 + 8 * GAMMA * side * current / (Math.PI * amplitude)) * thermal * side /
      amplitude ** 2 * (frequency / (2 * 10 * offset)) ** 2,
  );
  assertClose(leeson, switching, { rtol: 1e-12, atol: 0, what: "per-side form" });
});

Deno.test("figureOfMerit: of that oscillator at 1.2 mW, and by its efficiency", () => {
  const [frequency, offset, power] = [2.4e9, 1e6, 1.2e-3];
  const found = figureOfMerit(NOISE, { frequency, offset, power });
  assertClose(found, 181.689468, { rtol: 0, atol: 2e-6 });
  // P. Kinget (1999); L. Garampazzi et al., IEEE J. Solid-State Circuits 49 (2014) 635.
  const efficiency = 0.192 ** 2 / (2 * 301.592895) / power;
  assertClose(efficiency, 0.0509296, { rtol: 1e-6, atol: 0 });
  const bound = decibel(2e-3 / (BOLTZMANN * 300)) + 20 + decibel(efficiency / (1 + GAMMA));
  assertClose(found, bound, { rtol: 0, atol: 2e-6 });
});

/** Temperature [K] and 10 log(2 mW s / kT) [dB], the figure of merit at Q = 1 without any loss or noise. */
const LIMIT = [
  [290, 176.98548715],
  [293.15, 176.93856814],
  [298.15, 176.86511899],
  [300, 176.83825458],
] as const;

for (const [temperature, limit] of LIMIT) {
  Deno.test(`figureOfMerit: the thermodynamic limit at ${temperature} K`, () => {
    // A tank that turns all its power into a sinusoid, F = 1: P = A^2 / (2 R).
    const [frequency, offset, resistance, amplitude] = [5e9, 1e6, 400, 0.7];
    const values = { frequency, offset, resistance, amplitude, noiseFactor: 1 };
    const of = (quality: number) =>
      figureOfMerit(
        leesonPhaseNoise({ ...values, quality, thermalEnergy: BOLTZMANN * temperature }),
        { frequency, offset, power: amplitude ** 2 / (2 * resistance) },
      );
    assertClose(of(1), limit, { rtol: 0, atol: 1e-8 });
    assertClose(of(10), limit + 20, { rtol: 0, atol: 1e-8 });
  });
}

Deno.test("figureOfMerit: the ceiling of a hard-switched pair at full swing", () => {
  // Efficiency 2/pi at A = 2 V_DD, Q = 10, F = 5/3, 300 K: 192.6586 dB (from memory, recomputed).
  const [frequency, offset, supply, current] = [5e9, 1e6, 1, 1e-3];
  const amplitude = 2 * supply;
  const noise = leesonPhaseNoise({
    thermalEnergy: BOLTZMANN * 300,
    resistance: amplitude * Math.PI / (2 * current),
    amplitude,
    quality: 10,
    noiseFactor: 5 / 3,
    frequency,
    offset,
  });
  const found = figureOfMerit(noise, { frequency, offset, power: supply * current });
  assertClose(found, 192.6586, { rtol: 0, atol: 1e-4 });
});

Deno.test("pairNoiseFactor: hard switching passes gamma gm R / 4 of the tail's noise", () => {
  // Fourier series of sgn(cos) sin: b_2 = 8/(3 pi), b_4 = -16/(15 pi), ...: the sum of b_k^2 is 1, which makes
  // the tail's coefficient 1/4 (derived; J. Rael, A. Abidi, Proc. CICC 2000, 569 print 4/9 per side, from memory).
  let sum = 0;
  for (let k = 2; k < 20_000; k += 2) {
    sum += (4 * k / (Math.PI * (k * k - 1))) ** 2;
  }
  assertClose(4 * 2 / (Math.PI * 3), 0.848826, { rtol: 1e-6, atol: 0, what: "b_2" });
  // The tail of the sum is 16 / (2 pi^2 20000).
  assertClose(sum + 16 / (2 * Math.PI ** 2 * 20_000), 1, { rtol: 1e-7, atol: 0 });
  const found = pairNoiseFactor({
    pairGamma: GAMMA,
    tailGamma: 0.8,
    tailTransconductance: 10e-3,
    resistance: 300,
    loopGain: 1e12,
  });
  assertClose(found.tail, sum * 0.8 * 10e-3 * 300 / 4, { rtol: 2e-4, atol: 0 });
  assertClose(found.total, 1 + GAMMA + found.tail, { rtol: 1e-15, atol: 0 });
});
