/** Points per period with which the mean over a sinusoid begins. */
const FIRST_POINTS = 32;

/** Doubling stops here: a law with a step converges slowly and says so by its error. */
const LAST_POINTS = 2 ** 17;

/** Relative change at a doubling below which more points are pointless for a smooth law. */
const SETTLED = 1e-13;

/** A sinusoidal swing. */
export interface SinusoidalSwing {
  /** Voltage about which it swings [V]. */
  readonly bias: number;
  /** Peak of the sinusoid [V]; zero gives the small-signal value. */
  readonly amplitude: number;
}

/** What a capacitance law becomes under a sinusoidal swing. */
export interface SwingCapacitance {
  /** Capacitance that the fundamental sees [F]: the one that sets the frequency. */
  readonly effective: number;
  /** Mean over time [F]: not what sets the frequency, shown because it is often taken for it. */
  readonly average: number;
  /** At the bias [F]. */
  readonly smallSignal: number;
  /** Change of `effective` at the last doubling of the points [F]. */
  readonly error: number;
}

/**
 * Effective capacitance of a law C(v) under v = bias + A cos t:
 * C_eff = (1/pi) integral over 0 to 2 pi of C(bias + A cos t) sin^2 t dt = a0 - a2/2 with the Fourier
 * coefficients of C(t).
 *
 * It is the fundamental of the current over that of dv/dt. The mean uses equal steps, doubled until it no
 * longer changes; for an analytic law it then stands at rounding, for one with a step `error` tells.
 *
 * @param capacitance small-signal capacitance [F] at a voltage [V]
 * @throws {RangeError} when the swing is not finite
 * @see E. Hegazi, A. A. Abidi, IEEE J. Solid-State Circuits 38 (2003) 1033
 * @see S. Levantino, C. Samori, A. Bonfanti, S. L. J. Gierkink, A. L. Lacaita, V. Boccuzzi, IEEE J.
 *   Solid-State Circuits 37 (2002) 1003
 */
export function swingCapacitance(
  capacitance: (voltage: number) => number,
  { bias, amplitude }: SinusoidalSwing,
): SwingCapacitance {
  if (!(Number.isFinite(bias) && Number.isFinite(amplitude))) {
    throw new RangeError(
      `Cannot average the capacitance: bias and amplitude must be finite, got ${bias} V and ${amplitude} V`,
    );
  }
  const smallSignal = capacitance(bias);
  if (amplitude === 0) {
    return { effective: smallSignal, average: smallSignal, smallSignal, error: 0 };
  }
  // The law is even in t: half a period at the angles (k + 1/2) pi / n, every angle used once.
  let points = FIRST_POINTS / 2;
  let effective = NaN;
  for (;;) {
    let weighted = 0;
    let plain = 0;
    for (let k = 0; k < points; k++) {
      const angle = Math.PI * (k + 0.5) / points;
      const sine = Math.sin(angle);
      const value = capacitance(bias + amplitude * Math.cos(angle));
      weighted += value * sine * sine;
      plain += value;
    }
    const next = 2 * weighted / points;
    const error = Math.abs(next - effective);
    effective = next;
    points *= 2;
    if (error <= SETTLED * Math.abs(effective) || points > LAST_POINTS / 2) {
      return { effective, average: plain / (points / 2), smallSignal, error };
    }
  }
}

/** One period of a waveform and the charge that goes with it. */
export interface ChargeWaveform {
  /** Voltage across the capacitance, shape (m,) [V]. */
  readonly voltage: ArrayLike<number>;
  /** Charge of its first terminal, shape (m,) [C]. */
  readonly charge: ArrayLike<number>;
  /** Place in the period, 0 to 1, shape (m,) [1]. @default equally spaced from 0 */
  readonly phases?: ArrayLike<number>;
  /** Part of the period each sample stands for, shape (m,), sum 1 [1]. @default 1/m */
  readonly weights?: ArrayLike<number>;
}

/** What a charge looks like to the fundamental of a waveform. */
export interface WaveformCapacitance {
  /** [F] */
  readonly effective: number;
  /**
   * Part of the charge's fundamental in quadrature with the voltage's [F]: times minus the angular
   * frequency it is a conductance. Zero for a charge that follows a waveform with an axis of symmetry.
   */
  readonly quadrature: number;
}

/**
 * Effective capacitance under any periodic waveform: the fundamental of dq/dt over the fundamental of
 * dv/dt. For a sinusoid it is that of {@linkcode swingCapacitance}; in a tank with inductance L and
 * no other path for the current the frequency is exactly 1/(2 pi sqrt(L C_eff)).
 *
 * @throws {TypeError} when the arrays differ in length
 * @throws {RangeError} when the voltage has no fundamental
 */
export function waveformCapacitance(waveform: ChargeWaveform): WaveformCapacitance {
  const { voltage, charge, phases, weights } = waveform;
  const count = voltage.length;
  for (const [name, array] of Object.entries({ charge, phases, weights })) {
    if (array === undefined || array.length === count) continue;
    throw new TypeError(
      `Cannot average the capacitance: expected ${count} samples of ${name}, got ${array.length}`,
    );
  }
  const fundamental = [0, 0, 0, 0];
  let size = 0;
  for (let k = 0; k < count; k++) {
    const angle = 2 * Math.PI * (phases?.[k] ?? k / count);
    const weight = weights?.[k] ?? 1 / count;
    const re = weight * Math.cos(angle);
    const im = -weight * Math.sin(angle);
    // Both arrays have `count` entries.
    const [v, q] = [voltage[k]!, charge[k]!];
    fundamental[0]! += re * v;
    fundamental[1]! += im * v;
    fundamental[2]! += re * q;
    fundamental[3]! += im * q;
    size += weight * Math.abs(v);
  }
  const [vr, vi, qr, qi] = fundamental as [number, number, number, number];
  const square = vr * vr + vi * vi;
  if (!(square > (1e-12 * size) ** 2)) {
    throw new RangeError(
      `Cannot average the capacitance: the voltage must have a fundamental, got ${
        2 * Math.sqrt(square)
      } V`,
    );
  }
  return {
    effective: (qr * vr + qi * vi) / square,
    quadrature: (qi * vr - qr * vi) / square,
  };
}
