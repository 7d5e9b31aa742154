/**
 * Spectra, figure of merit and closed forms.
 *
 * @module
 */
export { carrierLine, figureOfMerit, leesonPhaseNoise, whitePhaseNoise } from "./phase_noise.ts";
export { type NoiseFactorParts, pairNoiseFactor, type PairNoiseValues } from "./closed_forms.ts";
