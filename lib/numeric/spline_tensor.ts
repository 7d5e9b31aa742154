import type { SplineAxis } from "./spline_axis.ts";

/** Entries per quantity: the value and its three derivatives. */
const ENTRIES = 4;

/** Weights an axis writes. */
const WEIGHTS = 8;

/**
 * Several functions of three variables on a grid as one tensor product of splines: twice continuously
 * differentiable, through every grid value. A function of two variables has a third axis of one point.
 *
 * @see C. de Boor, A Practical Guide to Splines (Springer, 1978), ch. XVII
 */
export class TensorSpline {
  readonly axes: readonly [SplineAxis, SplineAxis, SplineAxis];
  /** Number of functions. */
  readonly quantities: number;
  readonly #coefficients: Float64Array;
  readonly #weights = [0, 1, 2].map(() => new Float64Array(WEIGHTS)) as [
    Float64Array,
    Float64Array,
    Float64Array,
  ];

  /**
   * @param axes the three axes
   * @param values shape (n0, n1, n2, quantities), row-major; copied
   * @throws {RangeError} when the number of values does not fit the axes
   */
  constructor(axes: readonly [SplineAxis, SplineAxis, SplineAxis], values: Float64Array) {
    const [n0, n1, n2] = axes.map(({ points }) => points.length) as [number, number, number];
    const quantities = values.length / (n0 * n1 * n2);
    if (!(Number.isInteger(quantities) && quantities > 0)) {
      throw new RangeError(
        `Cannot make a spline: expected a multiple of ${n0} x ${n1} x ${n2} values, got ${values.length}`,
      );
    }
    this.axes = axes;
    this.quantities = quantities;
    const coefficients = values.slice();
    axes[0].fit(coefficients, { columns: n1 * n2 * quantities });
    for (let i = 0; i < n0; i++) {
      axes[1].fit(coefficients, { columns: n2 * quantities, at: i * n1 * n2 * quantities });
    }
    for (let i = 0; i < n0 * n1; i++) {
      axes[2].fit(coefficients, { columns: quantities, at: i * n2 * quantities });
    }
    this.#coefficients = coefficients;
  }

  /**
   * Values and first derivatives at a place, which may lie outside the grid.
   *
   * @param x place on the first axis, in its unit [1]
   * @param y place on the second axis [1]
   * @param z place on the third axis [1]
   * @param out shape (quantities, 4), overwritten: value and its derivatives by x, y and z
   */
  evaluate(x: number, y: number, z: number, out: Float64Array): void {
    const [first, second, third] = this.axes;
    const [wx, wy, wz] = this.#weights;
    const i0 = first.locate(x, wx);
    const j0 = second.locate(y, wy);
    const k0 = third.locate(z, wz);
    const n1 = second.points.length;
    const n2 = third.points.length;
    const { order: orderX } = first;
    const { order: orderY } = second;
    const { order: orderZ } = third;
    const m = this.quantities;
    const coefficients = this.#coefficients;
    for (let e = 0; e < m * ENTRIES; e++) out[e] = 0;
    for (let i = 0; i < orderX; i++) {
      for (let j = 0; j < orderY; j++) {
        const start = (((i0 + i) * n1 + j0 + j) * n2 + k0) * m;
        const both = wx[i]! * wy[j]!;
        const byX = wx[4 + i]! * wy[j]!;
        const byY = wx[i]! * wy[4 + j]!;
        for (let q = 0; q < m; q++) {
          let value = 0;
          let slope = 0;
          for (let k = 0, at = start + q; k < orderZ; k++, at += m) {
            const c = coefficients[at]!;
            value += wz[k]! * c;
            slope += wz[4 + k]! * c;
          }
          const e = q * ENTRIES;
          out[e] = out[e]! + both * value;
          out[e + 1] = out[e + 1]! + byX * value;
          out[e + 2] = out[e + 2]! + byY * value;
          out[e + 3] = out[e + 3]! + both * slope;
        }
      }
    }
  }
}
