/**
 * Startup loop gain of a common-gate Colpitts oscillator without output conductance: the hand value
 * g = gms n (1 - n) R over y = (1 + sqrt(1 + 4 g^2 / Q^2)) / 2.
 *
 * The source's conductance loads the divider: it takes part of the second capacitor out, which raises the
 * startup frequency, y being the square of it over that of the coil with the divider, and turns the tap's
 * phase. Derived; at g = 5 and Q = 8 it is 3.845.
 *
 * @param handValue g [1]
 * @param quality Q = R sqrt(C/L), C being all the capacitance across the coil, the divider's in series [1]
 * @returns [1]
 */
export function loadedLoopGain(
  handValue: number,
  { quality }: { readonly quality: number },
): number {
  return 2 * handValue / (1 + Math.sqrt(1 + 4 * (handValue / quality) ** 2));
}
