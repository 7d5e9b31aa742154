// The single-file build loads in a third of the time of the package's thousand modules.
// @ts-types="./_mathjs_unit.d.ts"
import mathjs from "mathjs/lib/browser/math.js";
import { ELEMENTARY_CHARGE } from "./constants.ts";

/** A unit text resolved: what kind of quantity it measures and how large it is in SI. */
export interface ResolvedUnit {
  /** The kind of quantity: equal texts can be converted into each other, unequal ones cannot. */
  readonly dimension: string;
  /** SI value of one unit; for decibels 1, since they stay decibels. */
  readonly scale: number;
  /** k when `scale` is 10^k, so that conversion can shift the decimal point without rounding. */
  readonly decimalExponent: number | undefined;
  /** SI value of zero on this scale: 273.15 for °C standing alone, else 0. */
  readonly offset: number;
}

interface Factor {
  readonly powers: ReadonlyMap<string, number>;
  readonly scale: number;
}

/** Base quantities in the order of mathjs's `dimensions`. */
const BASES = ["kg", "m", "s", "A", "K", "cd", "mol", "rad", "bit"] as const;

/** What mathjs may resolve: the units of the trade, so that a slip is not read as a furlong. */
const KNOWN_UNITS = new Set(
  ("m angstrom s min h Hz rad deg A K V ohm H F S W J C Wb T N Pa g bit").split(" "),
);

/** Relative distance within which a product of prefixes counts as a power of ten. */
const DECIMAL_TOLERANCE = 1e-12;

/** Names mathjs lacks, reads otherwise (`dB` as a deci-byte) or has with an old value (`eV`). */
const OWN_UNITS: ReadonlyMap<string, Factor> = new Map([
  ["1", { powers: new Map(), scale: 1 }],
  ["%", { powers: new Map(), scale: 1e-2 }],
  ["ppm", { powers: new Map(), scale: 1e-6 }],
  ["sq", { powers: new Map(), scale: 1 }],
  ["dB", { powers: new Map([["dB", 1]]), scale: 1 }],
  ["dBc", { powers: new Map([["dBc", 1]]), scale: 1 }],
  ["dBm", { powers: new Map([["dBm", 1]]), scale: 1 }],
  ["°C", { powers: new Map([["K", 1]]), scale: 1 }],
]);

const ELECTRONVOLT = /^([munkMG]?)eV$/;
const SHORT_PREFIXES: Readonly<Record<string, number>> = {
  "": 1,
  n: 1e-9,
  u: 1e-6,
  m: 1e-3,
  k: 1e3,
  M: 1e6,
  G: 1e9,
};

/**
 * Resolves a unit text such as `V`, `nH`, `fF/um^2`, `A/sqrt(Hz)`, `ppm/K`, `dBc/Hz` or `°C`.
 *
 * Factors are joined by `*`, `·` or a space and divided by `/`, which divides by the next factor only;
 * a factor is a name, `sqrt(...)` or a parenthesis, with an optional power `^2`.
 *
 * @throws {SyntaxError} when the text is not a unit
 */
export function resolveUnit(text: string): ResolvedUnit {
  const plain = normalize(text);
  const { powers, scale } = readProduct({ text: plain, at: 0 }, plain.length);
  const exponent = Math.round(Math.log10(scale));
  const decimal = Math.abs(scale / 10 ** exponent - 1) < DECIMAL_TOLERANCE;
  return {
    dimension: dimensionText(powers),
    scale: decimal ? Number(`1e${exponent}`) : scale,
    decimalExponent: decimal ? exponent : undefined,
    offset: plain === "°C" ? 273.15 : 0,
  };
}

/** One spelling for what keyboards and fonts spell in several ways. */
function normalize(text: string): string {
  return text.trim().replaceAll(/[\u00b5\u03bc]/g, "u").replaceAll(/[\u03a9\u2126]|Ohm/g, "ohm")
    .replaceAll("\u2103", "°C").replaceAll("degC", "°C").replaceAll("²", "^2").replaceAll("³", "^3")
    .replaceAll(/√\(/g, "sqrt(").replaceAll(/√(\w+)/g, "sqrt($1)").replaceAll("·", "*")
    .replaceAll("⋅", "*").replaceAll("−", "-");
}

interface Cursor {
  readonly text: string;
  at: number;
}

function readProduct(cursor: Cursor, end: number): Factor {
  const powers = new Map<string, number>();
  let scale = 1;
  let sign = 1;
  for (;;) {
    skipSpace(cursor);
    const factor = readFactor(cursor, end);
    for (const [base, power] of factor.powers) {
      powers.set(base, (powers.get(base) ?? 0) + sign * power);
    }
    scale *= factor.scale ** sign;
    skipSpace(cursor);
    if (cursor.at >= end) return { powers, scale };
    const joint = cursor.text[cursor.at]!;
    sign = joint === "/" ? -1 : 1;
    if (joint === "/" || joint === "*") cursor.at++;
    else if (cursor.text[cursor.at - 1] !== " ") throw unknownUnit(cursor.text);
  }
}

function readFactor(cursor: Cursor, end: number): Factor {
  const rest = cursor.text.slice(cursor.at, end);
  const root = rest.startsWith("sqrt(");
  let factor: Factor;
  if (root || rest.startsWith("(")) {
    const open = cursor.at + (root ? 4 : 0);
    const close = matchingParenthesis(cursor.text, open, end);
    cursor.at = open + 1;
    factor = raised(readProduct(cursor, close), root ? 0.5 : 1);
    cursor.at = close + 1;
  } else {
    const name = /^(?:1|%|°C|[A-Za-z]+)/.exec(rest)?.[0];
    if (name === undefined) throw unknownUnit(cursor.text);
    cursor.at += name.length;
    factor = namedUnit(name);
  }
  const power = /^\^(?:\((-?\d+(?:\.\d+)?)\)|(-?\d+(?:\.\d+)?))/.exec(
    cursor.text.slice(cursor.at, end),
  );
  if (power === null) return factor;
  cursor.at += power[0].length;
  return raised(factor, Number(power[1] ?? power[2]));
}

function matchingParenthesis(text: string, open: number, end: number): number {
  let depth = 0;
  for (let at = open; at < end; at++) {
    if (text[at] === "(") depth++;
    if (text[at] === ")" && --depth === 0) return at;
  }
  throw unknownUnit(text);
}

function skipSpace(cursor: Cursor): void {
  while (cursor.text[cursor.at] === " ") cursor.at++;
}

function raised(factor: Factor, power: number): Factor {
  return {
    powers: new Map([...factor.powers].map(([base, p]) => [base, p * power])),
    scale: factor.scale ** power,
  };
}

function namedUnit(name: string): Factor {
  const own = OWN_UNITS.get(name);
  if (own !== undefined) return own;
  const electronvolt = ELECTRONVOLT.exec(name);
  if (electronvolt !== null) {
    const { powers } = namedUnit("J");
    return { powers, scale: SHORT_PREFIXES[electronvolt[1]!]! * ELEMENTARY_CHARGE };
  }
  if (!mathjs.Unit.isValuelessUnit(name)) throw unknownUnit(name);
  const { dimensions, units: [{ unit, prefix }] } = new mathjs.Unit(1, name);
  if (!KNOWN_UNITS.has(unit.name)) throw unknownUnit(name);
  const powers = new Map<string, number>();
  dimensions.forEach((power, i) => {
    if (power !== 0) powers.set(BASES[i]!, power);
  });
  return { powers, scale: prefix.value * unit.value };
}

function dimensionText(powers: ReadonlyMap<string, number>): string {
  return [...powers].filter(([, power]) => power !== 0)
    .sort(([a], [b]) => (a < b ? -1 : 1))
    .map(([base, power]) => (power === 1 ? base : `${base}^${power}`)).join(" ") || "1";
}

/** What people write when a capital slips. */
const OFTEN_MEANT =
  ("GHz MHz kHz Hz nH pH uH pF fF nF V mV uV A mA uA nA ohm kohm Mohm W mW uW um nm mm " +
    "S mS uS s ns ps fs us dB dBm dBc dBc/Hz K °C").split(" ");

function unknownUnit(name: string): SyntaxError {
  const meant = OFTEN_MEANT.find((known) => known.toLowerCase() === name.toLowerCase());
  const hint = meant === undefined || meant === name ? "" : `, perhaps "${meant}"`;
  return new SyntaxError(`unknown unit "${name}"${hint}`);
}
