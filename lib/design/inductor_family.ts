/**
 * Families of inductors: what a coil of a given inductance is like at one frequency, by a rule, from a
 * sweep of geometries, or from a set of measured files.
 *
 * @module
 */
import { coilFromGeometry } from "../device/inductor_from_geometry.ts";
import { coilFromNetwork } from "../device/inductor_from_network.ts";
import type { SpiralGeometry, SpiralShape } from "../device/inductor_geometry.ts";
import type { CoilLayers } from "../device/inductor_layers.ts";
import type { CoilModel } from "../device/inductor_model.ts";
import type { CoilExcitation } from "../device/inductor_network.ts";
import { spiralInductance } from "../device/inductor_spiral_formulas.ts";
import { readTouchstone } from "../device/touchstone_read.ts";

const DIAMETER_BISECTIONS = 60;
/** The halves' coupling plays no part in what a differential drive sees; giving one spares computing it. */
const ANY_COUPLING = 0.6;
/** Opening of a hollow coil over its outer diameter (common practice: a third). */
const OPENING_SHARE = 1 / 3;

/** A member of a family of inductors, as the plain tank of its inductance takes it. */
export interface FamilyMember {
  /** Parallel loss resistance over 2 pi f L at the frequency, of the coil alone [1]. */
  readonly quality: number;
  /** [Hz]; Infinity where the family does not know it. */
  readonly selfResonance: number;
  /** Capacitance of the coil between its ends at the frequency [F]. */
  readonly capacitance: number;
  /** What it is, in words: dimensions, a file's name. */
  readonly description?: string;
}

/** A family of inductors: what a coil of a given inductance is like at the frequency. */
export interface InductorFamily {
  /** In a few words. */
  readonly name: string;
  /** Smallest and largest inductance the family offers [H]. */
  readonly smallest: number;
  readonly largest: number;
  /** Every inductance it offers, rising [H]; left out where any between the ends can be made. */
  readonly inductances?: readonly number[];
  /** The member with a differential inductance that the family offers [H]. */
  member(inductance: number): FamilyMember;
}

/** Options of {@linkcode ruleFamily}. */
export interface RuleFamilyOptions {
  /** Quality factor of the coil at the reference inductance, at the frequency [1]. */
  readonly quality: number;
  /** x in Q = Qr (L / Lr)^x [1]. @default 0 */
  readonly exponent?: number;
  /** Lr [H] */
  readonly referenceInductance: number;
  /** Self-resonance at the reference inductance [Hz]; it falls as 1/L. @default not known */
  readonly selfResonance?: number;
  readonly smallest: number;
  readonly largest: number;
}

/**
 * A family by the rule Q = Qr (L / Lr)^x with self-resonance fr Lr / L, which is what a capacitance in
 * proportion to the inductance gives (common practice for coils of one trace width).
 *
 * @throws {RangeError} when a figure is out of range
 */
export function ruleFamily(options: RuleFamilyOptions): InductorFamily {
  const { quality, exponent = 0, referenceInductance, selfResonance = Infinity } = options;
  const { smallest, largest } = options;
  demandRange({ smallest, largest }, { name: "inductance", unit: "H" });
  demandPositive(quality, "quality factor", "");
  demandPositive(referenceInductance, "reference inductance", "H");
  if (!(selfResonance > 0)) {
    throw familyError(`self-resonance must be > 0 Hz, got ${selfResonance} Hz`);
  }
  if (!Number.isFinite(exponent)) {
    throw familyError(`exponent must be a finite number, got ${exponent}`);
  }
  return {
    name: "coils by a rule",
    smallest,
    largest,
    member(inductance) {
      const size = inductance / referenceInductance;
      const resonance = selfResonance / size;
      return {
        quality: quality * size ** exponent,
        selfResonance: resonance,
        capacitance: 1 / ((2 * Math.PI * resonance) ** 2 * inductance),
      };
    },
  };
}

/** Options of {@linkcode geometryFamily}. */
export interface GeometryFamilyOptions {
  readonly shape: SpiralShape;
  /** Numbers of turns to choose from [1]. */
  readonly turns: readonly number[];
  /** Widths of the trace to choose from [m]. */
  readonly widths: readonly number[];
  /** [m] */
  readonly spacing: number;
  /** Outer diameters between which every value can be drawn [m]. */
  readonly outerDiameter: { readonly smallest: number; readonly largest: number };
  /** Least inner over outer diameter [1]. @default 1/3, common practice */
  readonly openingShare?: number;
  readonly layers: CoilLayers;
  /** Of the metal [K]. */
  readonly temperature: number;
  /** At which the members are looked at [Hz]. */
  readonly frequency: number;
}

interface Outline {
  readonly turns: number;
  readonly width: number;
  /** Smallest and largest outer diameter [m] and their inductances [H]. */
  readonly diameters: readonly [number, number];
  readonly inductances: readonly [number, number];
}

/**
 * A family of symmetric differential coils: of every number of turns and width that reaches an inductance
 * within the outer diameters, the one with the best quality factor.
 *
 * @throws {RangeError} when no coil can be drawn, or the outlines leave a gap between the ends
 */
export function geometryFamily(options: GeometryFamilyOptions): InductorFamily {
  const { shape, turns, widths, spacing, layers, temperature, frequency } = options;
  const { outerDiameter, openingShare = OPENING_SHARE } = options;
  demandPositive(frequency, "frequency", "Hz");
  demandRange(outerDiameter, { name: "outer diameter", unit: "m" });
  if (!(openingShare > 0 && openingShare < 1)) {
    throw familyError(`opening share must lie between 0 and 1, got ${openingShare}`);
  }
  const geometry = (turn: number, width: number, diameter: number): SpiralGeometry => ({
    shape,
    turns: turn,
    width,
    spacing,
    outerDiameter: diameter,
  });
  const inductanceOf = (turn: number, width: number, diameter: number) =>
    spiralInductance(geometry(turn, width, diameter)).inductance;
  const outlines = turns.flatMap((turn) =>
    widths.flatMap((width): Outline[] => {
      const metal = 2 * (turn * width + (turn - 1) * spacing);
      const least = Math.max(outerDiameter.smallest, metal / (1 - openingShare));
      if (!(least < outerDiameter.largest)) return [];
      const diameters = [least, outerDiameter.largest] as const;
      const [small, large] = diameters.map((diameter) => inductanceOf(turn, width, diameter));
      return [{ turns: turn, width, diameters, inductances: [small!, large!] }];
    })
  );
  const [smallest, largest] = rangeOf(outlines);
  const known = new Map<number, FamilyMember>();
  const find = (inductance: number): FamilyMember => {
    let best: { coil: CoilModel; quality: number; text: string } | undefined;
    for (const outline of outlines) {
      const { turns: turn, width, diameters, inductances: [small, large] } = outline;
      if (!(inductance >= small * (1 - 1e-12) && inductance <= large * (1 + 1e-12))) continue;
      let [low, high] = diameters;
      for (let k = 0; k < DIAMETER_BISECTIONS; k++) {
        const middle = (low + high) / 2;
        if (inductanceOf(turn, width, middle) < inductance) low = middle;
        else high = middle;
      }
      const coil = coilFromGeometry(geometry(turn, width, high), layers, {
        excitation: "differential",
        temperature,
        coupling: ANY_COUPLING,
      });
      const quality = coil.parallelResistance(frequency) / (2 * Math.PI * frequency * inductance);
      if (best !== undefined && !(quality > best.quality)) continue;
      best = { coil, quality, text: outlineText(turn, width, high) };
    }
    if (!best) {
      throw familyError(
        `inductance must lie from ${smallest} H to ${largest} H, got ${inductance} H`,
      );
    }
    return memberOf(best.coil, { frequency, description: best.text });
  };
  return {
    name: `${shape} coils`,
    smallest,
    largest,
    member(inductance) {
      const member = known.get(inductance) ?? find(inductance);
      known.set(inductance, member);
      return member;
    },
  };
}

/** One measured or field-solved coil: the text of a Touchstone file. */
export interface MeasuredCoil {
  /** Name for messages and tables, such as the file's. */
  readonly name: string;
  readonly text: string;
}

/** Options of {@linkcode measuredFamily}. */
export interface MeasuredFamilyOptions {
  /** At which the members are looked at [Hz]. */
  readonly frequency: number;
  /** What drives the coil in the files. */
  readonly excitation: CoilExcitation;
}

/**
 * A family that is a set of measured or field-solved coils. Of two with the same inductance the better
 * one is kept.
 *
 * @throws {RangeError} when there is no file, or a coil is not inductive or not known at the frequency
 * @throws {SyntaxError} when a file cannot be read; the message begins with its name
 */
export function measuredFamily(
  files: readonly MeasuredCoil[],
  { frequency, excitation }: MeasuredFamilyOptions,
): InductorFamily {
  demandPositive(frequency, "frequency", "Hz");
  if (files.length === 0) throw familyError("there must be at least one file, got none");
  const members = files.map(({ name, text }) => {
    try {
      const read = coilFromNetwork(readTouchstone(text), { excitation });
      if (read.status !== "found") throw new RangeError(read.reason);
      const { coil } = read;
      const { inductance } = coil.parameters;
      return { inductance, member: memberOf(coil, { frequency, description: name }) };
    } catch (error) {
      if (error instanceof Error) error.message = `${name}: ${error.message}`;
      throw error;
    }
  }).sort((a, b) => a.inductance - b.inductance || b.member.quality - a.member.quality)
    .filter(({ inductance }, k, all) => inductance !== all[k - 1]?.inductance);
  const inductances = members.map(({ inductance }) => inductance);
  return {
    name: files.length === 1 ? "one measured coil" : `${members.length} measured coils`,
    smallest: inductances[0]!,
    largest: inductances[inductances.length - 1]!,
    inductances,
    member(inductance) {
      const found = members.find((entry) => entry.inductance === inductance);
      if (found) return found.member;
      throw familyError(
        `inductance must be one of the set's (${inductances.join(", ")} H), got ${inductance} H`,
      );
    },
  };
}

/**
 * The coil as a plain tank of its inductance takes it at a frequency: parallel loss and the capacitance
 * between its ends, from its admittance Y = 1/R + j (w C - 1/(w L)).
 */
function memberOf(
  coil: CoilModel,
  { frequency, description }: { readonly frequency: number; readonly description: string },
): FamilyMember {
  const { inductance } = coil.parameters;
  const angular = 2 * Math.PI * frequency;
  const { re, im } = coil.admittance(frequency);
  if (!(im < 0 && re > 0)) {
    throw familyError(
      `the coil must be lossy and inductive at ${frequency} Hz, got ${re} S and ${im} S`,
    );
  }
  return {
    quality: 1 / (re * angular * inductance),
    selfResonance: coil.selfResonance ?? Infinity,
    capacitance: Math.max(0, im / angular + 1 / (angular ** 2 * inductance)),
    description,
  };
}

function rangeOf(outlines: readonly Outline[]): readonly [number, number] {
  const ranges = outlines.map(({ inductances }) => inductances).sort(([a], [b]) => a - b);
  const [first, ...rest] = ranges;
  if (!first) {
    throw familyError("at least one coil must fit inside the largest outer diameter, got none");
  }
  let [, reached] = first;
  for (const [small, large] of rest) {
    if (small > reached) {
      throw familyError(`the outlines must overlap, got none between ${reached} H and ${small} H`);
    }
    reached = Math.max(reached, large);
  }
  return [first[0], reached];
}

function outlineText(turns: number, width: number, diameter: number): string {
  const um = (length: number) => `${Number((length * 1e6).toPrecision(3))} um`;
  return `${turns} turn${turns === 1 ? "" : "s"}, ${um(width)} wide, ${um(diameter)} across`;
}

function demandRange(
  { smallest, largest }: { readonly smallest: number; readonly largest: number },
  { name, unit }: { readonly name: string; readonly unit: string },
): void {
  if (!(smallest > 0 && largest > smallest && largest < Infinity)) {
    throw familyError(
      `${name} must be > 0 ${unit} and rise from smallest to largest, got ${smallest} ${unit} to ${largest} ${unit}`,
    );
  }
}

function demandPositive(value: number, what: string, unit: string): void {
  if (value > 0 && value < Infinity) return;
  const space = unit === "" ? "" : ` ${unit}`;
  throw familyError(`${what} must be > 0${space}, got ${value}${space}`);
}

function familyError(text: string): RangeError {
  return new RangeError(`Cannot make the family of inductors: ${text}`);
}
