/** Inversion coefficients that bound moderate inversion (common practice) [1]. */
const WEAK_BELOW = 0.1;
const STRONG_ABOVE = 10;

/** What a designer reads off a transistor at a bias; channel only, without junctions. */
export interface TransistorOperatingPoint {
  /** Into the drain [A]. */
  readonly current: number;
  /** Change of the drain current with the gate voltage [S]. */
  readonly gm: number;
  /** Fall of the drain current with the source voltage [S]. */
  readonly gms: number;
  /** Change of the drain current with the drain voltage [S]. */
  readonly gds: number;
  /** Long-channel current of the more inverted end over the specific current [1]. */
  readonly inversionCoefficient: number;
  readonly inversion: "weak" | "moderate" | "strong";
  /** Magnitude of the drain-source voltage above which the channel is pinched off [V]. */
  readonly saturationVoltage: number;
  readonly region: "triode" | "saturation";
  /** Thermal noise of the channel over 4kT, one-sided density; over `gm` it is gamma of the gate [S]. */
  readonly noiseConductance: number;
  /** Overlap included [F]. */
  readonly gateSourceCapacitance: number;
  /** Overlap included [F]. */
  readonly gateDrainCapacitance: number;
  /** [F] */
  readonly gateBulkCapacitance: number;
  /** Junction included [F]. */
  readonly drainBulkCapacitance: number;
  /** Junction included [F]. */
  readonly sourceBulkCapacitance: number;
}

/**
 * Weak, moderate or strong inversion.
 *
 * @param coefficient inversion coefficient [1]
 */
export function inversionName(coefficient: number): "weak" | "moderate" | "strong" {
  if (coefficient < WEAK_BELOW) return "weak";
  return coefficient > STRONG_ABOVE ? "strong" : "moderate";
}

/**
 * Capacitances between terminals [F], each the fall of one terminal's charge with another's voltage.
 *
 * @internal
 * @param values what a transistor's `evaluate` fills
 */
export function terminalCapacitances(values: Float64Array) {
  return {
    gateSourceCapacitance: -values[30]!,
    gateDrainCapacitance: -values[28]!,
    gateBulkCapacitance: -values[31]!,
    drainBulkCapacitance: -values[36]!,
    sourceBulkCapacitance: -values[38]!,
  };
}
