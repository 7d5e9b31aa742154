import { BOLTZMANN, ELEMENTARY_CHARGE } from "../quantity/constants.ts";
import { demandTemperature } from "./_temperature_range.ts";
import type { Corner } from "./corner.ts";
import type { TechnologyCard } from "./technology_card.ts";
import type { TransistorParameters } from "./transistor_parameters.ts";

/** Band gap of silicon over the elementary charge near room temperature [V] (from memory, Sze). */
const BAND_GAP_VOLTAGE = 1.12;

/** Which transistor of a card, and in what condition. */
export interface ResolveTransistorOptions {
  readonly kind: "n" | "p";
  /** Threshold option. @default "regular" */
  readonly flavour?: string;
  readonly corner: Corner;
  /** [K] */
  readonly temperature: number;
}

/**
 * The parameters of one transistor of a card at a corner and a temperature.
 *
 * Threshold: V_T(T) = V_T + shift - k (T - T0). Mobility: factor (T/T0)^-b. Junction saturation current:
 * (T/T0)^3 e^{(E_g/q)(1/U_T0 - 1/U_T)}. Capacitances do not move with temperature, and the saturation
 * velocity neither.
 *
 * @returns parameters in SI
 * @throws {RangeError} when the card has no such transistor or the temperature lies outside the card's
 */
export function resolveTransistor(
  card: TechnologyCard,
  options: ResolveTransistorOptions,
): TransistorParameters {
  const { kind, flavour = "regular", corner, temperature } = options;
  const found = card.transistors.find((t) => t.kind === kind && t.flavour === flavour);
  if (found === undefined) {
    const known = card.transistors.map((t) => `${t.flavour} ${t.kind}`).join(", ");
    throw new RangeError(
      `Cannot resolve the transistor: card "${card.name}" has ${known}, got ${flavour} ${kind}`,
    );
  }
  const { nominal } = card.temperature;
  demandTemperature(card, temperature, { action: "resolve the transistor" });
  const { thresholdShift, mobilityFactor, oxideFactor } = found.corners[corner];
  const ratio = temperature / nominal;
  const gapExponent = BAND_GAP_VOLTAGE * ELEMENTARY_CHARGE / BOLTZMANN *
    (1 / nominal - 1 / temperature);
  return {
    kind,
    temperature,
    minimumLength: found.minimumLength,
    threshold: found.threshold + thresholdShift -
      found.thresholdTemperatureCoefficient * (temperature - nominal),
    slopeFactor: found.slopeFactor,
    transconductanceParameter: found.transconductanceParameter * mobilityFactor * oxideFactor *
      ratio ** -found.mobilityExponent,
    oxideCapacitance: found.oxideCapacitance * oxideFactor,
    saturationVelocity: found.saturationVelocity,
    outputConductanceLength: found.outputConductanceLength,
    overlapCapacitance: found.overlapCapacitance,
    junction: {
      ...found.junction,
      saturationCurrent: found.junction.saturationCurrent * ratio ** 3 * Math.exp(gapExponent),
    },
    flickerCoefficient: found.flickerCoefficient,
    thresholdMismatch: found.thresholdMismatch,
    gainMismatch: found.gainMismatch,
  };
}
