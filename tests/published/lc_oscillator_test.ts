/**
 * A parallel tank with a saturating driver, C = L = 1, R = Q, driver (k/Q) tanh(v).
 *
 * The figures of the table were computed independently of this project (an eighth-order integrator at
 * 1e-13 and its adjoint) to 1e-8. Definitions: A. Demir, A. Mehrotra, J. Roychowdhury, IEEE Trans. Circuits
 * Syst. I 47 (2000) 655, for the diffusion; J. Groszkowski, Proc. IRE 21 (1933) 958, for the frequency.
 */
import { assert, assertClose } from "../assert.ts";
import { orbitOf, tanhOscillator, unitSource } from "../lib/orbit/_systems.ts";
import { phaseSensitivity } from "../../lib/orbit/phase_sensitivity.ts";
import { phaseDiffusion } from "../../lib/orbit/phase_diffusion.ts";
import type { NoiseSource } from "../../lib/orbit/system.ts";

interface Row {
  readonly quality: number;
  readonly gain: number;
  readonly angular: number;
  readonly fundamental: number;
  readonly third: number;
  readonly diffusion: number;
  readonly logMultiplier: number;
}

const TABLE: readonly Row[] = [
  {
    quality: 100,
    gain: 3,
    angular: 0.999995406437,
    fundamental: 3.6945225757,
    third: 0.0036420375,
    // Not the tabulated 0.036632231204, which breaks the 1/Q^2 law of the other rows by 1.1e-6: 2 c A1^2 - 1
    // at Q = 3, 5, 10 is a series in 1/Q^2, and gives 2.1931776e-5 at Q = 100.
    diffusion: (1 + 2.1931776e-5) / (2 * 3.6945225757 ** 2),
    logMultiplier: -0.029097993,
  },
  {
    quality: 10,
    gain: 1.5,
    angular: 0.999911611169,
    fundamental: 1.5283979905,
    third: 0.0070980330,
    diffusion: 0.214134938897,
    logMultiplier: -0.182822156,
  },
  {
    quality: 10,
    gain: 3,
    angular: 0.999540739160,
    fundamental: 3.6943513143,
    third: 0.0364197144,
    diffusion: 0.036715158963,
    logMultiplier: -0.291174831,
  },
  {
    quality: 10,
    gain: 10,
    angular: 0.999034658324,
    fundamental: 12.6973504597,
    third: 0.1556107411,
    diffusion: 0.003118360646,
    logMultiplier: -0.312898185,
  },
  {
    quality: 3,
    gain: 3,
    angular: 0.994908056059,
    fundamental: 3.6926056597,
    third: 0.1213739436,
    diffusion: 0.037566631110,
    logMultiplier: -0.977253931,
  },
  {
    quality: 2,
    gain: 3,
    angular: 0.988577761945,
    fundamental: 3.6902187455,
    third: 0.1819975245,
    diffusion: 0.038747800546,
    logMultiplier: -1.479786351,
  },
];

/** Noise of the tank's loss, 4kT/R with 4kT = 1, and of a driver with gamma 1, 4kT times its slope. */
function tankSources({ quality, gain }: { quality: number; gain: number }): NoiseSource[] {
  return [
    {
      label: "thermal",
      device: "tank",
      color: "white",
      inject(_x, into) {
        into[0] = Math.sqrt(1 / quality);
        into[1] = 0;
      },
    },
    {
      label: "thermal",
      device: "driver",
      color: "white",
      inject(x, into) {
        into[0] = Math.sqrt(gain / quality) / Math.cosh(x[0]!);
        into[1] = 0;
      },
    },
  ];
}

for (const row of TABLE) {
  const { quality, gain } = row;
  Deno.test(`LC oscillator with Q = ${quality} and loop gain ${gain}: the tabulated figures`, () => {
    const { system, start } = tanhOscillator(row);
    const orbit = orbitOf(system, { start, tolerance: 1e-12 });
    const amplitude = (harmonic: number) => {
      const { re, im } = orbit.phasor((x) => x[0]!, { harmonic });
      return Math.hypot(re, im);
    };
    // The table's own tolerance, or half its last printed digit.
    const table = { rtol: 1e-8, atol: 0.5e-10 };
    assertClose(2 * Math.PI / orbit.period, row.angular, { ...table, rtol: 1e-11, what: "w" });
    assertClose(amplitude(1), row.fundamental, { ...table, what: "A1" });
    assertClose(amplitude(3), row.third, { ...table, what: "A3" });
    const { total } = phaseDiffusion(orbit, [unitSource(0)]);
    assertClose(total, row.diffusion, { ...table, what: "diffusion" });
    assertClose(orbit.exponents[1]!.re * orbit.period, row.logMultiplier, {
      rtol: 1e-8,
      atol: 0.5e-9,
      what: "ln multiplier",
    });
  });

  Deno.test(`LC oscillator with Q = ${quality} and loop gain ${gain}: noise factor 1 + gamma exactly`, () => {
    // The driver adds gamma to the noise factor at any Q and waveform: near-sinusoidal form by A. Mazzanti,
    // P. Andreani, IEEE J. Solid-State Circuits 43 (2008) 2716, and D. Murphy, J. Rael, A. Abidi, IEEE Trans.
    // Circuits Syst. I 57 (2010) 1187; exact since the adjoint p of v' = -i - g(v), i' = v has
    // d/dt (p1^2 + p2^2) / 2 = g'(v) p1^2, whose mean over a period is zero. The stages keep quadratic
    // invariants; what is left is how well the discrete sensitivity closes over a period, which the
    // estimate contains.
    const { system, start } = tanhOscillator(row);
    const ratio = (options: { tolerance?: number }) => {
      const orbit = orbitOf(system, { start, ...options });
      const { sources: [tank, driver] } = phaseDiffusion(orbit, tankSources(row));
      return { error: driver!.diffusion / tank!.diffusion - 1, estimate: orbit.estimate };
    };
    const plain = ratio({});
    assert(Math.abs(plain.error) < 1e-6, `error ${plain.error}`);
    assert(Math.abs(plain.error) <= 2 * plain.estimate.sensitivity, `error ${plain.error}`);
    const tight = ratio({ tolerance: 1e-13 });
    assert(Math.abs(tight.error) < 1e-10, `error ${tight.error}`);
    assert(Math.abs(tight.error) <= 2 * tight.estimate.sensitivity, `error ${tight.error}`);
  });
}

Deno.test("LC oscillator: f^2/f0^2 = sum |V_k|^2 / sum k^2 |V_k|^2 as harmonics are added", () => {
  const { system, start } = tanhOscillator({ quality: 2, gain: 3 });
  const orbit = orbitOf(system, { start, tolerance: 1e-12 });
  const square = (2 * Math.PI / orbit.period) ** 2;
  let plain = 0;
  let weighted = 0;
  const errors: number[] = [];
  for (let harmonic = 1; harmonic <= 41; harmonic += 2) {
    const { re, im } = orbit.phasor((x) => x[0]!, { harmonic });
    plain += re * re + im * im;
    weighted += harmonic ** 2 * (re * re + im * im);
    errors.push(Math.abs(plain / weighted / square - 1));
  }
  for (let k = 1; k < 16; k++) {
    assert(errors[k]! < 0.3 * errors[k - 1]!, `errors ${errors.join(", ")}`);
  }
  assert(errors.at(-1)! < 1e-11, `errors ${errors.join(", ")}`);
});

Deno.test("LC oscillator: the period's error falls at twice the number of stages", () => {
  const { system, start } = tanhOscillator({ quality: 3, gain: 3 });
  const exact = orbitOf(system, { start, tolerance: 1e-13, stages: 4, steps: 256 });
  // In the asymptotic range (more than 20 steps to the sharpest pole of tanh) and above rounding.
  const ladders = [[2, [64, 128, 256]], [3, [64, 96, 144]], [4, [72, 84, 96]]] as const;
  for (const [stages, counts] of ladders) {
    const errors = counts.map((steps) => {
      const orbit = orbitOf(system, {
        start: exact.at(0),
        period: exact.period,
        steps,
        stages,
        tolerance: 1e-12,
      });
      return Math.abs(orbit.period / exact.period - 1);
    });
    const slope = Math.log(errors[0]! / errors[2]!) / Math.log(counts[2]! / counts[0]!);
    assert(
      Math.abs(slope - 2 * stages) < 0.15,
      `${stages} stages: order ${slope}, errors ${errors.join(", ")}`,
    );
  }
});

Deno.test("LC oscillator: the diffusion's error falls at twice the number of stages", () => {
  const { system, start } = tanhOscillator({ quality: 3, gain: 3 });
  const exact = orbitOf(system, { start, tolerance: 1e-13, stages: 4 });
  const reference = phaseDiffusion(exact, [unitSource(0)]).total;
  for (const [stages, counts] of [[2, [64, 128, 256]], [3, [64, 96, 144]]] as const) {
    const errors = counts.map((steps) => {
      const orbit = orbitOf(system, {
        start: exact.at(0),
        period: exact.period,
        steps,
        stages,
        tolerance: 1e-12,
      });
      return Math.abs(
        phaseDiffusion(phaseSensitivity(orbit), [unitSource(0)]).total / reference - 1,
      );
    });
    const slope = Math.log(errors[0]! / errors[2]!) / Math.log(counts[2]! / counts[0]!);
    assert(
      Math.abs(slope - 2 * stages) < 0.15,
      `${stages} stages: order ${slope}, errors ${errors.join(", ")}`,
    );
  }
});

Deno.test("LC oscillator: on an even mesh the noise factor is exact where the period is not yet", () => {
  const parameters = { quality: 2, gain: 3 };
  const { system, start } = tanhOscillator(parameters);
  const exact = orbitOf(system, { start, tolerance: 1e-12, stages: 4 });
  const options = { start: exact.at(0), period: exact.period, tolerance: 1e-12 };
  const orbit = orbitOf(system, { ...options, steps: 128, stages: 2 });
  const { sources: [tank, driver] } = phaseDiffusion(orbit, tankSources(parameters));
  assertClose(driver!.diffusion / tank!.diffusion, 1, { rtol: 1e-12, atol: 0 });
  assert(Math.abs(orbit.period / exact.period - 1) > 1e-9);
});
