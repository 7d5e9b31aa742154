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
  closeIn,
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
export {
  type Candidate,
  type Contender,
  contender,
  type ContenderOptions,
  type TopologyResult,
} from "./compare_topologies.ts";
