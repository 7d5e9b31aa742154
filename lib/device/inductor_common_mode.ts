import type { CoilParameters } from "./inductor_network.ts";

/**
 * Inductance from both ends joined together to the centre tap: half of one half's, less their coupling.
 *
 * With halves L_h and coupling k, the differential inductance is 2 L_h (1 + k) and the common-mode one
 * L_h (1 - k) / 2, so that L_cm = L_d (1 - k) / (4 (1 + k)).
 *
 * @returns [H]
 * @throws {TypeError} when the coil has no tap
 */
export function commonModeInductance(parameters: CoilParameters): number {
  const { inductance, coupling } = parameters;
  if (coupling === undefined) {
    throw new TypeError(
      "Cannot compute the common-mode inductance: the coil must have a centre tap, got none",
    );
  }
  return inductance * (1 - coupling) / (4 * (1 + coupling));
}

/**
 * Coupling of the halves from the differential and the common-mode inductance:
 * k = (L_d - 4 L_cm) / (L_d + 4 L_cm).
 *
 * @param differential between the ends [H]
 * @param common from both ends to the tap [H]
 * @returns [1]
 * @throws {RangeError} when one of them is not positive
 */
export function couplingFromModes(differential: number, common: number): number {
  if (!(differential > 0)) {
    throw new RangeError(
      `Cannot compute the coupling: differential inductance must be > 0 H, got ${differential} H`,
    );
  }
  if (!(common > 0)) {
    throw new RangeError(
      `Cannot compute the coupling: common-mode inductance must be > 0 H, got ${common} H`,
    );
  }
  return (differential - 4 * common) / (differential + 4 * common);
}
