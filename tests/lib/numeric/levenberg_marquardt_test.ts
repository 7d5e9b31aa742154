import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { levenbergMarquardt } from "../../../lib/numeric/levenberg_marquardt.ts";

Deno.test("levenbergMarquardt meets the certified values of the Misra1a data set", () => {
  // NIST Statistical Reference Datasets, nonlinear regression, Misra1a: y = b1 (1 - exp(-b2 x)) (data from
  // memory; the certified sum of squares confirms them).
  // deno-fmt-ignore
  const x = [77.6, 114.9, 141.1, 190.8, 239.9, 289.0, 332.8, 378.4, 434.8, 477.3, 536.8, 593.1, 689.1, 760.0];
  // deno-fmt-ignore
  const y = [10.07, 14.73, 17.94, 23.93, 29.61, 35.18, 40.02, 44.82, 50.76, 55.05, 61.01, 66.40, 75.47, 81.78];
  // Logarithms of the parameters, from both of the set's starts.
  for (const start of [[500, 1e-4], [250, 5e-4]]) {
    const fit = levenbergMarquardt(
      (p, out) => {
        const [b1, b2] = [Math.exp(p[0]!), Math.exp(p[1]!)];
        x.forEach((at, k) => out[k] = b1 * (1 - Math.exp(-b2 * at)) - y[k]!);
      },
      start.map(Math.log),
      { count: x.length },
    );
    assertEquals(fit.status, "found");
    const certified = [2.3894212918e2, 5.5015643181e-4];
    // The certificate has 11 digits; central differences of 6e-6 leave the minimum good to 1e-8.
    assertClose(fit.parameters.map(Math.exp), certified, { rtol: 1e-8, atol: 0 });
    assertClose(fit.sumOfSquares, 1.2455138894e-1, { rtol: 1e-10, atol: 0 });
    const variance = fit.sumOfSquares / (x.length - 2);
    const deviations = certified.map((value, k) =>
      value * Math.sqrt(variance * fit.inverseCurvature![3 * k]!)
    );
    assertClose(deviations, [2.7070075241, 7.2668688436e-6], { rtol: 1e-5, atol: 0 });
  }
});

Deno.test("levenbergMarquardt goes round the bend of Rosenbrock's valley", () => {
  const fit = levenbergMarquardt(
    (p, out) => {
      out[0] = 10 * (p[1]! - p[0]! ** 2);
      out[1] = 1 - p[0]!;
    },
    [-1.2, 1],
    { count: 2 },
  );
  assertEquals(fit.status, "found");
  assertClose(fit.parameters, [1, 1], { rtol: 1e-9, atol: 0 });
  assert(fit.evaluations < 300, `${fit.evaluations} evaluations`);
});

Deno.test("levenbergMarquardt says when the iterations run out", () => {
  const fit = levenbergMarquardt(
    (p, out) => {
      out[0] = 10 * (p[1]! - p[0]! ** 2);
      out[1] = 1 - p[0]!;
    },
    [-1.2, 1],
    { count: 2, iterations: 3 },
  );
  assertEquals([fit.status, fit.iterations], ["not settled", 3]);
});

Deno.test("levenbergMarquardt steps back from where the residuals are not finite", () => {
  const fit = levenbergMarquardt(
    (p, out) => {
      out[0] = Math.sqrt(p[0]!) - 0.001;
    },
    [0.25],
    { count: 1 },
  );
  assert(fit.parameters[0]! > 0);
  assertClose(fit.parameters[0]!, 1e-6, { rtol: 0, atol: 1e-5 });
});

Deno.test("levenbergMarquardt leaves a parameter alone that has no effect, and says it is free", () => {
  const fit = levenbergMarquardt(
    (p, out) => {
      out[0] = p[0]! - 3;
      out[1] = 2 * (p[0]! - 3);
    },
    [1, 7],
    { count: 2 },
  );
  assertEquals(fit.status, "found");
  assertClose(fit.parameters, [3, 7], { rtol: 1e-9, atol: 0 });
  assertEquals(fit.inverseCurvature, undefined);
});

Deno.test("levenbergMarquardt refuses too few residuals and a start outside", () => {
  assertThrows(
    () => levenbergMarquardt(() => {}, [1, 2], { count: 1 }),
    RangeError,
    /residuals must be at least as many as parameters, 2, got 1$/,
  );
  assertThrows(
    () => levenbergMarquardt((_, out) => out[0] = NaN, [1], { count: 1 }),
    RangeError,
    /the residuals at the start must be finite, got a sum of NaN$/,
  );
});
