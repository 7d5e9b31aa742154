/**
 * Every topology finds its orbit at random startable sizings. More of them: bench/lib/circuit/robustness.ts.
 */
import { assert, assertClose } from "../../assert.ts";
import { oscillation } from "../../../lib/design/oscillation.ts";
import { Orbit, type OrbitFailure } from "../../../lib/orbit/orbit.ts";
import { phaseDiffusion } from "../../../lib/orbit/phase_diffusion.ts";
import { illustrativeCard } from "../device/_card.ts";
import { growthPerPeriod, rangesAfter } from "./_growth.ts";
import { BOX_NAMES, type Sizing, startableSizings } from "./_sizings.ts";

const COUNT = 20;
/** Of the sizings whose only unstable mode at rest is the tank's, all topologies together. */
const LEAST_FOUND = 0.995;
/** Periods after which only the winning mode is left. */
const SETTLED = 150;
const card = illustrativeCard();

const failures: string[] = [];
let tried = 0;

function checkOrbit({ oscillator, started }: Sizing, orbit: Orbit): void {
  const { circuit, tank } = oscillator;
  const [first, ...others] = orbit.multipliers;
  assertClose([first!.re, first!.im], [1, 0], { rtol: 0, atol: 1e-5, what: "unit multiplier" });
  assert(others.every(({ re, im }) => Math.hypot(re, im) < 1));
  const { re, im } = orbit.phasor((x) => circuit.voltage(tank.plus, tank.minus, x));
  assert(Math.hypot(re, im) > 0.01, "no tank voltage at the orbit's frequency");
  // One round, not two or half: near the frequency of startup.
  const ratio = orbit.frequency / started.frequency;
  assert(ratio > 0.7 && ratio < 1.4, `${ratio} of the startup frequency`);
  const { total } = phaseDiffusion(orbit, circuit.sources);
  assert(total > 0 && total < Infinity);
}

/** A reason must be one of two, and another integrator must say the same. */
function checkFailure(
  { oscillator, started }: Sizing,
  { status, reason, orbit }: OrbitFailure,
): void {
  if (status === "unstable") {
    const moduli = orbit!.multipliers.map(({ re, im }) => Math.hypot(re, im));
    assertClose(growthPerPeriod(orbit!), moduli[0]!, { rtol: 0.02, atol: 0, what: "growth" });
    return;
  }
  assert(/ends in another mode/.test(reason), `${status}: ${reason}`);
  assert(started.otherUnstable.length > 0);
  const { circuit, kick } = oscillator;
  const { difference, mean } = rangesAfter(circuit.system, {
    // A little uneven, as any real circuit is.
    start: kick!.state.map((value, j) => value * (1 + 1e-3 * (j % 2))),
    period: 1 / started.frequency,
    settled: SETTLED,
    of: [circuit.indexOf("plus")!, circuit.indexOf("minus")!],
  });
  assert(difference < 0.05 * mean, `${difference} V apart, ${mean} V together`);
}

for (const name of BOX_NAMES) {
  Deno.test(`${name}: ${COUNT} random startable sizings have an orbit, or a reason that holds`, () => {
    const { sizings } = startableSizings(name, { count: COUNT, card });
    for (const [k, sizing] of sizings.entries()) {
      const result = oscillation(sizing.oscillator, sizing);
      const single = sizing.started.otherUnstable.length === 0;
      if (single) tried++;
      if (result instanceof Orbit) {
        checkOrbit(sizing, result);
        continue;
      }
      if (single) failures.push(`${name} ${k}: ${result.status}, ${result.reason}`);
      checkFailure(sizing, result);
    }
  });
}

Deno.test("topologies: 99.5 % of the startable sizings with one unstable mode have an orbit", () => {
  assert(tried > 0.8 * COUNT * BOX_NAMES.length, `${tried} tried`);
  assert(failures.length <= (1 - LEAST_FOUND) * tried, failures.join("\n"));
});
