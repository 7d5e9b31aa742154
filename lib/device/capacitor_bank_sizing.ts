/**
 * Hand formulas of a switched capacitor bank.
 *
 * @module
 */

/** A cell of the bank with its switch closed. */
export interface ClosedCell {
  /** [Hz] */
  readonly frequency: number;
  /** Of the cell with its switch closed, differential [F]. */
  readonly capacitance: number;
}

/**
 * Quality factor of a cell whose only loss is its closed switch: Q = 1/(w R C).
 *
 * @param onResistance of the switch, between the two inner plates of a differential cell [ohm]
 * @returns [1]
 * @throws {RangeError} when a value is not above zero
 */
export function switchedQuality(onResistance: number, cell: ClosedCell): number {
  demand("on-resistance", onResistance, "ohm");
  return reactance(cell) / onResistance;
}

/**
 * On-resistance of the switch that gives a cell a quality factor: R = 1/(w Q C).
 *
 * @param quality asked for [1]
 * @returns [ohm]
 * @throws {RangeError} when a value is not above zero
 */
export function switchOnResistance(quality: number, cell: ClosedCell): number {
  demand("quality factor", quality, "");
  return reactance(cell) / quality;
}

/** A resonance that a step of capacitance moves. */
export interface SteppedTank {
  /** Differential [H]. */
  readonly inductance: number;
  /** [Hz] */
  readonly frequency: number;
}

/**
 * Fall of the frequency with a small step of capacitance: df = 2 pi^2 L f^3 dC, the first order of
 * f = 1/(2 pi sqrt(L C)).
 *
 * @param capacitance added to the tank, differential [F]
 * @returns [Hz]
 * @throws {RangeError} when inductance or frequency is not above zero
 */
export function frequencyStep(capacitance: number, tank: SteppedTank): number {
  demand("inductance", tank.inductance, "H");
  demand("frequency", tank.frequency, "Hz");
  return 2 * Math.PI ** 2 * tank.inductance * tank.frequency ** 3 * capacitance;
}

function reactance({ frequency, capacitance }: ClosedCell): number {
  demand("frequency", frequency, "Hz");
  demand("capacitance", capacitance, "F");
  return 1 / (2 * Math.PI * frequency * capacitance);
}

function demand(name: string, value: number, unit: string): void {
  if (value > 0) return;
  const [limit, found] = [`> 0 ${unit}`, `${value} ${unit}`].map((text) => text.trim());
  throw new RangeError(`Cannot size the capacitor bank: ${name} must be ${limit}, got ${found}`);
}
