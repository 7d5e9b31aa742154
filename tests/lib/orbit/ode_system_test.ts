import { assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { odeSystem } from "../../../lib/orbit/ode_system.ts";
import { brusselator, repressilator, rossler } from "./_systems.ts";

function valuesAt(system: ReturnType<typeof odeSystem>, x: Float64Array) {
  const n = system.dimension;
  const values = {
    q: new Float64Array(n).fill(NaN),
    f: new Float64Array(n).fill(NaN),
    C: new Float64Array(n * n).fill(NaN),
    G: new Float64Array(n * n).fill(NaN),
  };
  system.evaluate(x, values);
  return values;
}

Deno.test("odeSystem() has q = x, f = -flow, C = 1 and G = -d flow/dx", () => {
  const { system } = brusselator();
  const { q, f, C, G } = valuesAt(system, Float64Array.of(2, 3));
  assertEquals(Array.from(q), [2, 3]);
  assertEquals(Array.from(f), [-(1 + 12 - 8), -(6 - 12)]);
  assertEquals(Array.from(C), [1, 0, 0, 1]);
  assertEquals(Array.from(G), [-8, -4, 9, 4]);
});

Deno.test("odeSystem() finds the Jacobian by differences where none is given", () => {
  for (const { system, flow, start } of [rossler({ a: 0.2, b: 0.2, c: 2.5 }), repressilator()]) {
    const { dimension } = system;
    const scale = system.scale;
    const plain = odeSystem({ dimension, flow, ...(scale ? { scale } : {}) });
    // Central differences with a step of the cube root of epsilon: epsilon^(2/3) of the curvature.
    const { G } = valuesAt(plain, start);
    assertClose(G, valuesAt(system, start).G, { rtol: 1e-7, atol: 1e-7 });
    assertEquals(valuesAt(plain, start).f, valuesAt(system, start).f);
  }
});

Deno.test("odeSystem() refuses fewer than two unknowns and a scale of another length", () => {
  const flow = () => {};
  for (const dimension of [1, 2.5, NaN]) {
    assertThrows(
      () => odeSystem({ dimension, flow }),
      RangeError,
      /^Cannot build an oscillator: dimension must be an integer >= 2, got /,
    );
  }
  assertThrows(
    () => odeSystem({ dimension: 2, flow, scale: Float64Array.of(1) }),
    TypeError,
    /^Cannot build an oscillator: scale must have 2 entries, found 1$/,
  );
});
