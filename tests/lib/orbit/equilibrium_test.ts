import { assert, assertClose, assertThrows } from "../../assert.ts";
import { findEquilibrium, polesAt } from "../../../lib/orbit/equilibrium.ts";
import { odeSystem } from "../../../lib/orbit/ode_system.ts";
import { brusselator, fitzHughNagumo, rossler, tanhOscillator, vanDerPol } from "./_systems.ts";

Deno.test("findEquilibrium() finds fixed points and poles known in closed form", () => {
  // Brusselator: (A, B / A); trace B - 1 - A^2 = 1, determinant A^2 = 1: poles exp(+- i pi/3).
  const found = findEquilibrium(brusselator().system, { guess: Float64Array.of(0.4, 1) });
  assert(found.status === "found");
  assertClose(found.state, [1, 3], { rtol: 1e-12, atol: 0 });
  assertClose(found.poles.map(({ re }) => re), [0.5, 0.5], { rtol: 1e-11, atol: 0 });
  assertClose(found.poles.map(({ im }) => im), [Math.sqrt(0.75), -Math.sqrt(0.75)], {
    rtol: 1e-11,
    atol: 0,
  });
  // A tank of quality Q with loop gain k: s^2 - s (k - 1)/Q + 1 = 0.
  const tank = findEquilibrium(tanhOscillator({ quality: 10, gain: 3 }).system);
  assert(tank.status === "found");
  assertClose(tank.poles[0]!.re, 0.1, { rtol: 1e-12, atol: 0 });
  assertClose(tank.poles[0]!.im, Math.sqrt(0.99), { rtol: 1e-12, atol: 0 });
  // Rossler: x = a z, y = -z, a z^2 - c z + b = 0.
  const loop = findEquilibrium(rossler({ a: 0.2, b: 0.2, c: 2.5 }).system);
  assert(loop.status === "found");
  const z = (2.5 - Math.sqrt(2.5 ** 2 - 0.16)) / 0.4;
  assertClose(loop.state, [0.2 * z, -z, z], { rtol: 1e-11, atol: 0 });
});

Deno.test("findEquilibrium() gives modes that satisfy (G + s C) mode = 0", () => {
  for (const { system } of [vanDerPol(1), fitzHughNagumo(), rossler({ a: 0.2, b: 0.2, c: 2.5 })]) {
    const found = findEquilibrium(system);
    assert(found.status === "found");
    const n = system.dimension;
    const values = {
      q: new Float64Array(n),
      f: new Float64Array(n),
      C: new Float64Array(n * n),
      G: new Float64Array(n * n),
    };
    system.evaluate(found.state, values);
    for (const { re, im, mode } of found.poles) {
      const size = Math.hypot(...mode.re, ...mode.im);
      for (let i = 0; i < n; i++) {
        let [real, imaginary] = [0, 0];
        for (let j = 0; j < n; j++) {
          const [g, c] = [values.G[i * n + j]!, values.C[i * n + j]!];
          real += (g + re * c) * mode.re[j]! - im * c * mode.im[j]!;
          imaginary += (g + re * c) * mode.im[j]! + im * c * mode.re[j]!;
        }
        assertClose([real / size, imaginary / size], [0, 0], { rtol: 0, atol: 1e-11 });
      }
    }
  }
});

Deno.test("findEquilibrium() reaches an equilibrium that plain Newton steps over", () => {
  // f(x) = atan(4 (x - 3)): undamped Newton from 0 leaves by 54 and never returns.
  const steep = odeSystem({
    dimension: 2,
    flow: ([x, y], into) => {
      into[0] = -Math.atan(4 * (x! - 3)) + y!;
      into[1] = -y!;
    },
  });
  const found = findEquilibrium(steep);
  assert(found.status === "found");
  assertClose(found.state, [3, 0], { rtol: 1e-9, atol: 1e-9 });
});

Deno.test("findEquilibrium() says when there is none, and when f is not finite", () => {
  const none = odeSystem({
    dimension: 2,
    flow: ([x, y], into) => {
      into[0] = 1 + x! * x!;
      into[1] = -y!;
    },
  });
  const result = findEquilibrium(none);
  assert(result.status === "no equilibrium");
  assert(/could not be brought to zero/.test(result.reason), result.reason);
  assert(Number.isFinite(result.residual));
  const broken = odeSystem({
    dimension: 2,
    flow: ([x, y], into) => {
      into[0] = Math.log(-1 - x! * x!);
      into[1] = -y!;
    },
  });
  const lost = findEquilibrium(broken);
  assert(lost.status === "no equilibrium");
  assert(/not finite/.test(lost.reason), lost.reason);
});

Deno.test("findEquilibrium() refuses a guess of the wrong length", () => {
  assertThrows(
    () => findEquilibrium(vanDerPol(1).system, { guess: Float64Array.of(1) }),
    TypeError,
    /^Cannot find the equilibrium: guess must have 2 entries, found 1$/,
  );
});

Deno.test("polesAt() and findEquilibrium() refuse a system of higher index, naming the unknown", () => {
  // An ideal source of current c that keeps b at zero: neither a charge nor the algebraic row gives c.
  const system = {
    dimension: 3,
    unknowns: ["current a", "voltage b", "voltage c"],
    evaluate(
      x: Float64Array,
      into: { q: Float64Array; f: Float64Array; C: Float64Array; G: Float64Array },
    ) {
      into.q.set([x[0]!, x[1]!, 0]);
      into.f.set([x[1]! + x[2]!, -x[0]!, x[1]!]);
      into.C.set([1, 0, 0, 0, 1, 0, 0, 0, 0]);
      into.G.set([0, 1, 1, -1, 0, 0, 0, 1, 0]);
    },
  };
  const wording =
    /^Cannot describe an oscillator: neither charge nor current determines voltage c$/;
  assertThrows(() => polesAt(system, new Float64Array(3)), RangeError, wording);
  assertThrows(() => findEquilibrium(system), RangeError, wording);
});
