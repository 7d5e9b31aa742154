/**
 * Devices: transistor from model or table, junction, varactors, capacitor bank, coil, technology card;
 * Touchstone files.
 *
 * @module
 */
export {
  type BankBranch,
  type BankProcess,
  type BankState,
  CapacitorBank,
  type CapacitorBankDesign,
  type MonotonyFault,
} from "./capacitor_bank.ts";
export {
  type ClosedCell,
  frequencyStep,
  type SteppedTank,
  switchedQuality,
  switchOnResistance,
} from "./capacitor_bank_sizing.ts";
export { type CapacitorLoss, capacitorLoss, type LossyCapacitor } from "./capacitor_loss.ts";
export { type Corner, CORNERS } from "./corner.ts";
export type { Admittance } from "./inductor_admittance.ts";
export { commonModeInductance, couplingFromModes } from "./inductor_common_mode.ts";
export { type CoilCurves, coilCurves, type CoilCurvesOptions } from "./inductor_curves.ts";
export { type CoilHalves, coilHalves, type CoilHalvesOptions } from "./inductor_filaments.ts";
export {
  type CoilFit,
  type CoilFitElement,
  type CoilFitResult,
  fitCoil,
  type FitCoilOptions,
  type NoCoilFit,
} from "./inductor_fit.ts";
export { type CoilFigures, coilFromFigures } from "./inductor_from_figures.ts";
export { coilFromGeometry, type CoilFromGeometryOptions } from "./inductor_from_geometry.ts";
export {
  type CoilFromNetwork,
  coilFromNetwork,
  type CoilFromNetworkOptions,
} from "./inductor_from_network.ts";
export {
  type CoilWarning,
  SPIRAL_SHAPES,
  type SpiralDimensions,
  spiralDimensions,
  type SpiralGeometry,
  type SpiralShape,
} from "./inductor_geometry.ts";
export { type CoilLayers, type CoilTrace, type TracePi, tracePi } from "./inductor_layers.ts";
export {
  type CoilElement,
  type CoilModel,
  coilModel,
  type CoilModelOptions,
  type CoilNode,
} from "./inductor_model.ts";
export {
  COIL_EXCITATIONS,
  coilAdmittance,
  type CoilExcitation,
  type CoilParameters,
  substrateAdmittance,
  type SubstrateBranch,
} from "./inductor_network.ts";
export {
  CURRENT_SHEET_COEFFICIENTS,
  MODIFIED_WHEELER_COEFFICIENTS,
  MONOMIAL_COEFFICIENTS,
  type PolygonShape,
  SPIRAL_FORMULAS,
  type SpiralFormula,
  type SpiralInductance,
  spiralInductance,
  type SpiralInductanceOptions,
} from "./inductor_spiral_formulas.ts";
export { inversionCharge, inversionSlope } from "./inversion.ts";
export { Junction, type JunctionParameters } from "./junction.ts";
export { deviatedTransistor, mismatchDeviation, type TransistorDeviation } from "./mismatch.ts";
export {
  resolveBankProcess,
  type ResolveBankProcessOptions,
  type ResolvedBankProcess,
} from "./resolve_bank_process.ts";
export {
  type PassiveFactors,
  resolvePassives,
  type ResolvePassivesOptions,
} from "./resolve_passives.ts";
export { resolveTransistor, type ResolveTransistorOptions } from "./resolve_transistor.ts";
export {
  resolveAccumulationVaractor,
  type ResolveAccumulationVaractorOptions,
  resolveJunctionVaractor,
  type ResolveJunctionVaractorOptions,
} from "./resolve_varactor.ts";
export { effectiveThickness, skinDepth } from "./skin_depth.ts";
export { BULK_METALS, type ConductorMetal, resistivityAt } from "./skin_metal.ts";
export {
  type ChargeWaveform,
  type SinusoidalSwing,
  type SwingCapacitance,
  swingCapacitance,
  type WaveformCapacitance,
  waveformCapacitance,
} from "./swing_capacitance.ts";
export {
  type CardLimit,
  type CardTransistor,
  type ParseCardQuantity,
  type TechnologyCard,
  technologyCardFrom,
} from "./technology_card.ts";
export {
  type AdmittanceDescription,
  NETWORK_FORMATS,
  NETWORK_FREQUENCY_UNITS,
  NETWORK_PARAMETERS,
  networkAdmittance,
  type NetworkData,
  type NetworkFormat,
  type NetworkFrequencyUnit,
  networkFromAdmittance,
  type NetworkNoisePoint,
  type NetworkParameter,
} from "./touchstone_network.ts";
export { readTouchstone, type ReadTouchstoneOptions } from "./touchstone_read.ts";
export { writeTouchstone, type WriteTouchstoneOptions } from "./touchstone_write.ts";
export { Transistor, TRANSISTOR_VALUES } from "./transistor.ts";
export { type TransistorModel } from "./transistor_model.ts";
export { inversionName, type TransistorOperatingPoint } from "./transistor_operating_point.ts";
export {
  type TransistorJunctions,
  type TransistorParameters,
  type TransistorSize,
} from "./transistor_parameters.ts";
export {
  type TableExcursion,
  TransistorTable,
  type TransistorTableOptions,
} from "./transistor_table.ts";
export { parseTransistorTable, TransistorTableError } from "./transistor_table_csv.ts";
export { type TransistorTableCharges, type TransistorTableData } from "./transistor_table_data.ts";
export {
  type Varactor,
  type VaractorFigures,
  varactorFigures,
  type VaractorNoise,
} from "./varactor.ts";
export {
  AccumulationVaractor,
  type AccumulationVaractorParameters,
} from "./varactor_accumulation.ts";
export { InversionVaractor, type InversionVaractorOptions } from "./varactor_inversion.ts";
export { JunctionVaractor, type JunctionVaractorParameters } from "./varactor_junction.ts";
