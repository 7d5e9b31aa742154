/**
 * Slopes and floor of a measured or simulated curve.
 *
 * @module
 */
import { nonNegativeLeastSquares } from "./_non_negative_least_squares.ts";
import { checkCurve, type PhaseNoiseCurve } from "./piecewise.ts";
import { flickerCorner, floorCorner, type PowerLaw, powerLawDensity } from "./power_law.ts";

/** A term of a power law that a fit may use. */
export type FitTerm = "inverseCube" | "inverseSquare" | "floor";

/** One point of a curve beside its fit. */
export interface FitPoint {
  /** [Hz] */
  readonly offset: number;
  /** L of the curve [dBc/Hz]. */
  readonly level: number;
  /** L of the fit [dBc/Hz]. */
  readonly fitted: number;
  /** Level minus fit [dB]. */
  readonly residual: number;
}

/** How well one term is seen by a curve. */
export interface FittedTerm {
  /** Which term. */
  readonly term: FitTerm;
  /** In the unit of the power law's term, 0 where the curve does not ask for it. */
  readonly coefficient: number;
  /**
   * Largest share of the term in the fit at any of the points [1]. Small: the curve says little about it.
   */
  readonly largestShare: number;
}

/** A power law that follows a curve. */
export interface CurveFit {
  /** The fit. */
  readonly law: PowerLaw;
  /** Its terms, in the order asked for. */
  readonly terms: readonly FittedTerm[];
  /** The curve beside its fit. */
  readonly points: readonly FitPoint[];
  /** rms residual, each decade of offset with the same weight [dB]. */
  readonly rms: number;
  /** The point farthest from the fit. */
  readonly worst: FitPoint;
  /** Where the 1/f^3 and the 1/f^2 term are equal; absent where one is zero [Hz]. */
  readonly flickerCorner?: number;
  /** Where the 1/f^2 term and the floor are equal; absent where one is zero [Hz]. */
  readonly floorCorner?: number;
  /** Steps taken. */
  readonly iterations: number;
  /** `stopped`: the most steps were taken before the residual came to rest. */
  readonly status: "found" | "stopped";
}

/** Options of {@linkcode fitCurve}. */
export interface FitCurveOptions {
  /**
   * Terms to fit.
   * @default 1/f^3, 1/f^2 and floor
   */
  readonly terms?: readonly FitTerm[];
}

const POWERS: Readonly<Record<FitTerm, number>> = { inverseCube: 3, inverseSquare: 2, floor: 0 };
const ALL: readonly FitTerm[] = ["inverseCube", "inverseSquare", "floor"];
/** Steps of the outer iteration; clean curves need three. */
const MOST_ITERATIONS = 60;
/** At rest: the mean square, in nepers, falls by less than this share of itself or of NOTHING. */
const AT_REST = 1e-12;
/** A mean square that is nothing: residuals of 1e-6. */
const NOTHING = 1e-12;
/** Halvings of a step that does not lower the sum of squares. */
const MOST_HALVINGS = 40;
/** Decibels in one natural logarithm of power. */
const DECIBELS = 10 / Math.LN10;

/**
 * Fits L = b3/f^3 + b2/f^2 + b0 with coefficients that are not negative.
 *
 * Least squares of the residual in dB, so that all levels count alike, each point weighted by the part of
 * the logarithmic axis that it stands for, so that a dense part of the sweep does not outweigh the rest.
 * Gauss-Newton, each step a non-negative least squares problem.
 *
 * @throws {TypeError} without a term, or with a term twice
 * @throws {RangeError} for fewer points than terms, or a curve that `checkCurve` refuses
 */
export function fitCurve(
  curve: PhaseNoiseCurve,
  { terms = ALL }: FitCurveOptions = {},
): CurveFit {
  checkCurve(curve);
  if (terms.length === 0 || new Set(terms).size < terms.length) {
    throw new TypeError(
      `Cannot fit the curve: expected one or more different terms, got [${terms.join(", ")}]`,
    );
  }
  if (curve.length < terms.length) {
    throw new RangeError(
      `Cannot fit the curve: ${terms.length} terms need at least ${terms.length} points, got ` +
        `${curve.length}`,
    );
  }
  const measured = curve.map(({ level }) => level / DECIBELS);
  const roots = axisShares(curve).map(Math.sqrt);
  // A column is 1 at the offset of its largest share of the curve, which keeps the numbers near 1.
  const columns = terms.map((term) => {
    const logs = curve.map(({ offset }, i) => -POWERS[term] * Math.log(offset) - measured[i]!);
    return { term, shift: Math.max(...logs), logs };
  });
  const matrix = columns.map(({ logs, shift }) => logs.map((each) => Math.exp(each - shift)));
  const ratiosOf = (weights: readonly number[]) =>
    curve.map((_, i) => weights.reduce((sum, weight, k) => sum + weight * matrix[k]![i]!, 0));
  const costOf = (weights: readonly number[]) =>
    ratiosOf(weights).reduce((sum, ratio, i) => sum + (roots[i]! * Math.log(ratio)) ** 2, 0);

  let weights: readonly number[] = nonNegativeLeastSquares(
    matrix.map((column) => column.map((value, i) => value * roots[i]!)),
    roots,
  );
  let cost = costOf(weights);
  let iterations = 1;
  let status: CurveFit["status"] = "stopped";
  for (; iterations < MOST_ITERATIONS && status === "stopped"; iterations++) {
    const ratios = ratiosOf(weights);
    const target = nonNegativeLeastSquares(
      matrix.map((column) => column.map((value, i) => value / ratios[i]! * roots[i]!)),
      ratios.map((ratio, i) => (1 - Math.log(ratio)) * roots[i]!),
    );
    const next = stepTowards(target, { weights, cost, costOf });
    if (!(cost - next.cost > AT_REST * Math.max(cost, NOTHING))) status = "found";
    ({ weights, cost } = next);
  }
  const law: { -readonly [term in FitTerm]?: number } = {};
  columns.forEach(({ term, shift }, k) => {
    law[term] = weights[k]! * Math.exp(-shift);
  });
  return { ...describe(curve, law, roots), iterations, status };
}

/** The better of `weights` and a step from them towards `target`, halved until it helps. */
function stepTowards(
  target: readonly number[],
  { weights, cost, costOf }: {
    readonly weights: readonly number[];
    readonly cost: number;
    readonly costOf: (weights: readonly number[]) => number;
  },
): { readonly weights: readonly number[]; readonly cost: number } {
  let share = 1;
  for (let halving = 0; halving < MOST_HALVINGS; halving++, share /= 2) {
    const tried = weights.map((weight, k) => weight + share * (target[k]! - weight));
    const triedCost = costOf(tried);
    if (triedCost < cost) return { weights: tried, cost: triedCost };
  }
  return { weights, cost };
}

/** Part of the logarithmic axis that each point stands for; the sum is 1. */
function axisShares(curve: PhaseNoiseCurve): number[] {
  const logs = curve.map(({ offset }) => Math.log(offset));
  const whole = logs.at(-1)! - logs[0]!;
  return logs.map((here, i) => ((logs[i + 1] ?? here) - (logs[i - 1] ?? here)) / (2 * whole));
}

function describe(
  curve: PhaseNoiseCurve,
  law: Readonly<Partial<Record<FitTerm, number>>>,
  roots: readonly number[],
): Omit<CurveFit, "iterations" | "status"> {
  const points = curve.map(({ offset, level }): FitPoint => {
    const fitted = 10 * Math.log10(powerLawDensity(law, offset));
    return { offset, level, fitted, residual: level - fitted };
  });
  const terms = (Object.keys(law) as FitTerm[]).map((term): FittedTerm => {
    const coefficient = law[term] ?? 0;
    const largestShare = Math.max(
      ...curve.map(({ offset }) =>
        coefficient / offset ** POWERS[term] / powerLawDensity(law, offset)
      ),
    );
    return { term, coefficient, largestShare };
  });
  const corner = flickerCorner(law);
  const floor = floorCorner(law);
  return {
    law,
    terms,
    points,
    rms: Math.sqrt(points.reduce((sum, { residual }, i) => sum + (roots[i]! * residual) ** 2, 0)),
    worst: points.reduce((a, b) => Math.abs(b.residual) > Math.abs(a.residual) ? b : a),
    ...(corner === undefined ? {} : { flickerCorner: corner }),
    ...(floor === undefined ? {} : { floorCorner: floor }),
  };
}
