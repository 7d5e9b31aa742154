/**
 * The noise budget: what each source contributes to phase noise at each offset.
 *
 * Indices stay inside the arrays by construction; `!` says so to the compiler.
 *
 * @module
 */
import type { BuiltOscillator } from "../circuit/topology.ts";
import { inputSensitivity } from "../orbit/input_sensitivity.ts";
import type { Orbit } from "../orbit/orbit.ts";
import { phaseTransfer } from "../orbit/phase_transfer.ts";
import type { NoiseSource } from "../orbit/system.ts";

/** Noise that enters through an input of the circuit: a supply, a control voltage, a current. */
export interface InputNoise {
  /** Name of the input, as `inputSensitivity` gives it. */
  readonly input: string;
  /** What the noise is called in the budget: "regulator". */
  readonly label: string;
  /** One-sided density of the input at an offset [unit/sqrt(Hz)]. */
  density(offset: number): number;
}

/** Noise added behind the oscillator, which does not grow towards the carrier. */
export interface AddedNoise {
  readonly label: string;
  /** Phase noise at an offset [dBc/Hz]. */
  level(offset: number): number;
}

/** One line of the budget. */
export interface BudgetEntry {
  readonly device: string;
  readonly label: string;
  readonly origin: "white" | "1/f" | "input" | "added";
  /** Phase noise, half the one-sided density of phase, at each offset [1/Hz], shape (m,). */
  readonly phase: Float64Array;
  /** Amplitude noise, same measure [1/Hz], shape (m,); zero for inputs and added noise. */
  readonly amplitude: Float64Array;
}

/** The budget at a list of offsets. */
export interface NoiseBudget {
  /** [Hz] of the carrier. */
  readonly frequency: number;
  /** Offsets [Hz], increasing, shape (m,). */
  readonly offsets: readonly number[];
  /** Lines, the largest at the first offset first. */
  readonly entries: readonly BudgetEntry[];
  /** Phase noise in total [dBc/Hz], shape (m,). */
  readonly total: readonly number[];
  /** Amplitude noise in total [dBc/Hz], shape (m,). */
  readonly amplitude: readonly number[];
  /** Local slope d L / d log10 f [dB per decade], shape (m,). */
  readonly slopes: readonly number[];
  /**
   * Offset at which 1/f noise and the rest are equal [Hz]; undefined where they do not cross within
   * the offsets.
   */
  readonly corner: number | undefined;
}

/** Options of {@linkcode noiseBudget}. */
export interface NoiseBudgetOptions {
  /** Offsets from the carrier, increasing [Hz]. */
  readonly offsets: readonly number[];
  readonly inputs?: readonly InputNoise[];
  readonly added?: readonly AddedNoise[];
}

/**
 * The noise budget of an oscillator: each source of the circuit through the offset-dependent transfer
 * to the phase of the tank voltage, inputs through the derivative of the frequency, added noise as it
 * is.
 *
 * An input is taken at the gain K = df/dp of the orbit, L = (K S / f)^2 / 2 with the one-sided density
 * S: right below every pole between the input and the tank.
 *
 * @throws RangeError for offsets that are not positive and increasing or reach half the carrier, for
 * an unknown input and for a negative density
 */
export function noiseBudget(
  oscillator: BuiltOscillator,
  orbit: Orbit,
  { offsets, inputs = [], added = [] }: NoiseBudgetOptions,
): NoiseBudget {
  refuseOffsets(offsets, orbit.frequency);
  const { circuit, tank } = oscillator;
  const output = new Float64Array(circuit.system.dimension);
  const [plus, minus] = [circuit.indexOf(tank.plus), circuit.indexOf(tank.minus)];
  if (plus !== undefined) output[plus]! += 1;
  if (minus !== undefined) output[minus]! -= 1;
  const transfer = phaseTransfer(orbit, { output });
  const columns = offsets.map((offset) => transfer.noise(circuit.sources, offset));
  const entries: BudgetEntry[] = circuit.sources.map((source: NoiseSource, k) => ({
    device: source.device,
    label: source.label,
    origin: source.color,
    phase: Float64Array.from(columns, (column) => column[k]!.phase),
    amplitude: Float64Array.from(columns, (column) => column[k]!.amplitude),
  }));
  const gains = inputs.length > 0 ? inputSensitivity(orbit) : [];
  for (const { input, label, density } of inputs) {
    const gain = gains.find(({ name }) => name === input);
    if (!gain) {
      throw new RangeError(
        `Cannot build the budget: the input must be one of ${
          gains.map(({ name }) => name).join(", ")
        }, got "${input}"`,
      );
    }
    entries.push({
      device: input,
      label,
      origin: "input",
      phase: Float64Array.from(offsets, (offset) => {
        const own = density(offset);
        if (!(own >= 0)) {
          throw new RangeError(
            `Cannot build the budget: the density of ${label} must be >= 0 ${gain.unit}/sqrt(Hz), got ${own} at ${offset} Hz`,
          );
        }
        return (gain.frequency * own / offset) ** 2 / 2;
      }),
      amplitude: new Float64Array(offsets.length),
    });
  }
  for (const { label, level } of added) {
    entries.push({
      device: "added",
      label,
      origin: "added",
      phase: Float64Array.from(offsets, (offset) => 10 ** (level(offset) / 10)),
      amplitude: new Float64Array(offsets.length),
    });
  }
  entries.sort((a, b) => b.phase[0]! - a.phase[0]!);
  const sum = (read: (entry: BudgetEntry) => Float64Array, of: readonly BudgetEntry[]) =>
    offsets.map((_, k) => of.reduce((total, entry) => total + read(entry)[k]!, 0));
  const decibel = (values: readonly number[]) => values.map((value) => 10 * Math.log10(value));
  const phase = sum((entry) => entry.phase, entries);
  const total = decibel(phase);
  const flicker = sum((entry) => entry.phase, entries.filter(({ origin }) => origin === "1/f"));
  return {
    frequency: orbit.frequency,
    offsets,
    entries,
    total,
    amplitude: decibel(sum((entry) => entry.amplitude, entries)),
    slopes: slopesOf(offsets, total),
    corner: crossingOffset(offsets, flicker, phase.map((value, k) => value - flicker[k]!)),
  };
}

function refuseOffsets(offsets: readonly number[], frequency: number): void {
  if (offsets.length === 0) throw new RangeError("Cannot build the budget: there are no offsets");
  offsets.forEach((offset, k) => {
    if (!(offset > 0)) {
      throw new RangeError(`Cannot build the budget: offsets must be > 0 Hz, got ${offset} Hz`);
    }
    if (!(offset > (offsets[k - 1] ?? 0))) {
      throw new RangeError(
        `Cannot build the budget: offsets must increase, got ${offset} Hz after ${
          offsets[k - 1]
        } Hz`,
      );
    }
    if (!(offset < frequency / 2)) {
      throw new RangeError(
        `Cannot build the budget: offsets must stay below half the carrier, ${
          frequency / 2
        } Hz, got ${offset} Hz`,
      );
    }
  });
}

/** Slopes in dB per decade by neighbours on both sides, one at the ends. */
function slopesOf(offsets: readonly number[], level: readonly number[]): number[] {
  return offsets.map((_, k) => {
    const before = Math.max(0, k - 1);
    const after = Math.min(offsets.length - 1, k + 1);
    if (after === before) return NaN;
    return (level[after]! - level[before]!) / Math.log10(offsets[after]! / offsets[before]!);
  });
}

/** Where `falling`, steeper, crosses `other`, by straight lines in the logarithms. */
function crossingOffset(
  offsets: readonly number[],
  falling: readonly number[],
  other: readonly number[],
): number | undefined {
  const gap = offsets.map((_, k) => Math.log(falling[k]! / other[k]!));
  for (let k = 1; k < offsets.length; k++) {
    if (!(gap[k - 1]! > 0 && gap[k]! <= 0)) continue;
    const part = gap[k - 1]! / (gap[k - 1]! - gap[k]!);
    return offsets[k - 1]! * (offsets[k]! / offsets[k - 1]!) ** part;
  }
  return undefined;
}
