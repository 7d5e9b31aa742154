import { demandTemperature } from "./_temperature_range.ts";
import type { Corner } from "./corner.ts";
import type { TechnologyCard } from "./technology_card.ts";

/** In what condition. */
export interface ResolvePassivesOptions {
  readonly corner: Corner;
  /** [K] */
  readonly temperature: number;
}

/** Factors on nominal values. */
export interface PassiveFactors {
  /** On every capacitance of the bank [1]. */
  readonly capacitor: number;
  /** On every resistance [1]. */
  readonly resistor: number;
  /** On the metal's resistance; an inductor's quality factor from metal loss falls as its inverse [1]. */
  readonly metalResistance: number;
}

/**
 * How far capacitors, resistors and metal stand off their nominal values at a corner and a temperature:
 * corner factor times 1 + coefficient (T - T0). The metal has a temperature coefficient only.
 *
 * @throws {RangeError} when the temperature lies outside the card's
 */
export function resolvePassives(
  card: TechnologyCard,
  options: ResolvePassivesOptions,
): PassiveFactors {
  const { nominal } = card.temperature;
  const { corner, temperature } = options;
  demandTemperature(card, temperature, { action: "resolve the passives" });
  const rise = temperature - nominal;
  const { passives } = card;
  const { capacitorFactor, resistorFactor } = passives.corners[corner];
  return {
    capacitor: capacitorFactor * (1 + passives.capacitorTemperatureCoefficient * rise),
    resistor: resistorFactor * (1 + passives.resistorTemperatureCoefficient * rise),
    metalResistance: 1 + passives.metalTemperatureCoefficient * rise,
  };
}
