import { Matrix, solve as referenceSolve } from "ml-matrix";
import { assert, assertClose, assertEquals } from "../../assert.ts";
import { factor, solve, solveTransposed } from "../../../lib/numeric/lu.ts";

/** Uniform numbers in [-1, 1) from a seed: a 32-bit linear congruential generator. */
function uniform(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 31 - 1;
  };
}

const SIZES = [1, 2, 3, 5, 8, 13, 24];
/** Rounding of elimination with partial pivoting on well-conditioned random matrices of these sizes. */
const ROUNDING = { rtol: 1e-10, atol: 1e-12 };

Deno.test("factor() gives factors whose product is the row-exchanged matrix", () => {
  const next = uniform(1);
  for (const n of SIZES) {
    const a = Float64Array.from({ length: n * n }, next);
    const lu = a.slice();
    const pivots = new Int32Array(n);
    assert(factor(lu, pivots, { n }));
    const exchanged = a.slice();
    pivots.forEach((p, k) => {
      const row = exchanged.slice(k * n, (k + 1) * n);
      exchanged.set(exchanged.slice(p * n, (p + 1) * n), k * n);
      exchanged.set(row, p * n);
    });
    const product = new Float64Array(n * n);
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < n; j++) {
        for (let k = 0; k <= Math.min(i, j); k++) {
          product[i * n + j]! += (k === i ? 1 : lu[i * n + k]!) * lu[k * n + j]!;
        }
        if (j < i) assert(Math.abs(lu[i * n + j]!) <= 1, "partial pivoting bounds the multipliers");
      }
    }
    assertClose(product, exchanged, { rtol: 0, atol: 1e-14 * n });
  }
});

Deno.test("solve() and solveTransposed() agree with ml-matrix, inside larger storage too", () => {
  const next = uniform(2);
  for (const n of SIZES) {
    const a = Float64Array.from({ length: n * n }, next);
    const columns = 3;
    const b = Float64Array.from({ length: n * columns }, next);
    const dense = Matrix.from1DArray(n, n, a);
    const right = Matrix.from1DArray(n, columns, b);
    const [at, pivotsAt, bAt] = [7, 3, 5];
    const storage = new Float64Array(at + n * n + 2).fill(NaN);
    storage.set(a, at);
    const pivots = new Int32Array(pivotsAt + n);
    assert(factor(storage, pivots, { n, at, pivotsAt }));
    const x = new Float64Array(bAt + n * columns + 1).fill(NaN);
    x.set(b, bAt);
    solve(storage, pivots, x, { n, columns, at, pivotsAt, bAt });
    assertClose(x.slice(bAt, -1), referenceSolve(dense, right).to1DArray(), ROUNDING);
    assertEquals(Array.from(x.slice(0, bAt)), Array(bAt).fill(NaN));
    assert(Number.isNaN(x.at(-1)!));
    const y = new Float64Array(bAt + n + 1).fill(NaN);
    y.set(b.subarray(0, n), bAt);
    solveTransposed(storage, pivots, y, { n, at, pivotsAt, bAt });
    const transposed = referenceSolve(
      dense.transpose(),
      Matrix.columnVector(Array.from(b.subarray(0, n))),
    );
    assertClose(y.slice(bAt, -1), transposed.to1DArray(), ROUNDING);
    assert(Number.isNaN(y.at(-1)!));
  }
});

Deno.test("solveTransposed() is the adjoint of solve(): u . A^-1 b = (A^-T u) . b", () => {
  const next = uniform(3);
  for (const n of SIZES) {
    const a = Float64Array.from({ length: n * n }, (_, k) => k % 3 === 1 ? 0 : next());
    for (let i = 0; i < n; i++) a[i * n + i]! += 2;
    const pivots = new Int32Array(n);
    assert(factor(a, pivots, { n }));
    const b = Float64Array.from({ length: n }, next);
    const u = Float64Array.from({ length: n }, next);
    const x = b.slice();
    const w = u.slice();
    solve(a, pivots, x, { n });
    solveTransposed(a, pivots, w, { n });
    const dot = (p: Float64Array, q: Float64Array) => p.reduce((s, v, i) => s + v * q[i]!, 0);
    assertClose(dot(u, x), dot(w, b), { rtol: 1e-11, atol: 1e-13 });
  }
});

Deno.test("factor() refuses singular matrices and values that are not finite", () => {
  const pivots = new Int32Array(2);
  for (const a of [[1, 2, 2, 4], [0, 0, 0, 1], [NaN, 1, 1, 1], [Infinity, 1, 1, 1]]) {
    assertEquals(factor(Float64Array.from(a), pivots, { n: 2 }), false);
  }
  // A zero in the corner is only a matter of order.
  assertEquals(factor(Float64Array.of(0, 1, 1, 0), pivots, { n: 2 }), true);
});
