/** The cross-coupled pair the checks look at, and its quasi-static hand calculation. */
import { assert } from "../assert.ts";
import {
  crossCoupledPair,
  type CrossCoupledPairDesign,
} from "../../lib/circuit/cross_coupled_pair.ts";
import { thermalAmplitude } from "../../lib/circuit/element.ts";
import type { BuiltOscillator, Condition } from "../../lib/circuit/topology.ts";
import { resolveTransistor } from "../../lib/device/resolve_transistor.ts";
import { Transistor, TRANSISTOR_VALUES } from "../../lib/device/transistor.ts";
import { startup } from "../../lib/design/startup.ts";
import { findOrbit } from "../../lib/orbit/find_orbit.ts";
import { Orbit } from "../../lib/orbit/orbit.ts";
import { CARD, DESIGN, NOMINAL } from "../lib/design/_pair.ts";

export { CARD, DESIGN, NOMINAL };

/** A wide, long tail device: low saturation voltage and next to no output conductance. */
export const STIFF_TAIL = { width: 2e-3, length: 8e-6 };

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

const ANGLES = 96;

/** What the describing function of a pair with an ideal tail current says. */
export interface QuasiStatic {
  /** Peak of the tank voltage [V]. */
  readonly amplitude: number;
  /** Noise of the pair over that of the tank's loss: the mean of noise conductance against sin^2 [1]. */
  readonly pairFactor: number;
}

/**
 * Amplitude and pair's noise of a pair between a tank and an ideal tail current: sinusoidal tank voltage,
 * currents that follow at once, phase sensitivity in quadrature with the voltage.
 */
export function quasiStatic(
  design: CrossCoupledPairDesign,
  condition: Condition,
  { current, resistance }: { current: number; resistance: number },
): QuasiStatic {
  const parameters = resolveTransistor(CARD, { kind: "n", ...condition });
  const device = new Transistor(parameters, design.pair);
  const { supply } = condition;
  // The pair at tank voltage v: the differential current and the noise conductance across the tank.
  const at = (v: number) => {
    const side = (sign: number, tail: number) => {
      const out = new Float64Array(TRANSISTOR_VALUES);
      const [drain, gate] = [supply + sign * v / 2, supply - sign * v / 2];
      device.evaluate(drain, gate, tail, 0, out);
      const noise = device.channelNoise(drain, gate, tail, 0) ** 2;
      // out[6] is the change of the drain current with the source voltage.
      return { current: out[0]!, slope: -out[6]!, noise };
    };
    const tail = bisect(
      (potential) => side(1, potential).current + side(-1, potential).current - current,
      { low: supply + Math.abs(v), high: -supply },
    );
    const [plus, minus] = [side(1, tail), side(-1, tail)];
    // A device's noise shifts the tail node, and the other side takes part of it back.
    const sum = plus.slope + minus.slope;
    const noise = plus.noise * (minus.slope / sum) ** 2 + minus.noise * (plus.slope / sum) ** 2;
    return { current: (minus.current - plus.current) / 2, noise };
  };
  // By symmetry a quarter of the period stands for all of it.
  const angles = Array.from({ length: ANGLES / 4 }, (_, k) => 2 * Math.PI * (k + 0.5) / ANGLES);
  const mean = (f: (angle: number) => number) =>
    angles.reduce((sum, angle) => sum + f(angle), 0) / angles.length;
  const fundamental = (amplitude: number) =>
    2 * mean((angle) => at(amplitude * Math.cos(angle)).current * Math.cos(angle));
  const amplitude = bisect((value) => value - fundamental(value) * resistance, {
    low: 1e-3,
    high: 2 * current * resistance,
  });
  const noise = 2 * mean((angle) => at(amplitude * Math.cos(angle)).noise * Math.sin(angle) ** 2);
  return {
    amplitude,
    pairFactor: noise * resistance / thermalAmplitude(1, condition.temperature) ** 2,
  };
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
