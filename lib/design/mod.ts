/**
 * Startup, bias, limits.
 *
 * @module
 */
export { type NamedPole, startTime, type Startup, startup } from "./startup.ts";
export {
  type DeviceStress,
  deviceStresses,
  type NoiseShare,
  type OperatingFigures,
  operatingFigures,
} from "./operating_figures.ts";
export { KNEE_EXPONENT, kneeCurrent, localExponents, type Regime, regimeOf } from "./regime.ts";
export {
  type BiasPoint,
  type BiasSweep,
  biasSweep,
  type BiasSweepOptions,
  type CornerBias,
  cornerBias,
  cornerConditions,
  logarithmicCurrents,
} from "./bias.ts";
export { oscillation, type OscillationOptions } from "./oscillation.ts";
export { type HandComparison, handComparisons, transistorAt } from "./hand_values.ts";
export {
  type InductanceAnswer,
  type NoInductance,
  smallestByTrial,
  smallestInductance,
} from "./inductance.ts";
export {
  type BindingLimit,
  brokenText,
  checkInductance,
  type InductanceCheck,
  type InductanceOptions,
  type InductancePoint,
  type NominalStart,
  type TrimmedTank,
  trimTank,
  type WorstStart,
  worstStart,
} from "./inductance_check.ts";
export {
  type FamilyLimit,
  familyLimits,
  type InductanceColumn,
  inductanceColumn,
  type InductanceColumnOptions,
  inductanceTrend,
  type InductanceTrendOptions,
  type InductanceTrendPoint,
  smallestOnKneeLine,
} from "./inductance_map.ts";
export {
  type FamilyMember,
  geometryFamily,
  type GeometryFamilyOptions,
  type InductorFamily,
  type MeasuredCoil,
  measuredFamily,
  type MeasuredFamilyOptions,
  ruleFamily,
  type RuleFamilyOptions,
} from "./inductor_family.ts";
export {
  type DesignParameter,
  type NoiseDerivative,
  type Suggestion,
  type WhatIf,
  whatIf,
  type WhatIfOptions,
  type WhatIfPoint,
} from "./what_if.ts";
export { type CommonTank, onCommonTank } from "./common_tank.ts";
export {
  type Candidate,
  type CandidatePoint,
  type Contender,
  contender,
  type ContenderAt,
  type ContenderOptions,
  type TopologyResult,
} from "./compare_topologies.ts";
export {
  ceilingValues,
  type NoisePoint,
  noisePoint,
  type NoisePointOptions,
} from "./noise_point.ts";
