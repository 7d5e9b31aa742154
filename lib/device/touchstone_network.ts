import {
  add,
  type Complex,
  complex,
  divide,
  multiply,
  reciprocal,
  scale,
  subtract,
} from "./_complex.ts";

import type { Admittance } from "./inductor_admittance.ts";

/** Network parameters a Touchstone file may hold. */
export const NETWORK_PARAMETERS = ["S", "Y", "Z", "H", "G"] as const;

/** Network parameters a Touchstone file may hold. */
export type NetworkParameter = (typeof NETWORK_PARAMETERS)[number];

/** How a Touchstone file writes complex numbers: magnitude or decibels with degrees, or both parts. */
export const NETWORK_FORMATS = ["MA", "DB", "RI"] as const;

/** How a Touchstone file writes complex numbers. */
export type NetworkFormat = (typeof NETWORK_FORMATS)[number];

/** Frequency units of a Touchstone file. */
export const NETWORK_FREQUENCY_UNITS = ["Hz", "kHz", "MHz", "GHz"] as const;

/** Frequency unit of a Touchstone file. */
export type NetworkFrequencyUnit = (typeof NETWORK_FREQUENCY_UNITS)[number];

/** One line of noise parameters. */
export interface NetworkNoisePoint {
  /** [Hz] */
  readonly frequency: number;
  readonly minimumNoiseFigureDb: number;
  /** Source reflection for the least noise figure [1]. */
  readonly sourceReflection: { readonly re: number; readonly im: number };
  /** Effective noise resistance [ohm]. */
  readonly noiseResistance: number;
}

/** A one-port or two-port network over frequency, as a Touchstone file describes it. */
export interface NetworkData {
  readonly ports: 1 | 2;
  readonly parameter: NetworkParameter;
  /** Per port, real [ohm]. */
  readonly referenceResistances: readonly number[];
  /** Rising, shape (n,) [Hz]. */
  readonly frequencies: Float64Array;
  /**
   * Shape (n, ports, ports), row-major, real parts: S in 1, Y in S, Z in ohm, H and G each in its own unit;
   * not divided by the reference resistance.
   */
  readonly re: Float64Array;
  /** Imaginary parts, laid out as `re`. */
  readonly im: Float64Array;
  readonly noise: readonly NetworkNoisePoint[];
}

/**
 * Admittance matrix of a network at one of its frequencies.
 *
 * @param index which frequency, from 0 [1]
 * @returns shape (ports, ports), row-major [S]
 * @throws {RangeError} when the index is out of range, or the network has no admittance there (a short)
 */
export function networkAdmittance(network: NetworkData, index: number): readonly Admittance[] {
  const { ports, frequencies, re, im } = network;
  if (!(Number.isInteger(index) && index >= 0 && index < frequencies.length)) {
    throw new RangeError(
      `Cannot take the admittance: index must lie from 0 to ${
        frequencies.length - 1
      }, got ${index}`,
    );
  }
  const size = ports * ports;
  const at = index * size;
  const values = Array.from(
    { length: size },
    (_, k) => complex(re[at + k] ?? NaN, im[at + k] ?? NaN),
  );
  const admittance = toAdmittance(values, network);
  if (admittance.some((y) => !(Number.isFinite(y.re) && Number.isFinite(y.im)))) {
    throw new RangeError(
      `Cannot take the admittance: the network must not be a short between its terminals, got one at ` +
        `${frequencies[index]} Hz`,
    );
  }
  return admittance;
}

function toAdmittance(values: readonly Complex[], network: NetworkData): readonly Complex[] {
  const { parameter, referenceResistances } = network;
  switch (parameter) {
    case "Y":
      return values;
    case "Z":
      return inverse(values);
    case "S":
      return fromNormalised(cayley(values), referenceResistances);
    case "H": {
      const [h11, h12, h21, h22] = quadruple(values);
      const y11 = reciprocal(h11);
      const y12 = scale(multiply(h12, y11), -1);
      const y21 = multiply(h21, y11);
      return [y11, y12, y21, subtract(h22, multiply(h21, multiply(h12, y11)))];
    }
    case "G": {
      const [g11, g12, g21, g22] = quadruple(values);
      const y22 = reciprocal(g22);
      const y12 = multiply(g12, y22);
      const y21 = scale(multiply(g21, y22), -1);
      return [subtract(g11, multiply(g12, multiply(g21, y22))), y12, y21, y22];
    }
  }
}

/** Description of a network by its admittance, for {@linkcode networkFromAdmittance}. */
export interface AdmittanceDescription {
  readonly ports: 1 | 2;
  /** Rising [Hz]. */
  readonly frequencies: ArrayLike<number>;
  /** Admittance matrix, row-major, shape (ports, ports) [S], at a frequency [Hz]. */
  readonly admittance: (
    frequency: number,
  ) => readonly Admittance[];
  /** @default "S" */
  readonly parameter?: "S" | "Y" | "Z";
  /** Of every port [ohm]. @default 50 */
  readonly referenceResistance?: number;
}

const USUAL_REFERENCE = 50;

/**
 * A network from its admittance matrix, to be written to a file.
 *
 * @throws {RangeError} when a frequency does not rise, the reference is not positive, or the parameters
 *   do not exist
 * @throws {TypeError} when the admittance has not the right number of entries
 */
export function networkFromAdmittance(description: AdmittanceDescription): NetworkData {
  const { ports, admittance, parameter = "S", referenceResistance = USUAL_REFERENCE } = description;
  const frequencies = Float64Array.from(description.frequencies);
  if (!(referenceResistance > 0 && referenceResistance < Infinity)) {
    throw new RangeError(
      `Cannot make the network: reference must be > 0 ohm, got ${referenceResistance} ohm`,
    );
  }
  const referenceResistances = Array.from({ length: ports }, () => referenceResistance);
  const size = ports * ports;
  const re = new Float64Array(frequencies.length * size);
  const im = new Float64Array(frequencies.length * size);
  frequencies.forEach((frequency, index) => {
    const previous = frequencies[index - 1] ?? -Infinity;
    if (!(frequency >= 0 && frequency > previous && frequency < Infinity)) {
      throw new RangeError(
        `Cannot make the network: frequencies must rise from >= 0 Hz, got ${frequency} Hz at index ${index}`,
      );
    }
    const y = admittance(frequency);
    if (y.length !== size) {
      throw new TypeError(
        `Cannot make the network: admittance must have ${size} entries, got ${y.length}`,
      );
    }
    const values = parameter === "Y"
      ? y
      : parameter === "Z"
      ? inverse(y)
      : cayley(toNormalised(y, referenceResistances));
    values.forEach((value, k) => {
      if (!(Number.isFinite(value.re) && Number.isFinite(value.im))) {
        throw new RangeError(
          `Cannot make the network: ${parameter} parameters must be finite, got none at ${frequency} Hz`,
        );
      }
      re[index * size + k] = value.re;
      im[index * size + k] = value.im;
    });
  });
  return { ports, parameter, referenceResistances, frequencies, re, im, noise: [] };
}

/** y_ij / sqrt(R_i R_j) from a normalised matrix. */
function fromNormalised(y: readonly Complex[], resistances: readonly number[]): Complex[] {
  return weighted(y, resistances, (root) => 1 / root);
}

function toNormalised(y: readonly Complex[], resistances: readonly number[]): Complex[] {
  return weighted(y, resistances, (root) => root);
}

function weighted(
  y: readonly Complex[],
  resistances: readonly number[],
  weight: (root: number) => number,
): Complex[] {
  const ports = resistances.length;
  return y.map((value, k) => {
    const product = resistances[Math.floor(k / ports)]! * resistances[k % ports]!;
    return scale(value, weight(Math.sqrt(product)));
  });
}

/** (1 - M)(1 + M)^-1, its own inverse: S to normalised admittance and back. */
function cayley(m: readonly Complex[]): Complex[] {
  if (m.length === 1) {
    const one = complex(1, 0);
    return [divide(subtract(one, m[0]!), add(one, m[0]!))];
  }
  const [a, b, c, d] = quadruple(m);
  const one = complex(1, 0);
  // With D the determinant of 1 + M.
  const bc = multiply(b, c);
  const plusA = add(one, a);
  const plusD = add(one, d);
  const inverseDeterminant = reciprocal(subtract(multiply(plusA, plusD), bc));
  const times = (value: Complex) => multiply(value, inverseDeterminant);
  return [
    times(add(multiply(subtract(one, a), plusD), bc)),
    times(scale(b, -2)),
    times(scale(c, -2)),
    times(add(multiply(plusA, subtract(one, d)), bc)),
  ];
}

function inverse(m: readonly Complex[]): Complex[] {
  if (m.length === 1) return [reciprocal(m[0]!)];
  const [a, b, c, d] = quadruple(m);
  const factor = reciprocal(subtract(multiply(a, d), multiply(b, c)));
  return [
    multiply(d, factor),
    scale(multiply(b, factor), -1),
    scale(multiply(c, factor), -1),
    multiply(a, factor),
  ];
}

/** The entries of a two-by-two matrix; the callers know that it has four. */
function quadruple(m: readonly Complex[]): [Complex, Complex, Complex, Complex] {
  return [m[0]!, m[1]!, m[2]!, m[3]!];
}
