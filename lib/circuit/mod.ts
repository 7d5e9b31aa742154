/**
 * Elements and nodes made into one system; one file per topology.
 *
 * @module
 */
export {
  type CapacitorElement,
  type CircuitElement,
  type CurrentElement,
  type DeviceElement,
  type DeviceNoise,
  deviceValues,
  GROUND,
  type InductorElement,
  type PotentialElement,
  type ResistorElement,
  thermalAmplitude,
  transistorElement,
} from "./element.ts";
export { assemble, type Circuit } from "./circuit.ts";
export type { Schematic, SchematicSymbol, SymbolKind } from "./schematic.ts";
export type {
  BuiltOscillator,
  Condition,
  HandValue,
  ModePattern,
  TankDesign,
  Topology,
  WatchedVoltage,
} from "./topology.ts";
export {
  crossCoupledPair,
  type CrossCoupledPairDesign,
  tankResistance,
} from "./cross_coupled_pair.ts";
