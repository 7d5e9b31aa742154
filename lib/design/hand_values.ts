/**
 * Hand formulas beside the computed figures, each with the test of its own assumptions.
 *
 * @module
 */
import { loadedLoopGain } from "../circuit/loaded_loop_gain.ts";
import type { BuiltOscillator, CoreValues, Topology } from "../circuit/topology.ts";
import type { TransistorOperatingPoint } from "../device/transistor_operating_point.ts";
import { noiseClosedForm } from "../noise/closed_forms.ts";
import { leesonPhaseNoise } from "../noise/phase_noise.ts";
import { BOLTZMANN } from "../quantity/constants.ts";
import type { BiasPoint } from "./bias.ts";

/** Loop gain from which the pair is taken to switch hard (common practice). */
const HARD_SWITCHING = 2.5;
/** Part of the noise from sources that the closed form leaves out, from which it does not hold. */
const LEFT_OUT = 0.1;
/** Parts whose noise the closed forms count. */
const COUNTED: readonly string[] = ["tank", "pair", "tail"];
/** Parts of the transconductance and of the loop gain from which a load counts. */
const OUTPUT_LOADS = 0.08;
const SOURCE_LOADS = 0.08;
/** Exponent of the amplitude above which a point is well below the knee. */
const BELOW_KNEE = 0.8;

/** One formula at one point. */
export interface HandComparison {
  readonly name: string;
  /** TeX. */
  readonly formula: string;
  readonly source: string;
  readonly unit: string;
  readonly hand: number;
  readonly computed: number;
  /** Hand minus computed: in dB for dBc/Hz, else relative to the computed value [1]. */
  readonly deviation: number;
  /** How far the formula may be off where it holds, same measure as `deviation`. */
  readonly allowance: number;
  /** The assumptions that do not hold here, in words; empty where all do. */
  readonly broken: readonly string[];
  /** `agrees`, `does not hold here`, or `disagrees`: off by more than its assumptions allow. */
  readonly outcome: "agrees" | "does not hold here" | "disagrees";
}

/** Operating point of a named transistor of an oscillator at a state. */
export function transistorAt(
  { circuit }: BuiltOscillator,
  device: string,
  x: Float64Array,
): TransistorOperatingPoint {
  const element = circuit.elements.find(({ name }) => name === device);
  if (element?.kind !== "device" || !element.transistor) {
    throw new RangeError(`Cannot read an operating point: there is no transistor "${device}"`);
  }
  const [d, g, s, b] = element.nodes.map((node) => circuit.potential(node, x));
  return element.transistor.operatingPoint(d ?? NaN, g ?? NaN, s ?? NaN, b ?? NaN);
}

/**
 * Loop gain, amplitude, noise factor and phase noise of a point by hand and as computed; empty
 * where the point has no orbit.
 *
 * @param offset of the phase noise [Hz]
 */
export function handComparisons<Design>(
  topology: Topology<Design>,
  point: BiasPoint,
  { offset, temperature }: { readonly offset: number; readonly temperature: number },
): HandComparison[] {
  const { figures, startup, oscillator, amplitudeExponent } = point;
  if (!figures || !startup) return [];
  const angular = 2 * Math.PI * figures.frequency;
  const resistance = 1 / oscillator.tank.conductance(angular);
  const state = startup.equilibrium.state;
  const core = coreAt(oscillator, state);
  if (!core) return [];
  const tap = oscillator.tap === undefined ? {} : { tap: oscillator.tap };
  const closedForm = noiseClosedForm(topology.name);
  const factor = closedForm?.factor({
    coreGamma: core.gamma,
    tailNoiseConductance: tailNoiseConductance(oscillator, state),
    resistance,
    loopGain: startup.loopGain,
    ...tap,
  });
  const switching = startup.loopGain >= HARD_SWITCHING ? [] : [
    `the loop gain ${
      startup.loopGain.toFixed(2)
    } is below ${HARD_SWITCHING}: the pair does not switch hard`,
  ];
  const belowKnee = (amplitudeExponent ?? 0) >= BELOW_KNEE ? [] : [
    `d ln A / d ln I is ${
      (amplitudeExponent ?? NaN).toFixed(2)
    }, below ${BELOW_KNEE}: the point is near or past the knee`,
  ];
  const named = new Set(COUNTED.flatMap((part) => oscillator.parts[part] ?? []));
  const leftOut = figures.shares.reduce(
    (sum, { device, share }) => named.has(device) ? sum : sum + share,
    0,
  );
  const left = Object.keys(oscillator.parts).filter((part) => !COUNTED.includes(part)).join(", ");
  const complete = leftOut < LEFT_OUT ? [] : [
    `${(100 * leftOut).toFixed(0)} % of the noise comes from ${left}, which the formula leaves out`,
  ];
  const gain = topology.loopGain({ ...core, resistance, ...tap });
  const amplitude = topology.amplitude({
    current: point.current,
    resistance,
    supply: oscillator.circuit.potential(oscillator.supplyNode, state),
    ...tap,
  });
  const outputs = core.outputConductance / core.transconductance;
  const unloaded = outputs < OUTPUT_LOADS ? [] : [
    `the core's output conductance is ${(100 * outputs).toFixed(0)} % of its transconductance`,
  ];
  const reactance = 2 * Math.PI * startup.frequency * oscillator.tank.inductance;
  const loaded = loadedLoopGain(gain, { quality: resistance / reactance });
  const lightSource = oscillator.tap === undefined || loaded > gain * (1 - SOURCE_LOADS) ? [] : [
    `the source's conductance loads the divider, which leaves about ${loaded.toFixed(2)}`,
  ];
  const limits = [...switching, ...belowKnee];
  const small = [
    compare({
      ...topology.loopGainFormula,
      unit: "1",
      hand: gain,
      computed: startup.loopGain,
      allowance: 0.1,
      broken: [...unloaded, ...lightSource],
    }),
    compare({
      ...topology.amplitudeFormula,
      unit: "V",
      hand: amplitude,
      computed: figures.amplitude,
      allowance: 0.1,
      broken: limits,
    }),
  ];
  if (!closedForm || !factor) return small;
  const noise = leesonPhaseNoise({
    thermalEnergy: BOLTZMANN * temperature,
    resistance,
    amplitude: figures.amplitude,
    quality: resistance / (angular * oscillator.tank.inductance),
    noiseFactor: factor.total,
    frequency: figures.frequency,
    offset,
  });
  return [
    ...small,
    compare({
      name: "noise factor",
      formula: closedForm.formula,
      source: closedForm.source,
      unit: "1",
      hand: factor.total,
      computed: figures.noiseFactor,
      allowance: 0.25,
      broken: [...limits, ...complete],
    }),
    compare({
      name: "phase noise, with the computed amplitude",
      formula: "L = 10 \\log \\frac{4 k T R F}{A^2} \\left(\\frac{f_0}{2 Q \\Delta f}\\right)^2",
      source: "D. Leeson, Proc. IEEE 54 (1966) 329",
      unit: "dBc/Hz",
      hand: noise,
      computed: figures.phaseNoise,
      allowance: 1,
      broken: [...limits, ...complete],
    }),
  ];
}

/** The core's values, from the first transistor of the pair where the topology has no rule of its own. */
function coreAt(oscillator: BuiltOscillator, state: Float64Array): CoreValues | undefined {
  if (oscillator.core) return oscillator.core(state);
  const [name] = oscillator.parts["pair"] ?? [];
  if (name === undefined) return undefined;
  const { gm, gds, noiseConductance } = transistorAt(oscillator, name, state);
  return { transconductance: gm, gamma: noiseConductance / gm, outputConductance: gds };
}

/** Noise conductance of the first tail: a transistor's or a resistor's; 0 without one [S]. */
function tailNoiseConductance(oscillator: BuiltOscillator, state: Float64Array): number {
  const [name] = oscillator.parts["tail"] ?? [];
  if (name === undefined) return 0;
  const element = oscillator.circuit.elements.find((entry) => entry.name === name);
  if (element?.kind === "resistor") return 1 / element.resistance;
  return transistorAt(oscillator, name, state).noiseConductance;
}

function compare(
  values: Omit<HandComparison, "deviation" | "outcome">,
): HandComparison {
  const { hand, computed, unit, allowance, broken } = values;
  const deviation = unit === "dBc/Hz" ? hand - computed : hand / computed - 1;
  const agrees = Math.abs(deviation) <= allowance;
  return {
    ...values,
    deviation,
    outcome: agrees ? "agrees" : broken.length > 0 ? "does not hold here" : "disagrees",
  };
}
