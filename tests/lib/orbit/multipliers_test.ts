import { assertClose, assertEquals } from "../../assert.ts";
import { multipliersOf, multiplierValue } from "../../../lib/orbit/multipliers.ts";
import { EigenvalueDecomposition, Matrix } from "ml-matrix";
import { brusselator, fitzHughNagumo, orbitOf, repressilator, rossler } from "./_systems.ts";

/** Uniform numbers in [-1, 1) from a seed. */
function uniform(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 31 - 1;
  };
}

Deno.test("multipliersOf() gives the eigenvalues of a plain product", () => {
  const next = uniform(4);
  for (const r of [2, 3, 5]) {
    const steps = 7;
    const maps = Float64Array.from({ length: steps * r * r }, next);
    let product = Matrix.eye(r, r);
    for (let k = 0; k < steps; k++) {
      product = Matrix.from1DArray(r, r, maps.slice(k * r * r, (k + 1) * r * r)).mmul(product);
    }
    const { realEigenvalues, imaginaryEigenvalues } = new EigenvalueDecomposition(product);
    const expected = realEigenvalues.map((re, k) => ({ re, im: imaginaryEigenvalues[k]! }))
      .sort((a, b) => Math.hypot(b.re, b.im) - Math.hypot(a.re, a.im) || b.im - a.im);
    const found = multipliersOf(maps, r).map(multiplierValue);
    const size = Math.hypot(expected[0]!.re, expected[0]!.im);
    // A well-conditioned product of seven: rounding against the largest.
    assertClose(found.map(({ re }) => re), expected.map(({ re }) => re), {
      rtol: 0,
      atol: 1e-11 * size,
    });
    assertClose(found.map(({ im }) => im), expected.map(({ im }) => im), {
      rtol: 0,
      atol: 1e-11 * size,
    });
  }
});

Deno.test("multipliersOf() keeps multipliers far below machine epsilon, and below the smallest number", () => {
  const next = uniform(5);
  const r = 3;
  const steps = 60;
  // Maps X[k+1] D X[k]^-1 with X periodic have the product X D^steps X^-1.
  const turn = () => {
    const matrix = Matrix.eye(r, r);
    for (let i = 0; i < r; i++) {
      for (let j = 0; j < r; j++) matrix.set(i, j, matrix.get(i, j) + 0.2 * next());
    }
    return matrix;
  };
  const bases = Array.from({ length: steps }, turn);
  const diagonal = Matrix.diag([1, 0.01, 1e-7]);
  const maps = new Float64Array(steps * r * r);
  for (let k = 0; k < steps; k++) {
    const { determinant, inverse } = cofactors(bases[k]!);
    const map = bases[(k + 1) % steps]!.mmul(diagonal).mmul(inverse).div(determinant);
    maps.set(map.to1DArray(), k * r * r);
  }
  const found = multipliersOf(maps, r);
  const expected = [0, steps * Math.log(0.01), steps * Math.log(1e-7)];
  // Sixty steps each right to rounding over the smallest factor, 1e-16/1e-7.
  assertClose(found.map(({ logModulus }) => logModulus), expected, { rtol: 1e-9, atol: 1e-11 });
  // e^-967 is no number any more, and that is said by zero.
  assertEquals(multiplierValue(found[2]!).re, 0);
});

function cofactors(m: Matrix): { determinant: number; inverse: Matrix } {
  const e = (i: number, j: number) => m.get(i % 3, j % 3);
  const inverse = new Matrix(3, 3);
  for (let i = 0; i < 3; i++) {
    for (let j = 0; j < 3; j++) {
      inverse.set(
        j,
        i,
        e(i + 1, j + 1) * e(i + 2, j + 2) - e(i + 1, j + 2) * e(i + 2, j + 1),
      );
    }
  }
  const determinant = e(0, 0) * inverse.get(0, 0) + e(0, 1) * inverse.get(1, 0) +
    e(0, 2) * inverse.get(2, 0);
  return { determinant, inverse };
}

Deno.test("multipliersOf() finds a complex pair far below the first multiplier", () => {
  const steps = 40;
  const maps = new Float64Array(steps * 9);
  const [c, s] = [0.3 * Math.cos(0.1), 0.3 * Math.sin(0.1)];
  for (let k = 0; k < steps; k++) maps.set([1, 0.2, 0.1, 0, c, -s, 0, s, c], k * 9);
  const [first, second, third] = multipliersOf(maps, 3);
  assertClose(first!.logModulus, 0, { rtol: 0, atol: 1e-12 });
  assertClose(
    [second!.logModulus, third!.logModulus],
    [1, 1].map((v) => v * steps * Math.log(0.3)),
    {
      rtol: 1e-11,
      atol: 0,
    },
  );
  const angle = steps * 0.1 - 2 * Math.PI;
  assertClose([second!.argument, third!.argument], [-angle, angle], { rtol: 1e-9, atol: 0 });
});

Deno.test("multipliers: their product is exp of the integral of the trace (Liouville)", () => {
  const cases = [
    brusselator(),
    fitzHughNagumo(),
    repressilator(),
    rossler({ a: 0.2, b: 0.2, c: 2.5 }),
  ];
  for (const { system, start } of cases) {
    const n = system.dimension;
    const orbit = orbitOf(system, { start, tolerance: 1e-11, stages: 4, steps: 600 });
    const values = {
      q: new Float64Array(n),
      f: new Float64Array(n),
      C: new Float64Array(n * n),
      G: new Float64Array(n * n),
    };
    const trace = orbit.mean((x) => {
      system.evaluate(x, values);
      let sum = 0;
      for (let i = 0; i < n; i++) sum -= values.G[i * n + i]!;
      return sum;
    });
    const sum = orbit.exponents.reduce((total, { re }) => total + re, 0);
    // The tolerance speaks of the period; this mesh resolves the contraction as well (e^-38 over a period
    // for FitzHugh-Nagumo).
    assertClose(sum, trace, { rtol: 1e-9, atol: 0 });
    assertClose(orbit.exponents[0]!.re, 0, { rtol: 0, atol: 1e-8 / orbit.period });
    assertEquals(orbit.multipliers.length, n);
  }
});
