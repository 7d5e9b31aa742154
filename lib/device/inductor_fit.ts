import { levenbergMarquardt } from "../numeric/levenberg_marquardt.ts";
import { type Complex, complex, magnitude, reciprocal, scale, subtract } from "./_complex.ts";
import type { CoilCurves } from "./inductor_curves.ts";
import {
  coilAdmittance,
  type CoilParameters,
  substrateAdmittance,
  type SubstrateBranch,
} from "./inductor_network.ts";

/** Options of {@linkcode fitCoil}. */
export interface FitCoilOptions {
  /** Lowest frequency of the fit [Hz]. @default the curves' first */
  readonly from?: number;
  /** Highest frequency of the fit [Hz]. @default the self-resonance, else the curves' last */
  readonly to?: number;
  /** Whether to fit a substrate branch; `auto` where it lowers the residual. @default "auto" */
  readonly substrate?: "auto" | "with" | "without";
}

/** Name of a fitted element. */
export type CoilFitElement =
  | "inductance"
  | "constantResistance"
  | "skinResistance"
  | "parallelCapacitance"
  | "oxideCapacitance"
  | "siliconResistance"
  | "siliconCapacitance";

/** A lumped network fitted to curves, with how well it fits. */
export interface CoilFit {
  readonly status: "found";
  readonly parameters: CoilParameters;
  /** Series resistance: constant + skin sqrt(f); [ohm] and [ohm/sqrt(Hz)]. */
  readonly resistance: { readonly constant: number; readonly skin: number };
  /**
   * Relative standard error of each fitted element from the residuals [1]; Infinity where the curves do not
   * fix it.
   */
  readonly uncertainty: Readonly<Partial<Record<CoilFitElement, number>>>;
  /** Of the driven admittance, |Y_fit - Y| / |Y| [1]. */
  readonly residual: {
    readonly rms: number;
    readonly largest: number;
    /** Where it is largest [Hz]. */
    readonly frequency: number;
  };
  /** Largest |Q_fit - Q| [1]. */
  readonly qualityError: number;
  /** Lowest and highest fitted frequency [Hz]. */
  readonly range: { readonly lowest: number; readonly highest: number };
  readonly points: number;
  readonly evaluations: number;
}

/** Why no network was found. */
export interface NoCoilFit {
  readonly status: "no fit";
  readonly reason: string;
  readonly evaluations: number;
}

/** Outcome of {@linkcode fitCoil}. */
export type CoilFitResult = CoilFit | NoCoilFit;

/** Elements without a substrate branch. */
const PLAIN: readonly CoilFitElement[] = [
  "inductance",
  "constantResistance",
  "skinResistance",
  "parallelCapacitance",
];

/**
 * What one curve can tell of the substrate. A fourth capacitance would leave the admittance as it is:
 * C across, oxide and silicon have three degrees of freedom at one port.
 */
const ONE_CURVE: readonly CoilFitElement[] = [...PLAIN, "oxideCapacitance", "siliconResistance"];

/** What a two-port tells, whose admittance to ground is known by itself. */
const TWO_CURVES: readonly CoilFitElement[] = [...ONE_CURVE, "siliconCapacitance"];

/** Shares of the capacitance that a start puts into the oxide. */
const OXIDE_SHARES = [0.3, 0.8];

/** Silicon resistances to start from [ohm]. */
const SILICON_RESISTANCES = [50, 500, 5000];

const SILICON_CAPACITANCE_SHARE = 0.3;

/** A substrate branch is kept when it brings the residual below this share. */
const WORTH_A_SUBSTRATE = 0.8;

/** A residual that needs no further element [1]: no measurement of a coil is better. */
const FITS_ALREADY = 1e-4;

/** Gain below which a step no longer counts; an absent element's logarithm falls for ever. */
const SEARCH = { tolerance: 1e-9, iterations: 300 };

/** Capacitance to start from where the curves show none [F]. */
const LEAST_CAPACITANCE = 1e-16;

interface Observations {
  readonly curves: CoilCurves;
  readonly frequencies: readonly number[];
  readonly drive: readonly Complex[];
  /** Substrate branch of an end, where a two-port tells it. */
  readonly shunt: readonly Complex[] | undefined;
  /** The skin resistance is fitted at this frequency [Hz]. */
  readonly reference: number;
}

/**
 * Fits the lumped pi network of a coil to its curves by least squares on the relative error of the
 * admittance: L, R = constant + skin sqrt(f) and C across the ends, and a substrate branch where the
 * curves show one. A two-port's admittance to ground is fitted along and tells the oxide from the
 * capacitance across. A one-port cannot: its substrate branch has no silicon capacitance, is equivalent
 * at the port, and says nothing about the common mode.
 *
 * @throws {RangeError} when too few frequencies lie in the range
 */
export function fitCoil(curves: CoilCurves, options: FitCoilOptions = {}): CoilFitResult {
  const { substrate = "auto" } = options;
  const observations = observe(curves, options);
  const elements = observations.shunt ? TWO_CURVES : ONE_CURVE;
  const first = firstGuess(observations);
  if (typeof first === "string") return { status: "no fit", reason: first, evaluations: 0 };
  let evaluations = 0;
  const search = (names: readonly CoilFitElement[], starts: readonly number[][]) => {
    const attempts = starts.map((start) => attempt(observations, names, start));
    evaluations += attempts.reduce((sum, each) => sum + each.evaluations, 0);
    const settledOnes = attempts.filter(({ status }) => status === "found");
    return (settledOnes.length > 0 ? settledOnes : attempts).reduce((best, each) =>
      each.sumOfSquares < best.sumOfSquares ? each : best
    );
  };
  const plain = substrate === "with" ? undefined : search(PLAIN, [first]);
  const settled = plain && (substrate === "without" || plain.rms < FITS_ALREADY);
  const full = settled
    ? undefined
    : search(elements, substrateStarts(first, curves, elements.length));
  const worthIt = full && (!plain || full.rms < WORTH_A_SUBSTRATE * plain.rms);
  const best = worthIt ? full : plain!;
  if (best.status === "not settled") {
    return {
      status: "no fit",
      reason: `the search did not settle; relative residual ${best.rms.toPrecision(3)}`,
      evaluations,
    };
  }
  return describe(observations, best, evaluations);
}

function observe(curves: CoilCurves, options: FitCoilOptions): Observations {
  const { from = curves.frequencies[0]!, to = curves.selfResonance ?? Infinity } = options;
  const highest = Math.min(to, curves.frequencies.at(-1)!);
  const indices = Array.from(curves.frequencies.keys()).filter((k) =>
    curves.frequencies[k]! >= from && curves.frequencies[k]! <= highest
  );
  if (!(indices.length >= TWO_CURVES.length)) {
    throw new RangeError(
      `Cannot fit the coil: the file must have at least ${TWO_CURVES.length} frequencies from ${from} Hz ` +
        `to ${highest} Hz, got ${indices.length}`,
    );
  }
  const { toGround, tapGrounded } = curves;
  const frequencies = indices.map((k) => curves.frequencies[k]!);
  return {
    curves,
    frequencies,
    drive: indices.map((k) => complex(curves.conductance[k]!, curves.susceptance[k]!)),
    shunt: toGround && !tapGrounded
      ? indices.map((k) => complex(toGround.conductance[k]!, toGround.susceptance[k]!))
      : undefined,
    reference: Math.sqrt(frequencies[0]! * frequencies.at(-1)!),
  };
}

/** Logarithms of the plain elements, or why there are none. */
function firstGuess({ curves, frequencies, drive, reference }: Observations): number[] | string {
  const inductive = drive.findIndex((y) => y.im < 0 && y.re > 0);
  if (inductive < 0) {
    return "the coil is nowhere inductive with a positive loss in the fitted range";
  }
  const { re, im } = drive[inductive]!;
  const size = re * re + im * im;
  const inductance = -im / size / (2 * Math.PI * frequencies[inductive]!);
  const resistance = re / size;
  const last = 2 * Math.PI * frequencies.at(-1)!;
  const capacitance = curves.selfResonance
    ? 1 / (inductance * (2 * Math.PI * curves.selfResonance) ** 2)
    : drive.at(-1)!.im / last + 1 / (inductance * last ** 2);
  const growth = Math.sqrt(reference / frequencies[inductive]!);
  return [
    inductance,
    resistance / 2,
    resistance / 2 * growth,
    Math.max(capacitance, LEAST_CAPACITANCE),
  ].map(Math.log);
}

function substrateStarts(
  first: readonly number[],
  { excitation }: CoilCurves,
  length: number,
): number[][] {
  const capacitance = Math.exp(first[3]!);
  const weight = excitation === "differential" ? 0.5 : 1;
  return OXIDE_SHARES.flatMap((share) =>
    SILICON_RESISTANCES.map((siliconResistance) => {
      const oxide = share * capacitance / weight;
      const own = Math.log((1 - share) * capacitance);
      const silicon = [oxide, siliconResistance, SILICON_CAPACITANCE_SHARE * oxide].map(Math.log);
      return [...first.slice(0, 3), own, ...silicon].slice(0, length);
    })
  );
}

interface Attempt {
  readonly elements: readonly CoilFitElement[];
  readonly status: "found" | "not settled";
  readonly logarithms: Float64Array;
  readonly sumOfSquares: number;
  readonly rms: number;
  readonly evaluations: number;
  readonly uncertainty: readonly number[];
}

function attempt(
  observations: Observations,
  elements: readonly CoilFitElement[],
  start: readonly number[],
): Attempt {
  const { curves, frequencies, drive, shunt } = observations;
  const perPoint = shunt ? 4 : 2;
  const count = perPoint * frequencies.length;
  const weight = curves.excitation === "differential" ? 0.5 : 1;
  const result = levenbergMarquardt(
    (p, out) => {
      const network = networkOf(p, observations.reference);
      frequencies.forEach((frequency, k) => {
        const size = magnitude(drive[k]!);
        const driven = coilAdmittance(network, frequency, curves);
        const error = scale(subtract(driven, drive[k]!), 1 / size);
        out[perPoint * k] = error.re;
        out[perPoint * k + 1] = error.im;
        if (!shunt) return;
        const ground = network.substrate
          ? substrateAdmittance(network.substrate, frequency)
          : complex(0, 0);
        const groundError = scale(subtract(ground, shunt[k]!), weight / size);
        out[perPoint * k + 2] = groundError.re;
        out[perPoint * k + 3] = groundError.im;
      });
    },
    start,
    { count, ...SEARCH },
  );
  const variance = result.sumOfSquares / Math.max(1, count - elements.length);
  return {
    elements,
    status: result.status,
    logarithms: result.parameters,
    sumOfSquares: result.sumOfSquares,
    rms: Math.sqrt(result.sumOfSquares / frequencies.length),
    evaluations: result.evaluations,
    uncertainty: elements.map((_, k) => {
      const curvature = result.inverseCurvature?.[k * elements.length + k] ?? NaN;
      return curvature >= 0 ? Math.sqrt(curvature * variance) : Infinity;
    }),
  };
}

function resistanceOf(p: Float64Array, reference: number): CoilFit["resistance"] {
  return { constant: Math.exp(p[1]!), skin: Math.exp(p[2]!) / Math.sqrt(reference) };
}

function networkOf(p: Float64Array, reference: number): CoilParameters {
  const { constant, skin } = resistanceOf(p, reference);
  const plain = {
    inductance: Math.exp(p[0]!),
    seriesResistance: (frequency: number) => constant + skin * Math.sqrt(frequency),
    parallelCapacitance: Math.exp(p[3]!),
  };
  if (p.length === PLAIN.length) return plain;
  const substrate: SubstrateBranch = {
    oxideCapacitance: Math.exp(p[4]!),
    siliconResistance: Math.exp(p[5]!),
    siliconCapacitance: p.length === TWO_CURVES.length ? Math.exp(p[6]!) : 0,
  };
  return { ...plain, substrate };
}

function describe(
  { curves, frequencies, drive, reference }: Observations,
  { elements, logarithms, uncertainty }: Attempt,
  evaluations: number,
): CoilFit {
  const parameters = networkOf(logarithms, reference);
  let squares = 0;
  let largest = 0;
  let frequency = frequencies[0]!;
  let qualityError = 0;
  for (const [k, each] of frequencies.entries()) {
    const fitted = coilAdmittance(parameters, each, curves);
    const error = magnitude(subtract(fitted, drive[k]!)) / magnitude(drive[k]!);
    squares += error * error;
    if (error > largest) [largest, frequency] = [error, each];
    qualityError = Math.max(qualityError, Math.abs(qualityOf(fitted) - qualityOf(drive[k]!)));
  }
  return {
    status: "found",
    parameters,
    resistance: resistanceOf(logarithms, reference),
    uncertainty: Object.fromEntries(elements.map((name, k) => [name, uncertainty[k]!])),
    residual: { rms: Math.sqrt(squares / frequencies.length), largest, frequency },
    qualityError,
    range: { lowest: frequencies[0]!, highest: frequencies.at(-1)! },
    points: frequencies.length,
    evaluations,
  };
}

function qualityOf(admittance: Complex): number {
  const { re, im } = reciprocal(admittance);
  return im / re;
}
