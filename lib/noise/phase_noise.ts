/**
 * Spectra made from phase diffusion.
 *
 * @module
 */

function positive(value: number, what: string, unit: string): void {
  if (!(value > 0 && value < Infinity)) refuse("> 0", { value, what, unit });
}

function finite(value: number, what: string, unit: string): void {
  if (!Number.isFinite(value)) refuse("finite, in", { value, what, unit });
}

function refuse(
  requirement: string,
  { value, what, unit }: { value: number; what: string; unit: string },
): never {
  const space = unit === "" ? "" : " ";
  throw new RangeError(
    `Cannot compute phase noise: ${what} must be ${requirement}${space}${unit}, got ${value}${space}${unit}`,
  );
}

/**
 * Phase noise in the 1/f^2 region, L = f0^2 c / f^2: half the one-sided spectral density of phase.
 *
 * @param diffusion c, growth rate of the variance of the time shift [s]
 * @param frequency f0 of the carrier [Hz]
 * @param offset f [Hz]
 * @returns L [dBc/Hz]
 * @throws RangeError for values that are not positive
 * @see A. Demir, A. Mehrotra, J. Roychowdhury, IEEE Trans. Circuits Syst. I 47 (2000) 655; IEEE Std
 *   1139-2008 for the definition of L
 */
export function whitePhaseNoise(
  diffusion: number,
  { frequency, offset }: { readonly frequency: number; readonly offset: number },
): number {
  positive(diffusion, "diffusion", "s");
  positive(frequency, "frequency", "Hz");
  positive(offset, "offset", "Hz");
  return 10 * Math.log10(frequency ** 2 * diffusion / offset ** 2);
}

/**
 * Shape of the carrier line broadened by white sources, L = f0^2 c / (pi^2 f0^4 c^2 + f^2).
 *
 * @param diffusion c [s]
 * @param frequency f0 [Hz]
 * @param offset f, may be zero or negative [Hz]
 * @returns power density relative to the carrier's power [1/Hz]; its integral over all offsets is one
 * @throws RangeError for a diffusion or frequency that is not positive, or an offset that is not finite
 * @see A. Demir, A. Mehrotra, J. Roychowdhury, IEEE Trans. Circuits Syst. I 47 (2000) 655
 */
export function carrierLine(
  diffusion: number,
  { frequency, offset }: { readonly frequency: number; readonly offset: number },
): number {
  positive(diffusion, "diffusion", "s");
  positive(frequency, "frequency", "Hz");
  finite(offset, "offset", "Hz");
  const width = frequency ** 2 * diffusion;
  return width / ((Math.PI * width) ** 2 + offset ** 2);
}

/**
 * Figure of merit -L + 20 log(f0/f) - 10 log(P/1 mW).
 *
 * @param phaseNoise L at the offset [dBc/Hz]
 * @param frequency f0 [Hz]
 * @param offset f [Hz]
 * @param power P [W]
 * @returns [dBc/Hz], larger is better
 * @throws RangeError for a phase noise that is not finite and other values that are not positive
 * @see P. Kinget, in Analog Circuit Design (1999) 353 (from memory)
 */
export function figureOfMerit(
  phaseNoise: number,
  { frequency, offset, power }: {
    readonly frequency: number;
    readonly offset: number;
    readonly power: number;
  },
): number {
  finite(phaseNoise, "phase noise", "dBc/Hz");
  positive(frequency, "frequency", "Hz");
  positive(offset, "offset", "Hz");
  positive(power, "power", "W");
  return -phaseNoise + 20 * Math.log10(frequency / offset) - 10 * Math.log10(power / 1e-3);
}

/**
 * Phase noise of an ideal sinusoid across a parallel tank by Leeson's formula in the 1/f^2 region,
 * L = (4 k T R F / A^2) (f0 / (2 Q f))^2.
 *
 * @returns L [dBc/Hz]
 * @throws RangeError for values that are not positive
 * @see D. Leeson, Proc. IEEE 54 (1966) 329
 */
export function leesonPhaseNoise(
  { thermalEnergy, resistance, amplitude, quality, noiseFactor, frequency, offset }: {
    /** k T [J]. */
    readonly thermalEnergy: number;
    /** Parallel loss resistance of the tank [ohm]. */
    readonly resistance: number;
    /** Peak of the tank voltage [V]. */
    readonly amplitude: number;
    /** Quality factor of the tank [1]. */
    readonly quality: number;
    /** F, total over the tank's own [1]. */
    readonly noiseFactor: number;
    /** [Hz] */
    readonly frequency: number;
    /** [Hz] */
    readonly offset: number;
  },
): number {
  positive(thermalEnergy, "thermal energy", "J");
  positive(resistance, "resistance", "ohm");
  positive(amplitude, "amplitude", "V");
  positive(quality, "quality factor", "");
  positive(noiseFactor, "noise factor", "");
  positive(frequency, "frequency", "Hz");
  positive(offset, "offset", "Hz");
  const carrier = 4 * thermalEnergy * resistance * noiseFactor / amplitude ** 2;
  return 10 * Math.log10(carrier * (frequency / (2 * quality * offset)) ** 2);
}
