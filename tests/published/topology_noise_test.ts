/**
 * Closed forms of the topologies' noise factor, in slow tanks with steep pairs and long tails.
 *
 * 1 + gamma: J. Bank, PhD thesis, Technical University of Denmark (2006); D. Murphy, J. Rael, A. Abidi, IEEE Trans.
 * Circuits Syst. I 57 (2010) 1187. Class C: A. Mazzanti, P. Andreani, IEEE J. Solid-State Circuits 43 (2008) 2716.
 * Colpitts 1 + gamma (1 - n) / n: P. Andreani, X. Wang, L. Vandi, A. Fard, IEEE J. Solid-State Circuits 40 (2005)
 * 1107. All from memory; the tail terms are derived.
 */
import { assert, assertClose } from "../assert.ts";
import { classCPair } from "../../lib/circuit/class_c_pair.ts";
import { colpitts } from "../../lib/circuit/colpitts.ts";
import { complementaryPair } from "../../lib/circuit/complementary_pair.ts";
import { crossCoupledPair } from "../../lib/circuit/cross_coupled_pair.ts";
import { noiseClosedForm } from "../../lib/noise/closed_forms.ts";
import { transistorAt } from "../../lib/design/hand_values.ts";
import { phaseDiffusion } from "../../lib/orbit/phase_diffusion.ts";
import { type Run, run, slowTank } from "./_topologies.ts";

const LONG_TAIL = { width: 2e-3, length: 8e-6 };
const RESISTANCE = 565;

/** Diffusion of the pair and the tails over that of the tank's loss, computed and by the closed form. */
function compared(topology: string, { oscillator, started, orbit, resistance }: Run) {
  const white = oscillator.circuit.sources.filter(({ color }) => color === "white");
  const { sources } = phaseDiffusion(orbit, white);
  const of = (name: string) =>
    sources.filter(({ device }) => oscillator.parts[name]!.includes(device))
      .reduce((sum, { diffusion }) => sum + diffusion, 0);
  const { state } = started.equilibrium;
  const { gamma } = oscillator.core!(state);
  const tail = transistorAt(oscillator, oscillator.parts["tail"]![0]!, state);
  const { tap } = oscillator;
  const hand = noiseClosedForm(topology)!.factor({
    coreGamma: gamma,
    tailNoiseConductance: tail.noiseConductance,
    resistance,
    loopGain: started.loopGain,
    ...(tap === undefined ? {} : { tap }),
  });
  return { pair: of("pair") / of("tank"), tail: of("tail") / of("tank"), hand, gamma };
}

const hard = {
  tank: slowTank({ resistance: RESISTANCE, quality: 100 }),
  pair: { width: 1e-3, length: 60e-9 },
  tail: LONG_TAIL,
  current: 2e-3,
  mirrorRatio: 1,
};

Deno.test("closed forms: one pair's tail noise counts a quarter of what the complementary pair's does", () => {
  const single = compared("n_pair", run(crossCoupledPair, hard, { supply: 12 }));
  const both = compared(
    "complementary_pair",
    run(complementaryPair, { ...hard, pairP: { width: 3e-3, length: 60e-9 } }, { supply: 12 }),
  );
  for (const { tail, hand, pair } of [single, both]) {
    // Hard switching of white noise, to the steepness of the pair.
    assertClose(tail, hand.tail, { rtol: 0.05, atol: 0, what: "tail" });
    assertClose(pair, hand.pair, { rtol: 0.12, atol: 0, what: "pair" });
  }
  // 4, and the two loop gains' parts of 1 - 1/a.
  const ratio = both.hand.tail / single.hand.tail;
  assert(ratio > 4 && ratio < 4.4, `${ratio}`);
  assertClose(both.tail / single.tail, ratio, { rtol: 0.03, atol: 0, what: "ratio" });
});

for (const tap of [0.2, 0.36, 0.5]) {
  Deno.test(`closed forms: Colpitts, core (1 - n) / n and tail n^2 R, n = ${tap}`, () => {
    const tank = slowTank({ resistance: 350, quality: 200 });
    const found = compared(
      "colpitts",
      run(colpitts, {
        tank: { ...tank, capacitance: 0 },
        divider: { first: tank.capacitance / (1 - tap), second: tank.capacitance / tap },
        core: { width: 2, length: 600e-9 },
        tail: LONG_TAIL,
        // The same swing at the source, so that conduction is as short at any tap.
        current: 1.2e-3 / tap,
        gateBias: 2.5,
        mirrorRatio: 1,
      }, { supply: 8 }),
    );
    // Weak inversion, at the peak of the pulses too: half the source transconductance makes shot noise.
    assertClose(found.gamma, 0.5, { rtol: 0.02, atol: 0, what: "gamma" });
    assertClose(found.pair, found.hand.pair, { rtol: 0.02, atol: 0, what: "core" });
    assertClose(found.tail, found.hand.tail, { rtol: 0.02, atol: 0, what: "tail" });
  });
}

Deno.test("closed forms: class C has the pair's gamma and no tail noise", () => {
  const tank = slowTank({ resistance: RESISTANCE, quality: 400 });
  const found = compared(
    "class_c_pair",
    run(classCPair, {
      tank,
      pair: { width: 40e-3, length: 60e-9 },
      tail: LONG_TAIL,
      current: 4e-3,
      mirrorRatio: 1,
      gateBias: 1,
      biasResistance: 1e6,
      couplingCapacitance: 1e-6,
      biasFilter: { resistance: 100, capacitance: 1e-12 },
      tailCapacitance: 1.8 * tank.capacitance,
    }, { supply: 8 }),
  );
  assertClose(found.pair, found.hand.pair, { rtol: 0.05, atol: 0, what: "pair" });
  assert(found.tail < 0.05, `tail ${found.tail}`);
});
