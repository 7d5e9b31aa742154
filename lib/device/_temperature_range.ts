import type { TechnologyCard } from "./technology_card.ts";

/** Relative distance by which a temperature may miss the range: conversion from degrees rounds. */
const ROUNDING = 1e-9;

/**
 * Refuses a temperature outside the card's range.
 *
 * @param action what cannot be done, for the message
 * @throws {RangeError} when the temperature lies outside
 */
export function demandTemperature(
  card: TechnologyCard,
  temperature: number,
  { action }: { readonly action: string },
): void {
  const { lowest, highest } = card.temperature;
  if (temperature >= lowest * (1 - ROUNDING) && temperature <= highest * (1 + ROUNDING)) return;
  const [from, to] = [lowest, highest].map((kelvin) => Number(kelvin.toPrecision(9)));
  throw new RangeError(
    `Cannot ${action}: temperature must lie between ${from} K and ${to} K, got ${temperature} K`,
  );
}
