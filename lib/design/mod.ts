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
  type BindingLimit,
  checkInductance,
  type FamilyMember,
  type InductanceAnswer,
  type InductanceCheck,
  type InductanceColumn,
  inductanceColumn,
  type InductanceOptions,
  type InductorFamily,
  type NoInductance,
  smallestInductance,
  type TrimmedTank,
  trimTank,
} from "./inductance.ts";
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
