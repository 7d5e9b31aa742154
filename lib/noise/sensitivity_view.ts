/**
 * Where in the cycle a source's noise is spent: its impulse sensitivity function, noise modulating
 * function and effective sensitivity over one period.
 *
 * Indices stay inside the arrays by construction; `!` says so to the compiler.
 *
 * @module
 */
import { Orbit } from "../orbit/orbit.ts";
import type { PhaseSensitivity } from "../orbit/phase_sensitivity.ts";
import { phaseSensitivity } from "../orbit/phase_sensitivity.ts";
import type { NoiseSource } from "../orbit/system.ts";

/** Highest harmonic whose folding is told apart. */
const HARMONICS = 8;

/** How the sensitivity is normalised. */
export interface SensitivityScale {
  /** In words, for the axis. */
  readonly name: string;
  /** Factor on v1 in s/C (s/Wb): 1 for seconds per coulomb. */
  readonly factor: number;
}

/**
 * The normalisation of Hajimiri and Lee: radians per maximum charge, w0 q_max, with q_max = C A.
 *
 * @param frequency [Hz]
 * @param maximumCharge q_max [C]
 * @see A. Hajimiri, T. Lee, IEEE J. Solid-State Circuits 33 (1998) 179
 */
export function radiansPerMaximumCharge(
  { frequency, maximumCharge }: { readonly frequency: number; readonly maximumCharge: number },
): SensitivityScale {
  if (!(frequency > 0 && maximumCharge > 0)) {
    throw new RangeError(
      `Cannot normalise the sensitivity: frequency and maximum charge must be > 0, got ${frequency} Hz and ${maximumCharge} C`,
    );
  }
  return {
    name: "rad per maximum charge",
    factor: 2 * Math.PI * frequency * maximumCharge,
  };
}

/** Sensitivity, modulation and effective sensitivity of one source. */
export interface SensitivityView {
  readonly label: string;
  readonly device: string;
  readonly color: NoiseSource["color"];
  readonly scale: string;
  /** Times [s], shape (m,). */
  readonly times: Float64Array;
  /** Impulse sensitivity along the source's direction, in the scale, shape (m,). */
  readonly sensitivity: Float64Array;
  /** Noise modulating function: the signed amplitude over its largest size [1], shape (m,). */
  readonly modulation: Float64Array;
  /** Largest size of the one-sided amplitude over the period, of its largest row [A/sqrt(Hz)]. */
  readonly largest: number;
  /** Sensitivity times modulation, shape (m,). */
  readonly effective: Float64Array;
  readonly rms: { readonly sensitivity: number; readonly effective: number };
  readonly mean: { readonly sensitivity: number; readonly effective: number };
  /**
   * Parts of the mean square of the effective sensitivity that noise from around harmonic k of the
   * carrier brings, k = 0 ... 8, shape (9,); what is missing to 1 comes from higher ones.
   */
  readonly foldings: readonly number[];
}

/**
 * The sensitivity view of a source.
 *
 * @param sensitivity the orbit or its phase sensitivity
 * @param source the source, one-sided amplitude
 * @param scale how to normalise; seconds per coulomb without it
 */
export function sensitivityView(
  sensitivity: Orbit | PhaseSensitivity,
  source: NoiseSource,
  scale: SensitivityScale = { name: "s/C", factor: 1 },
): SensitivityView {
  const own = sensitivity instanceof Orbit ? phaseSensitivity(sensitivity) : sensitivity;
  const { orbit } = own;
  const { count, times, weights, states } = orbit.quadrature;
  const n = orbit.system.dimension;
  const v = own.quadrature;
  const along = new Float64Array(count);
  const size = new Float64Array(count);
  const b = new Float64Array(n);
  // The sign of the modulation is taken against the point of largest noise.
  let reference = new Float64Array(n);
  let largest = 0;
  for (let k = 0; k < count; k++) {
    source.inject(states.subarray(k * n, (k + 1) * n), b);
    const norm = sizeOf(b);
    if (norm > largest) {
      largest = norm;
      reference = b.map((entry) => entry / norm);
    }
  }
  for (let k = 0; k < count; k++) {
    source.inject(states.subarray(k * n, (k + 1) * n), b);
    // Where several rows share the noise in turns, its direction moves; without noise it is the reference's.
    const norm = sizeOf(b);
    const own = norm * (b.reduce((sum, entry, j) => sum + entry * reference[j]!, 0) < 0 ? -1 : 1);
    for (let j = 0; j < n; j++) {
      along[k]! += v[k * n + j]! * (norm > 0 ? b[j]! / own : reference[j]!) * scale.factor;
    }
    size[k] = norm > 0 ? own / largest : 0;
  }
  const effective = along.map((value, k) => value * size[k]!);
  const mean = (values: Float64Array) =>
    values.reduce((sum, value, k) => sum + weights[k]! * value, 0) / orbit.period;
  const rms = (values: Float64Array) => Math.sqrt(mean(values.map((value) => value * value)));
  const power = rms(effective) ** 2;
  const foldings = Array.from({ length: HARMONICS + 1 }, (_, harmonic) => {
    let re = 0;
    let im = 0;
    for (let k = 0; k < count; k++) {
      const angle = 2 * Math.PI * harmonic * times[k]! / orbit.period;
      re += weights[k]! * effective[k]! * Math.cos(angle);
      im += weights[k]! * effective[k]! * Math.sin(angle);
    }
    const part = (re * re + im * im) / orbit.period ** 2;
    return power > 0 ? (harmonic === 0 ? part : 2 * part) / power : 0;
  });
  return {
    label: source.label,
    device: source.device,
    color: source.color,
    scale: scale.name,
    times,
    sensitivity: along,
    modulation: size,
    effective,
    largest,
    rms: { sensitivity: rms(along), effective: rms(effective) },
    mean: { sensitivity: mean(along), effective: mean(effective) },
    foldings,
  };
}

function sizeOf(b: Float64Array): number {
  return b.reduce((most, entry) => Math.max(most, Math.abs(entry)), 0);
}
