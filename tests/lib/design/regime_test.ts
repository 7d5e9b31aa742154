import { assert, assertClose, assertEquals } from "../../assert.ts";
import {
  KNEE_EXPONENT,
  kneeCurrent,
  localExponents,
  regimeOf,
} from "../../../lib/design/regime.ts";

/** Exponents that must all be there. */
function exponentsOf(x: readonly number[], y: readonly number[]): number[] {
  return localExponents(x, y).map((exponent) => {
    assert(exponent !== undefined, "an exponent is missing");
    return exponent;
  });
}

Deno.test("regimeOf: the stated rule, edge by edge", () => {
  assertEquals(KNEE_EXPONENT, 0.5);
  const of = (exponent: number | undefined, starts = true, kneeExponent?: number) =>
    regimeOf({ starts, exponent, ...(kneeExponent === undefined ? {} : { kneeExponent }) });
  assertEquals(of(undefined), "does not start");
  assertEquals(of(undefined, false), "does not start");
  assertEquals(of(1, false), "sustains but does not start");
  assertEquals(of(0.1, false), "sustains but does not start");
  assertEquals(of(1.05), "current-limited");
  assertEquals(of(0.651), "current-limited");
  assertEquals(of(0.649), "at the knee");
  assertEquals(of(0.5), "at the knee");
  assertEquals(of(0.351), "at the knee");
  assertEquals(of(0.349), "voltage-limited");
  assertEquals(of(-0.2), "voltage-limited");
  // The lead may put the knee elsewhere.
  assertEquals(of(0.5, true, 0.3), "current-limited");
  assertEquals(of(0.5, true, 0.7), "voltage-limited");
});

Deno.test("localExponents: exact on power laws, uneven points and all", () => {
  const x = [1e-4, 1.3e-4, 2e-4, 5e-4, 5.5e-4, 4e-3];
  for (const power of [-2, 0.5, 1, 3]) {
    const y = x.map((value) => 7e3 * value ** power);
    assertClose(exponentsOf(x, y), x.map(() => power), { rtol: 1e-11, atol: 0 });
  }
  assertClose(exponentsOf(x, x.map(() => 2)), x.map(() => 0), { rtol: 0, atol: 1e-11 });
});

Deno.test("localExponents: exact on a parabola in the logarithms, ends included", () => {
  const x = [1, 2, 3, 7, 8, 20];
  const y = x.map((value) => Math.exp(1.5 * Math.log(value) - 0.4 * Math.log(value) ** 2));
  const slopes = x.map((value) => 1.5 - 0.8 * Math.log(value));
  assertClose(exponentsOf(x, y), slopes, { rtol: 0, atol: 1e-12 });
});

Deno.test("localExponents: second order on a curve that is neither", () => {
  const errors = [10, 20, 40].map((count) => {
    const x = Array.from({ length: count + 1 }, (_, k) => 10 ** (k / count));
    const found = exponentsOf(x, x.map((value) => Math.tanh(value / 3)));
    const exact = x.map((value) => value / 3 / Math.sinh(value / 3) / Math.cosh(value / 3));
    return Math.max(...found.map((value, k) => Math.abs(value - exact[k]!)).slice(1, -1));
  });
  const order = Math.log2(errors[0]! / errors[2]!) / 2;
  assert(Math.abs(order - 2) < 0.3, `order ${order}, errors ${errors.join(", ")}`);
});

Deno.test("localExponents: the chord of two points, none of one", () => {
  assertClose(exponentsOf([1, 4], [3, 12]), [1, 1], { rtol: 1e-14, atol: 0 });
  assertEquals(localExponents([1], [2]), [undefined]);
  assertEquals(localExponents([], []), []);
});

Deno.test("kneeCurrent: interpolates in the logarithm of the current", () => {
  // Exponents linear in ln I: 1 - ln(I / 1 mA) / 2, one half at e mA.
  const currents = [0.5e-3, 1e-3, 2e-3, 4e-3, 9e-3];
  const exponents = currents.map((current) => 1 - Math.log(current / 1e-3) / 2);
  assertClose(kneeCurrent(currents, exponents)!, Math.E * 1e-3, { rtol: 1e-12, atol: 0 });
  assertClose(kneeCurrent(currents, exponents, { kneeExponent: 0.9 })!, Math.exp(0.2) * 1e-3, {
    rtol: 1e-12,
    atol: 0,
  });
});

Deno.test("kneeCurrent: the first fall counts, and a point on it is it", () => {
  const exponents = [1, 0.6, 0.4, 0.7, 0.3];
  const found = kneeCurrent([1, 2, 3, 4, 5], exponents)!;
  assert(found > 2 && found < 3, `${found}`);
  assertClose(kneeCurrent([1, 2, 3], [1, 0.5, 0.2])!, 2, { rtol: 1e-14, atol: 0 });
});

Deno.test("kneeCurrent: no answer where the sweep does not contain the knee", () => {
  assertEquals(kneeCurrent([1, 2, 3], [1, 0.9, 0.8]), undefined);
  // It begins beyond: where the knee lies is not known.
  assertEquals(kneeCurrent([1, 2, 3], [0.4, 0.3, 0.2]), undefined);
  assertEquals(kneeCurrent([], []), undefined);
  assertEquals(kneeCurrent([1, 2], [undefined, undefined]), undefined);
});
