/**
 * Devices: transistor, junction, technology card.
 *
 * @module
 */
export { type Corner, CORNERS } from "./corner.ts";
export { inversionCharge, inversionSlope } from "./inversion.ts";
export { Junction, type JunctionParameters } from "./junction.ts";
export { deviatedTransistor, mismatchDeviation, type TransistorDeviation } from "./mismatch.ts";
export {
  type PassiveFactors,
  resolvePassives,
  type ResolvePassivesOptions,
} from "./resolve_passives.ts";
export { resolveTransistor, type ResolveTransistorOptions } from "./resolve_transistor.ts";
export {
  type CardLimit,
  type CardTransistor,
  type ParseCardQuantity,
  type TechnologyCard,
  technologyCardFrom,
} from "./technology_card.ts";
export { Transistor, TRANSISTOR_VALUES } from "./transistor.ts";
export { inversionName, type TransistorOperatingPoint } from "./transistor_operating_point.ts";
export {
  type TransistorJunctions,
  type TransistorParameters,
  type TransistorSize,
} from "./transistor_parameters.ts";
