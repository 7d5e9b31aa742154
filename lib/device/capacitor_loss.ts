/** A capacitor with a quality factor at a frequency. */
export interface LossyCapacitor {
  /** In series with its loss [F]. */
  readonly capacitance: number;
  /** Reactance over resistance at `qualityFrequency`; Infinity for a lossless one [1]. */
  readonly quality: number;
  /** Frequency at which the quality factor holds [Hz]. */
  readonly qualityFrequency: number;
}

/** The two ways to draw one impedance. */
export interface CapacitorLoss {
  /** In series with the capacitance [ohm]; the same at any frequency. */
  readonly seriesResistance: number;
  /** Across `parallelCapacitance`, for the frequency of the quality factor only [ohm]. */
  readonly parallelResistance: number;
  /** [F] */
  readonly parallelCapacitance: number;
}

/**
 * Resistance in series with a capacitor, R = 1/(w Q C), and the parallel pair that is the same impedance at
 * that frequency: R_p = R (1 + Q^2), C_p = C Q^2/(1 + Q^2).
 *
 * @throws {RangeError} when a value is not above zero
 */
export function capacitorLoss(capacitor: LossyCapacitor): CapacitorLoss {
  const { capacitance, quality, qualityFrequency } = capacitor;
  for (
    const [name, value, unit] of [
      ["capacitance", capacitance, " F"],
      ["quality factor", quality, ""],
      ["frequency", qualityFrequency, " Hz"],
    ] as const
  ) {
    if (value > 0) continue;
    throw new RangeError(
      `Cannot find the capacitor's loss: ${name} must be > 0${unit}, got ${value}${unit}`,
    );
  }
  const reactance = 1 / (2 * Math.PI * qualityFrequency * capacitance);
  return {
    seriesResistance: reactance / quality,
    // Written with Q + 1/Q so that a lossless capacitor has an infinite one, not an undefined one.
    parallelResistance: reactance * (quality + 1 / quality),
    parallelCapacitance: capacitance / (1 + 1 / (quality * quality)),
  };
}
