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
  AmplitudeValues,
  BuiltOscillator,
  Condition,
  CoreValues,
  Divider,
  HandValue,
  LoopGainValues,
  ModePattern,
  TankDesign,
  Topology,
  WatchedVoltage,
} from "./topology.ts";
export { tankResistance } from "./tank_resistance.ts";
export {
  crossCoupledPair,
  type CrossCoupledPairDesign,
  crossCoupledPairP,
  type TailFilter,
} from "./cross_coupled_pair.ts";
export {
  resistorTailPair,
  type ResistorTailPairDesign,
  tailResistanceFor,
} from "./resistor_tail_pair.ts";
export { untailedPair, type UntailedPairDesign } from "./untailed_pair.ts";
export { complementaryPair, type ComplementaryPairDesign } from "./complementary_pair.ts";
export { classCPair, type ClassCPairDesign } from "./class_c_pair.ts";
export { colpitts, type ColpittsDesign } from "./colpitts.ts";
export { differentialColpitts, type DifferentialColpittsDesign } from "./differential_colpitts.ts";
export { steeredColpitts, type SteeredColpittsDesign } from "./steered_colpitts.ts";
export { loadedLoopGain } from "./loaded_loop_gain.ts";
export { topologies, type TopologyName } from "./topologies.ts";
export { coilElements, type CoilPlace } from "./coil_elements.ts";
export { varactorElements, type VaractorPlace } from "./varactor_elements.ts";
export { tankOfCoil } from "./tank_of_coil.ts";
