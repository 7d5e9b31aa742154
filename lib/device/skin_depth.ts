import { MU_0 } from "../quantity/constants.ts";

/**
 * Depth at which a field has fallen to 1/e in a good conductor: delta = sqrt(rho / (pi f mu0)).
 *
 * @param resistivity [ohm m]
 * @param frequency [Hz]; Infinity comes out at 0 Hz
 * @returns [m]
 * @throws {RangeError} when the resistivity is not positive or the frequency negative
 * @see D. M. Pozar, Microwave Engineering, the section on plane waves in a good conductor (from memory)
 */
export function skinDepth(resistivity: number, frequency: number): number {
  if (!(resistivity > 0)) {
    throw new RangeError(
      `Cannot compute the skin depth: resistivity must be > 0 ohm m, got ${resistivity} ohm m`,
    );
  }
  if (!(frequency >= 0)) {
    throw new RangeError(
      `Cannot compute the skin depth: frequency must be >= 0 Hz, got ${frequency} Hz`,
    );
  }
  return Math.sqrt(resistivity / (Math.PI * frequency * MU_0));
}

/**
 * Thickness that would carry a film's current uniformly when the current decays from one face:
 * t_eff = delta (1 - e^{-t/delta}). Tends to t for a film much thinner than delta, to delta for a thick one.
 *
 * @param thickness of the film [m]
 * @param depth skin depth delta [m]; Infinity for direct current
 * @returns [m]
 * @throws {RangeError} when one of them is not positive
 * @see C. P. Yue, S. S. Wong, "Physical modeling of spiral inductors on silicon", IEEE Trans. Electron
 *   Devices 47 (2000) 560 (from memory)
 */
export function effectiveThickness(thickness: number, depth: number): number {
  if (!(thickness > 0)) {
    throw new RangeError(
      `Cannot compute the effective thickness: thickness must be > 0 m, got ${thickness} m`,
    );
  }
  if (!(depth > 0)) {
    throw new RangeError(
      `Cannot compute the effective thickness: skin depth must be > 0 m, got ${depth} m`,
    );
  }
  return depth === Infinity ? thickness : -depth * Math.expm1(-thickness / depth);
}
