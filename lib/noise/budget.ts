/**
 * The noise budget: what each source contributes to phase noise at each offset.
 *
 * Indices stay inside the arrays by construction; `!` says so to the compiler.
 *
 * @module
 */
import type { BuiltOscillator } from "../circuit/topology.ts";
import { type InputSensitivity, inputSensitivity } from "../orbit/input_sensitivity.ts";
import type { Orbit } from "../orbit/orbit.ts";
import { phaseDiffusion } from "../orbit/phase_diffusion.ts";
import { phaseTransfer } from "../orbit/phase_transfer.ts";
import type { NoiseSource } from "../orbit/system.ts";
import type { PowerLaw } from "./power_law.ts";

/** Noise that enters through an input of the circuit: a supply, a control voltage, a current. */
export interface InputNoise {
  /** Name of the input, as `inputSensitivity` gives it; with `gain` any name. */
  readonly input: string;
  /**
   * Frequency per unit of it, for what the circuit does not hold, such as a varactor's control line [Hz/unit].
   * @default the derivative of the orbit's frequency by the circuit's input of that name
   */
  readonly gain?: number;
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
  /** Local slope d L / d log10 f [dB per decade], shape (m,); undefined at a single offset. */
  readonly slopes: readonly (number | undefined)[];
  /**
   * Offset at which 1/f noise and the rest are equal [Hz]; undefined where they do not cross within
   * the offsets.
   */
  readonly corner: number | undefined;
  /**
   * The circuit's own sources in the limit of small offset, 1/f^3 and 1/f^2, with the added noise at the
   * last offset as floor. Slow poles and inputs make the total leave it.
   */
  readonly asymptotes: PowerLaw;
  /** White phase diffusion over that of the tank's loss alone, in the limit of small offset [1]. */
  readonly noiseFactor: number;
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
 * @throws TypeError without an offset
 * @throws RangeError for offsets that are not positive and increasing or reach half the carrier, for
 * an unknown input, for a negative density and for added noise that is no level below 0 dBc/Hz
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
  const gains = inputs.some(({ gain }) => gain === undefined) ? inputSensitivity(orbit) : [];
  const nothing = new Float64Array(offsets.length);
  for (const noise of inputs) {
    const phase = inputPhase(noise, { gains, offsets });
    entries.push({
      device: noise.input,
      label: noise.label,
      origin: "input",
      phase,
      amplitude: nothing,
    });
  }
  for (const noise of added) {
    const { label } = noise;
    const phase = addedPhase(noise, offsets);
    entries.push({ device: "added", label, origin: "added", phase, amplitude: nothing });
  }
  entries.sort((a, b) => b.phase[0]! - a.phase[0]!);
  const sum = (read: (entry: BudgetEntry) => Float64Array, of: readonly BudgetEntry[]) =>
    offsets.map((_, k) => of.reduce((total, entry) => total + read(entry)[k]!, 0));
  const decibel = (values: readonly number[]) => values.map((value) => 10 * Math.log10(value));
  const phase = sum((entry) => entry.phase, entries);
  const total = decibel(phase);
  const only = (origin: BudgetEntry["origin"]) =>
    sum((entry) => entry.phase, entries.filter((entry) => entry.origin === origin));
  const flicker = only("1/f");
  const limit = phaseDiffusion(orbit, circuit.sources);
  const square = orbit.frequency ** 2;
  return {
    frequency: orbit.frequency,
    offsets,
    entries,
    total,
    amplitude: decibel(sum((entry) => entry.amplitude, entries)),
    slopes: slopesOf(offsets, total),
    corner: crossingOffset(offsets, flicker, phase.map((value, k) => value - flicker[k]!)),
    asymptotes: {
      inverseCube: limit.sources.reduce(
        (cube, { color, mean }) => color === "1/f" ? cube + square * mean ** 2 / 2 : cube,
        0,
      ),
      inverseSquare: square * limit.total,
      floor: only("added").at(-1)!,
    },
    noiseFactor: limit.total / limit.sources
      .filter(({ device }) => oscillator.parts["tank"]?.includes(device))
      .reduce((tankOnly, { diffusion }) => tankOnly + diffusion, 0),
  };
}

/** Phase noise of an input's noise at each offset [1/Hz]. */
function inputPhase(
  { input, label, density, gain: given }: InputNoise,
  { gains, offsets }: {
    readonly gains: readonly InputSensitivity[];
    readonly offsets: readonly number[];
  },
): Float64Array {
  const found = gains.find(({ name }) => name === input);
  const gain = given ?? found?.frequency;
  const unit = found?.unit ?? "unit";
  if (gain === undefined) {
    const names = gains.map(({ name }) => name).join(", ");
    throw new RangeError(
      `Cannot build the budget: the input must be one of ${names}, got "${input}"`,
    );
  }
  if (!Number.isFinite(gain)) {
    throw new RangeError(
      `Cannot build the budget: the gain of ${label} must be finite, got ${gain}`,
    );
  }
  return Float64Array.from(offsets, (offset) => {
    const own = density(offset);
    if (!(own >= 0 && own < Infinity)) {
      throw new RangeError(
        `Cannot build the budget: the density of ${label} must be >= 0 ${unit}/sqrt(Hz) and ` +
          `finite, got ${own} at ${offset} Hz`,
      );
    }
    return (gain * own / offset) ** 2 / 2;
  });
}

/** Added noise at each offset [1/Hz]. */
function addedPhase({ label, level }: AddedNoise, offsets: readonly number[]): Float64Array {
  return Float64Array.from(offsets, (offset) => {
    const own = level(offset);
    // A level at or above the carrier in 1 Hz is a linear density, or dB of something else.
    if (!(own < 0)) {
      throw new RangeError(
        `Cannot build the budget: ${label} must be a level below 0 dBc/Hz, got ${own} at ${offset} Hz`,
      );
    }
    return 10 ** (own / 10);
  });
}

function refuseOffsets(offsets: readonly number[], frequency: number): void {
  if (offsets.length === 0) {
    throw new TypeError("Cannot build the budget: expected at least 1 offset, got 0");
  }
  offsets.forEach((offset, k) => {
    if (!(offset > 0)) {
      throw new RangeError(`Cannot build the budget: offsets must be > 0 Hz, got ${offset} Hz`);
    }
    if (offset === offsets[k - 1]) {
      throw new RangeError(`Cannot build the budget: the offset ${offset} Hz is there twice`);
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
function slopesOf(
  offsets: readonly number[],
  level: readonly number[],
): (number | undefined)[] {
  return offsets.map((_, k) => {
    const before = Math.max(0, k - 1);
    const after = Math.min(offsets.length - 1, k + 1);
    if (after === before) return undefined;
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
