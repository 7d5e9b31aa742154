/**
 * Phase diffusion of an orbit due to noise sources, in the limit of small offset.
 *
 * Indices stay inside the arrays by construction; `!` says so to the compiler.
 *
 * @module
 */
import type { PhaseSensitivity } from "./phase_sensitivity.ts";
import { phaseSensitivity } from "./phase_sensitivity.ts";
import { Orbit } from "./orbit.ts";
import type { NoiseSource } from "./system.ts";

/** What one source does to the phase. */
export interface SourceDiffusion {
  readonly label: string;
  readonly device: string;
  readonly color: NoiseSource["color"];
  /**
   * White sources: growth rate of the variance of the time shift [s^2/s = s],
   * (1/T) integral of (v1 . b)^2 / 2 dt with the one-sided amplitude b. Zero for 1/f sources.
   */
  readonly diffusion: number;
  /**
   * Signed mean of v1 . b over the period. For a 1/f source, with b its amplitude at 1 Hz, the drift
   * amplitude in s/s/sqrt(Hz) at 1 Hz.
   */
  readonly mean: number;
  /** rms of v1 . b over the period, same unit as `mean`. */
  readonly rms: number;
}

/** Phase diffusion of an orbit. */
export interface PhaseDiffusion {
  readonly orbit: Orbit;
  readonly sources: readonly SourceDiffusion[];
  /** Sum of the white sources' diffusions [s]. */
  readonly total: number;
}

/**
 * Phase diffusion per source and in total.
 *
 * The single-sideband phase noise in the 1/f^2 region is f0^2 total / f^2. How a source acts at offsets
 * comparable with the slow poles of the circuit is told by `phaseTransfer`, whose limit this is.
 *
 * @param orbit the orbit, or its sensitivity where that is at hand
 * @param sources noise sources, one-sided amplitudes
 * @see A. Demir, A. Mehrotra, J. Roychowdhury, IEEE Trans. Circuits Syst. I 47 (2000) 655
 */
export function phaseDiffusion(
  orbit: Orbit | PhaseSensitivity,
  sources: readonly NoiseSource[],
): PhaseDiffusion {
  const sensitivity = orbit instanceof Orbit ? phaseSensitivity(orbit) : orbit;
  const found = sensitivity.orbit;
  const { count, weights, states } = found.quadrature;
  const n = found.system.dimension;
  const v = sensitivity.quadrature;
  const b = new Float64Array(n);
  let total = 0;
  const each = sources.map((source): SourceDiffusion => {
    let square = 0;
    let mean = 0;
    for (let k = 0; k < count; k++) {
      source.inject(states.subarray(k * n, (k + 1) * n), b);
      let value = 0;
      for (let i = 0; i < n; i++) value += v[k * n + i]! * b[i]!;
      square += weights[k]! * value * value;
      mean += weights[k]! * value;
    }
    const diffusion = source.color === "white" ? square / found.period / 2 : 0;
    total += diffusion;
    return {
      label: source.label,
      device: source.device,
      color: source.color,
      diffusion,
      mean: mean / found.period,
      rms: Math.sqrt(square / found.period),
    };
  });
  return { orbit: found, sources: each, total };
}
