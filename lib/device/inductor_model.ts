import { reciprocal } from "./_complex.ts";
import { firstResonance } from "./_inductor_resonance.ts";
import type { Admittance } from "./inductor_admittance.ts";
import type { CoilWarning } from "./inductor_geometry.ts";
import { coilAdmittance, type CoilExcitation, type CoilParameters } from "./inductor_network.ts";

/** Where a node of a coil is: an end, the centre tap, ground, or the silicon under an end. */
export type CoilNode =
  | "plus"
  | "minus"
  | "tap"
  | "ground"
  | "plus_silicon"
  | "minus_silicon";

/** One lumped element of a coil at one frequency, for a circuit. */
export type CoilElement =
  | {
    readonly kind: "windings";
    readonly windings: readonly {
      readonly nodes: readonly [CoilNode, CoilNode];
      /** [H] */
      readonly inductance: number;
      /** [ohm] */
      readonly seriesResistance: number;
    }[];
    /** Between two windings [1]; 0 for one. */
    readonly coupling: number;
  }
  | {
    readonly kind: "capacitor";
    readonly name: string;
    readonly nodes: readonly [CoilNode, CoilNode];
    /** [F] */
    readonly capacitance: number;
  }
  | {
    readonly kind: "resistor";
    readonly name: string;
    readonly nodes: readonly [CoilNode, CoilNode];
    /** [ohm] */
    readonly resistance: number;
  };

/** A coil, wherever it comes from. */
export interface CoilModel {
  readonly origin: "geometry" | "file" | "figures";
  readonly excitation: CoilExcitation;
  readonly parameters: CoilParameters;
  /** Frequencies the curves may be asked for, above zero [Hz]. */
  readonly range: { readonly lowest: number; readonly highest: number };
  /** First frequency at which the reactance of the coil passes through zero [Hz]; none in the range. */
  readonly selfResonance: number | undefined;
  readonly warnings: readonly CoilWarning[];
  /** Admittance of the driven coil [S] at a frequency [Hz]. */
  readonly admittance: (frequency: number) => Admittance;
  /** Im(Z) / (2 pi f) of the driven coil [H] at a frequency [Hz]; negative above self-resonance. */
  readonly inductance: (frequency: number) => number;
  /** Im(Z) / Re(Z) of the driven coil [1] at a frequency [Hz]; zero at self-resonance. */
  readonly quality: (frequency: number) => number;
  /** 1 / Re(Y): the loss as a resistance across the drive [ohm] at a frequency [Hz]. */
  readonly parallelResistance: (frequency: number) => number;
  /**
   * Lumped elements, the series resistance taken at a frequency [Hz]. A coil with a tap has two coupled
   * windings, plus to tap and tap to minus; one without has one winding, plus to minus.
   */
  readonly elements: (frequency: number) => readonly CoilElement[];
}

/** Options of {@linkcode coilModel}. */
export interface CoilModelOptions {
  readonly origin: CoilModel["origin"];
  readonly excitation: CoilExcitation;
  /** @default none */
  readonly warnings?: readonly CoilWarning[];
  /** Replaces the admittance of the lumped network, as measured curves do [S]. */
  readonly admittance?: (frequency: number) => Admittance;
  /** @default any frequency above zero */
  readonly range?: CoilModel["range"];
}

const ANY_FREQUENCY = { lowest: 0, highest: Infinity };

/** The search ends where all capacitances but this share are gone. */
const LEAST_CAPACITANCE_SHARE = 0.01;

/**
 * A coil from its lumped elements.
 *
 * @throws {RangeError} when a parameter is out of range
 */
export function coilModel(parameters: CoilParameters, options: CoilModelOptions): CoilModel {
  check(parameters);
  const { origin, excitation, warnings = [], range = ANY_FREQUENCY } = options;
  const curve = options.admittance ??
    ((frequency: number) => coilAdmittance(parameters, frequency, { excitation }));
  const admittance = (frequency: number) => {
    if (!(frequency > 0 && frequency >= range.lowest && frequency <= range.highest)) {
      const wanted = range === ANY_FREQUENCY
        ? "> 0 Hz"
        : `from ${range.lowest} Hz to ${range.highest} Hz`;
      throw new RangeError(
        `Cannot evaluate the coil: frequency must be ${wanted}, got ${frequency} Hz`,
      );
    }
    return curve(frequency);
  };
  const impedance = (frequency: number) => reciprocal(admittance(frequency));
  return {
    origin,
    excitation,
    parameters,
    range,
    selfResonance: findSelfResonance(admittance, parameters, range),
    warnings,
    admittance,
    inductance: (frequency) => impedance(frequency).im / (2 * Math.PI * frequency),
    quality: (frequency) => {
      const { re, im } = impedance(frequency);
      return im / re;
    },
    parallelResistance: (frequency) => 1 / admittance(frequency).re,
    elements: (frequency) => elementsAt(parameters, frequency),
  };
}

function check(parameters: CoilParameters): void {
  const { inductance, parallelCapacitance, substrate, coupling } = parameters;
  demand(inductance > 0 && inductance < Infinity, "inductance must be > 0 H", `${inductance} H`);
  demand(
    parallelCapacitance >= 0 && parallelCapacitance < Infinity,
    "parallel capacitance must be >= 0 F",
    `${parallelCapacitance} F`,
  );
  if (coupling !== undefined) {
    demand(coupling > -1 && coupling < 1, "coupling must lie between -1 and 1", `${coupling}`);
  }
  if (substrate === undefined) return;
  const { oxideCapacitance, siliconCapacitance, siliconResistance } = substrate;
  demand(
    oxideCapacitance > 0 && oxideCapacitance < Infinity,
    "oxide capacitance must be > 0 F",
    `${oxideCapacitance} F`,
  );
  demand(
    siliconCapacitance >= 0 && siliconCapacitance < Infinity,
    "silicon capacitance must be >= 0 F",
    `${siliconCapacitance} F`,
  );
  demand(
    siliconResistance > 0 && siliconResistance < Infinity,
    "silicon resistance must be > 0 ohm",
    `${siliconResistance} ohm`,
  );
}

function demand(condition: boolean, wording: string, value: string): void {
  if (!condition) throw new RangeError(`Cannot make the coil: ${wording}, got ${value}`);
}

/** Where to look for the self-resonance when the curves have no end: where the network's own may be. */
function findSelfResonance(
  admittance: (frequency: number) => Admittance,
  { inductance, parallelCapacitance, substrate }: CoilParameters,
  range: CoilModel["range"],
): number | undefined {
  const susceptance = (frequency: number) => admittance(frequency).im;
  if (range.highest < Infinity) return firstResonance(susceptance, range);
  const most = parallelCapacitance + (substrate?.oxideCapacitance ?? 0);
  if (most === 0) return undefined;
  const resonanceWith = (capacitance: number) =>
    1 / (2 * Math.PI * Math.sqrt(inductance * capacitance));
  return firstResonance(susceptance, {
    lowest: resonanceWith(most) / 10,
    highest: resonanceWith(LEAST_CAPACITANCE_SHARE * most),
  });
}

function elementsAt(parameters: CoilParameters, frequency: number): readonly CoilElement[] {
  const { inductance, parallelCapacitance, substrate, coupling } = parameters;
  const seriesResistance = parameters.seriesResistance(frequency);
  demand(
    seriesResistance >= 0 && seriesResistance < Infinity,
    "series resistance must be >= 0 ohm",
    `${seriesResistance} ohm at ${frequency} Hz`,
  );
  const elements: CoilElement[] = [];
  if (coupling === undefined) {
    const windings = [{ nodes: ["plus", "minus"], inductance, seriesResistance }] as const;
    elements.push({ kind: "windings", windings, coupling: 0 });
  } else {
    // Two halves in series aiding: L = 2 (1 + k) L_half.
    const half = {
      inductance: inductance / (2 * (1 + coupling)),
      seriesResistance: seriesResistance / 2,
    };
    const windings = [
      { nodes: ["plus", "tap"], ...half },
      { nodes: ["tap", "minus"], ...half },
    ] as const;
    elements.push({ kind: "windings", windings, coupling });
  }
  if (parallelCapacitance > 0) {
    elements.push({
      kind: "capacitor",
      name: "coil capacitance",
      nodes: ["plus", "minus"],
      capacitance: parallelCapacitance,
    });
  }
  if (substrate === undefined) return elements;
  const { oxideCapacitance, siliconCapacitance, siliconResistance } = substrate;
  for (const end of ["plus", "minus"] as const) {
    const silicon = `${end}_silicon` as const;
    elements.push(
      {
        kind: "capacitor",
        name: `coil oxide ${end}`,
        nodes: [end, silicon],
        capacitance: oxideCapacitance,
      },
      {
        kind: "resistor",
        name: `coil silicon ${end}`,
        nodes: [silicon, "ground"],
        resistance: siliconResistance,
      },
    );
    if (siliconCapacitance > 0) {
      elements.push({
        kind: "capacitor",
        name: `coil silicon capacitance ${end}`,
        nodes: [silicon, "ground"],
        capacitance: siliconCapacitance,
      });
    }
  }
  return elements;
}
