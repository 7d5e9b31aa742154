/**
 * Spectra, figure of merit and closed forms.
 *
 * @module
 */
export { carrierLine, figureOfMerit, leesonPhaseNoise, whitePhaseNoise } from "./phase_noise.ts";
export {
  type ClosedFormValues,
  type NoiseClosedForm,
  noiseClosedForm,
  type NoiseFactorParts,
  pairNoiseFactor,
  type PairNoiseValues,
} from "./closed_forms.ts";
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
export {
  checkCurve,
  curveArea,
  curveLevel,
  type CurvePoint,
  type OffsetRange,
  type PhaseNoiseCurve,
  sumLevels,
} from "./piecewise.ts";
export {
  flickerCorner,
  floorCorner,
  type PowerLaw,
  powerLawArea,
  powerLawLevel,
  powerLawThrough,
} from "./power_law.ts";
export {
  type IntegratedPhaseNoise,
  integratePhaseNoise,
  type IntegratePhaseNoiseOptions,
  type PhaseNoise,
  phaseNoiseLevel,
} from "./integrals.ts";
export {
  accumulatedJitter,
  diffusionFromLevel,
  jitterFromPhaseError,
  periodJitter,
  phaseErrorFromJitter,
} from "./jitter.ts";
export { firstOrderLoop, type Loop, typeTwoLoop, typeTwoLoopOfMargin } from "./loop_view.ts";
export {
  type IntegratedLockedNoise,
  integrateLockedNoise,
  type IntegrateLockedNoiseOptions,
  type LockedLevels,
  lockedLevels,
  type LockedSources,
} from "./loop_view_locked_noise.ts";
export {
  type BalancedBandwidth,
  balancedBandwidth,
  type BalancedBandwidthOptions,
} from "./loop_view_bandwidth.ts";
export { firstOrderPhaseError } from "./loop_view_closed_form.ts";
export {
  type Mask,
  maskAt,
  maskFrom,
  type MaskLimit,
  type MaskOrigin,
  type MaskPiece,
  mergeMasks,
  translateMask,
  translationShift,
} from "./mask.ts";
export { maskThroughPoints, type MaskThroughPointsOptions } from "./mask_through_points.ts";
export { compareWithMask, type MaskComparison, type MaskMargin } from "./mask_comparison.ts";
export {
  type AdjacentInterferer,
  adjacentRequirement,
  type Blocker,
  blockerRequirement,
  type DemandPlace,
} from "./requirement_blocker.ts";
export { type TransmitNoise, transmitNoiseRequirement } from "./requirement_transmit_noise.ts";
export {
  type JitterDemand,
  jitterRequirement,
  type PhaseErrorDemand,
  phaseErrorFromModulation,
  type PhaseErrorPlace,
  phaseErrorRequirement,
} from "./requirement_phase_error.ts";
export {
  type Ceiling,
  ceiling,
  type CeilingJudgement,
  type CeilingLoss,
  type CeilingValues,
  judgeFigureOfMerit,
} from "./ceiling.ts";
export { waveformAllowance } from "./ceiling_waveform_allowance.ts";
export {
  allowedSupplyNoise,
  densityAt,
  type DensityPoint,
  type NoiseDensity,
  SIDEBAND_CONVENTION,
  type SupplyNoise,
  type SupplyPhaseNoise,
  supplyPhaseNoise,
} from "./supply_noise.ts";
export { type FeedResistor, resistorDensity, resistorPhaseNoise } from "./supply_noise_resistor.ts";
export { type Spur, type SupplyTone, toneSpur } from "./supply_noise_tone.ts";
export { readCurve, type ReadCurveOptions } from "./curve_csv.ts";
export {
  type CurveFit,
  fitCurve,
  type FitCurveOptions,
  type FitPoint,
  type FittedTerm,
  type FitTerm,
} from "./curve_fit.ts";
export { type MaskCoverage, maskCoverage } from "./mask_coverage.ts";
export { type Neighbour, radioDemands, type RadioNumbers } from "./radio_demands.ts";
export {
  type CurveExplanation,
  explainCurve,
  type Explanation,
  type Suspect,
} from "./explain_curve.ts";
