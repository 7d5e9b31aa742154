import { kindOf } from "./_kinds.ts";
import { type ResolvedUnit, resolveUnit } from "./unit.ts";

/** A decimal number at the start of a text, then the unit text. */
const NUMBER_AND_UNIT = /^([+-]?)(\d+\.?\d*|\.\d+)(?:[eE]([+-]?\d{1,4}))?(?![\d.,])\s*(.*)$/s;

/**
 * Reads a text such as `"1.2 nH"` as a quantity of the dimension of `unit`.
 *
 * Decibel kinds (dB, dBc, dBm, dBc/Hz, dBm/Hz) stay decibels and are kinds of their own: none is read as
 * another. A temperature is absolute: `"125 °C"` is 398.15 K; `"V/°C"` is the same as `"V/K"`. `"1"` is
 * a pure number, written without a unit or with `%` or `ppm`. The conversion is correctly rounded where
 * the units differ by a power of ten.
 *
 * @param text number and unit as a person writes them
 * @param unit unit that fixes the dimension; its prefix does not matter
 * @returns the value in coherent SI units (decibels for decibel kinds)
 * @throws {SyntaxError} when the text is no number with a unit, or the unit is unknown
 * @throws {TypeError} when the unit has another dimension, or is missing
 * @throws {RangeError} when the number is too large for a finite value
 */
export function parseQuantity(text: string, unit: string): number {
  const expected = resolveUnit(unit);
  const trimmed = text.trim().replace(/^\u2212/, "-");
  const match = NUMBER_AND_UNIT.exec(trimmed);
  if (match === null) {
    const hint = /^[+-]?\d+,\d/.test(trimmed) ? " (write the decimal mark as a point)" : "";
    throw new SyntaxError(`${expectation(unit)}, got ${JSON.stringify(text)}${hint}`);
  }
  const [, sign, digits, exponent, unitText] = match as unknown as [
    string,
    string,
    string,
    string | undefined,
    string,
  ];
  const actual = resolveWritten(unitText, text, unit);
  if (actual.dimension !== expected.dimension) {
    const found = unitText === "" ? "no unit" : kindOf(unitText).words;
    throw new TypeError(`${expectation(unit)}, got ${JSON.stringify(text)} (${found})`);
  }
  const value = toSi(sign + digits, Number(exponent ?? 0), actual);
  if (!Number.isFinite(value)) {
    throw new RangeError(`${expectation(unit)}, got ${JSON.stringify(text)} (not finite)`);
  }
  return value;
}

function resolveWritten(unitText: string, text: string, unit: string): ResolvedUnit {
  try {
    if (unitText === "") return resolveUnit("1");
    return resolveUnit(unitText.startsWith("/") ? `1${unitText}` : unitText);
  } catch (error) {
    if (!(error instanceof SyntaxError)) throw error;
    throw new SyntaxError(
      `${expectation(unit)}, got ${JSON.stringify(text)} (${error.message})`,
    );
  }
}

function toSi(digits: string, exponent: number, unit: ResolvedUnit): number {
  const { decimalExponent, scale, offset } = unit;
  if (decimalExponent === undefined) return Number(`${digits}e${exponent}`) * scale + offset;
  // Adding 0 turns the negative zero of "-0 V" into zero.
  return Number(`${digits}e${exponent + decimalExponent}`) + offset + 0;
}

function expectation(unit: string): string {
  const { words, example } = kindOf(unit);
  return `expected ${words} such as "${example}"`;
}
