/**
 * White noise of the cross-coupled pair, part by part.
 *
 * F = 1 + gamma for the pair: J. Bank, PhD thesis, Technical University of Denmark (2006); D. Murphy, J. Rael,
 * A. Abidi, IEEE Trans. Circuits Syst. I 57 (2010) 1187 (from memory), for devices without output conductance and
 * tail nodes without capacitance. Here it is compared with devices that have both.
 */
import { assert, assertClose, assertEquals } from "../assert.ts";
import { assemble } from "../../lib/circuit/circuit.ts";
import {
  crossCoupledPair,
  type CrossCoupledPairDesign,
} from "../../lib/circuit/cross_coupled_pair.ts";
import { tankResistance } from "../../lib/circuit/tank_resistance.ts";
import { thermalAmplitude } from "../../lib/circuit/element.ts";
import type { Condition } from "../../lib/circuit/topology.ts";
import { transistorAt } from "../../lib/design/hand_values.ts";
import { operatingFigures } from "../../lib/design/operating_figures.ts";
import { startup } from "../../lib/design/startup.ts";
import { pairNoiseFactor } from "../../lib/noise/closed_forms.ts";
import { leesonPhaseNoise } from "../../lib/noise/phase_noise.ts";
import { phaseDiffusion } from "../../lib/orbit/phase_diffusion.ts";
import { BOLTZMANN } from "../../lib/quantity/constants.ts";
import { CARD, DESIGN, NOMINAL, pairOrbit, quasiStatic, slowed, STIFF_TAIL } from "./_pair.ts";

const RESISTANCE = tankResistance(DESIGN.tank);
const OFFSET = 1e6;
/** Above the card's range, to keep the knee out of the way. */
const RAISED = { ...NOMINAL, supply: 4 };

/** Diffusion of the parts over the tank's, and what the hand formulas need. */
function partsOf(design: CrossCoupledPairDesign, condition: Condition) {
  const { oscillator, orbit, amplitude } = pairOrbit(design, condition);
  const started = startup(oscillator);
  assert(started.status === "found");
  const white = oscillator.circuit.sources.filter(({ color }) => color === "white");
  const { sources, total } = phaseDiffusion(orbit, white);
  const of = (part: string) =>
    sources
      .filter(({ device }) => oscillator.parts[part]!.includes(device))
      .reduce((sum, { diffusion }) => sum + diffusion, 0);
  const { state } = started.equilibrium;
  const tank = of("tank");
  return {
    amplitude,
    loopGain: started.loopGain,
    pair: of("pair") / tank,
    tail: of("tail") / tank,
    mirror: of("mirror") / tank,
    factor: total / tank,
    figures: operatingFigures(oscillator, orbit, { supply: condition.supply, offset: OFFSET }),
    device: transistorAt(oscillator, "pair plus", state),
    tailDevice: transistorAt(oscillator, "tail", state),
    tailCurrent: orbit.mean((x) => oscillator.circuit.deviceCurrents("tail", x)[0]!),
  };
}

Deno.test("pair: a device of the circuit at zero drain-source voltage makes Nyquist's noise", () => {
  // J. Johnson, H. Nyquist, Phys. Rev. 32 (1928) 97 and 110: 4kT times the channel conductance.
  const { circuit } = crossCoupledPair.build(DESIGN, { card: CARD, condition: NOMINAL });
  const { system, sources, indexOf, stateAt } = assemble(
    circuit.elements.filter(({ name }) => !name.startsWith("pair")),
  );
  const n = system.dimension;
  const values = {
    q: new Float64Array(n),
    f: new Float64Array(n),
    C: new Float64Array(n * n),
    G: new Float64Array(n * n),
  };
  const source = sources.find(({ device, label }) =>
    device === "tail" && label === "channel thermal"
  );
  const tail = indexOf("tail")!;
  const into = new Float64Array(n);
  for (const mirror of [0, 0.2, 0.35, 0.5, 0.8, 1.2]) {
    const state = stateAt({ plus: 1, minus: 1, tail: 0, mirror });
    system.evaluate(state, values);
    source!.inject(state, into);
    // The drain junction's leak shares the entry and makes no noise: 1e-12 of a channel in strong inversion.
    const leak = 0.5e-6 * 0.18e-6 * DESIGN.tail.width / (BOLTZMANN * 300.15 / 1.602176634e-19);
    const conductance = values.G[tail * n + tail]! - leak;
    const expected = thermalAmplitude(conductance, NOMINAL.temperature);
    assertClose(-into[tail]!, expected, { rtol: 1e-12, atol: 0, what: `gate at ${mirror} V` });
  }
});

Deno.test("pair: the noise factor is the sum of its sources, which are all there", () => {
  const { oscillator, orbit } = pairOrbit(DESIGN, NOMINAL);
  const { sources } = phaseDiffusion(orbit, oscillator.circuit.sources);
  const white = sources.filter(({ color }) => color === "white");
  assertEquals(
    white.map(({ device }) => device).sort(),
    Object.values(oscillator.parts).flat().sort(),
    "one white source for each device",
  );
  const { diffusion, shares } = operatingFigures(oscillator, orbit, { supply: 1, offset: OFFSET });
  const sum = white.reduce((total, source) => total + source.diffusion, 0);
  assertClose(diffusion, sum, { rtol: 1e-12, atol: 0 });
  assertClose(shares.reduce((total, { share }) => total + share, 0), 1, { rtol: 1e-12, atol: 0 });
  assert(white.every((source) => source.diffusion > 0), "a source without diffusion");
  // Either side of the balanced pair makes the same.
  const of = (device: string) => white.find((source) => source.device === device)!.diffusion;
  assertClose(of("pair plus"), of("pair minus"), { rtol: 1e-6, atol: 0 });
});

Deno.test("pair: at startup its noise factor is gamma gm / (gm - gds)", () => {
  // At a = 1 the devices' net conductance, gm - gds over two, is the tank's loss.
  const { loopGain, pair, device } = partsOf({ ...DESIGN, current: 0.385e-3 }, NOMINAL);
  assert(loopGain > 1 && loopGain < 1.005, `a = ${loopGain}`);
  // Found 0.75364 against 0.75379; gamma itself is 0.7296.
  const expected = device.noiseConductance / (device.gm - device.gds);
  assertClose(pair, expected, { rtol: 1e-3, atol: 0 });
});

for (const current of [0.4e-3, 1e-3, 3e-3]) {
  Deno.test(`pair: its noise follows the quasi-static sum over the cycle at ${1e3 * current} mA, slowed down`, () => {
    const design = slowed({ ...DESIGN, tail: STIFF_TAIL, current }, 1e5);
    const { pair, tailCurrent } = partsOf(design, RAISED);
    const hand = quasiStatic(design, RAISED, { current: tailCurrent, resistance: RESISTANCE });
    // First harmonic only: found 1e-4 (a = 1.1), 8e-4 (a = 2.2) and 2e-3 (a = 4.5).
    assertClose(pair, hand.pairFactor, { rtol: 3e-3, atol: 0 });
  });
}

Deno.test("pair: its noise factor stays near gamma up to a = 4.8 and says by how much", () => {
  const ratios = [0.45e-3, 0.6e-3, 1e-3, 1.6e-3, 2.2e-3, 3e-3, 4e-3, 5e-3].map((current) => {
    const { loopGain, pair, device } = partsOf({ ...DESIGN, current }, NOMINAL);
    return { loopGain, ratio: pair / (device.noiseConductance / device.gm) };
  });
  const figures = ratios.map(({ loopGain, ratio }) => `${loopGain.toFixed(2)}: ${ratio.toFixed(3)}`)
    .join(", ");
  // Found 1.024 at a = 1.12 (output conductance), 0.99 at 1.9, 0.98 at 2.5, 0.91 at 3.7 (the capacitance at the tail
  // node takes part of the conducting side's noise), 1.10 at 4.8 (the pair in triode past the knee).
  for (const { ratio } of ratios) assertClose(ratio, 1, { rtol: 0, atol: 0.12, what: figures });
  const below = ratios.filter(({ loopGain }) => loopGain < 2.6);
  for (const { ratio } of below) assertClose(ratio, 1, { rtol: 0, atol: 0.03, what: figures });
});

Deno.test("pair: the unfiltered tail's noise stays below the tanh pair's closed form", () => {
  for (const current of [0.5e-3, 1e-3, 1.6e-3, 3e-3]) {
    const { loopGain, tail, device, tailDevice } = partsOf({ ...DESIGN, current }, NOMINAL);
    const hand = pairNoiseFactor({
      pairGamma: device.noiseConductance / device.gm,
      tailGamma: tailDevice.noiseConductance / tailDevice.gm,
      tailTransconductance: tailDevice.gm,
      resistance: RESISTANCE,
      loopGain,
    }).tail;
    // Found 0.72 of it at a = 1.2, 0.82 at 1.9, 0.85 at 2.5, 0.92 at 3.7.
    assert(tail < hand && tail > 0.6 * hand, `a = ${loopGain}: ${tail} against ${hand}`);
  }
});

Deno.test("pair: a capacitor at the tail node filters the tail's and the mirror's noise", () => {
  const design = { ...DESIGN, current: 0.8e-3 };
  const [none, small, large] = [0, 1e-12, 1e-11].map((tailCapacitance) => {
    const { tail, mirror } = partsOf({ ...design, tailCapacitance }, NOMINAL);
    return tail + mirror;
  });
  // Found 0.344, 0.034 and 0.0004 of the tank's.
  assert(
    none! > 0.3 && small! < 0.15 * none! && large! < 0.02 * small!,
    `${none} ${small} ${large}`,
  );
});

Deno.test("pair: doubling the current below the knee lowers the noise by about 6 dB with a filtered tail", () => {
  // Supply raised to 2 V, a wide pair: hard switching at swings that leave the pair out of triode.
  const condition = { ...NOMINAL, supply: 2 };
  const design = {
    ...DESIGN,
    pair: { width: 60e-6, length: 60e-9 },
    tail: { width: 120e-6, length: 200e-9 },
  };
  const change = (tailCapacitance: number) => {
    const [one, two] = [0.6e-3, 1.2e-3].map((current) =>
      partsOf({ ...design, tailCapacitance, current }, condition)
    );
    return {
      noise: two!.figures.phaseNoise - one!.figures.phaseNoise,
      swing: 20 * Math.log10(two!.amplitude / one!.amplitude),
      tails: two!.tail + two!.mirror,
    };
  };
  const [filtered, open] = [change(5e-12), change(0)];
  const figures = JSON.stringify({ filtered, open });
  // Found -6.44 dB at a = 2.2 to 3.6: the amplitude rises by 6.63 dB, as pulses get narrower.
  assert(filtered.tails < 0.04, figures);
  assertClose(filtered.noise, -6, { rtol: 0, atol: 0.5, what: figures });
  assertClose(filtered.noise, -filtered.swing, { rtol: 0, atol: 0.25, what: figures });
  // The unfiltered tail's own noise takes a decibel of it: found -5.32 dB.
  assert(open.noise > filtered.noise + 0.8, figures);
});

Deno.test("pair: Leeson's formula with the computed amplitude and noise factor gives the computed noise", () => {
  const excess = [0.4e-3, 1.5e-3, 3.5e-3, 8e-3].map((current) => {
    const { amplitude, factor, figures } = partsOf({ ...DESIGN, current }, NOMINAL);
    const angular = 2 * Math.PI * figures.frequency;
    const hand = leesonPhaseNoise({
      thermalEnergy: BOLTZMANN * NOMINAL.temperature,
      resistance: RESISTANCE,
      amplitude,
      quality: RESISTANCE / (angular * DESIGN.tank.inductance),
      noiseFactor: factor,
      frequency: figures.frequency,
      offset: OFFSET,
    });
    return figures.phaseNoise - hand;
  });
  // A sinusoid has least; amplitude turned into phase by the devices' capacitances adds to it: found 0.15, 0.02, 0.48
  // and 0.21 dB.
  for (const value of excess) assert(value > 0 && value < 0.6, excess.join(", "));
});
