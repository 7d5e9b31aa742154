import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { inputSensitivity } from "../../../lib/orbit/input_sensitivity.ts";
import type { OscillatorSystem } from "../../../lib/orbit/system.ts";
import type { Orbit } from "../../../lib/orbit/orbit.ts";
import { orbitOf, vanDerPol } from "./_systems.ts";

interface Inputs {
  readonly mu: number;
  readonly bias: number;
  readonly tuning: number;
}

const NOMINAL: Inputs = { mu: 1, bias: 0.2, tuning: 0.3 };

/**
 * Van der Pol with a bias in its second row and a charge that depends on the state and on an input:
 * q = (x + tuning atan(x - bias), y), so that two inputs move charge.
 */
function tunable({ mu, bias, tuning }: Inputs): OscillatorSystem {
  return {
    dimension: 2,
    inputs: [{ name: "mu", unit: "1" }, { name: "bias", unit: "V" }, { name: "tuning", unit: "1" }],
    evaluate([x, y], { q, f, C, G }) {
      const slope = 1 / (1 + (x! - bias) ** 2);
      q.set([x! + tuning * Math.atan(x! - bias), y!]);
      f.set([-y!, x! - mu * (1 - x! * x!) * y! - bias]);
      C.set([1 + tuning * slope, 0, 0, 1]);
      G.set([0, -1, 1 + 2 * mu * x! * y!, -mu * (1 - x! * x!)]);
    },
    evaluateInput(k, [x, y], { dq, df }) {
      dq.fill(0);
      df.fill(0);
      if (k === 0) df[1] = -(1 - x! * x!) * y!;
      if (k === 1) {
        dq[0] = -tuning / (1 + (x! - bias) ** 2);
        df[1] = -1;
      }
      if (k === 2) dq[0] = Math.atan(x! - bias);
    },
  };
}

/** dT/dp by central differences of re-solved orbits, extrapolated once. */
function difference(
  orbit: Orbit,
  name: keyof Inputs,
  options: { tolerance: number; steps?: number; stages?: number },
): number {
  const period = (change: number) => {
    const system = tunable({ ...NOMINAL, [name]: NOMINAL[name] + change });
    return orbitOf(system, { start: orbit, ...options }).period;
  };
  const central = (h: number) => (period(h) - period(-h)) / (2 * h);
  return (4 * central(1e-3) - central(2e-3)) / 3;
}

Deno.test("inputSensitivity() is the derivative of re-solved orbits, also by inputs that hold charge", () => {
  const options = { tolerance: 1e-12 };
  const orbit = orbitOf(tunable(NOMINAL), { start: Float64Array.of(2, 0), ...options });
  const found = inputSensitivity(orbit);
  assertEquals(found.map(({ name, unit }) => `${name} ${unit}`), ["mu 1", "bias V", "tuning 1"]);
  found.forEach(({ name, period, frequency }) => {
    // Differences over 1e-3 with the fourth order left, periods to 1e-12.
    assertClose(period, difference(orbit, name as keyof Inputs, options), { rtol: 1e-7, atol: 0 });
    assertClose(frequency, -period / orbit.period ** 2, { rtol: 1e-14, atol: 0 });
  });
});

Deno.test("inputSensitivity() is the derivative of the same discrete map on a coarse mesh", () => {
  // 24 steps of two stages: the period is wrong by 1e-4, its derivative by inputs is that of this period.
  const options = { tolerance: 1e-12, steps: 24, stages: 2 };
  const orbit = orbitOf(tunable(NOMINAL), { start: Float64Array.of(2, 0), ...options });
  const fine = orbitOf(tunable(NOMINAL), { start: orbit.at(0), tolerance: 1e-12 });
  assert(Math.abs(orbit.period / fine.period - 1) > 1e-5);
  for (const { name, period } of inputSensitivity(orbit)) {
    // Periods of one discrete map are smooth in the input to rounding, 1e-13 over 1e-3.
    assertClose(period, difference(orbit, name as keyof Inputs, options), {
      rtol: 1e-9,
      atol: 1e-9,
    });
  }
});

Deno.test("inputSensitivity() is empty without inputs", () => {
  const { system, start } = vanDerPol(1);
  assertEquals(inputSensitivity(orbitOf(system, { start })), []);
});

Deno.test("inputSensitivity() refuses an input that puts charge into a row without any", () => {
  const base = tunable(NOMINAL);
  const system: OscillatorSystem = {
    dimension: 3,
    unknowns: ["x", "y", "potential of divider"],
    inputs: [{ name: "kick", unit: "V" }],
    evaluate(x, { q, f, C, G }) {
      const inner = {
        q: new Float64Array(2),
        f: new Float64Array(2),
        C: new Float64Array(4),
        G: new Float64Array(4),
      };
      base.evaluate(x.subarray(0, 2), inner);
      q.set([...inner.q, 0]);
      f.set([...inner.f, x[2]! - x[0]! / 2]);
      C.set([inner.C[0]!, inner.C[1]!, 0, inner.C[2]!, inner.C[3]!, 0, 0, 0, 0]);
      G.set([inner.G[0]!, inner.G[1]!, 0, inner.G[2]!, inner.G[3]!, 0, -0.5, 0, 1]);
    },
    evaluateInput(_k, _x, { dq, df }) {
      dq.set([0, 0, 1]);
      df.fill(0);
    },
  };
  const orbit = orbitOf(system, { start: Float64Array.of(2, 0, 1) });
  assertThrows(
    () => inputSensitivity(orbit),
    RangeError,
    /^Cannot find the sensitivity to kick: it puts charge into a row without a capacitor \(potential of divider\)$/,
  );
});
