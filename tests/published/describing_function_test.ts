/**
 * The amplitude of a high-Q oscillator against the describing function of its driver.
 *
 * First-order harmonic balance for a tanh driver: K. Clarke, D. Hess, Communication Circuits: Analysis and
 * Design (1971), from memory; the integral and its root were evaluated independently to 1e-11.
 */
import { assert, assertClose } from "../assert.ts";
import { orbitOf, tanhOscillator } from "../lib/orbit/_systems.ts";

/** Loop gain, and the amplitude A with gain N(A) = 1. */
const AMPLITUDES = [
  [1.5, 1.528396288179],
  [2, 2.316343734174],
  [3, 3.694524305904],
  [5, 6.298576159556],
  [10, 12.699752699744],
] as const;

/** Fundamental of tanh(v) over v for v = A cos: 1/(pi A) times the integral of tanh(A cos t) cos t. */
const DESCRIBING = [
  [0.1, 0.997508303926685],
  [1, 0.811675685131559],
  [3, 0.402461857773612],
  [10, 0.126795638364512],
] as const;

for (const [gain, amplitude] of AMPLITUDES) {
  Deno.test(`the amplitude at loop gain ${gain} approaches harmonic balance as 1/Q^2`, () => {
    const errors = [20, 40, 80].map((quality) => {
      const { system } = tanhOscillator({ quality, gain });
      const start = Float64Array.of(amplitude, 0);
      const orbit = orbitOf(system, { start, period: 2 * Math.PI, tolerance: 1e-11 });
      const { re, im } = orbit.phasor((x) => x[0]!);
      return Math.abs(Math.hypot(re, im) / amplitude - 1);
    });
    assert(errors[2]! < 1e-5, `errors ${errors.join(", ")}`);
    // Harmonics of order 1/Q act back on the fundamental in order 1/Q^2: each doubling is a factor of 4.
    assertClose(errors[0]! / errors[1]!, 4, { rtol: 0.03, atol: 0 });
    assertClose(errors[1]! / errors[2]!, 4, { rtol: 0.03, atol: 0 });
  });
}

for (const [size, expected] of DESCRIBING) {
  Deno.test(`orbit.phasor() gives the describing function of tanh at ${size}`, () => {
    // A nearly sinusoidal orbit of amplitude `size`: Q so high that the waveform is a cosine to 1e-9.
    const gain = 1 / expected;
    const { system } = tanhOscillator({ quality: 1e4, gain });
    const start = Float64Array.of(size, 0);
    const orbit = orbitOf(system, { start, period: 2 * Math.PI, tolerance: 1e-11 });
    const v = orbit.phasor((x) => x[0]!);
    const driver = orbit.phasor((x) => Math.tanh(x[0]!));
    const ratio = Math.hypot(driver.re, driver.im) / Math.hypot(v.re, v.im);
    // Both harmonics and the amplitude differ from the ideal by 1/Q^2 = 1e-8 at most.
    assertClose(ratio, expected, { rtol: 1e-8, atol: 0 });
    assertClose(Math.hypot(v.re, v.im), size, { rtol: 1e-6, atol: 0 });
  });
}
