import { saturationRise } from "./_saturation_rise.ts";
import { demandTemperature } from "./_temperature_range.ts";
import type { Corner } from "./corner.ts";
import type { TechnologyCard } from "./technology_card.ts";
import type { AccumulationVaractorParameters } from "./varactor_accumulation.ts";
import type { JunctionVaractorParameters } from "./varactor_junction.ts";

/** Part of a resistance that a sheet fed from both sides shows. */
const FED_FROM_BOTH = 1 / 12;

/** A junction varactor of a card. */
export interface ResolveJunctionVaractorOptions {
  /** Of the junction [m^2]. */
  readonly area: number;
  readonly corner: Corner;
  /** [K] */
  readonly temperature: number;
}

/** An accumulation-mode varactor of a card. */
export interface ResolveAccumulationVaractorOptions {
  /** Of all gate fingers together [m]. */
  readonly width: number;
  /** Of the gate [m]. */
  readonly length: number;
  readonly corner: Corner;
  /** [K] */
  readonly temperature: number;
}

/**
 * Parameters of a junction varactor at a corner and a temperature. The capacitance takes corner factor and
 * temperature coefficient, the saturation current that of a silicon junction.
 *
 * @throws {RangeError} when the card has no such varactor, the area is not above zero or the temperature
 *   lies outside the card's
 */
export function resolveJunctionVaractor(
  card: TechnologyCard,
  options: ResolveJunctionVaractorOptions,
): JunctionVaractorParameters {
  const { area, temperature } = options;
  const law = card.varactors?.junction;
  if (law === undefined) throw missing(card, "junction varactor");
  demandSize("area", area, "m^2");
  return {
    temperature,
    zeroBiasCapacitance: law.zeroBiasCapacitance * area * capacitanceFactor(card, options),
    builtInPotential: law.builtInPotential,
    grading: law.grading,
    saturationCurrent: law.saturationCurrent * area *
      saturationRise(card.temperature.nominal, temperature),
    emission: law.emission,
    seriesResistance: law.seriesResistance / area,
  };
}

/**
 * Parameters of an accumulation-mode varactor at a corner and a temperature: per-area capacitances times
 * gate area and the fringe of both edges; the well, fed from both sides of the gate, shows a twelfth of its
 * sheet resistance times length over width, in series with the contacts.
 *
 * @throws {RangeError} when the card has no such varactor, a size is not above zero or the temperature
 *   lies outside the card's
 */
export function resolveAccumulationVaractor(
  card: TechnologyCard,
  options: ResolveAccumulationVaractorOptions,
): AccumulationVaractorParameters {
  const { width, length } = options;
  const law = card.varactors?.accumulation;
  if (law === undefined) throw missing(card, "accumulation-mode varactor");
  demandSize("width", width, "m");
  demandSize("length", length, "m");
  const factor = capacitanceFactor(card, options);
  const fringe = 2 * law.fringeCapacitance * width;
  const area = width * length;
  return {
    maximumCapacitance: (law.maximumCapacitance * area + fringe) * factor,
    minimumCapacitance: (law.minimumCapacitance * area + fringe) * factor,
    centreVoltage: law.centreVoltage,
    transitionVoltage: law.transitionVoltage,
    seriesResistance: (FED_FROM_BOTH * law.wellSheetResistance * length + law.contactResistance) /
      width,
  };
}

function capacitanceFactor(
  card: TechnologyCard,
  { corner, temperature }: { readonly corner: Corner; readonly temperature: number },
): number {
  demandTemperature(card, temperature, { action: "resolve the varactor" });
  // The caller has found the varactor, so the card has the group.
  const { corners, temperatureCoefficient } = card.varactors!;
  return corners[corner].capacitanceFactor *
    (1 + temperatureCoefficient * (temperature - card.temperature.nominal));
}

function missing(card: TechnologyCard, what: string): RangeError {
  return new RangeError(
    `Cannot resolve the varactor: card "${card.name}" has no ${what}`,
  );
}

function demandSize(name: string, value: number, unit: string): void {
  if (value > 0 && value < Infinity) return;
  throw new RangeError(
    `Cannot resolve the varactor: ${name} must be > 0 ${unit}, got ${value} ${unit}`,
  );
}
