import { assert, assertClose, assertThrows } from "../../assert.ts";
import { classCPair, type ClassCPairDesign } from "../../../lib/circuit/class_c_pair.ts";
import { oscillation } from "../../../lib/design/oscillation.ts";
import { startup } from "../../../lib/design/startup.ts";
import { Orbit } from "../../../lib/orbit/orbit.ts";
import { illustrativeCard } from "../device/_card.ts";
import { NOMINAL } from "./_examples.ts";
import { growthPerPeriod } from "./_growth.ts";

const card = illustrativeCard();

/** 4 GHz, R = 905 ohm, tail capacitance to be given. */
const DESIGN: Omit<ClassCPairDesign, "tailCapacitance"> = {
  tank: { inductance: 3e-9, quality: 12, qualityFrequency: 4e9, capacitance: 400e-15 },
  pair: { width: 100e-6, length: 60e-9 },
  tail: { width: 200e-6, length: 300e-9 },
  current: 0.8e-3,
  mirrorRatio: 4,
  gateBias: 0.7,
  biasResistance: 20e3,
  couplingCapacitance: 2e-12,
  biasFilter: { resistance: 500, capacitance: 2e-12 },
};

/** A large swing at a bias so low that the pair hardly conducts at rest. */
const SUSTAINED = {
  tank: { ...DESIGN.tank, quality: 16 },
  pair: { width: 200e-6, length: 60e-9 },
  tail: { width: 400e-6, length: 200e-9 },
  current: 3e-3,
  gateBias: 0.2,
  tailCapacitance: 0.5e-12,
};

function solved(changes: Partial<ClassCPairDesign> & { tailCapacitance: number }) {
  const oscillator = classCPair.build({ ...DESIGN, ...changes }, { card, condition: NOMINAL });
  const started = startup(oscillator);
  assert(started.status === "found");
  return { oscillator, started, result: oscillation(oscillator, { started }) };
}

Deno.test("classCPair: an orbit exists although the equilibrium is stable, and the kick finds it", () => {
  const { started, result, oscillator } = solved(SUSTAINED);
  assert(!started.starts && started.loopGain < 1, `${started.loopGain}`);
  assert(result instanceof Orbit, result.status);
  const { circuit } = oscillator;
  const { re, im } = result.phasor((x) => circuit.voltage("plus", "minus", x));
  assert(Math.hypot(re, im) > 0.3, `${Math.hypot(re, im)} V`);
  assert(result.multipliers.slice(1).every((m) => Math.hypot(m.re, m.im) < 1));
});

Deno.test("classCPair: too large a tail capacitor makes the orbit unstable, told by a pair of multipliers", () => {
  const small = solved({ tailCapacitance: 4e-12 }).result;
  assert(small instanceof Orbit, small.status);
  assert(small.multipliers.slice(1).every((m) => Math.hypot(m.re, m.im) < 1));

  const { result } = solved({ tailCapacitance: 6e-12 });
  assert(result.status === "unstable", result.status);
  const { orbit } = result;
  const [pair] = orbit!.multipliers;
  const modulus = Math.hypot(pair!.re, pair!.im);
  // A complex pair: the amplitude swells and shrinks some 17 periods long.
  assert(modulus > 1.05 && Math.abs(pair!.im) > 0.2, `${pair!.re} + ${pair!.im} i`);
  const reference = growthPerPeriod(orbit!);
  assertClose(modulus, reference, { rtol: 5e-3, atol: 0, what: "growth by another integrator" });
});

Deno.test("classCPair refuses a bias network without its parts", () => {
  for (const name of ["gateBias", "biasResistance", "couplingCapacitance", "tailCapacitance"]) {
    assertThrows(() => solved({ tailCapacitance: 1e-12, [name]: 0 }), RangeError, /must be > 0/);
  }
});
