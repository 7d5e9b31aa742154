/** Oscillators with published equations: the flow, and the system with its exact Jacobian. */
import type { OscillatorSystem } from "../../../lib/orbit/system.ts";
import { odeSystem } from "../../../lib/orbit/ode_system.ts";
import { findOrbit, type FindOrbitOptions } from "../../../lib/orbit/find_orbit.ts";
import { Orbit } from "../../../lib/orbit/orbit.ts";
import type { NoiseSource } from "../../../lib/orbit/system.ts";
import type { Flow } from "../../reference/integrate.ts";

export interface Example {
  readonly flow: Flow;
  readonly system: OscillatorSystem;
  /** A state from which the cycle is reached. */
  readonly start: Float64Array;
}

function example(
  start: readonly number[],
  flow: Flow,
  jacobian: (x: Float64Array, into: Float64Array) => void,
  scale?: readonly number[],
): Example {
  const system = odeSystem({
    dimension: start.length,
    flow,
    jacobian,
    ...(scale ? { scale: Float64Array.from(scale) } : {}),
  });
  return { flow, system, start: Float64Array.from(start) };
}

/** x'' - mu (1 - x^2) x' + x = 0 as x' = y: B. van der Pol, Phil. Mag. 2 (1926) 978. */
export function vanDerPol(mu: number): Example {
  return example(
    [2, 0],
    (x, into) => {
      into[0] = x[1]!;
      into[1] = mu * (1 - x[0]! ** 2) * x[1]! - x[0]!;
    },
    (x, J) => {
      J.set([0, 1, -2 * mu * x[0]! * x[1]! - 1, mu * (1 - x[0]! ** 2)]);
    },
  );
}

/** y'' - mu (y' - y'^3 / 3) + y = 0: Lord Rayleigh, Phil. Mag. 15 (1883) 229. */
export function rayleigh(mu: number): Example {
  return example(
    [2, 0],
    (x, into) => {
      into[0] = x[1]!;
      into[1] = mu * (x[1]! - x[1]! ** 3 / 3) - x[0]!;
    },
    (x, J) => {
      J.set([0, 1, -1, mu * (1 - x[1]! ** 2)]);
    },
  );
}

/**
 * z' = (growth + i frequency) z - (damping + i shear) |z|^2 z: Y. Kuramoto, Chemical Oscillations, Waves
 * and Turbulence (1984), 2.4.
 */
export function stuartLandau(
  { growth, frequency, damping, shear }: {
    growth: number;
    frequency: number;
    damping: number;
    shear: number;
  },
): Example {
  return example(
    [Math.sqrt(growth / damping), 0.1],
    ([x, y], into) => {
      const square = x! * x! + y! * y!;
      into[0] = growth * x! - frequency * y! - square * (damping * x! - shear * y!);
      into[1] = growth * y! + frequency * x! - square * (damping * y! + shear * x!);
    },
    ([x, y], J) => {
      const square = x! * x! + y! * y!;
      const p = damping * x! - shear * y!;
      const q = damping * y! + shear * x!;
      J[0] = growth - square * damping - 2 * x! * p;
      J[1] = -frequency + square * shear - 2 * y! * p;
      J[2] = frequency - square * shear - 2 * x! * q;
      J[3] = growth - square * damping - 2 * y! * q;
    },
  );
}

/** Parallel tank with C = L = 1, R = quality and a driver (gain / quality) tanh(v): v' = ..., i' = v. */
export function tanhOscillator({ quality, gain }: { quality: number; gain: number }): Example {
  return example(
    [1, 0],
    ([v, i], into) => {
      into[0] = -i! - v! / quality + gain / quality * Math.tanh(v!);
      into[1] = v!;
    },
    ([v], J) => {
      J.set([(gain / Math.cosh(v!) ** 2 - 1) / quality, -1, 1, 0]);
    },
  );
}

/** I. Prigogine, R. Lefever, J. Chem. Phys. 48 (1968) 1695, with A = 1 and B = 3. */
export function brusselator(): Example {
  return example(
    [1, 1],
    ([x, y], into) => {
      into[0] = 1 + x! * x! * y! - 4 * x!;
      into[1] = 3 * x! - x! * x! * y!;
    },
    ([x, y], J) => {
      J.set([2 * x! * y! - 4, x! * x!, 3 - 2 * x! * y!, -x! * x!]);
    },
  );
}

/** R. FitzHugh, Biophys. J. 1 (1961) 445, with a = 0.7, b = 0.8, 1/c^2 = 0.08 and a current of 0.5. */
export function fitzHughNagumo(): Example {
  return example(
    [1, 0],
    ([v, w], into) => {
      into[0] = v! - v! ** 3 / 3 - w! + 0.5;
      into[1] = 0.08 * (v! + 0.7 - 0.8 * w!);
    },
    ([v], J) => {
      J.set([1 - v! * v!, -1, 0.08, -0.064]);
    },
  );
}

/**
 * O. Rossler, Phys. Lett. A 57 (1976) 397: x' = -y - z, y' = x + a y, z' = b + z (x - c). One loop a
 * period at a = b = 0.2, c = 2.5 (S. Strogatz, Nonlinear Dynamics and Chaos, 1994, 12.3, from memory).
 */
export function rossler({ a, b, c }: { a: number; b: number; c: number }): Example {
  return example(
    [2, -2, 0.2],
    ([x, y, z], into) => {
      into[0] = -y! - z!;
      into[1] = x! + a * y!;
      into[2] = b + z! * (x! - c);
    },
    ([x, , z], J) => {
      J.set([0, -1, -1, 1, a, 0, z!, 0, x! - c]);
    },
  );
}

/**
 * Ring of three repressors: M. Elowitz, S. Leibler, Nature 403 (2000) 335, box 1, with n = 2,
 * protein decay 0.2 of messenger decay, 216 and 0.216 proteins per promoter (parameters from memory).
 * States: three messengers, three proteins.
 */
export function repressilator(): Example {
  const [strength, leak, decay] = [216, 0.216, 0.2];
  return example(
    [10, 5, 1, 20, 10, 2],
    (x, into) => {
      for (let i = 0; i < 3; i++) {
        const repressor = x[3 + (i + 2) % 3]!;
        into[i] = -x[i]! + strength / (1 + repressor ** 2) + leak;
        into[3 + i] = decay * (x[i]! - x[3 + i]!);
      }
    },
    (x, J) => {
      J.fill(0);
      for (let i = 0; i < 3; i++) {
        const from = 3 + (i + 2) % 3;
        J[i * 6 + i] = -1;
        J[i * 6 + from] = -2 * strength * x[from]! / (1 + x[from]! ** 2) ** 2;
        J[(3 + i) * 6 + i] = decay;
        J[(3 + i) * 6 + 3 + i] = -decay;
      }
    },
    [30, 30, 30, 30, 30, 30],
  );
}

/** r' = growth r + r^3 - r^5, angle' = frequency: two cycles for -1/4 < growth < 0, the inner unstable. */
export function bautin({ growth, frequency }: { growth: number; frequency: number }): Example {
  return example(
    [1, 0],
    ([x, y], into) => {
      const square = x! * x! + y! * y!;
      const radial = growth + square - square * square;
      into[0] = radial * x! - frequency * y!;
      into[1] = radial * y! + frequency * x!;
    },
    ([x, y], J) => {
      const square = x! * x! + y! * y!;
      const radial = growth + square - square * square;
      const slope = 2 - 4 * square;
      J[0] = radial + slope * x! * x!;
      J[1] = slope * x! * y! - frequency;
      J[2] = slope * x! * y! + frequency;
      J[3] = radial + slope * y! * y!;
    },
  );
}

/** The orbit, or an error with the reason why there is none. */
export function orbitOf(
  system: OscillatorSystem,
  options: FindOrbitOptions,
): Orbit {
  const result = findOrbit(system, options);
  if (!(result instanceof Orbit)) throw new Error(`${result.status}: ${result.reason}`);
  return result;
}

/**
 * A white source of unit two-sided intensity into one row: its one-sided amplitude is sqrt(2), and the
 * diffusion is then (1/T) times the integral of v1^2.
 */
export function unitSource(row: number): NoiseSource {
  return {
    label: "unit",
    device: `row ${row}`,
    color: "white",
    inject(_x, into) {
      into.fill(0);
      into[row] = Math.SQRT2;
    },
  };
}

/** Largest of a component over the period, from dense samples and a parabola through the best three. */
export function peakOf(orbit: Orbit, component: number, { samples = 2000 } = {}): number {
  const value = (k: number) => orbit.at(k * orbit.period / samples)[component]!;
  let best = 0;
  for (let k = 1; k < samples; k++) if (value(k) > value(best)) best = k;
  // Ternary search inside the best two intervals: the top is flat, so its place need not be sharp.
  let low = best - 1;
  let high = best + 1;
  for (let round = 0; round < 60; round++) {
    const [a, b] = [low + (high - low) / 3, high - (high - low) / 3];
    if (value(a) < value(b)) low = a;
    else high = b;
  }
  return value((low + high) / 2);
}
