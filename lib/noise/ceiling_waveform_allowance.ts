/**
 * How far harmonics of the tank voltage may lift a figure of merit above the sinusoid's ceiling:
 * 1 + D = sum over k of (V_k / V_1)^2 ((k + r / k) / 2)^2 with r = (f0/f)^2 = sum k^2 V_k^2 / sum V_k^2.
 *
 * A bound, exact for a parallel RLC with any memoryless conductor: its sensitivity v1 to charge obeys
 * mean(v1 (C v' - i_L)) = 1, since v1 = L times the derivative of the sensitivity to flux. By the
 * Cauchy-Schwarz inequality mean(v1^2) >= 1 / mean((C v' - i_L)^2), the noise of the loss conductance is
 * 4kT/R times that, and the sum above is the mean over that of the fundamental alone. r is Groszkowski's
 * law. The figure of merit takes Q = 2 pi f R C and the fundamental's power. Harmonic k counts with about
 * k^2 / 4: leave out those that are not resolved, whose rounding would be counted as distortion.
 *
 * @param harmonics peak of V_1, V_2, ... of the tank voltage [V], shape (n,); without the mean, which an
 *   inductor cannot hold
 * @returns D, at least 0 for the pure sinusoid's [1]
 * @throws {TypeError} without a harmonic
 * @throws {RangeError} for a negative amplitude or a fundamental of zero
 * @see derived here; J. Groszkowski, Proc. IRE 21 (1933) 958 for the frequency
 */
export function waveformAllowance(harmonics: readonly number[]): number {
  const action = "compute the allowance of the waveform";
  const [fundamental] = harmonics;
  if (fundamental === undefined) {
    throw new TypeError(`Cannot ${action}: expected at least the fundamental, got 0 harmonics`);
  }
  harmonics.forEach((value, index) => {
    if (!(value >= 0 && value < Infinity) || (index === 0 && value === 0)) {
      throw new RangeError(
        `Cannot ${action}: harmonic ${index + 1} must be ${index === 0 ? ">" : ">="} 0 V and ` +
          `finite, got ${value} V`,
      );
    }
  });
  const shares = harmonics.map((value) => (value / fundamental) ** 2);
  const sum = (weight: (k: number) => number) =>
    shares.reduce((total, share, index) => total + share * weight(index + 1), 0);
  const ratio = sum((k) => k * k) / sum(() => 1);
  return sum((k) => ((k + ratio / k) / 2) ** 2) - 1;
}
