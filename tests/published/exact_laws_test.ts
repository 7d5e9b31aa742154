/**
 * Laws that hold exactly for the continuous orbit, each over a ladder of steps: the discrete orbit must
 * approach them at the order of its method, or faster.
 *
 * Three stages make order 6. Ladders begin where the error has reached that order and end above
 * rounding. Laws 1 and 2 follow from a quadratic invariant, which Gauss collocation with stage quadrature
 * keeps as far as the discrete period map's own multiplier is 1: on an even mesh their error falls faster
 * than any power of the number of steps.
 */
import { assert, assertClose } from "../assert.ts";
import { assemble } from "../../lib/circuit/circuit.ts";
import { GROUND, thermalAmplitude } from "../../lib/circuit/element.ts";
import { findEquilibrium } from "../../lib/orbit/equilibrium.ts";
import type { Orbit } from "../../lib/orbit/orbit.ts";
import { phaseDiffusion } from "../../lib/orbit/phase_diffusion.ts";
import { phaseSensitivity } from "../../lib/orbit/phase_sensitivity.ts";
import type { NoiseSource, OscillatorSystem, SystemValues } from "../../lib/orbit/system.ts";
import {
  CAPACITANCE,
  CHARACTERISTIC_RESISTANCE,
  conductorCircuit,
  conductorEquations,
  CONDUCTORS,
  INDUCTANCE,
  orbitOf,
  tanhPairCircuit,
  TEMPERATURE,
} from "./_tank.ts";

const ORDER = 6;
const GAMMA = 2 / 3;

/** Orbits of a system on meshes of given numbers of steps, and one far finer. */
function ladder(
  system: OscillatorSystem,
  { start, counts }: { start: Float64Array; counts: readonly number[] },
): { fine: Orbit; rungs: readonly Orbit[] } {
  const fine = orbitOf(system, { start, tolerance: 1e-12 });
  // With the steps held, the tolerance is what the discrete equations are solved to.
  const rungs = counts.map((steps) =>
    orbitOf(system, { start: fine.at(0), period: fine.period, steps, tolerance: 1e-14 })
  );
  return { fine, rungs };
}

/** Order of convergence between the first and the last rung. */
function orderOf(errors: readonly number[], counts: readonly number[]): number {
  const last = errors.length - 1;
  return Math.log(errors[0]! / errors[last]!) / Math.log(counts[last]! / counts[0]!);
}

/** Diffusion of the sources whose device begins with a name. */
function diffusionOf(orbit: Orbit, sources: readonly NoiseSource[], device: string): number {
  return phaseDiffusion(orbit, sources).sources
    .filter((source) => source.device.startsWith(device))
    .reduce((sum, { diffusion }) => sum + diffusion, 0);
}

/*
 * 1. One capacitor node, any memoryless conductor of nowhere-positive slope with noise 4kT gamma times
 * its negative slope: F = 1 + gamma. Proof: with p = v1 on node and coil, p1' = (1/R - g) p1 / C - p2 ..., so that
 * the integral of p1^2 (1/R - g) is that of the derivative of a square, which is zero over a period.
 *
 * J. Bank, PhD thesis, Technical University of Denmark (2006); A. Mazzanti, P. Andreani, IEEE J.
 * Solid-State Circuits 43 (2008) 2716; D. Murphy, J. Rael, A. Abidi, IEEE Trans. Circuits Syst. I 57 (2010)
 * 1187 give it for nearly sinusoidal tanks (from memory).
 */
for (const [name, conductor] of Object.entries(CONDUCTORS)) {
  for (const quality of [1.5, 10, 100]) {
    Deno.test(`F = 1 + gamma for a ${name} conductor at Q = ${quality}, as circuit and as equations`, () => {
      const values = { quality, gain: 3, gamma: GAMMA };
      const equations = conductorEquations(conductor, values);
      const circuit = conductorCircuit(conductor, values);
      const cases = [
        { ...equations, start: Float64Array.of(2, 0) },
        { ...circuit, start: circuit.stateAt({ out: 0.2 }) },
      ];
      // Sharp steps of a curve need more of the mesh before the law's error is at rounding.
      const counts = name === "stepped" ? [48, 96, 192, 384] : [24, 48, 96, 192];
      for (const { system, sources, start } of cases) {
        const { fine, rungs } = ladder(system, { start, counts });
        const factor = (orbit: Orbit) =>
          phaseDiffusion(orbit, sources).total / diffusionOf(orbit, sources, "tank");
        const errors = rungs.map((orbit) => Math.abs(factor(orbit) - 1 - GAMMA));
        const figures = errors.map((error) => error.toExponential(1)).join(", ");
        assert(errors[3]! <= 1e-12, `finest rung: errors ${figures}`);
        // What remains is the distance of the discrete multiplier from 1: smaller than any power of
        // the step on even meshes, falling at order 6 on the fine orbit's uneven one.
        for (const orbit of [...rungs, fine]) {
          const error = Math.abs(factor(orbit) - 1 - GAMMA);
          const multiplier = Math.abs(orbit.multipliers[0]!.re - 1);
          assert(
            error <= 0.5 * quality * multiplier + 1e-12,
            `${orbit.steps} steps: error ${error}, multiplier off by ${multiplier}`,
          );
        }
        // Faster than the method's order from the first rung to the last but one.
        const faster = orderOf(errors.slice(0, 3), counts.slice(0, 3));
        assert(faster > ORDER, `order ${faster}, errors ${figures}`);
        // At the default tolerance the sensitivity is good to 1e-6; the factor is a quotient of two
        // means of its square.
        const own = factor(orbitOf(system, { start }));
        assertClose(own, 1 + GAMMA, { rtol: 4e-6, atol: 0, what: "at the default tolerance" });
      }
    });
  }
}

/*
 * 2. A quasi-static tanh pair passing white tail noise: F_tail = (gamma gm_tail R / 4)(1 - 1/a). The pair
 * passes tanh(v/s) of the noise, and 1 - tanh^2 is its slope, whose mean against v1^2 law 1 gives.
 *
 * Derived; the limit a -> infinity, gamma gm R / 4, is the hard-switching value (J. Rael, A. Abidi, Proc. CICC
 * 2000, 569, from memory, print 4/9 with the loss per side; the exact coefficient is 1/4).
 */
for (const loopGain of [1.2, 2, 5]) {
  for (const quality of [3, 10]) {
    Deno.test(`a tanh pair passes tail noise as (1 - 1/a) R / 4, a = ${loopGain}, Q = ${quality}`, () => {
      const { circuit, tailNoise, resistance } = tanhPairCircuit({ quality, loopGain });
      const counts = [48, 96, 192];
      const start = circuit.stateAt({ plus: 1.2, minus: 0.8 });
      const { rungs } = ladder(circuit.system, { start, counts });
      const sources = [...circuit.sources, tailNoise];
      const errors = rungs.map((orbit) => {
        // gamma gm_tail = 1 S.
        const tail = diffusionOf(orbit, sources, "tail") * thermalAmplitude(1, TEMPERATURE) ** 2;
        const expected = resistance / 4 * (1 - 1 / loopGain);
        return Math.abs(tail / diffusionOf(orbit, sources, "tank") / expected - 1);
      });
      const figures = errors.map((error) => error.toExponential(1)).join(", ");
      assert(errors[2]! <= 1e-12, `finest rung: errors ${figures}`);
      assert(errors[0]! <= 1e-5, `coarsest rung: errors ${figures}`);
    });
  }
}

/*
 * 3. f^2 / f0^2 = sum |V_k|^2 / sum k^2 |V_k|^2 for a lossless resonator with a memoryless conductor.
 * J. Groszkowski, Proc. IRE 21 (1933) 958.
 */
for (const name of ["tanh", "lopsided", "algebraic"] as const) {
  for (const quality of [1.5, 10]) {
    Deno.test(`Groszkowski's frequency from the harmonics, ${name} conductor at Q = ${quality}`, () => {
      const circuit = conductorCircuit(CONDUCTORS[name], { quality, gain: 3, gamma: 0 });
      const counts = [108, 162, 243];
      const { rungs } = ladder(circuit.system, { start: circuit.stateAt({ out: 0.2 }), counts });
      const square = 1 / (4 * Math.PI ** 2 * INDUCTANCE * CAPACITANCE);
      const errors = rungs.map((orbit) => {
        let above = 0;
        let below = 0;
        for (let harmonic = 1; harmonic <= 60; harmonic++) {
          const { re, im } = orbit.phasor((x) => circuit.potential("out", x), { harmonic });
          above += re * re + im * im;
          below += harmonic ** 2 * (re * re + im * im);
        }
        return Math.abs(orbit.frequency ** 2 / square - above / below);
      });
      const figures = errors.map((error) => error.toExponential(1)).join(", ");
      const order = orderOf(errors, counts);
      assert(Math.abs(order - ORDER) < 0.5, `order ${order}, errors ${figures}`);
      assert(errors[2]! <= 2e-11, `finest rung: errors ${figures}`);
    });
  }
}

/*
 * 4. A common-gate Colpitts without output conductance is on the edge of starting at
 * gms n (1 - n) R = Q^2 / (Q^2 - 1), n = C1 / (C1 + C2), Q = R sqrt(C / L) with C the two in series. From
 * s^3 C (C1 + C2) + s^2 (C1 + C2) / R + s ((C1 + C2) / L + gms / R) + gms / L = 0 by Routh's criterion.
 */
for (const n of [0.15, 0.3, 0.6]) {
  for (const quality of [1.5, 4, 20]) {
    Deno.test(`common-gate Colpitts starts at gms n (1 - n) R = Q^2/(Q^2 - 1), n = ${n}, Q = ${quality}`, () => {
      const resistance = quality * CHARACTERISTIC_RESISTANCE;
      const growth = (gms: number) => {
        const { system } = colpitts({ gms, n, resistance });
        const equilibrium = findEquilibrium(system);
        assert(equilibrium.status === "found");
        const pair = equilibrium.poles.find(({ im }) => im > 0);
        assert(pair, "no pole pair");
        return pair.re;
      };
      const expected = quality ** 2 / (quality ** 2 - 1) / (n * (1 - n) * resistance);
      const found = rootBetween(growth, { low: expected / 3, high: 3 * expected });
      // Poles are good to a few roundings of the system's norm, 1e-15, over their slope, 1/(2 Q).
      assertClose(found, expected, { rtol: 1e-13 * quality, atol: 0, what: "gms" });
    });
  }
}

/** Drain at the tank, C1 from drain to source, C2 from source to ground, gate at ground. */
function colpitts(
  { gms, n, resistance }: { gms: number; n: number; resistance: number },
): { system: OscillatorSystem } {
  return assemble([
    {
      kind: "inductor",
      name: "coil",
      windings: [{ nodes: ["drain", GROUND], inductance: INDUCTANCE, seriesResistance: 0 }],
      coupling: 0,
      temperature: 0,
    },
    { kind: "resistor", name: "loss", nodes: ["drain", GROUND], resistance, temperature: 0 },
    {
      kind: "capacitor",
      name: "C1",
      nodes: ["drain", "source"],
      capacitance: CAPACITANCE / (1 - n),
    },
    { kind: "capacitor", name: "C2", nodes: ["source", GROUND], capacitance: CAPACITANCE / n },
    {
      kind: "device",
      name: "transistor",
      nodes: ["drain", "source"],
      evaluate(v, out) {
        out.fill(0);
        out.set([-gms * v[1]!, gms * v[1]!, 0, -gms, 0, gms]);
      },
      noise: [],
    },
  ]);
}

/** Bisection, to rounding. */
function rootBetween(f: (x: number) => number, { low, high }: { low: number; high: number }) {
  assert(f(low) < 0 && f(high) > 0, `no sign change: ${f(low)}, ${f(high)}`);
  for (let k = 0; k < 60; k++) {
    const middle = (low + high) / 2;
    if (f(middle) < 0) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

/*
 * 5. v1 . dq/dt = 1 along the orbit. A. Demir, A. Mehrotra, J. Roychowdhury, IEEE Trans. Circuits Syst. I 47
 * (2000) 655. At mesh points and between them the error falls at the method's order; at the stages, where
 * integrals are taken, states and sensitivities have the stage order 3.
 */
for (const name of ["tanh", "lopsided", "algebraic"] as const) {
  for (const quality of [1.5, 10]) {
    Deno.test(`v1 . dq/dt = 1 along the orbit, ${name} conductor at Q = ${quality}`, () => {
      const circuit = conductorCircuit(CONDUCTORS[name], { quality, gain: 3, gamma: 0 });
      const counts = [108, 162, 243];
      const { rungs } = ladder(circuit.system, { start: circuit.stateAt({ out: 0.2 }), counts });
      const errors = rungs.map((orbit) => invariantErrors(circuit.system, orbit));
      const places = [["mesh", ORDER, 1e-9], ["between", ORDER, 1e-9], [
        "stages",
        4,
        2e-6,
      ]] as const;
      for (const [place, order, bound] of places) {
        const own = errors.map((error) => error[place]);
        const figures = own.map((error) => error.toExponential(1)).join(", ");
        const found = orderOf(own, counts);
        assert(Math.abs(found - order) < 0.5, `${place}: order ${found}, errors ${figures}`);
        assert(own[2]! <= bound, `${place}: errors ${figures}`);
      }
    });
  }
}

/** Largest |v1 . dq/dt - 1| at mesh points, between them and at the stages; dq/dt = -f(x). */
function invariantErrors(system: OscillatorSystem, orbit: Orbit) {
  const n = system.dimension;
  const values: SystemValues = {
    q: new Float64Array(n),
    f: new Float64Array(n),
    C: new Float64Array(n * n),
    G: new Float64Array(n * n),
  };
  const off = (state: Float64Array, v1: Float64Array) => {
    system.evaluate(state, values);
    return Math.abs(v1.reduce((sum, value, i) => sum - value * values.f[i]!, -1));
  };
  const largest = (states: Float64Array, v1: Float64Array) => {
    let worst = 0;
    for (let at = 0; at < states.length; at += n) {
      worst = Math.max(worst, off(states.subarray(at, at + n), v1.subarray(at, at + n)));
    }
    return worst;
  };
  const sensitivity = phaseSensitivity(orbit);
  let between = 0;
  for (let k = 0; k < 97; k++) {
    const time = orbit.period * (k + 0.5) / 97;
    between = Math.max(between, off(orbit.at(time), sensitivity.at(time)));
  }
  return {
    mesh: largest(orbit.samples.states, sensitivity.samples),
    between,
    stages: largest(orbit.quadrature.states, sensitivity.quadrature),
  };
}
