/**
 * The fields of a technology card with their units, written once. The schema file beside the cards is
 * checked against this list by a test.
 *
 * @module
 */
import { flag, list, notNegative, optional, positive, signed, text, word } from "./_card_shape.ts";

/** Classes of human-body-model withstand voltage, ANSI/ESDA/JEDEC JS-001, table 3. */
export const HBM_CLASSES = ["0Z", "0A", "0B", "1A", "1B", "1C", "2", "3A", "3B"] as const;

/** Classes of charged-device-model withstand voltage, ANSI/ESDA/JEDEC JS-002. */
export const CDM_CLASSES = ["C0a", "C0b", "C1", "C2a", "C2b", "C3"] as const;

const transistorCorner = {
  /** Added to the magnitude of the threshold voltage [V]. */
  thresholdShift: signed("V"),
  /** Factor on the mobility [1]. */
  mobilityFactor: positive("1"),
  /** Factor on the oxide capacitance [1]. */
  oxideFactor: positive("1"),
} as const;

const passiveCorner = {
  /** Factor on every capacitance of the capacitor bank [1]. */
  capacitorFactor: positive("1"),
  /** Factor on every resistance [1]. */
  resistorFactor: positive("1"),
} as const;

const transistor = {
  kind: word("n", "p"),
  /** Name of the threshold option, such as `regular`. */
  flavour: text,
  /** Smallest drawn channel length [m]. */
  minimumLength: positive("m"),
  /** Magnitude of the threshold voltage at zero source-bulk voltage and the nominal temperature [V]. */
  threshold: signed("V"),
  /** Fall of the threshold's magnitude with temperature [V/K]. */
  thresholdTemperatureCoefficient: signed("V/K"),
  /** Slope factor n [1]. */
  slopeFactor: positive("1"),
  /** Mobility times oxide capacitance at the nominal temperature [A/V^2]. */
  transconductanceParameter: positive("A/V^2"),
  /** b in mobility ~ T^-b [1]. */
  mobilityExponent: signed("1"),
  /** Velocity at which carriers saturate [m/s]. */
  saturationVelocity: positive("m/s"),
  /** Relative slope of the current in saturation times channel length [m/V]. */
  outputConductanceLength: notNegative("m/V"),
  /** Gate oxide capacitance per area [F/m^2]. */
  oxideCapacitance: positive("F/m^2"),
  /** Gate-drain and gate-source overlap and fringe, each, per width [F/m]. */
  overlapCapacitance: notNegative("F/m"),
  junction: {
    /** Length of the source and drain areas along the channel [m]. */
    diffusionLength: positive("m"),
    /** Bottom capacitance at zero bias [F/m^2]. */
    areaCapacitance: notNegative("F/m^2"),
    /** Side-wall capacitance at zero bias [F/m]. */
    perimeterCapacitance: notNegative("F/m"),
    /** Built-in potential [V]. */
    builtInPotential: positive("V"),
    /** Grading coefficient, below 1 [1]. */
    grading: positive("1"),
    /** Saturation current at the nominal temperature [A/m^2]. */
    saturationCurrent: notNegative("A/m^2"),
    /** Emission coefficient [1]. */
    emission: positive("1"),
  },
  /** K_F of S_V = K_F / (C_ox W L f), one-sided [V^2 F]. */
  flickerCoefficient: notNegative("V^2*F"),
  /** Standard deviation of the threshold difference of a pair times sqrt(W L) [V m]. */
  thresholdMismatch: notNegative("V*m"),
  /** Standard deviation of the relative gain difference of a pair times sqrt(W L) [m]. */
  gainMismatch: notNegative("m"),
  corners: { slow: transistorCorner, typical: transistorCorner, fast: transistorCorner },
} as const;

const varactorCorner = {
  /** Factor on every varactor capacitance [1]. */
  capacitanceFactor: positive("1"),
} as const;

const switchCorner = {
  /** Factor on the on-resistance [1]. */
  onResistanceFactor: positive("1"),
  /** Factor on the off-capacitance [1]. */
  offCapacitanceFactor: positive("1"),
} as const;

const varactors = {
  corners: { slow: varactorCorner, typical: varactorCorner, fast: varactorCorner },
  /** Of every varactor capacitance [1/K]. */
  temperatureCoefficient: signed("1/K"),
  junction: optional({
    /** At zero bias [F/m^2]. */
    zeroBiasCapacitance: positive("F/m^2"),
    /** [V] */
    builtInPotential: positive("V"),
    /** Grading coefficient, below 1 [1]. */
    grading: positive("1"),
    /** At the nominal temperature [A/m^2]. */
    saturationCurrent: notNegative("A/m^2"),
    /** Emission coefficient [1]. */
    emission: positive("1"),
    /** Series resistance times area [ohm m^2]. */
    seriesResistance: notNegative("ohm*m^2"),
  }),
  accumulation: optional({
    /** Of the gate over the well in accumulation [F/m^2]. */
    maximumCapacitance: positive("F/m^2"),
    /** In depletion [F/m^2]. */
    minimumCapacitance: positive("F/m^2"),
    /** Of each edge along the width, at any voltage [F/m]. */
    fringeCapacitance: notNegative("F/m"),
    /** Gate-well voltage of the mean capacitance [V]. */
    centreVoltage: signed("V"),
    /** Voltage scale of the transition [V]. */
    transitionVoltage: positive("V"),
    /** Of the well under the gate [ohm], per square. */
    wellSheetResistance: notNegative("ohm"),
    /** Of gate and contacts times width [ohm m]. */
    contactResistance: notNegative("ohm*m"),
  }),
} as const;

const capacitorBank = {
  /** Resistance of a closed differential switch times its width [ohm m]. */
  switchOnResistance: positive("ohm*m"),
  /** Relative rise of that with temperature [1/K]. */
  switchTemperatureCoefficient: signed("1/K"),
  /** Between the ends of an open differential switch, over its width [F/m]. */
  switchOffCapacitance: positive("F/m"),
  /** Quality factor of the capacitors themselves [1]. */
  capacitorQuality: positive("1"),
  /** Frequency at which it holds [Hz]. */
  capacitorQualityFrequency: positive("Hz"),
  /** Capacitance of the outer plates to the substrate over the cell's own, below 1 [1]. */
  plateFraction: notNegative("1"),
  corners: { slow: switchCorner, typical: switchCorner, fast: switchCorner },
} as const;

/** A limit with the place its figure comes from. */
function limit<const U extends string>(unit: U) {
  return { value: positive(unit), origin: text } as const;
}

/** Every field of a technology card. */
export const CARD_FIELDS = {
  name: text,
  /** Process node and option in words. */
  process: text,
  /** True when the figures are invented. */
  illustrative: flag,
  /** What a reader of the report must know about the card. */
  note: text,
  /** Supply voltage [V]. */
  supply: { nominal: positive("V"), lowest: positive("V"), highest: positive("V") },
  /** Junction temperature [K]; the parameters hold at `nominal`. */
  temperature: { nominal: positive("K"), lowest: positive("K"), highest: positive("K") },
  transistors: list(transistor),
  passives: {
    corners: { slow: passiveCorner, typical: passiveCorner, fast: passiveCorner },
    /** Of resistors [1/K]. */
    resistorTemperatureCoefficient: signed("1/K"),
    /** Of capacitors [1/K]. */
    capacitorTemperatureCoefficient: signed("1/K"),
    /** Of the metal's resistance: what lowers an inductor's quality factor when hot [1/K]. */
    metalTemperatureCoefficient: signed("1/K"),
    /** Of the thick metal of inductors at the nominal temperature [ohm], per square. */
    thickMetalSheetResistance: positive("ohm"),
    /** Of the thick metal of inductors [m]. */
    thickMetalThickness: positive("m"),
  },
  /** What the process offers as varactors. */
  varactors: optional(varactors),
  /** Switches and capacitors of a switched bank. */
  capacitorBank: optional(capacitorBank),
  limits: {
    /** Peak gate-source voltage, magnitude [V]. */
    gateSourceVoltage: limit("V"),
    /** Peak gate-drain voltage, magnitude [V]. */
    gateDrainVoltage: limit("V"),
    /** Peak drain-source voltage while the channel conducts, magnitude [V]. */
    drainSourceVoltage: limit("V"),
    /** Peak reverse voltage of the drain-bulk junction [V]. */
    drainBulkVoltage: limit("V"),
    /** Average current per width of thick metal at the highest junction temperature [A/m]. */
    metalCurrentDensity: limit("A/m"),
    /** Root-mean-square current per width of thick metal [A/m]. */
    metalRmsCurrentDensity: limit("A/m"),
    /** Highest junction temperature [K]. */
    junctionTemperature: limit("K"),
  },
  electrostaticDischarge: {
    /** Target of the pins on the human body model. */
    humanBodyClass: word(...HBM_CLASSES),
    /** Target of the pins on the charged device model. */
    chargedDeviceClass: word(...CDM_CLASSES),
    origin: text,
  },
} as const;
