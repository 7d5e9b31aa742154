/** In strong inversion, the drain's share of a pinched-off channel's charge over q at the source. */
const CUBIC = 4 / 15;

/**
 * Ward-Dutton partition of the channel charge along a charge-linearised channel, in closed form.
 *
 * With i x = (qs^2 + qs) - (q^2 + q) along the normalised channel 0 <= x <= 1, the drain's share is the
 * integral of x q and the source's that of (1 - x) q. Both integrals are ratios of polynomials without a
 * difference that could cancel, and are written so.
 *
 * @param qs normalised charge at the source end [1]
 * @param qd normalised charge at the drain end [1]
 * @param out shape (6,), overwritten: drain share, source share, d(drain)/dqs, d(drain)/dqd,
 *   d(source)/dqs, d(source)/dqd [1]
 * @see D. E. Ward, R. W. Dutton, IEEE J. Solid-State Circuits 13 (1978) 703, for the partition
 * @see C. C. Enz, E. A. Vittoz, Charge-Based MOS Transistor Modeling (Wiley, 2006), for the closed form
 */
export function channelCharges(qs: number, qd: number, out: Float64Array): void {
  const inverse = 1 / (qs + qd + 1);
  const inverse2 = inverse * inverse;
  const product = qs * qd;
  const ss = qs * qs;
  const dd = qd * qd;
  const drain = (qs * (CUBIC * ss + 1 / 6 + 5 / 12 * qs + 2 * CUBIC * product) +
    qd * (1.5 * CUBIC * dd + 1 / 3 + 0.75 * qd + 3 * CUBIC * product) + 5 / 6 * product) * inverse2;
  const source = (qd * (CUBIC * dd + 1 / 6 + 5 / 12 * qd + 2 * CUBIC * product) +
    qs * (1.5 * CUBIC * ss + 1 / 3 + 0.75 * qs + 3 * CUBIC * product) + 5 / 6 * product) * inverse2;
  // Slopes of the numerators, less the slope of the common denominator.
  const near = 5 / 6 * (qs + qd) + 1 / 6;
  const fall = 2 * inverse;
  out[0] = drain;
  out[1] = source;
  out[2] = (CUBIC * (3 * ss + 4 * product + 3 * dd) + near) * inverse2 - drain * fall;
  out[3] = (CUBIC * (2 * ss + 6 * product + 4.5 * dd) + 5 / 6 * qs + 1.5 * qd + 1 / 3) * inverse2 -
    drain * fall;
  out[4] = (CUBIC * (2 * dd + 6 * product + 4.5 * ss) + 5 / 6 * qd + 1.5 * qs + 1 / 3) * inverse2 -
    source * fall;
  out[5] = (CUBIC * (3 * dd + 4 * product + 3 * ss) + near) * inverse2 - source * fall;
}
