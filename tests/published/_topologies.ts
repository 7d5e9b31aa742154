/** Orbits of any topology for the published checks, and circuits slowed down until capacitances vanish. */
import { assert } from "../assert.ts";
import type {
  BuiltOscillator,
  Condition,
  TankDesign,
  Topology,
} from "../../lib/circuit/topology.ts";
import { oscillation } from "../../lib/design/oscillation.ts";
import { type Startup, startup } from "../../lib/design/startup.ts";
import { Orbit } from "../../lib/orbit/orbit.ts";
import { CARD, NOMINAL } from "./_pair.ts";

/** An orbit with what the hand formulas are about. */
export interface Run {
  readonly oscillator: BuiltOscillator;
  readonly started: Startup;
  readonly orbit: Orbit;
  /** Peak of the fundamental of the tank voltage [V]. */
  readonly amplitude: number;
  /** Mean current of all tails together [A]. */
  readonly current: number;
  /** [ohm] */
  readonly resistance: number;
  /** Amplitude over current times resistance [1]. */
  readonly coefficient: number;
}

/** Solves a design at a supply, anything else nominal. */
export function run<Design>(
  topology: Topology<Design>,
  design: Design,
  { supply = 1, tolerance = 1e-8 }: { supply?: number; tolerance?: number } = {},
): Run {
  const condition: Condition = { ...NOMINAL, supply };
  const oscillator = topology.build(design, { card: CARD, condition });
  const started = startup(oscillator);
  assert(started.status === "found", started.status === "found" ? "" : started.reason);
  const orbit = oscillation(oscillator, { started, tolerance });
  assert(orbit instanceof Orbit, orbit instanceof Orbit ? "" : orbit.reason);
  const { circuit, tank, parts } = oscillator;
  const { re, im } = orbit.phasor((x) => circuit.voltage(tank.plus, tank.minus, x));
  const amplitude = Math.hypot(re, im);
  const tails = (x: Float64Array) =>
    (parts["tail"] ?? []).reduce(
      (sum, name) => sum + Math.abs(circuit.deviceCurrents(name, x)[0]!),
      0,
    );
  const current = orbit.mean(tails);
  const resistance = 1 / tank.conductance(2 * Math.PI * orbit.frequency);
  return {
    oscillator,
    started,
    orbit,
    amplitude,
    current,
    resistance,
    coefficient: amplitude / (current * resistance),
  };
}

/** Frequency of the slow tanks: a million times below those of use, so that the devices' capacitances vanish [Hz]. */
const SLOW = 5e3;

/** A slow tank of a resistance [ohm] and a quality factor [1]. */
export function slowTank(
  { resistance, quality }: { resistance: number; quality: number },
): TankDesign {
  const angular = 2 * Math.PI * SLOW;
  return {
    inductance: resistance / quality / angular,
    quality,
    qualityFrequency: SLOW,
    capacitance: quality / resistance / angular,
  };
}

/**
 * I1(x) / I0(x) of the modified Bessel functions, by the trapezium rule on (1/pi) integral of
 * exp(x cos t) cos(k t), which converges geometrically (M. Abramowitz, I. Stegun, Handbook, 9.6.19).
 */
export function besselRatio(x: number): number {
  const points = 400;
  let [zeroth, first] = [0, 0];
  for (let k = 0; k < points; k++) {
    const angle = 2 * Math.PI * k / points;
    const weight = Math.exp(x * (Math.cos(angle) - 1));
    zeroth += weight;
    first += weight * Math.cos(angle);
  }
  return first / zeroth;
}
