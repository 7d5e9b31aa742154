import { BOLTZMANN, ELEMENTARY_CHARGE } from "../quantity/constants.ts";

/** Band gap of silicon over the elementary charge near room temperature [V] (from memory, Sze). */
const BAND_GAP_VOLTAGE = 1.12;

/**
 * Factor by which a junction's saturation current grows from one temperature to another:
 * (T/T0)^3 e^{(E_g/k)(1/T0 - 1/T)}.
 *
 * @param from T0 [K]
 * @param to T [K]
 */
export function saturationRise(from: number, to: number): number {
  const gap = BAND_GAP_VOLTAGE * ELEMENTARY_CHARGE / BOLTZMANN;
  return (to / from) ** 3 * Math.exp(gap * (1 / from - 1 / to));
}
