/**
 * The van der Pol oscillator x'' - mu (1 - x^2) x' + x = 0 against tabulated values.
 *
 * Period and amplitude at mu = 1: E. Hairer, S. Norsett, G. Wanner, Solving Ordinary Differential
 * Equations I (1993), I.16; at the other values: P. Amore, arXiv:2111.12198 (2021) tabulates them (method
 * from memory). All digits, the multipliers and the diffusions below were recomputed with 45-digit
 * Taylor series and a secant on the half-return map, independently of this project.
 */
import { assert, assertClose } from "../assert.ts";
import { orbitOf, peakOf, rayleigh, unitSource, vanDerPol } from "../lib/orbit/_systems.ts";
import { phaseSensitivity } from "../../lib/orbit/phase_sensitivity.ts";
import { phaseDiffusion } from "../../lib/orbit/phase_diffusion.ts";

interface Row {
  readonly mu: number;
  readonly period: number;
  readonly amplitude: number;
  /** Natural logarithm of the second multiplier. */
  readonly logMultiplier: number;
  /** Largest |x'|. */
  readonly fastest: number;
}

const TABLE: readonly Row[] = [
  {
    mu: 0.1,
    period: 6.287111272288726806,
    amplitude: 2.000103979872795923,
    logMultiplier: -0.62910392102601959557,
    fastest: 2.01156464973284384866,
  },
  {
    mu: 1,
    period: 6.663286859323130189,
    amplitude: 2.008619860874843136,
    logMultiplier: -7.058932808798959179,
    fastest: 2.6784414796069779492,
  },
  {
    mu: 5,
    period: 11.612230667719570034,
    amplitude: 2.021508061562321323,
    logMultiplier: -85.45201854488354065,
    fastest: 7.63715882738602544849,
  },
  {
    mu: 10,
    period: 19.078369566939014070,
    amplitude: 2.014285360926405285,
    logMultiplier: -311.84421928622801849,
    fastest: 14.1801472870564701090,
  },
];

for (const { mu, period, amplitude, logMultiplier, fastest } of TABLE) {
  Deno.test(`van der Pol at mu = ${mu}: period, amplitude and multiplier at a tolerance of 1e-12`, () => {
    const { system, start } = vanDerPol(mu);
    const orbit = orbitOf(system, { start, tolerance: 1e-12 });
    // The tolerance asked for is on the period; four times that for rounding over 1000 steps.
    assertClose(orbit.period, period, { rtol: 4e-12, atol: 0, what: "period" });
    assertClose(peakOf(orbit, 0), amplitude, { rtol: 1e-10, atol: 0, what: "amplitude" });
    assertClose(peakOf(orbit, 1), fastest, { rtol: 1e-9, atol: 0, what: "largest x'" });
    // The tolerance speaks of the period. A multiplier of e^-312 comes out of a contraction that the
    // period's mesh need not resolve: on a mesh that does, its logarithm is right to rounding.
    const { exponents, period: fine } = orbitOf(system, { start: orbit, stages: 4, steps: 1500 });
    assertClose(exponents[1]!.re * fine, logMultiplier, {
      rtol: 1e-10,
      atol: 0,
      what: "ln multiplier",
    });
    assertClose(orbit.exponents[0]!.re * orbit.period, 0, { rtol: 0, atol: 1e-9, what: "ln 1" });
  });

  Deno.test(`van der Pol at mu = ${mu}: the period at default settings is within its tolerance`, () => {
    const { system, start } = vanDerPol(mu);
    const orbit = orbitOf(system, { start });
    assertClose(orbit.period, period, { rtol: 1e-8, atol: 0 });
    assert(orbit.estimate.period <= 1e-8, `estimate ${orbit.estimate.period}`);
  });
}

/** c = (1/T) integral of v1_y^2 dt, the largest |v1_y|, and the peak harmonics 1, 3, 5 of x. */
const DIFFUSION: readonly {
  readonly mu: number;
  readonly diffusion: number;
  readonly largest: number;
  readonly harmonics: readonly [number, number, number];
}[] = [
  {
    mu: 0.1,
    diffusion: 0.125429287395,
    largest: 0.500598006102,
    harmonics: [2.0001562029, 0.0249882715, 0.0005204531],
  },
  {
    mu: 1,
    diffusion: 0.163071746802,
    largest: 0.550507623609,
    harmonics: [2.0149064642, 0.2376482826, 0.0479872008],
  },
  {
    mu: 5,
    diffusion: 0.311034644165,
    largest: 0.735473243953,
    harmonics: [2.1060767510, 0.5840888393, 0.3063842750],
  },
];

for (const { mu, diffusion, largest, harmonics } of DIFFUSION) {
  // Definition: A. Demir, A. Mehrotra, J. Roychowdhury, IEEE Trans. Circuits Syst. I 47 (2000) 655.
  Deno.test(`van der Pol at mu = ${mu}: diffusion, sensitivity and harmonics`, () => {
    const { system, start } = vanDerPol(mu);
    const orbit = orbitOf(system, { start, tolerance: 1e-12 });
    const sensitivity = phaseSensitivity(orbit);
    const found = phaseDiffusion(sensitivity, [unitSource(1)]);
    // The table's own accuracy is 1e-9.
    assertClose(found.total, diffusion, { rtol: 1e-9, atol: 0, what: "diffusion" });
    let peak = 0;
    for (let k = 0; k < 4000; k++) {
      peak = Math.max(peak, Math.abs(sensitivity.at(k * orbit.period / 4000)[1]!));
    }
    // 4000 samples miss a smooth maximum by less than (pi/4000)^2 / 2 of its curvature.
    assertClose(peak, largest, { rtol: 1e-5, atol: 0, what: "largest v1" });
    // Half the last printed digit, or the table's 1e-8; the fifth on a mesh finer than the period needs.
    const fine = orbitOf(system, { start: orbit, stages: 4, steps: 400 });
    const peaks = [1, 3, 5].map((harmonic) => {
      const { re, im } = fine.phasor((x) => x[0]!, { harmonic });
      return Math.hypot(re, im);
    });
    assertClose(peaks, harmonics, { rtol: 1e-8, atol: 0.5e-10, what: "harmonic" });
    const even = orbit.phasor((x) => x[0]!, { harmonic: 2 });
    assertClose([even.re, even.im, orbit.mean((x) => x[0]!)], [0, 0, 0], { rtol: 0, atol: 1e-11 });
    // Half-wave symmetry: the sensitivity has no mean.
    const slow = phaseDiffusion(sensitivity, [{ ...unitSource(1), color: "1/f" }]);
    assertClose(slow.sources[0]!.mean, 0, { rtol: 0, atol: 1e-11 });
  });
}

Deno.test("van der Pol at mu = 0.1 follows the series in mu to the first neglected term", () => {
  // C. Andersen, J. Geer, SIAM J. Appl. Math. 42 (1982) 678: coefficients from memory, recomputed exactly.
  const { system, start } = vanDerPol(0.1);
  const { period } = orbitOf(system, { start, tolerance: 1e-13 });
  const square = 0.01;
  const series = 1 - square / 16 + 17 * square ** 2 / 3072 + 35 * square ** 3 / 884736 -
    678899 * square ** 4 / 5096079360;
  // The next term is below 1e-3 mu^10 = 1e-13.
  assertClose(2 * Math.PI / period, series, { rtol: 2e-13, atol: 0 });
});

/** Largest y, to the table's 1e-11: x' of van der Pol where x = 0. */
for (const [mu, amplitude] of [[0.1, 2.001770546297], [1, 2.172713692623], [5, 4.375229748200]]) {
  Deno.test(`Rayleigh's equation at mu = ${mu} has van der Pol's period and its own amplitude`, () => {
    const { system, start } = rayleigh(mu!);
    const orbit = orbitOf(system, { start, tolerance: 1e-12 });
    const row = TABLE.find((entry) => entry.mu === mu)!;
    assertClose(orbit.period, row.period, { rtol: 4e-12, atol: 0 });
    assertClose(peakOf(orbit, 0), amplitude!, { rtol: 1e-11, atol: 0.5e-12 });
    const { exponents, period } = orbitOf(system, { start: orbit, stages: 4, steps: 1500 });
    assertClose(exponents[1]!.re * period, row.logMultiplier, { rtol: 1e-10, atol: 0 });
  });
}

Deno.test("van der Pol: the period's error falls at twice the number of stages", () => {
  const { system, start } = vanDerPol(1);
  const exact = 6.663286859323130189;
  const begin = orbitOf(system, { start });
  // Ladders in the asymptotic range and above rounding (1e-14).
  const ladders = [[2, [64, 128, 256]], [3, [48, 96, 192]], [4, [40, 56, 80]]] as const;
  for (const [stages, counts] of ladders) {
    const errors = counts.map((steps) => {
      const orbit = orbitOf(system, {
        start: begin.at(0),
        period: exact,
        steps,
        stages,
        tolerance: 1e-12,
      });
      return Math.abs(orbit.period / exact - 1);
    });
    const slope = Math.log(errors[0]! / errors[2]!) / Math.log(counts[2]! / counts[0]!);
    assert(
      Math.abs(slope - 2 * stages) < 0.15,
      `${stages} stages: order ${slope}, errors ${errors.join(", ")}`,
    );
  }
});
