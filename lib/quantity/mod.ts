/**
 * Texts with units to SI numbers and back, and the physical constants.
 *
 * @module
 */
export {
  BOLTZMANN,
  ELEMENTARY_CHARGE,
  EPSILON_0,
  MU_0,
  PHYSICAL_CONSTANTS,
  type PhysicalConstant,
} from "./constants.ts";
export { formatQuantity, type FormatQuantityOptions } from "./format_quantity.ts";
export { parseQuantity } from "./parse_quantity.ts";
export { type ResolvedUnit, resolveUnit } from "./unit.ts";
