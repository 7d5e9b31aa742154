import { factor, solve } from "./lu.ts";

/** Coefficients per piece: cubic. */
const ORDER = 4;

/**
 * One axis of a spline on given points: the weights of the coefficients at any place, and the coefficients
 * of given values.
 *
 * Cubic B-splines with the third derivative continuous at the second and the last but one point (not a
 * knot): twice continuously differentiable, error of fourth order in the spacing, cubics reproduced. Three
 * points give a parabola, two a line, one a constant. Outside the points the value goes on with the slope
 * and the curvature of the end, the curvature fading as e^(-s/h) over the outermost spacing h: twice
 * continuously differentiable there too, and a straight line far out.
 *
 * @see C. de Boor, A Practical Guide to Splines (Springer, 1978), ch. IV and X
 */
export class SplineAxis {
  /** Strictly rising. */
  readonly points: Float64Array;
  /** Coefficients that count at any one place: 4 for a cubic. */
  readonly order: number;
  readonly #breaks: Float64Array;
  /** Shape (pieces, order, order): polynomials in the place inside the piece, 0 to 1, lowest power first. */
  readonly #pieces: Float64Array;
  readonly #collocation: Float64Array;
  readonly #pivots: Int32Array;

  /** @throws {RangeError} when the points are not finite and strictly rising */
  constructor(points: ArrayLike<number>) {
    const n = points.length;
    if (!(n > 0)) throw new RangeError("Cannot make a spline: there must be a point, got none");
    for (let i = 0; i < n; i++) {
      const rises = i === 0 || points[i]! > points[i - 1]!;
      if (Number.isFinite(points[i]!) && rises) continue;
      throw new RangeError(
        `Cannot make a spline: points must be finite and strictly rising, got ${points[i]} after ${
          points[i - 1] ?? "nothing"
        }`,
      );
    }
    this.points = Float64Array.from(points);
    this.order = Math.min(ORDER, n);
    const { order } = this;
    // Not a knot: the second and the last but one point of a cubic do not divide pieces.
    const inner = n > ORDER ? this.points.slice(2, n - 2) : new Float64Array(0);
    this.#breaks = Float64Array.from([points[0]!, ...inner, points[n - 1]!]);
    const knots = [
      ...new Array<number>(order).fill(points[0]!),
      ...inner,
      ...new Array<number>(order).fill(points[n - 1]!),
    ];
    const pieces = this.#breaks.length - 1;
    this.#pieces = new Float64Array(pieces * order * order);
    for (let p = 0; p < pieces; p++) {
      basisPolynomials(knots, { piece: p, order }).forEach((polynomial, j) =>
        this.#pieces.set(polynomial, (p * order + j) * order)
      );
    }
    this.#collocation = new Float64Array(n * n);
    this.#pivots = new Int32Array(n);
    const weights = new Float64Array(2 * ORDER);
    for (let i = 0; i < n; i++) {
      const first = this.locate(points[i]!, weights);
      for (let j = 0; j < order; j++) this.#collocation[i * n + first + j] = weights[j]!;
    }
    if (!factor(this.#collocation, this.#pivots, { n })) {
      throw new RangeError("Cannot make a spline: two points are too close to tell apart");
    }
  }

  /**
   * Weights of the coefficients at a place.
   *
   * @param x place; any finite number
   * @param weights shape (8,), overwritten: weights of the value at 0 to 3 and of its derivative at 4 to 7
   * @returns index of the first of the `order` coefficients that count
   */
  locate(x: number, weights: Float64Array): number {
    const { order, points } = this;
    const breaks = this.#breaks;
    const last = points.length - 1;
    if (last === 0) {
      weights[0] = 1;
      weights[ORDER] = 0;
      return 0;
    }
    const edge = x < points[0]! ? points[0]! : x > points[last]! ? points[last]! : x;
    let low = 0;
    let high = breaks.length - 1;
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if (breaks[middle]! <= edge) low = middle;
      else high = middle;
    }
    const length = breaks[low + 1]! - breaks[low]!;
    const u = (edge - breaks[low]!) / length;
    const beyond = x - edge;
    // Outside: value + slope s + curvature F(s), F'' = e^(-|s|/h).
    let bend = 0;
    let bendSlope = 0;
    if (beyond !== 0) {
      const h = beyond > 0 ? points[last]! - points[last - 1]! : points[1]! - points[0]!;
      const distance = Math.abs(beyond);
      const gone = -Math.expm1(-distance / h);
      bend = h * (distance - h * gone);
      bendSlope = Math.sign(beyond) * h * gone;
    }
    const pieces = this.#pieces;
    for (let j = 0; j < order; j++) {
      const at = (low * order + j) * order;
      let value = 0;
      let slope = 0;
      let half = 0;
      for (let k = order - 1; k >= 0; k--) {
        half = half * u + slope;
        slope = slope * u + value;
        value = value * u + pieces[at + k]!;
      }
      slope /= length;
      if (beyond !== 0) {
        const curvature = 2 * half / (length * length);
        value += slope * beyond + curvature * bend;
        slope += curvature * bendSlope;
      }
      weights[j] = value;
      weights[ORDER + j] = slope;
    }
    return low;
  }

  /**
   * Turns values at the points into coefficients, in place, for `columns` functions at once.
   *
   * @param values shape (points, columns) row-major from index `at`, overwritten
   */
  fit(values: Float64Array, { columns, at = 0 }: { columns: number; at?: number }): void {
    const n = this.points.length;
    solve(this.#collocation, this.#pivots, values, { n, columns, bAt: at });
  }
}

/**
 * The B-splines that are not zero on one piece between two different knots, as polynomials in
 * u = (x - left)/(right - left), by the recurrence of Cox and de Boor.
 */
function basisPolynomials(
  knots: readonly number[],
  { piece, order }: { readonly piece: number; readonly order: number },
): number[][] {
  const m = order - 1 + piece;
  const left = knots[m]!;
  const length = knots[m + 1]! - left;
  let basis: number[][] = [[1]];
  for (let k = 2; k <= order; k++) {
    const next = Array.from({ length: k }, () => new Array<number>(k).fill(0));
    basis.forEach((polynomial, j) => {
      // B-spline number m - k + 2 + j of the order before rises over its own support...
      const start = knots[m - k + 2 + j]!;
      const end = knots[m + 1 + j]!;
      const span = end - start;
      polynomial.forEach((c, power) => {
        // ... times (x - start)/span into the next one, times (end - x)/span into the one before.
        next[j + 1]![power]! += c * (left - start) / span;
        next[j + 1]![power + 1]! += c * length / span;
        next[j]![power]! += c * (end - left) / span;
        next[j]![power + 1]! -= c * length / span;
      });
    });
    basis = next;
  }
  return basis.map((polynomial) => [
    ...polynomial,
    ...new Array<number>(order - polynomial.length).fill(0),
  ]);
}
