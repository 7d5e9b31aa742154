/**
 * The physical constants, one table: CODATA 2022 adjustment.
 *
 * Source: P. J. Mohr, D. B. Newell, B. N. Taylor, E. Tiesinga, "CODATA recommended values of the
 * fundamental physical constants: 2022", Rev. Mod. Phys. 97 (2025) 025002; the exact ones are fixed
 * by the SI (BIPM, The International System of Units, 9th edition, 2019).
 *
 * @module
 */

/** A physical constant with where it stands in the adjustment. */
export interface PhysicalConstant {
  /** In `unit`. */
  readonly value: number;
  /** Coherent SI unit. */
  readonly unit: string;
  /** True when the SI fixes the value by definition. */
  readonly exact: boolean;
  /** Standard uncertainty in `unit`; 0 when exact. */
  readonly uncertainty: number;
  /** Year of the CODATA adjustment. */
  readonly adjustment: number;
}

const exact = { exact: true, uncertainty: 0, adjustment: 2022 } as const;
const measured = { exact: false, adjustment: 2022 } as const;

/** Every constant of the house by name. */
export const PHYSICAL_CONSTANTS = {
  BOLTZMANN: { value: 1.380649e-23, unit: "J/K", ...exact },
  ELEMENTARY_CHARGE: { value: 1.602176634e-19, unit: "C", ...exact },
  EPSILON_0: { value: 8.8541878188e-12, unit: "F/m", uncertainty: 1.4e-21, ...measured },
  MU_0: { value: 1.25663706127e-6, unit: "N/A^2", uncertainty: 2.0e-16, ...measured },
} as const satisfies Record<string, PhysicalConstant>;

/** Boltzmann constant k [J/K], exact. */
export const BOLTZMANN: number = PHYSICAL_CONSTANTS.BOLTZMANN.value;

/** Elementary charge [C], exact. */
export const ELEMENTARY_CHARGE: number = PHYSICAL_CONSTANTS.ELEMENTARY_CHARGE.value;

/** Vacuum electric permittivity [F/m], standard uncertainty 1.4e-21 F/m. */
export const EPSILON_0: number = PHYSICAL_CONSTANTS.EPSILON_0.value;

/** Vacuum magnetic permeability [N/A^2], standard uncertainty 2.0e-16 N/A^2. */
export const MU_0: number = PHYSICAL_CONSTANTS.MU_0.value;
