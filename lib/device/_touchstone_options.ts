import { type LineError, readNumber, type TouchstoneLine } from "./_touchstone_lines.ts";
import {
  NETWORK_FORMATS,
  NETWORK_FREQUENCY_UNITS,
  NETWORK_PARAMETERS,
  type NetworkFormat,
  type NetworkParameter,
} from "./touchstone_network.ts";

/** What an option line says. */
export interface OptionLine {
  /** [Hz] */
  readonly frequencyUnit: number;
  readonly parameter: NetworkParameter;
  readonly format: NetworkFormat;
  /** [ohm] */
  readonly referenceResistance: number;
}

/** Size of each frequency unit [Hz]. */
export const FREQUENCY_UNIT = { Hz: 1, kHz: 1e3, MHz: 1e6, GHz: 1e9 } as const;

/** What holds for each part that the line leaves out. */
const DEFAULTS = { unit: "GHz", parameter: "S", format: "MA", reference: 50 } as const;

const WANTED = `a frequency unit (${NETWORK_FREQUENCY_UNITS.join(", ")}), a parameter (${
  NETWORK_PARAMETERS.join(", ")
}), a format (${NETWORK_FORMATS.join(", ")}) or R and a resistance`;

/** Reads an option line; its parts may come in any order, each once. */
export function readOptionLine({ number, words }: TouchstoneLine, fail: LineError): OptionLine {
  let unit: keyof typeof FREQUENCY_UNIT | undefined;
  let parameter: NetworkParameter | undefined;
  let format: NetworkFormat | undefined;
  let reference: number | undefined;
  const once = <T>(what: string, before: T | undefined, now: T, word: string): T => {
    if (before === undefined) return now;
    throw fail(number, `one ${what} in the option line`, `"${word}" after ${before}`);
  };
  for (let k = 0; k < words.length; k++) {
    const word = words[k] ?? "";
    const upper = word.toUpperCase();
    const knownUnit = NETWORK_FREQUENCY_UNITS.find((each) => each.toUpperCase() === upper);
    const knownParameter = NETWORK_PARAMETERS.find((each) => each === upper);
    const knownFormat = NETWORK_FORMATS.find((each) => each === upper);
    if (knownUnit) unit = once("frequency unit", unit, knownUnit, word);
    else if (knownParameter) parameter = once("parameter", parameter, knownParameter, word);
    else if (knownFormat) format = once("format", format, knownFormat, word);
    else if (upper === "R") {
      const what = "a resistance > 0 ohm after R in the option line";
      const value = readNumber(words[++k], { line: number, what, fail });
      if (!(value > 0)) throw fail(number, what, `${value}`);
      reference = once("reference resistance", reference, value, `R ${value}`);
    } else throw fail(number, `${WANTED} in the option line`, `"${word}"`);
  }
  return {
    frequencyUnit: FREQUENCY_UNIT[unit ?? DEFAULTS.unit],
    parameter: parameter ?? DEFAULTS.parameter,
    format: format ?? DEFAULTS.format,
    referenceResistance: reference ?? DEFAULTS.reference,
  };
}
