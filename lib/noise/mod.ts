/**
 * Spectra, figure of merit and closed forms.
 *
 * @module
 */
export { carrierLine, figureOfMerit, leesonPhaseNoise, whitePhaseNoise } from "./phase_noise.ts";
export { type NoiseFactorParts, pairNoiseFactor, type PairNoiseValues } from "./closed_forms.ts";
export {
  type AddedNoise,
  type BudgetEntry,
  type InputNoise,
  type NoiseBudget,
  noiseBudget,
  type NoiseBudgetOptions,
} from "./budget.ts";
export {
  radiansPerMaximumCharge,
  type SensitivityScale,
  type SensitivityView,
  sensitivityView,
} from "./sensitivity_view.ts";
