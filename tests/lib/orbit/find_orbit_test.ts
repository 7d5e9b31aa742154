import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { findOrbit } from "../../../lib/orbit/find_orbit.ts";
import { findEquilibrium } from "../../../lib/orbit/equilibrium.ts";
import { odeSystem } from "../../../lib/orbit/ode_system.ts";
import { Orbit, type OrbitFailure } from "../../../lib/orbit/orbit.ts";
import type { OscillatorSystem } from "../../../lib/orbit/system.ts";
import {
  bautin,
  brusselator,
  orbitOf,
  rossler,
  stuartLandau,
  tanhOscillator,
  vanDerPol,
} from "./_systems.ts";

/** A failure, checked to be told in words and to hold no NaN. */
function failureOf(result: ReturnType<typeof findOrbit>): OrbitFailure {
  assert(!(result instanceof Orbit), "an orbit was found");
  assert(result.reason.length > 10 && !/NaN|undefined/.test(result.reason), result.reason);
  assert(!/\.$/.test(result.reason), result.reason);
  for (const value of Object.values(result.work)) assert(Number.isFinite(value));
  return result;
}

Deno.test("findOrbit() finds the same orbit from a state, an equilibrium and a neighbour", () => {
  const { system, start } = brusselator();
  const fromState = orbitOf(system, { start: Float64Array.of(2, 1) });
  const equilibrium = findEquilibrium(system, { guess: Float64Array.of(1, 2) });
  const fromEquilibrium = orbitOf(system, { start: equilibrium });
  const fromOrbit = orbitOf(system, { start: fromState });
  const fromPeriod = orbitOf(system, { start: start.map((x) => x + 0.3), period: 7 });
  for (const orbit of [fromEquilibrium, fromOrbit, fromPeriod]) {
    // Each within the tolerance of 1e-8.
    assertClose(orbit.period, fromState.period, { rtol: 2e-8, atol: 0 });
  }
});

Deno.test("findOrbit() finds one round, not two, where the motion grows much in each cycle", () => {
  // Growth by 1.5 to 4 times a cycle; a second round may come nearer to its start than the first.
  for (const gain of [3, 4.7, 7, 10]) {
    for (const quality of [5, 10, 15]) {
      const { system } = tanhOscillator({ quality, gain });
      const orbit = orbitOf(system, { start: findEquilibrium(system) });
      assertClose(orbit.frequency, 1 / (2 * Math.PI), { rtol: 0.05, atol: 0, what: "frequency" });
    }
  }
});

Deno.test("findOrbit() keeps steps and stages as asked", () => {
  const { system, start } = vanDerPol(1);
  for (const stages of [2, 3, 4]) {
    const orbit = orbitOf(system, { start, steps: 77, stages });
    assertEquals(orbit.steps, 77);
    assertEquals(orbit.quadrature.count, 77 * stages);
    const other = orbitOf(system, { start: orbit, steps: 50, stages: stages === 2 ? 3 : 2 });
    assertEquals(other.steps, 50);
    assertClose(other.period, orbit.period, { rtol: 1e-4, atol: 0 });
  }
});

Deno.test("findOrbit() bounds the work at default settings", () => {
  // Measured 5860 evaluations with the transient; doubled, so that a lost shortcut is noticed.
  const { system, start } = tanhOscillator({ quality: 2, gain: 3 });
  const cold = orbitOf(system, { start });
  assert(cold.work.evaluations < 12_000, `${cold.work.evaluations} evaluations`);
  const warm = orbitOf(tanhOscillator({ quality: 2, gain: 3.02 }).system, { start: cold });
  assert(warm.work.passes <= 4, `${warm.work.passes} passes`);
});

Deno.test("findOrbit() does not depend on the units of time and of the unknowns", () => {
  const plain = orbitOf(vanDerPol(1).system, { start: vanDerPol(1).start });
  const [time, size] = [1e-10, 1e-3];
  const scaled = odeSystem({
    dimension: 2,
    flow: ([x, y], into) => {
      into[0] = y! / time;
      into[1] = ((1 - (x! / size) ** 2) * y! - x!) / time;
    },
    jacobian: ([x, y], J) => {
      J.set([0, 1, -2 * x! * y! / size ** 2 - 1, 1 - (x! / size) ** 2].map((v) => v / time));
    },
    scale: Float64Array.of(size, size),
  });
  const orbit = orbitOf(scaled, { start: Float64Array.of(2 * size, 0) });
  assertClose(orbit.period, plain.period * time, { rtol: 2e-8, atol: 0 });
});

Deno.test("findOrbit(): a stable equilibrium settles", () => {
  const { system } = stuartLandau({ growth: -0.3, frequency: 2, damping: 1, shear: 0 });
  const equilibrium = findEquilibrium(system);
  assertEquals(failureOf(findOrbit(system, { start: equilibrium })).status, "settles");
  // The same from a state that dies out, slowly and fast.
  assertEquals(failureOf(findOrbit(system, { start: Float64Array.of(1, 0) })).status, "settles");
  const slow = stuartLandau({ growth: -0.01, frequency: 2, damping: 1, shear: 0.5 });
  assertEquals(
    failureOf(findOrbit(slow.system, { start: Float64Array.of(1, 0) })).status,
    "settles",
  );
  // An equilibrium given as a state: nothing moves.
  assertEquals(failureOf(findOrbit(system, { start: new Float64Array(2) })).status, "settles");
});

Deno.test("findOrbit(): whether it starts by itself and whether an orbit exists are two answers", () => {
  // r' = -0.1 r + r^3 - r^5: the equilibrium is stable, and there is a stable orbit outside the unstable.
  const { system } = bautin({ growth: -0.1, frequency: 3 });
  assertEquals(failureOf(findOrbit(system, { start: findEquilibrium(system) })).status, "settles");
  const orbit = orbitOf(system, { start: Float64Array.of(1, 0) });
  const radius = Math.sqrt((1 + Math.sqrt(0.6)) / 2);
  assertClose(Math.hypot(...orbit.at(0.2)), radius, { rtol: 1e-8, atol: 0 });
});

Deno.test("findOrbit(): an unstable orbit is named, with the orbit and its multiplier", () => {
  const square = (1 - Math.sqrt(0.6)) / 2;
  const neighbour = orbitOf(
    stuartLandau({ growth: square * 1.05, frequency: 3, damping: 1, shear: 0 }).system,
    { start: Float64Array.of(0.4, 0) },
  );
  const { system } = bautin({ growth: -0.1, frequency: 3 });
  const failure = failureOf(findOrbit(system, { start: neighbour }));
  assertEquals(failure.status, "unstable");
  assert(failure.orbit instanceof Orbit);
  assertClose(Math.hypot(...failure.orbit.at(0)), Math.sqrt(square), { rtol: 1e-8, atol: 0 });
  // Radial slope at the orbit: -0.1 + 3 r^2 - 5 r^4.
  const slope = -0.1 + 3 * square - 5 * square ** 2;
  assert(slope > 0);
  const [largest] = failure.orbit.multipliers;
  assertClose(largest!.re, Math.exp(slope * 2 * Math.PI / 3), { rtol: 1e-7, atol: 0 });
  assert(failure.reason.includes(largest!.re.toPrecision(4)), failure.reason);
});

Deno.test("findOrbit(): van der Pol in reversed time settles inside and escapes outside", () => {
  const { flow } = vanDerPol(1);
  const reversed = odeSystem({
    dimension: 2,
    flow: (x, into) => {
      flow(x, into);
      into[0] = -into[0]!;
      into[1] = -into[1]!;
    },
  });
  const inside = failureOf(findOrbit(reversed, { start: Float64Array.of(1, 0) }));
  assertEquals(inside.status, "settles");
  const outside = failureOf(findOrbit(reversed, { start: Float64Array.of(4, 0) }));
  assertEquals(outside.status, "no convergence");
});

Deno.test("findOrbit(): a chaotic motion ends in a named failure", () => {
  // Rossler with a = b = 0.1, c = 18 is chaotic (from memory); its orbits are all unstable.
  const { system, start } = rossler({ a: 0.1, b: 0.1, c: 18 });
  const failure = failureOf(findOrbit(system, { start, transientSteps: 20_000 }));
  assert(failure.status === "unstable" || failure.status === "no convergence", failure.status);
});

Deno.test("findOrbit(): no equilibrium to start from", () => {
  const system = odeSystem({
    dimension: 2,
    flow: ([x, y], into) => {
      into[0] = 1 + x! * x!;
      into[1] = -y!;
    },
  });
  const failure = failureOf(findOrbit(system, { start: findEquilibrium(system) }));
  assertEquals(failure.status, "no equilibrium");
  // The same system from a state runs to infinity in finite time.
  const lost = failureOf(findOrbit(system, { start: Float64Array.of(0, 1) }));
  assertEquals(lost.status, "no convergence");
});

Deno.test("findOrbit(): a motion that leaves where the equations are defined is told", () => {
  const system = odeSystem({
    dimension: 2,
    flow: ([x, y], into) => {
      into[0] = y! + 0.1 * x!;
      into[1] = -x! + 0 * Math.sqrt(4 - x! * x!);
    },
    jacobian: (_x, J) => {
      J.set([0.1, 1, -1, 0]);
    },
  });
  const failure = failureOf(findOrbit(system, { start: Float64Array.of(1, 0) }));
  assertEquals(failure.status, "no convergence");
});

Deno.test("findOrbit(): a tolerance out of reach is told with the estimate that was reached", () => {
  const { system, start } = vanDerPol(10);
  const failure = failureOf(findOrbit(system, { start, tolerance: 1e-14, stages: 2 }));
  assertEquals(failure.status, "no convergence");
  assert(/the tolerance 1e-14 is out of reach: the estimate is \d/.test(failure.reason));
  assert(failure.orbit instanceof Orbit);
  assertClose(failure.orbit.period, 19.078369566939014, { rtol: 1e-8, atol: 0 });
});

Deno.test("findOrbit(): options outside their ranges are refused in words", () => {
  const { system, start } = vanDerPol(1);
  const refuse = (options: Record<string, unknown>, wording: RegExp) =>
    assertThrows(
      () => findOrbit(system, { start, ...options }),
      RangeError,
      new RegExp(`^Cannot find an orbit: ${wording.source}$`),
    );
  for (const tolerance of [0, 1e-15, 0.1, NaN]) {
    refuse({ tolerance }, /tolerance must be from 1e-14 to 1e-2, got .*/);
  }
  for (const period of [0, -1, Infinity, NaN]) refuse({ period }, /period must be > 0 s, got .* s/);
  for (const steps of [8, 20.5, NaN]) refuse({ steps }, /steps must be an integer >= 16, got .*/);
  for (const stages of [1, 5, NaN]) refuse({ stages }, /stages must be 2, 3 or 4, got .*/);
  refuse({ transientSteps: 0 }, /transientSteps must be > 0, got 0/);
  refuse({ start: Float64Array.of(1, NaN) }, /every entry of start must be finite/);
  assertThrows(
    () => findOrbit(system, { start: Float64Array.of(1) }),
    TypeError,
    /^Cannot find an orbit: start must have 2 entries, found 1$/,
  );
  const neighbour = orbitOf(system, { start });
  assertThrows(
    () => findOrbit(rossler({ a: 0.2, b: 0.2, c: 2.5 }).system, { start: neighbour }),
    TypeError,
    /^Cannot continue an orbit: the system must have 2 unknowns, found 3$/,
  );
});

Deno.test("findOrbit(): one state or one charge alone cannot oscillate", () => {
  const system: OscillatorSystem = {
    dimension: 2,
    evaluate(x, { q, f, C, G }) {
      q.set([x[0]!, 0]);
      f.set([x[0]! + x[1]!, x[1]!]);
      C.set([1, 0, 0, 0]);
      G.set([1, 1, 0, 1]);
    },
  };
  assertThrows(
    () => findOrbit(system, { start: Float64Array.of(1, 1) }),
    RangeError,
    /^Cannot describe an oscillator: at least 2 independent charges are needed, found 1$/,
  );
});
