import { assert, assertClose, assertThrows } from "../../assert.ts";
import { assemble } from "../../../lib/circuit/circuit.ts";
import { crossCoupledPair } from "../../../lib/circuit/cross_coupled_pair.ts";
import { tankResistance } from "../../../lib/circuit/tank_resistance.ts";
import { resolvePassives } from "../../../lib/device/resolve_passives.ts";
import { findEquilibrium, polesAt } from "../../../lib/orbit/equilibrium.ts";
import { findOrbit } from "../../../lib/orbit/find_orbit.ts";
import { Orbit } from "../../../lib/orbit/orbit.ts";
import { phaseDiffusion } from "../../../lib/orbit/phase_diffusion.ts";
import { illustrativeCard } from "../device/_card.ts";
import { seededUniform } from "../device/_biases.ts";
import { orbitOf } from "../orbit/_systems.ts";
import { NOMINAL, PAIR_DESIGN } from "./_examples.ts";

const card = illustrativeCard();
const build = (changes = {}, condition = NOMINAL) =>
  crossCoupledPair.build({ ...PAIR_DESIGN, ...changes }, { card, condition });

Deno.test("crossCoupledPair: the bare tank has the inductance, capacitance and loss asked for", () => {
  const { circuit, tank } = build();
  const passive = assemble(
    circuit.elements.filter(({ kind, name }) =>
      kind !== "device" && kind !== "current" && !/^(tail|mirror)/.test(name)
    ),
  );
  const poles = polesAt(passive.system, new Float64Array(passive.system.dimension));
  // Of the two pairs, common and differential, the one whose mode has opposite outputs.
  const [plus, minus] = [passive.indexOf("plus")!, passive.indexOf("minus")!];
  const differential = poles.find(({ im, mode: { re, im: imaginary } }) =>
    im > 0 &&
    Math.hypot(re[plus]! + re[minus]!, imaginary[plus]! + imaginary[minus]!) <
      1e-6 * Math.hypot(re[plus]!, imaginary[plus]!)
  )!;
  const { capacitor } = resolvePassives(card, { corner: "typical", temperature: 300 });
  const capacitance = PAIR_DESIGN.tank.capacitance * capacitor + PAIR_DESIGN.loadCapacitance! / 2;
  const square = differential.re ** 2 + differential.im ** 2;
  assertClose(square, 1 / (PAIR_DESIGN.tank.inductance * capacitance), { rtol: 1e-10, atol: 0 });
  const conductance = tank.conductance(differential.im);
  assertClose(differential.re, -conductance / (2 * capacitance), { rtol: 1e-9, atol: 0 });
  // At 300 K the metal is as on the card to a few tenths of a per cent.
  assertClose(1 / conductance, tankResistance(PAIR_DESIGN.tank), { rtol: 0.01, atol: 0 });
});

Deno.test("crossCoupledPair: amplitude near (2/pi) I R and frequency near the tank's, for what it is", () => {
  const { circuit, tank } = build();
  const { system } = circuit;
  const orbit = orbitOf(system, { start: findEquilibrium(system, { guess: build().guess }) });
  const { re, im } = orbit.phasor((x) => circuit.voltage("plus", "minus", x));
  const amplitude = Math.hypot(re, im);
  const resistance = 1 / tank.conductance(2 * Math.PI * orbit.frequency);
  const hand = crossCoupledPair.amplitude({ current: PAIR_DESIGN.current, resistance });
  assertClose(hand, 2 / Math.PI * PAIR_DESIGN.current * resistance, { rtol: 1e-14, atol: 0 });
  // The hand formula has no triode region, no finite steering and no tail capacitance: compared, within 30 %.
  assertClose(amplitude, hand, { rtol: 0.3, atol: 0 });
  const bare = 1 / (2 * Math.PI * Math.sqrt(1.2e-9 * (3e-12 + 25e-15)));
  // The devices add capacitance and nothing else of size.
  assert(orbit.frequency < bare && orbit.frequency > 0.9 * bare, `${orbit.frequency}`);
  // The total is above what the tank's own loss would give: a noise factor above one.
  const { sources, total } = phaseDiffusion(orbit, circuit.sources);
  const loss = sources.filter(({ device }) => device.startsWith("tank loss"))
    .reduce((sum, { diffusion }) => sum + diffusion, 0);
  assert(total > 1.5 * loss && total < 20 * loss, `noise factor ${total / loss}`);
  // The loss alone: (kT/R) / (C^2 A^2 w^2) of an ideal sinusoid (Leeson), to the waveform's distortion.
  const capacitance = 1 / (2 * Math.PI * orbit.frequency) ** 2 / PAIR_DESIGN.tank.inductance;
  const ideal = 4 * 1.380649e-23 * 300 / resistance / 4 /
    (capacitance * amplitude * 2 * Math.PI * orbit.frequency) ** 2;
  assertClose(loss, ideal, { rtol: 0.1, atol: 0 });
});

Deno.test("crossCoupledPair.withCurrent() changes the programmed current alone", () => {
  const changed = crossCoupledPair.withCurrent(PAIR_DESIGN, 3e-3);
  assertClose(changed.current, 3e-3, { rtol: 1e-15, atol: 0 });
  assert(JSON.stringify({ ...changed, current: 2e-3 }) === JSON.stringify(PAIR_DESIGN));
  assertClose(crossCoupledPair.loopGain({ transconductance: 20e-3, resistance: 300 }), 3, {
    rtol: 1e-14,
    atol: 0,
  });
});

Deno.test("crossCoupledPair refuses a current and a mirror ratio that are not positive", () => {
  for (const current of [0, -1e-3, NaN]) {
    assertThrows(() => build({ current }), RangeError, /current must be > 0 A, got .* A$/);
  }
  for (const mirrorRatio of [0, NaN]) {
    assertThrows(() => build({ mirrorRatio }), RangeError, /mirror ratio must be > 0, got /);
  }
});

Deno.test("crossCoupledPair: a current too small to start settles, and says so", () => {
  const { circuit: { system }, guess } = build({ current: 0.1e-3 });
  const equilibrium = findEquilibrium(system, { guess });
  assert(equilibrium.status === "found" && equilibrium.poles[0]!.re < 0);
  const result = findOrbit(system, { start: equilibrium });
  assert(result.status === "settles", result.status);
});

/** Random sizings and conditions: written down before any of them was solved. */
const BOX = {
  designs: 16,
  seed: 2026,
  inductance: [0.4e-9, 3e-9],
  quality: [6, 20],
  frequency: [1.5e9, 6e9],
  width: [10e-6, 80e-6],
  length: [60e-9, 120e-9],
  tailWidth: [40e-6, 200e-6],
  tailLength: [120e-9, 400e-9],
  current: [0.4e-3, 4e-3],
  tailCapacitance: [20e-15, 2e-12],
  temperature: [233, 398],
  supply: [0.9, 1.2],
} as const;

Deno.test("crossCoupledPair: sizings from a box have an orbit whenever their equilibrium is unstable", () => {
  const next = seededUniform(BOX.seed);
  const between = ([low, high]: readonly [number, number]) => low * (high / low) ** next();
  let found = 0;
  for (let k = 0; k < BOX.designs; k++) {
    const inductance = between(BOX.inductance);
    const frequency = between(BOX.frequency);
    const design = {
      tank: {
        inductance,
        quality: between(BOX.quality),
        qualityFrequency: frequency,
        capacitance: 1 / (2 * Math.PI * frequency) ** 2 / inductance,
      },
      pair: { width: between(BOX.width), length: between(BOX.length) },
      tail: { width: between(BOX.tailWidth), length: between(BOX.tailLength) },
      current: between(BOX.current),
      tailCapacitance: between(BOX.tailCapacitance),
    };
    const condition = {
      corner: (["slow", "typical", "fast"] as const)[k % 3]!,
      temperature: between(BOX.temperature),
      supply: between(BOX.supply),
    };
    const { circuit, guess } = build(design, condition);
    const equilibrium = findEquilibrium(circuit.system, { guess });
    assert(equilibrium.status === "found", `design ${k}: no equilibrium`);
    const starts = equilibrium.poles[0]!.re > 0;
    const result = findOrbit(circuit.system, { start: equilibrium });
    const told = result instanceof Orbit ? "found" : `${result.status}, ${result.reason}`;
    assert((result.status === "found") === starts, `design ${k}: ${told}`);
    if (!(result instanceof Orbit)) continue;
    found++;
    assertClose(result.multipliers[0]!.re, 1, { rtol: 1e-6, atol: 0 });
    const { total } = phaseDiffusion(result, circuit.sources);
    assert(total > 0 && total < Infinity);
  }
  // The box reaches far below startup; enough of it must oscillate for the test to mean something.
  assert(found >= BOX.designs / 4, `${found} of ${BOX.designs} oscillate`);
});
