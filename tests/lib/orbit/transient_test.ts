import { assert, assertClose, assertEquals } from "../../assert.ts";
import { ChargeCoordinates } from "../../../lib/orbit/charge_coordinates.ts";
import { gaussMethod } from "../../../lib/numeric/gauss.ts";
import { Transient } from "../../../lib/orbit/transient.ts";
import { odeSystem } from "../../../lib/orbit/ode_system.ts";
import type { OscillatorSystem } from "../../../lib/orbit/system.ts";
import { brusselator, stuartLandau, vanDerPol } from "./_systems.ts";

function transientOf(system: OscillatorSystem, start: Float64Array, firstStep = 1e-2): Transient {
  return new Transient(new ChargeCoordinates(system, start), gaussMethod(3), {
    start,
    charges: start.slice(),
    firstStep,
    longestStep: Infinity,
  });
}

Deno.test("Transient.nextCycle() closes near the period once the motion is steady", () => {
  for (
    const [{ system }, period] of [
      [vanDerPol(1), 6.663286859323130],
      [vanDerPol(5), 11.61223066771957],
      [brusselator(), 7.1569199212],
    ] as const
  ) {
    const transient = transientOf(system, Float64Array.of(0.5, 0.5));
    let last: ReturnType<Transient["nextCycle"]> | undefined;
    for (let cycle = 0; cycle < 8; cycle++) last = transient.nextCycle(5000);
    assert(last?.status === "closed");
    // Steps aim at 5e-4 of the range each: a start for Newton.
    assertClose(last.path.period, period, { rtol: 1e-2, atol: 0 });
    assert(Math.abs(last.growth) < 1e-2);
    const { mesh, charges } = last.path;
    assertEquals([mesh[0], mesh.at(-1)], [0, 1]);
    assertEquals(charges.slice(-2), charges.slice(0, 2));
  }
});

Deno.test("Transient.nextCycle() sees growth and decay", () => {
  const { system } = stuartLandau({ growth: 0.05, frequency: 1, damping: 1, shear: 0 });
  const transient = transientOf(system, Float64Array.of(1e-2, 0));
  transient.nextCycle(5000);
  const growing = transient.nextCycle(5000);
  assert(growing.status === "closed");
  // Small amplitudes grow by 0.05 a unit of time, 2 pi long.
  assertClose(growing.growth, 0.05 * 2 * Math.PI, { rtol: 0.05, atol: 0 });
});

Deno.test("Transient.nextCycle() ends at rest, with few steps, where the motion dies out", () => {
  const cases = [
    stuartLandau({ growth: -0.3, frequency: 2, damping: 1, shear: 0 }).system,
    stuartLandau({ growth: -5, frequency: 0.1, damping: 1, shear: 0 }).system,
  ];
  for (const system of cases) {
    const transient = transientOf(system, Float64Array.of(1, 0));
    for (let cycle = 0;; cycle++) {
      const outcome = transient.nextCycle(3000);
      assert(cycle < 400 && outcome.status !== "lost");
      if (outcome.status === "at rest") break;
      assert(Number.isFinite(outcome.path.period));
    }
    assert(transient.steps < 3000);
  }
});

Deno.test("Transient.nextCycle() tells a motion without bound and one that never closes", () => {
  const runaway = odeSystem({
    dimension: 2,
    flow: ([x, y], into) => into.set([1 + x! * x!, -y!]),
    jacobian: ([x], J) => J.set([2 * x!, 0, 0, -1]),
  });
  const escaped = transientOf(runaway, Float64Array.of(0, 1)).nextCycle(5000);
  assert(escaped.status === "lost");
  assert(/grows without bound/.test(escaped.reason), escaped.reason);
  const drift = odeSystem({
    dimension: 2,
    flow: (_x, into) => into.set([1, 0]),
    jacobian: (_x, J) => J.fill(0),
  });
  const endless = transientOf(drift, Float64Array.of(0, 0)).nextCycle(50);
  assert(endless.status === "lost");
  assert(/within 50 time steps|without bound/.test(endless.reason), endless.reason);
});
