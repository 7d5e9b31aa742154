/**
 * How injections act on phase and amplitude of an output at a finite offset from the carrier.
 *
 * Indices stay inside the arrays by construction; `!` says so to the compiler.
 *
 * @module
 */
import type { Complex } from "./equilibrium.ts";
import type { Orbit } from "./orbit.ts";
import { PeriodMap } from "./period_map.ts";
import { toRows } from "./phase_sensitivity.ts";
import type { NoiseSource } from "./system.ts";

/** Transfer to one modulation of the output at one offset, at the points of `orbit.quadrature`. */
export interface ModulationTransfer {
  /** Real and imaginary part per row, shape (m, n) each, row-major [rad or 1 per A, per V on inductor rows]. */
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/** Transfers to phase and amplitude of the output. */
export interface OffsetTransfer {
  /** Offset from the carrier [Hz]. */
  readonly offset: number;
  readonly phase: ModulationTransfer;
  readonly amplitude: ModulationTransfer;
}

/** What a source does to the output at one offset. */
export interface SourceNoise {
  readonly label: string;
  readonly device: string;
  readonly color: NoiseSource["color"];
  /** Phase noise, half the one-sided density of phase [1/Hz]. */
  readonly phase: number;
  /** Amplitude noise, half the one-sided density of the relative amplitude [1/Hz]. */
  readonly amplitude: number;
}

/** The offset-dependent transfer of an orbit to one of its outputs. */
export interface PhaseTransfer {
  /** Transfers at an offset [Hz], above zero. */
  at(offset: number): OffsetTransfer;
  /** Noise of each source at an offset [Hz], above zero; one-sided source amplitudes. */
  noise(sources: readonly NoiseSource[], offset: number): SourceNoise[];
}

/** Options of {@linkcode phaseTransfer}. */
export interface PhaseTransferOptions {
  /** Weights of the unknowns in the output, shape (n,): +1 and -1 for a differential voltage. */
  readonly output: Float64Array;
}

/**
 * The transfer from injections to phase and amplitude of the fundamental of an output, by the
 * periodic adjoint that turns with the offset. Sources next to a slow pole (a bias filter, a mirror, a
 * varactor's resistor) act as they do at that offset; for offsets small against every pole the phase
 * transfer goes to w0 v1 / (i w).
 *
 * A response d(output) = exp(i w t) sum_k V_k exp(i k w0 t) of a carrier Re(A exp(i w0 t)) has phase
 * (V_1/A - V_-1/A*)/i and relative amplitude V_1/A + V_-1/A*.
 *
 * @throws TypeError for an output of the wrong shape
 * @throws RangeError for an output without fundamental
 * @see M. Okumura, H. Tanimoto, T. Itakura, T. Sugawara, IEEE Trans. Circuits Syst. I 40 (1993) 581, for
 *   noise by the periodic adjoint (from memory)
 */
export function phaseTransfer(
  orbit: Orbit,
  { output }: PhaseTransferOptions,
): PhaseTransfer {
  const { coordinates, method, path, adjoint, nodes } = orbit.discrete;
  const { n, r, unknownScale } = coordinates;
  if (output.length !== n) {
    throw new TypeError(
      `Cannot build the transfer: output must have ${n} entries, found ${output.length}`,
    );
  }
  const value = (x: Float64Array) => x.reduce((sum, entry, k) => sum + entry * output[k]!, 0);
  const carrier = orbit.phasor(value);
  const size = Math.hypot(carrier.re, carrier.im);
  if (!(size > 0)) throw new RangeError("Cannot build the transfer: the output has no fundamental");
  // An own map: others may reuse the orbit's work arrays.
  const map = new PeriodMap(coordinates, method, orbit.steps);
  map.load(path, coordinates);
  map.linearise();
  const flow = coordinates.reducedFlow(nodes.states.slice(0, n)).flow;
  const sensitivity = adjoint.nodes.slice(0, r);
  const along = flow.reduce((sum, entry, i) => sum + entry * sensitivity[i]!, 0);
  for (let i = 0; i < r; i++) sensitivity[i]! /= along;
  const { count, times, weights, states } = orbit.quadrature;

  const modulation = (offset: number, kind: "phase" | "amplitude"): ModulationTransfer => {
    const turn = 2 * Math.PI * offset * orbit.period;
    const functional = {
      re: new Float64Array(count * n),
      im: new Float64Array(count * n),
    };
    for (let k = 0; k < count; k++) {
      const weight = readout(carrier, 2 * Math.PI * times[k]! / orbit.period, kind);
      const back = -turn * times[k]! / orbit.period;
      const share = weight * weights[k]! / orbit.period;
      for (let j = 0; j < n; j++) {
        const own = share * output[j]! * unknownScale[j]!;
        functional.re[k * n + j] = own * Math.cos(back);
        functional.im[k * n + j] = own * Math.sin(back);
      }
    }
    const scaled = map.turningAdjoint(functional, { turn, flow, sensitivity });
    const re = new Float64Array(count * n);
    const im = new Float64Array(count * n);
    for (let k = 0; k < count; k++) {
      toRows(orbit, scaled.re, re, k * n);
      toRows(orbit, scaled.im, im, k * n);
      const angle = turn * times[k]! / orbit.period;
      const [c, s] = [orbit.period * Math.cos(angle), orbit.period * Math.sin(angle)];
      for (let j = k * n; j < (k + 1) * n; j++) {
        const [x, y] = [re[j]!, im[j]!];
        re[j] = c * x - s * y;
        im[j] = c * y + s * x;
      }
    }
    return { re, im };
  };

  const at = (offset: number): OffsetTransfer => {
    if (!(offset > 0 && offset < Infinity)) {
      throw new RangeError(`Cannot read the transfer: offset must be > 0 Hz, got ${offset} Hz`);
    }
    return {
      offset,
      phase: modulation(offset, "phase"),
      amplitude: modulation(offset, "amplitude"),
    };
  };

  const density = (
    { re, im }: ModulationTransfer,
    source: NoiseSource,
    { injected, offset }: { injected: Float64Array; offset: number },
  ): number => {
    let square = 0;
    let meanRe = 0;
    let meanIm = 0;
    for (let k = 0; k < count; k++) {
      let x = 0;
      let y = 0;
      for (let j = k * n; j < (k + 1) * n; j++) {
        x += re[j]! * injected[j]!;
        y += im[j]! * injected[j]!;
      }
      const share = weights[k]! / orbit.period;
      square += share * (x * x + y * y);
      meanRe += share * x;
      meanIm += share * y;
    }
    // White noise folds from around every harmonic; 1/f noise comes from around zero alone.
    return source.color === "white" ? square / 2 : (meanRe ** 2 + meanIm ** 2) / (2 * offset);
  };

  return {
    at,
    noise(sources, offset) {
      const transfer = at(offset);
      const injected = new Float64Array(count * n);
      return sources.map((source): SourceNoise => {
        for (let k = 0; k < count; k++) {
          source.inject(
            states.subarray(k * n, (k + 1) * n),
            injected.subarray(k * n, (k + 1) * n),
          );
        }
        const { label, device, color } = source;
        return {
          label,
          device,
          color,
          phase: density(transfer.phase, source, { injected, offset }),
          amplitude: density(transfer.amplitude, source, { injected, offset }),
        };
      });
    },
  };
}

/** Weight with which the output at an angle of the carrier enters its phase or amplitude; real. */
function readout(carrier: Complex, angle: number, kind: "phase" | "amplitude"): number {
  // 2 Re(exp(-i angle) / A) for the amplitude, 2 Im of it for the phase.
  const square = carrier.re ** 2 + carrier.im ** 2;
  const re = (Math.cos(angle) * carrier.re - Math.sin(angle) * carrier.im) / square;
  const im = -(Math.cos(angle) * carrier.im + Math.sin(angle) * carrier.re) / square;
  return 2 * (kind === "phase" ? im : re);
}
