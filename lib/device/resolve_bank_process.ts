import { demandTemperature } from "./_temperature_range.ts";
import type { BankProcess } from "./capacitor_bank.ts";
import type { Corner } from "./corner.ts";
import { resolvePassives } from "./resolve_passives.ts";
import type { TechnologyCard } from "./technology_card.ts";

/** In what condition, and with what bias resistors. */
export interface ResolveBankProcessOptions {
  readonly corner: Corner;
  /** [K] */
  readonly temperature: number;
  /** Holds each end of one unit's open switch, at its nominal value [ohm]. @default none */
  readonly biasResistance?: number;
}

/** A bank's process at a corner, and what the corner does to its capacitors. */
export interface ResolvedBankProcess extends BankProcess {
  /** Factor on every capacitance of the bank: the unit capacitance is to be multiplied by it [1]. */
  readonly capacitorFactor: number;
}

/**
 * Switches and capacitors of a card's bank at a corner and a temperature: the on-resistance takes its corner
 * factor and temperature coefficient, the off-capacitance its corner factor, bias resistors and capacitors
 * those of the passives.
 *
 * @throws {RangeError} when the card has no bank or the temperature lies outside the card's
 */
export function resolveBankProcess(
  card: TechnologyCard,
  options: ResolveBankProcessOptions,
): ResolvedBankProcess {
  const { corner, temperature, biasResistance = Infinity } = options;
  const bank = card.capacitorBank;
  if (bank === undefined) {
    throw new RangeError(
      `Cannot resolve the capacitor bank: card "${card.name}" has no bank`,
    );
  }
  demandTemperature(card, temperature, { action: "resolve the capacitor bank" });
  const { onResistanceFactor, offCapacitanceFactor } = bank.corners[corner];
  const rise = temperature - card.temperature.nominal;
  const passives = resolvePassives(card, { corner, temperature });
  return {
    switchOnResistance: bank.switchOnResistance * onResistanceFactor *
      (1 + bank.switchTemperatureCoefficient * rise),
    switchOffCapacitance: bank.switchOffCapacitance * offCapacitanceFactor,
    biasResistance: biasResistance * passives.resistor,
    capacitorQuality: bank.capacitorQuality,
    capacitorQualityFrequency: bank.capacitorQualityFrequency,
    plateFraction: bank.plateFraction,
    capacitorFactor: passives.capacitor,
  };
}
