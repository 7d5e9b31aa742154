import { resolveUnit } from "./unit.ts";

/** A kind of quantity in words, and a text that a person could write for it. */
export interface QuantityKind {
  readonly words: string;
  readonly example: string;
}

/** Kinds that messages name, each by a unit of its dimension. */
const NAMED: readonly (readonly [unit: string, words: string, example: string])[] = [
  ["1", "a pure number", "3.5"],
  ["V", "a voltage", "1.0 V"],
  ["A", "a current", "2 mA"],
  ["Hz", "a frequency", "2.4 GHz"],
  ["H", "an inductance", "1.2 nH"],
  ["F", "a capacitance", "250 fF"],
  ["ohm", "a resistance", "1.5 kohm"],
  ["S", "a conductance", "4 mS"],
  ["s", "a time", "20 ns"],
  ["W", "a power", "3 mW"],
  ["K", "a temperature", "85 °C"],
  ["m", "a length", "60 nm"],
  ["m^2", "an area", "4 um^2"],
  ["J", "an energy", "1 pJ"],
  ["C", "a charge", "10 fC"],
  ["rad", "an angle", "90 deg"],
  ["rad/s", "an angular frequency", "3e10 rad/s"],
  ["bit", "a number of bits", "7 bit"],
  ["dB", "a level in decibels", "3 dB"],
  ["dBc", "a level against the carrier", "-60 dBc"],
  ["dBc/Hz", "a phase noise", "-112 dBc/Hz"],
  ["dBm", "a power level", "-10 dBm"],
  ["dBm/Hz", "a power density level", "-174 dBm/Hz"],
  ["Hz/V", "a tuning gain", "60 MHz/V"],
  ["Hz/A", "a frequency per current", "5 MHz/mA"],
  ["V/sqrt(Hz)", "a voltage noise density", "10 nV/sqrt(Hz)"],
  ["A/sqrt(Hz)", "a current noise density", "200 pA/sqrt(Hz)"],
  ["F/m^2", "a capacitance per area", "10 fF/um^2"],
  ["F/m", "a capacitance per length", "0.3 fF/um"],
  ["A/m", "a current per length", "12 mA/um"],
  ["V/K", "a voltage per temperature", "-1 mV/K"],
  ["1/K", "a temperature coefficient", "80 ppm/K"],
  ["1/V", "a number per voltage", "0.1 1/V"],
  ["V/m", "an electric field", "1 MV/m"],
];

let kinds: ReadonlyMap<string, QuantityKind> | undefined;

/** The kind of quantity that `unit` measures, in words; nameless kinds are named by their unit. */
export function kindOf(unit: string): QuantityKind {
  kinds ??= new Map(
    NAMED.map(([name, words, example]) => [resolveUnit(name).dimension, { words, example }]),
  );
  return kinds.get(resolveUnit(unit).dimension) ??
    { words: `a quantity in ${unit}`, example: `1 ${unit}` };
}
