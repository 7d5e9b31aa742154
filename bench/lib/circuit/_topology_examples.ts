/** One design of each topology, of a size that a 65 nm process of 1 V would take at 2 to 6 GHz. */
import type { ClassCPairDesign } from "../../../lib/circuit/class_c_pair.ts";
import type { ColpittsDesign } from "../../../lib/circuit/colpitts.ts";
import type { ComplementaryPairDesign } from "../../../lib/circuit/complementary_pair.ts";
import type { DifferentialColpittsDesign } from "../../../lib/circuit/differential_colpitts.ts";
import type { ResistorTailPairDesign } from "../../../lib/circuit/resistor_tail_pair.ts";
import type { SteeredColpittsDesign } from "../../../lib/circuit/steered_colpitts.ts";
import type { UntailedPairDesign } from "../../../lib/circuit/untailed_pair.ts";
import type { CrossCoupledPairDesign } from "../../../lib/circuit/cross_coupled_pair.ts";

/** R = 453 ohm at 5 GHz. */
const TANK = { inductance: 1.2e-9, quality: 12, qualityFrequency: 5e9, capacitance: 650e-15 };
const TAIL = { width: 120e-6, length: 200e-9 };

export const P_PAIR: CrossCoupledPairDesign = {
  tank: TANK,
  pair: { width: 80e-6, length: 60e-9 },
  tail: { width: 300e-6, length: 200e-9 },
  current: 2.5e-3,
  mirrorRatio: 4,
  loadCapacitance: 30e-15,
  tailCapacitance: 100e-15,
  mirrorCapacitance: 1e-12,
};

/** 2 f0 = 10 GHz with 0.4 nH needs 633 fF at the sources, the devices' own included. */
export const FILTERED_PAIR: CrossCoupledPairDesign = {
  tank: TANK,
  pair: { width: 30e-6, length: 60e-9 },
  tail: TAIL,
  current: 2.5e-3,
  mirrorRatio: 4,
  loadCapacitance: 30e-15,
  tailCapacitance: 4e-12,
  mirrorCapacitance: 1e-12,
  tailFilter: { inductance: 0.4e-9, quality: 10, capacitance: 560e-15 },
};

export const RESISTOR_TAIL_PAIR: ResistorTailPairDesign = {
  tank: TANK,
  pair: { width: 30e-6, length: 60e-9 },
  tailResistance: 170,
  current: 2.5e-3,
  loadCapacitance: 30e-15,
  tailCapacitance: 50e-15,
};

export const UNTAILED_PAIR: UntailedPairDesign = {
  tank: TANK,
  pair: { width: 10e-6, length: 60e-9 },
  current: 6e-3,
  loadCapacitance: 30e-15,
};

export const COMPLEMENTARY_PAIR: ComplementaryPairDesign = {
  tank: { ...TANK, capacitance: 550e-15 },
  pair: { width: 20e-6, length: 60e-9 },
  pairP: { width: 50e-6, length: 60e-9 },
  tail: TAIL,
  current: 1e-3,
  mirrorRatio: 4,
  loadCapacitance: 30e-15,
  tailCapacitance: 50e-15,
  mirrorCapacitance: 1e-12,
};

export const CLASS_C_PAIR: ClassCPairDesign = {
  tank: TANK,
  pair: { width: 40e-6, length: 60e-9 },
  tail: TAIL,
  current: 1.5e-3,
  mirrorRatio: 4,
  gateBias: 0.65,
  biasResistance: 10e3,
  couplingCapacitance: 600e-15,
  biasFilter: { resistance: 2e3, capacitance: 2e-12 },
  tailCapacitance: 1e-12,
  loadCapacitance: 30e-15,
};

export const COLPITTS: ColpittsDesign = {
  tank: { inductance: 0.8e-9, quality: 14, qualityFrequency: 5e9, capacitance: 0 },
  divider: { first: 1.6e-12, second: 2.8e-12 },
  core: { width: 80e-6, length: 60e-9 },
  tail: TAIL,
  current: 4e-3,
  mirrorRatio: 4,
};

export const DIFFERENTIAL_COLPITTS: DifferentialColpittsDesign = {
  tank: { inductance: 1.6e-9, quality: 14, qualityFrequency: 5e9, capacitance: 0 },
  divider: { first: 1.6e-12, second: 2.8e-12 },
  core: { width: 80e-6, length: 60e-9 },
  tail: TAIL,
  current: 8e-3,
  mirrorRatio: 4,
};

export const STEERED_COLPITTS: SteeredColpittsDesign = {
  tank: { inductance: 1.6e-9, quality: 14, qualityFrequency: 5e9, capacitance: 0 },
  divider: { first: 1.6e-12, second: 2.8e-12 },
  core: { width: 80e-6, length: 60e-9 },
  steering: { width: 60e-6, length: 60e-9 },
  tail: { width: 240e-6, length: 200e-9 },
  current: 6e-3,
  mirrorRatio: 4,
};
