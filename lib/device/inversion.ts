/**
 * The one non-linear function of the transistor: the normalised inversion charge.
 *
 * @module
 */

/** Below this argument the charge is e^v to rounding. */
const EXPONENTIAL_BELOW = -38;
/** Up to here the residual is written with e^v, which keeps it free of cancellation. */
const WEAK_BELOW = 0.3;
/** From here the asymptotic series starts better than the rational fit. */
const ASYMPTOTIC_ABOVE = 240;

/**
 * Normalised inversion charge q of one channel end: the solution of 2q + ln q = v.
 *
 * With w = 2q this is the Wright omega function w + ln w = v + ln 2. A rational or asymptotic start,
 * good to 1.1e-4 of w, is improved by exactly one step of fourth order (error constant at most 1/72), so
 * the cost never depends on the data and the result is good to rounding on both sides of each joint.
 *
 * @param v pinch-off minus channel potential, over the thermal voltage [1]
 * @returns charge per area over -2 n U_T C_ox [1]; its derivative is {@linkcode inversionSlope}
 * @see C. C. Enz, F. Krummenacher, E. A. Vittoz, Analog Integr. Circuits Signal Process. 8 (1995) 83,
 *   and J.-M. Sallese et al., Solid-State Electron. 47 (2003) 677, for the equation
 * @see F. N. Fritsch, R. E. Shafer, W. P. Crowley, Commun. ACM 16 (1973) 123, algorithm 443, for the step
 */
export function inversionCharge(v: number): number {
  let w: number;
  let residual: number;
  if (v < WEAK_BELOW) {
    const e = 2 * Math.exp(v);
    if (v < EXPONENTIAL_BELOW) return 0.5 * e;
    // Least-squares fit of w/e on 0 < e < exp(1), relative error below 2e-5: a start, not a result.
    const ratio = (0.99998367 + e * (1.61491325 + e * 0.32484629)) /
      (1 + e * (2.61369402 + e * (1.45372719 + e * 0.1159738)));
    w = e * ratio;
    residual = -Math.log(ratio) - w;
  } else {
    const z = v + Math.LN2;
    if (v < ASYMPTOTIC_ABOVE) {
      // Least-squares fit on 1 < z < 250, relative error below 1.1e-4.
      w = (0.5701432329 +
        z * (0.6077724539 + z * (0.2696962357 + z * (0.05804487373 + z * 0.001226514435)))) /
        (1 + z * (0.4409005486 + z * (0.06466986006 + z * 0.001230274712)));
    } else {
      const l = Math.log(z);
      w = z - l + l / z;
    }
    residual = z - w - Math.log(w);
  }
  const p = 2 * (1 + w) * (1 + w + residual * (2 / 3));
  return 0.5 * w * (1 + residual * (p - residual) / ((1 + w) * (p - 2 * residual)));
}

/**
 * Derivative of {@linkcode inversionCharge}: dq/dv = q / (1 + 2q).
 *
 * @param q normalised inversion charge [1]
 * @returns slope [1]
 */
export function inversionSlope(q: number): number {
  return q / (1 + 2 * q);
}
