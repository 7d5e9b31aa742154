import { assert, assertClose, assertThrows } from "../../assert.ts";
import { SplineAxis } from "../../../lib/numeric/spline_axis.ts";

const UNEVEN = [-1, -0.7, -0.5, 0, 0.4, 0.45, 1.1, 2];

/** Value and slope of the spline through f at the points. */
function interpolant(f: (x: number) => number, points: ArrayLike<number>) {
  const axis = new SplineAxis(points);
  const coefficients = Float64Array.from(points, f);
  axis.fit(coefficients, { columns: 1 });
  const weights = new Float64Array(8);
  return (x: number) => {
    const first = axis.locate(x, weights);
    let value = 0;
    let slope = 0;
    for (let j = 0; j < axis.order; j++) {
      value += weights[j]! * coefficients[first + j]!;
      slope += weights[4 + j]! * coefficients[first + j]!;
    }
    return { value, slope };
  };
}

function even(count: number, from = 0, to = 1): number[] {
  return Array.from({ length: count }, (_, i) => from + (to - from) * i / (count - 1));
}

Deno.test("SplineAxis passes through its values and reproduces cubics with their slope", () => {
  const cubic = (x: number) => 2 - x + 3 * x ** 2 - 1.5 * x ** 3;
  const spline = interpolant(cubic, UNEVEN);
  for (let x = -1; x <= 2; x += 0.0137) {
    const { value, slope } = spline(x);
    assertClose([value, slope], [cubic(x), -1 + 6 * x - 4.5 * x ** 2], {
      rtol: 1e-12,
      atol: 1e-12,
    });
  }
  const rough = interpolant((x) => Math.abs(x), UNEVEN);
  for (const x of UNEVEN) assertClose(rough(x).value, Math.abs(x), { rtol: 0, atol: 1e-14 });
});

Deno.test("SplineAxis errs by the fourth power of the spacing, its slope by the third", () => {
  const errors = [17, 33, 65].map((count) => {
    const spline = interpolant((x) => Math.exp(Math.sin(5 * x)), even(count));
    let [value, slope] = [0, 0];
    for (let x = 0; x <= 1; x += 0.00131) {
      const exact = Math.exp(Math.sin(5 * x));
      const found = spline(x);
      value = Math.max(value, Math.abs(found.value - exact));
      slope = Math.max(slope, Math.abs(found.slope - 5 * Math.cos(5 * x) * exact));
    }
    return { value, slope };
  });
  for (let k = 1; k < errors.length; k++) {
    // Theory: 16 and 8 at each halving; the coarse grids are not yet in the limit.
    assert(errors[k - 1]!.value / errors[k]!.value > 12, `${JSON.stringify(errors)}`);
    assert(errors[k - 1]!.slope / errors[k]!.slope > 6, `${JSON.stringify(errors)}`);
  }
});

Deno.test("SplineAxis is twice continuously differentiable at every point, the ends included", () => {
  const spline = interpolant((x) => Math.sin(4 * x), UNEVEN);
  const d = 1e-5;
  for (const x of UNEVEN) {
    const [before, at, after] = [x - d, x, x + d].map(spline) as [
      { value: number; slope: number },
      { value: number; slope: number },
      { value: number; slope: number },
    ];
    // Trapezoid of the slopes: d^3 times the third derivative, up to 1e3 here, is left of the value.
    assertClose(after.value - at.value, d * (at.slope + after.slope) / 2, { rtol: 0, atol: 1e-12 });
    assertClose(at.value - before.value, d * (at.slope + before.slope) / 2, {
      rtol: 0,
      atol: 1e-12,
    });
    const [left, right] = [(at.slope - before.slope) / d, (after.slope - at.slope) / d];
    // A jump of the curvature, 16 in size, would stay; the third derivative leaves 1e3 d.
    assertClose(right, left, { rtol: 0, atol: 2e-2 });
  }
});

Deno.test("SplineAxis goes on with slope and curvature and is a line far outside", () => {
  const spline = interpolant((x) => Math.exp(x), UNEVEN);
  for (const [far, further] of [[9, 10], [-9, -10]] as const) {
    assertClose(spline(far).slope, spline(further).slope, { rtol: 1e-2, atol: 1e-6 });
  }
  const [near, end] = [spline(2.01), spline(2)];
  assertClose(near.value, end.value + 0.01 * end.slope + 0.5e-4 * Math.exp(2), {
    rtol: 0,
    atol: 1e-4,
  });
});

Deno.test("SplineAxis of one, two and three points is a constant, a line and a parabola", () => {
  assert(interpolant(() => 7, [0.3])(5).value === 7);
  assertClose(interpolant((x) => 2 * x, [0, 1])(0.3).value, 0.6, { rtol: 1e-14, atol: 0 });
  assertClose(interpolant((x) => x * x, [0, 1, 3])(2).value, 4, { rtol: 1e-14, atol: 0 });
});

Deno.test("SplineAxis refuses points that do not rise", () => {
  assertThrows(() => new SplineAxis([0, 1, 1]), RangeError, /strictly rising, got 1 after 1/);
  assertThrows(() => new SplineAxis([0, NaN]), RangeError, /finite and strictly rising/);
  assertThrows(() => new SplineAxis([]), RangeError, /there must be a point/);
});
