import { assert, assertClose } from "../../assert.ts";
import { classCPair } from "../../../lib/circuit/class_c_pair.ts";
import { complementaryPair } from "../../../lib/circuit/complementary_pair.ts";
import { crossCoupledPair } from "../../../lib/circuit/cross_coupled_pair.ts";
import { differentialColpitts } from "../../../lib/circuit/differential_colpitts.ts";
import type { BuiltOscillator } from "../../../lib/circuit/topology.ts";
import { oscillation } from "../../../lib/design/oscillation.ts";
import { startup } from "../../../lib/design/startup.ts";
import { Orbit } from "../../../lib/orbit/orbit.ts";
import { illustrativeCard } from "../device/_card.ts";
import { NOMINAL, PAIR_DESIGN } from "../circuit/_examples.ts";
import { CLASS_C_PAIR, DIFFERENTIAL_COLPITTS } from "../circuit/_topology_examples.ts";

const options = { card: illustrativeCard(), condition: NOMINAL };

function startupOf(oscillator: BuiltOscillator) {
  const started = startup(oscillator);
  assert(started.status === "found");
  return started;
}

Deno.test("oscillation: of a pair that starts, the orbit at the asked tolerance", () => {
  const oscillator = crossCoupledPair.build(PAIR_DESIGN, options);
  const orbit = oscillation(oscillator, { started: startupOf(oscillator), tolerance: 1e-11 });
  assert(orbit instanceof Orbit && orbit.estimate.period <= 1e-11);
});

Deno.test("oscillation: of a pair that does not start and has no kick, it settles", () => {
  const oscillator = crossCoupledPair.build({ ...PAIR_DESIGN, current: 0.1e-3 }, options);
  assert(oscillator.kick === undefined);
  const result = oscillation(oscillator, { started: startupOf(oscillator) });
  assert(result.status === "settles", result.status);
});

Deno.test("oscillation: a kick that dies out settles", () => {
  const oscillator = classCPair.build({ ...CLASS_C_PAIR, gateBias: 0.2 }, options);
  const started = startupOf(oscillator);
  assert(oscillator.kick !== undefined && !started.starts);
  const result = oscillation(oscillator, { started });
  assert(result.status === "settles", result.status);
});

Deno.test("oscillation: the tank's mode, even where the common mode grows faster", () => {
  const oscillator = differentialColpitts.build(
    { ...DIFFERENTIAL_COLPITTS, joined: false },
    options,
  );
  const started = startupOf(oscillator);
  const [fastest] = started.poles;
  assert(fastest!.name === "common mode" && fastest!.re > started.growthRate);
  const orbit = oscillation(oscillator, { started });
  assert(orbit instanceof Orbit);
  assertClose(orbit.frequency, started.frequency, { rtol: 0.1, atol: 0 });
});

Deno.test("oscillation: one round of the orbit, where a motion of fast edges closes after several", () => {
  // Slow and steep: the tail node jumps within a time step, so that a first return may be overlooked.
  const [resistance, slow] = [565, 5e3];
  const angular = 2 * Math.PI * slow;
  for (const quality of [12, 100]) {
    for (const current of [1e-3, 2e-3]) {
      const oscillator = complementaryPair.build({
        tank: {
          inductance: resistance / quality / angular,
          quality,
          qualityFrequency: slow,
          capacitance: quality / resistance / angular,
        },
        pair: { width: 6e-3, length: 60e-9 },
        pairP: { width: 18e-3, length: 60e-9 },
        tail: { width: 2e-3, length: 8e-6 },
        current,
        mirrorRatio: 4,
      }, { ...options, condition: { ...NOMINAL, supply: 6 } });
      const started = startupOf(oscillator);
      const orbit = oscillation(oscillator, { started });
      assert(orbit instanceof Orbit, orbit.status);
      assertClose(orbit.frequency, started.frequency, { rtol: 0.05, atol: 0 });
    }
  }
});
