import { assert, assertClose, assertThrows } from "../../assert.ts";
import { SplineAxis } from "../../../lib/numeric/spline_axis.ts";
import { TensorSpline } from "../../../lib/numeric/spline_tensor.ts";

const X = [-1, 0, 0.3, 1, 2];
const Y = [0, 0.5, 1, 1.7];
const Z = [-0.5, 0, 1];

const f = (x: number, y: number, z: number) => (x ** 3 - x) * (1 + y ** 3) * (2 - z ** 2) + y * z;
const g = (x: number, y: number, z: number) => 1 + x * y * z;

function spline(): TensorSpline {
  const values: number[] = [];
  for (const x of X) for (const y of Y) for (const z of Z) values.push(f(x, y, z), g(x, y, z));
  return new TensorSpline(
    [new SplineAxis(X), new SplineAxis(Y), new SplineAxis(Z)],
    Float64Array.from(values),
  );
}

Deno.test("TensorSpline reproduces products of cubics and a parabola with all derivatives", () => {
  const tensor = spline();
  const out = new Float64Array(8);
  for (let k = 0; k < 60; k++) {
    const [x, y, z] = [
      -1 + 3 * k / 59,
      1.7 * ((7 * k) % 60) / 60,
      -0.5 + 1.5 * ((11 * k) % 60) / 60,
    ];
    tensor.evaluate(x, y, z, out);
    const expected = [
      f(x, y, z),
      (3 * x * x - 1) * (1 + y ** 3) * (2 - z * z),
      (x ** 3 - x) * 3 * y * y * (2 - z * z) + z,
      (x ** 3 - x) * (1 + y ** 3) * -2 * z + y,
      g(x, y, z),
      y * z,
      x * z,
      x * y,
    ];
    assertClose(out, expected, { rtol: 1e-11, atol: 1e-11 });
  }
});

Deno.test("TensorSpline with one point on the third axis does not depend on it", () => {
  const values = X.flatMap((x) => Y.map((y) => f(x, y, 0)));
  const tensor = new TensorSpline(
    [new SplineAxis(X), new SplineAxis(Y), new SplineAxis([0])],
    Float64Array.from(values),
  );
  const out = new Float64Array(4);
  tensor.evaluate(0.7, 0.9, 3, out);
  assertClose(out[0]!, f(0.7, 0.9, 0), { rtol: 1e-12, atol: 0 });
  assert(out[3] === 0);
});

Deno.test("TensorSpline refuses values that do not fill the grid", () => {
  assertThrows(
    () =>
      new TensorSpline(
        [new SplineAxis(X), new SplineAxis(Y), new SplineAxis(Z)],
        new Float64Array(61),
      ),
    RangeError,
    /expected a multiple of 5 x 4 x 3 values, got 61/,
  );
});
