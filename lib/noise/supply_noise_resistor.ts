import { BOLTZMANN } from "../quantity/constants.ts";
import { requirePositive } from "./_require.ts";
import { type SupplyPhaseNoise, supplyPhaseNoise } from "./supply_noise.ts";

/** A resistor that feeds a supply or control node. */
export interface FeedResistor {
  /** R [ohm] */
  readonly resistance: number;
  /** Of the resistor [K]. */
  readonly temperature: number;
  /**
   * Capacitance from the node to ground, which with R makes a pole at 1 / (2 pi R C) [F].
   * @default none: no filtering
   */
  readonly capacitance?: number;
}

/**
 * One-sided thermal noise density at the node, sqrt(4 k T R / (1 + (f/fp)^2)), fp = 1 / (2 pi R C).
 *
 * @param frequency f [Hz]
 * @returns [V/sqrt(Hz)]
 * @throws {RangeError} for values that are not positive
 */
export function resistorDensity(
  { resistance, temperature, capacitance }: FeedResistor,
  frequency: number,
): number {
  const action = "compute a resistor's noise";
  requirePositive(action, { what: "resistance", value: resistance, unit: "ohm" });
  requirePositive(action, { what: "temperature", value: temperature, unit: "K" });
  requirePositive(action, { what: "frequency", value: frequency, unit: "Hz" });
  const white = 4 * BOLTZMANN * temperature * resistance;
  if (capacitance === undefined) return Math.sqrt(white);
  requirePositive(action, { what: "capacitance", value: capacitance, unit: "F" });
  return Math.sqrt(white / (1 + (2 * Math.PI * resistance * capacitance * frequency) ** 2));
}

/**
 * Phase noise from a resistor that feeds a supply or control node,
 * L = 10 log(K^2 4 k T R / (2 f^2 (1 + (f/fp)^2))).
 *
 * @param offset f [Hz]
 * @throws {RangeError} for values that are not positive
 */
export function resistorPhaseNoise(
  { gain, ...resistor }: FeedResistor & {
    /** Pushing or tuning gain K [Hz/V]. */
    readonly gain: number;
  },
  offset: number,
): SupplyPhaseNoise {
  return supplyPhaseNoise({ gain, density: resistorDensity(resistor, offset) }, offset);
}
