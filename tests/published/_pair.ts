/** The cross-coupled pair the checks look at, and its quasi-static hand calculation. */
import { assert } from "../assert.ts";
import {
  crossCoupledPair,
  type CrossCoupledPairDesign,
} from "../../lib/circuit/cross_coupled_pair.ts";
import type { BuiltOscillator, Condition } from "../../lib/circuit/topology.ts";
import { resolveTransistor } from "../../lib/device/resolve_transistor.ts";
import { Transistor, TRANSISTOR_VALUES } from "../../lib/device/transistor.ts";
import { startup } from "../../lib/design/startup.ts";
import { findOrbit } from "../../lib/orbit/find_orbit.ts";
import { Orbit } from "../../lib/orbit/orbit.ts";
import { illustrativeCard } from "../lib/device/_card.ts";

export const CARD = illustrativeCard();
export const NOMINAL: Condition = { corner: "typical", temperature: 300.15, supply: 1 };

/** 5 GHz, R = 565 ohm. */
export const DESIGN: CrossCoupledPairDesign = {
  tank: { inductance: 1.5e-9, quality: 12, qualityFrequency: 5e9, capacitance: 0.5e-12 },
  pair: { width: 20e-6, length: 60e-9 },
  tail: { width: 60e-6, length: 200e-9 },
  current: 2e-3,
  mirrorRatio: 4,
  loadCapacitance: 50e-15,
};

/** A wide, long tail device: low saturation voltage and next to no output conductance. */
export const STIFF_TAIL = { width: 1e-3, length: 2e-6 };

/**
 * The design at a lower frequency with the same tank resistance: coil and capacitors `factor` times
 * larger. The devices' own capacitances lose their weight.
 */
export function slowed(design: CrossCoupledPairDesign, factor: number): CrossCoupledPairDesign {
  const { tank, loadCapacitance = 0 } = design;
  return {
    ...design,
    tank: {
      ...tank,
      inductance: tank.inductance * factor,
      capacitance: tank.capacitance * factor,
      qualityFrequency: tank.qualityFrequency / factor,
    },
    loadCapacitance: loadCapacitance * factor,
  };
}

export function pairOrbit(
  design: CrossCoupledPairDesign,
  condition: Condition,
  { tolerance = 1e-8, from }: { tolerance?: number; from?: Orbit } = {},
): { oscillator: BuiltOscillator; orbit: Orbit; amplitude: number } {
  const oscillator = crossCoupledPair.build(design, { card: CARD, condition });
  const started = startup(oscillator);
  assert(started.status === "found");
  const orbit = findOrbit(oscillator.circuit.system, {
    start: from ?? started.equilibrium,
    tolerance,
  });
  assert(orbit instanceof Orbit, orbit instanceof Orbit ? "" : orbit.reason);
  const { re, im } = orbit.phasor((x) => oscillator.circuit.voltage("plus", "minus", x));
  return { oscillator, orbit, amplitude: Math.hypot(re, im) };
}

const ANGLES = 64;

/**
 * Amplitude of a pair between a tank and an ideal tail current by its describing function: sinusoidal
 * tank voltage, currents that follow at once.
 */
export function quasiStaticAmplitude(
  design: CrossCoupledPairDesign,
  condition: Condition,
  { current, resistance }: { current: number; resistance: number },
): number {
  const device = new Transistor(
    resolveTransistor(CARD, { kind: "n", ...condition }),
    design.pair,
  );
  const out = new Float64Array(TRANSISTOR_VALUES);
  const { supply } = condition;
  const currents = (v: number, tail: number) => {
    device.evaluate(supply + v / 2, supply - v / 2, tail, 0, out);
    const plus = out[0]!;
    device.evaluate(supply - v / 2, supply + v / 2, tail, 0, out);
    return { plus, minus: out[0]! };
  };
  // Tank voltage + cosine makes the pair draw less at plus: the fundamental that feeds the tank.
  const fundamental = (amplitude: number) => {
    let sum = 0;
    for (let k = 0; k < ANGLES; k++) {
      const cosine = Math.cos(2 * Math.PI * (k + 0.5) / ANGLES);
      const v = amplitude * cosine;
      const tail = bisect(
        (potential) => {
          const { plus, minus } = currents(v, potential);
          return plus + minus - current;
        },
        { low: supply + amplitude, high: -supply },
      );
      const { plus, minus } = currents(v, tail);
      sum += (minus - plus) / 2 * cosine;
    }
    return 2 * sum / ANGLES;
  };
  return bisect((amplitude) => amplitude - fundamental(amplitude) * resistance, {
    low: 1e-3,
    high: 2 * current * resistance,
  });
}

/** Where an f that is negative at `low` and positive at `high` is zero. */
function bisect(f: (x: number) => number, { low, high }: { low: number; high: number }): number {
  let [below, above] = [low, high];
  for (let k = 0; k < 50; k++) {
    const middle = (below + above) / 2;
    if (f(middle) < 0) below = middle;
    else above = middle;
  }
  return (below + above) / 2;
}
