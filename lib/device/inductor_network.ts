import { add, complex, reciprocal, scale } from "./_complex.ts";
import type { Admittance } from "./inductor_admittance.ts";

/** How a coil is driven: between its ends, or at one end with the other at ground. */
export const COIL_EXCITATIONS = ["differential", "single_ended"] as const;

/** How a coil is driven. */
export type CoilExcitation = (typeof COIL_EXCITATIONS)[number];

/** The branch from each end of a coil to the grounded substrate. */
export interface SubstrateBranch {
  /** Through the oxide, in series with the silicon [F]. */
  readonly oxideCapacitance: number;
  /** Of the silicon [ohm]. */
  readonly siliconResistance: number;
  /** Across the silicon resistance [F]; may be zero. */
  readonly siliconCapacitance: number;
}

/** A coil as a lumped pi network: a series branch between the ends, a substrate branch at each. */
export interface CoilParameters {
  /** Between the ends [H]. */
  readonly inductance: number;
  /** In series with the inductance, between the ends, at a frequency in Hz [ohm]. */
  readonly seriesResistance: (frequency: number) => number;
  /** Across the ends [F]; may be zero. */
  readonly parallelCapacitance: number;
  /** At each end. @default none */
  readonly substrate?: SubstrateBranch;
  /** Coupling of the two halves of a centre-tapped coil [1]. @default the coil has no tap */
  readonly coupling?: number;
}

/**
 * Admittance that a coil shows to its drive: series branch, plus half the substrate branch when driven
 * between the ends (the two branches in series), plus one when the other end is at ground.
 *
 * @param frequency [Hz]
 * @returns [S]
 * @see C. P. Yue, S. S. Wong, IEEE J. Solid-State Circuits 33 (1998) 743 for the network; M. Danesh,
 *   J. R. Long, IEEE Trans. Microwave Theory Tech. 50 (2002) 332 for the differential drive (from memory)
 */
export function coilAdmittance(
  parameters: CoilParameters,
  frequency: number,
  { excitation }: { readonly excitation: CoilExcitation },
): Admittance {
  const series = seriesAdmittance(parameters, frequency);
  const { substrate } = parameters;
  if (substrate === undefined) return series;
  const shunt = substrateAdmittance(substrate, frequency);
  return add(series, excitation === "differential" ? scale(shunt, 0.5) : shunt);
}

function seriesAdmittance(parameters: CoilParameters, frequency: number): Admittance {
  const angular = 2 * Math.PI * frequency;
  const { inductance, seriesResistance, parallelCapacitance } = parameters;
  return add(
    reciprocal(complex(seriesResistance(frequency), angular * inductance)),
    complex(0, angular * parallelCapacitance),
  );
}

/**
 * Admittance of one substrate branch: the oxide in series with the silicon.
 *
 * @param frequency above zero [Hz]
 * @returns [S]
 */
export function substrateAdmittance(substrate: SubstrateBranch, frequency: number): Admittance {
  const angular = 2 * Math.PI * frequency;
  const { oxideCapacitance, siliconResistance, siliconCapacitance } = substrate;
  if (oxideCapacitance === 0) return complex(0, 0);
  const silicon = reciprocal(complex(1 / siliconResistance, angular * siliconCapacitance));
  return reciprocal(add(complex(0, -1 / (angular * oxideCapacitance)), silicon));
}
