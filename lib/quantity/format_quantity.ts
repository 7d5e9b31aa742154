import { resolveUnit } from "./unit.ts";

/** Options of {@linkcode formatQuantity}. */
export interface FormatQuantityOptions {
  /**
   * Significant digits at most, 1 to 17; zeros at the end are dropped.
   * @default 4, but one fixed decimal for decibels
   */
  readonly digits?: number;
}

const DEFAULT_DIGITS = 4;

/** Engineering prefixes by decimal exponent. */
const PREFIXES: ReadonlyMap<number, string> = new Map([
  [-18, "a"],
  [-15, "f"],
  [-12, "p"],
  [-9, "n"],
  [-6, "u"],
  [-3, "m"],
  [0, ""],
  [3, "k"],
  [6, "M"],
  [9, "G"],
  [12, "T"],
]);

/** A unit that takes a prefix: a bare symbol of the first power in front of what it is divided by. */
const PREFIXABLE = /^(?:V|A|Hz|H|F|S|ohm|W|s|m|C|J|eV|N|Wb|T)(?:$|[ */])/;

/** Without a prefix, numbers from 1e-4 up to 1e6 are written out, others with an exponent. */
const PLAIN_EXPONENTS = { least: -4, most: 5 } as const;

/**
 * Writes a value as a person would: `"1.2 nH"`, `"4.884 GHz"`, `"-112.3 dBc/Hz"`, `"3.1"`.
 *
 * The text does not depend on the locale and is spelled as a revision file spells it, so that
 * {@linkcode parseQuantity} reads it back. The minus sign is the ASCII hyphen-minus; zero never carries
 * one. A unit without a prefix gets an engineering prefix; a unit written with one (`"mA/um"`) keeps it.
 *
 * @param value [unit] in SI units (K for `"°C"`, a fraction for `"%"` and `"ppm"`, decibels for decibels)
 * @param unit unit to write the value in; `"1"` for a pure number
 * @throws {RangeError} when the value is not finite or `digits` is out of range
 * @throws {SyntaxError} when the unit is unknown
 */
export function formatQuantity(
  value: number,
  unit: string,
  options: FormatQuantityOptions = {},
): string {
  const { digits } = options;
  if (!Number.isFinite(value)) {
    throw new RangeError(`Cannot format a quantity: value must be finite, got ${value} ${unit}`);
  }
  if (digits !== undefined && !(Number.isInteger(digits) && digits >= 1 && digits <= 17)) {
    throw new RangeError(`Cannot format a quantity: digits must be 1 to 17, got ${digits}`);
  }
  const { dimension, decimalExponent, scale, offset } = resolveUnit(unit);
  const significant = digits ?? DEFAULT_DIGITS;
  if (digits === undefined && dimension.startsWith("dB")) return `${fixed(value, 1)} ${unit}`;
  const shifted = decimalExponent === undefined
    ? decimal((value - offset) / scale, significant, 0)
    : decimal(value - offset, significant, -decimalExponent);
  if (PREFIXABLE.test(unit)) {
    const step = Math.floor(shifted.exponent / 3) * 3;
    const prefix = PREFIXES.get(shifted.digits === "0" ? 0 : step);
    if (prefix !== undefined) {
      const exponent = shifted.digits === "0" ? 0 : shifted.exponent - step;
      return `${written({ ...shifted, exponent })} ${prefix}${unit}`;
    }
  }
  const number = written(shifted);
  return unit === "1" ? number : `${number} ${unit}`;
}

/** sign digits[0] . digits[1...] x 10^exponent, without zeros at the end. */
interface Decimal {
  readonly sign: "" | "-";
  readonly digits: string;
  readonly exponent: number;
}

function decimal(value: number, significant: number, shift: number): Decimal {
  const [mantissa, exponent] = value.toExponential(significant - 1).split("e") as [string, string];
  const digits = mantissa.replace(/^-/, "").replace(".", "").replace(/0+$/, "");
  if (digits === "") return { sign: "", digits: "0", exponent: 0 };
  return { sign: value < 0 ? "-" : "", digits, exponent: Number(exponent) + shift };
}

function written({ sign, digits, exponent }: Decimal): string {
  if (exponent < PLAIN_EXPONENTS.least || exponent > PLAIN_EXPONENTS.most) {
    const mantissa = digits.length > 1 ? `${digits[0]}.${digits.slice(1)}` : digits;
    return `${sign}${mantissa}e${exponent}`;
  }
  if (exponent < 0) return `${sign}0.${"0".repeat(-exponent - 1)}${digits}`;
  const padded = digits.padEnd(exponent + 1, "0");
  const whole = padded.slice(0, exponent + 1);
  const part = padded.slice(exponent + 1);
  return part === "" ? `${sign}${whole}` : `${sign}${whole}.${part}`;
}

function fixed(value: number, decimals: number): string {
  const text = value.toFixed(decimals);
  return /^-0\.0*$/.test(text) ? text.slice(1) : text;
}
