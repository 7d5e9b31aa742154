/**
 * Order conditions of Gauss methods: J. Butcher, Math. Comp. 18 (1964) 50; E. Hairer, C. Lubich, G. Wanner,
 * Geometric Numerical Integration, 2nd ed. (2006), II.1.3 and IV.2.
 */
import { assert, assertClose, assertThrows } from "../../assert.ts";
import {
  gaussLegendre,
  gaussMethod,
  lagrangeBasis,
  lagrangeIntegrals,
} from "../../../lib/numeric/gauss.ts";

const STAGES = [1, 2, 3, 4, 5, 6, 7, 8];
const ROUNDING = { rtol: 1e-13, atol: 1e-14 };

Deno.test("gaussLegendre() gives the nodes and weights known in closed form", () => {
  const two = gaussLegendre(2);
  assertClose(two.nodes, [0.5 - Math.sqrt(3) / 6, 0.5 + Math.sqrt(3) / 6], ROUNDING);
  assertClose(two.weights, [0.5, 0.5], ROUNDING);
  const three = gaussLegendre(3);
  assertClose(three.nodes, [0.5 - Math.sqrt(15) / 10, 0.5, 0.5 + Math.sqrt(15) / 10], ROUNDING);
  assertClose(three.weights, [5 / 18, 4 / 9, 5 / 18], ROUNDING);
});

Deno.test("gaussLegendre() integrates powers up to 2 s - 1 and no further", () => {
  for (const s of [...STAGES, 16, 20]) {
    const { nodes, weights } = gaussLegendre(s);
    const integral = (power: number) =>
      nodes.reduce((sum, node, k) => sum + weights[k]! * node ** power, 0);
    for (let power = 0; power < 2 * s; power++) {
      assertClose(integral(power), 1 / (power + 1), ROUNDING);
    }
    if (s <= 8) assert(Math.abs(integral(2 * s) - 1 / (2 * s + 1)) > 1e-12);
    for (let k = 0; k < s; k++) {
      assertClose(nodes[k]! + nodes[s - 1 - k]!, 1, ROUNDING);
      assert(weights[k]! > 0);
    }
  }
});

Deno.test("gaussMethod() meets the simplifying conditions B(2s), C(s), D(s) and is symplectic", () => {
  for (const s of STAGES) {
    const { nodes: c, weights: b, matrix } = gaussMethod(s);
    const a = (i: number, j: number) => matrix[i * s + j]!;
    for (let power = 1; power <= s; power++) {
      for (let i = 0; i < s; i++) {
        let rows = 0;
        let columns = 0;
        for (let j = 0; j < s; j++) {
          rows += a(i, j) * c[j]! ** (power - 1);
          columns += b[j]! * c[j]! ** (power - 1) * a(j, i);
        }
        assertClose(rows, c[i]! ** power / power, { ...ROUNDING, what: `C, ${s} stages` });
        assertClose(columns, b[i]! * (1 - c[i]! ** power) / power, {
          ...ROUNDING,
          what: `D, ${s} stages`,
        });
      }
    }
    for (let i = 0; i < s; i++) {
      for (let j = 0; j < s; j++) {
        assertClose(b[i]! * a(i, j) + b[j]! * a(j, i), b[i]! * b[j]!, ROUNDING);
      }
    }
  }
});

Deno.test("lagrangeBasis() is one at its own node and reproduces polynomials", () => {
  const nodes = [-0.3, 0.1, 0.9, 2];
  nodes.forEach((node, k) => {
    assertClose(lagrangeBasis(nodes, node), nodes.map((_, j) => j === k ? 1 : 0), ROUNDING);
  });
  const polynomial = (x: number) => 2 - x + 3 * x ** 3;
  for (const x of [-1, 0.4, 3]) {
    const basis = lagrangeBasis(nodes, x);
    const value = nodes.reduce((sum, node, k) => sum + basis[k]! * polynomial(node), 0);
    assertClose(value, polynomial(x), { rtol: 1e-12, atol: 1e-13 });
  }
});

Deno.test("lagrangeIntegrals() integrates polynomials through the nodes exactly", () => {
  for (const nodes of [[0.2, 0.7], [-4, -3, -2, -1, 0, 1, 2, 3, 4, 5], [0, 0.1, 0.5, 1, 1.7]]) {
    for (const [from, to] of [[0, 1], [-0.5, 0.25], [1, 0]] as const) {
      const integrals = lagrangeIntegrals(nodes, { from, to });
      for (let power = 0; power < nodes.length; power++) {
        const value = nodes.reduce((sum, node, k) => sum + integrals[k]! * node ** power, 0);
        const exact = (to ** (power + 1) - from ** (power + 1)) / (power + 1);
        // Ten nodes up to 5 apart: 5^9 of rounding.
        assertClose(value, exact, { rtol: 1e-9, atol: 1e-9 });
      }
    }
  }
});

Deno.test("gaussMethod() and gaussLegendre() refuse counts that make no rule", () => {
  for (const stages of [0, 9, 2.5, NaN]) {
    assertThrows(
      () => gaussMethod(stages),
      RangeError,
      /^Cannot build a Gauss method: stages must be an integer from 1 to 8, got /,
    );
  }
  for (const count of [0, 1.5, NaN]) {
    assertThrows(() => gaussLegendre(count), RangeError, /count must be an integer >= 1, got /);
  }
});
