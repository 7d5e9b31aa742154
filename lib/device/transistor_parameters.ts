/** A MOS transistor's parameters at one corner and one temperature, in SI. */
export interface TransistorParameters {
  readonly kind: "n" | "p";
  /** [K] */
  readonly temperature: number;
  /** Smallest channel length [m]. */
  readonly minimumLength: number;
  /** Magnitude of the threshold voltage at zero source-bulk voltage [V]. */
  readonly threshold: number;
  /** Slope factor n >= 1; carries the body effect [1]. */
  readonly slopeFactor: number;
  /** Mobility times oxide capacitance [A/V^2]. */
  readonly transconductanceParameter: number;
  /** Gate oxide capacitance per area [F/m^2]. */
  readonly oxideCapacitance: number;
  /** [m/s]; Infinity switches velocity saturation off. */
  readonly saturationVelocity: number;
  /** Relative slope of the current in saturation times channel length [m/V]. */
  readonly outputConductanceLength: number;
  /** Gate-drain and gate-source overlap and fringe, each, per width [F/m]. */
  readonly overlapCapacitance: number;
  readonly junction: TransistorJunctions;
  /** K_F of the one-sided gate voltage density K_F / (C_ox W L f) [V^2 F]. */
  readonly flickerCoefficient: number;
  /** Standard deviation of the threshold difference of a pair times sqrt(W L) [V m]. */
  readonly thresholdMismatch: number;
  /** Standard deviation of the relative gain difference of a pair times sqrt(W L) [m]. */
  readonly gainMismatch: number;
}

/** The source-bulk and drain-bulk junctions per size. */
export interface TransistorJunctions {
  /** Length of the source and drain areas along the channel [m]. */
  readonly diffusionLength: number;
  /** [F/m^2] */
  readonly areaCapacitance: number;
  /** [F/m] */
  readonly perimeterCapacitance: number;
  /** [V] */
  readonly builtInPotential: number;
  /** [1] */
  readonly grading: number;
  /** [A/m^2] */
  readonly saturationCurrent: number;
  /** [1] */
  readonly emission: number;
}

/** Drawn size of a transistor. */
export interface TransistorSize {
  /** [m] */
  readonly width: number;
  /** [m] */
  readonly length: number;
  /** Number of equal devices in parallel [1]. @default 1 */
  readonly multiplier?: number;
  /** Whether the two bulk junctions are part of the device. @default true */
  readonly bulkJunctions?: boolean;
}
