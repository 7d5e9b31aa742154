/**
 * One inductance of a family at one programmed current: its trimmed tank, and every limit it is judged by.
 *
 * @module
 */
import type { BuiltOscillator, Condition, TankDesign, Topology } from "../circuit/topology.ts";
import type { TechnologyCard } from "../device/technology_card.ts";
import { formatQuantity } from "../quantity/format_quantity.ts";
import { Orbit } from "../orbit/orbit.ts";
import type { FamilyMember, InductorFamily } from "./inductor_family.ts";
import { oscillation } from "./oscillation.ts";
import { type Startup, startup } from "./startup.ts";

const TRIM_ITERATIONS = 12;
/** Relative accuracy of the capacitance to which the frequency is trimmed. */
const TRIM_TOLERANCE = 1e-6;

/** What binds the answer. */
export type BindingLimit =
  | "startup"
  | "power"
  | "fixed capacitance"
  | "self-resonance"
  | "smallest of the family"
  | "largest of the family";

/** What is asked of the inductance. */
export interface InductanceOptions<Design> {
  readonly card: TechnologyCard;
  readonly family: InductorFamily;
  /** The design with a tank; everything but the tank is as given. */
  readonly designWith: (tank: TankDesign) => Design;
  /** [Hz] */
  readonly frequency: number;
  /** Conditions the startup is judged at; the first is the nominal one. */
  readonly conditions: readonly [Condition, ...Condition[]];
  /** Startup loop gain asked for at the worst condition [1]. */
  readonly loopGain: number;
  /** Quality factor of the capacitor between the outputs [1]. */
  readonly capacitorQuality: number;
  /** Least capacitance left for that capacitor, what tuning needs [F]. */
  readonly leastCapacitance: number;
  /** Self-resonance over frequency that the coil must keep [1]. */
  readonly resonanceRatio: number;
  /** Most power at the nominal condition [W]. */
  readonly mostPower: number;
}

/** One inductance at one programmed current. */
export interface InductancePoint {
  /** [H] */
  readonly inductance: number;
  /** [A] */
  readonly current: number;
}

/** A tank trimmed to the frequency. */
export interface TrimmedTank {
  /** Its capacitance holds the coil's own and the capacitor. */
  readonly tank: TankDesign;
  readonly member: FamilyMember;
  /** What is left for the capacitor: trimmed, less the coil's own [F]; negative where nothing is. */
  readonly capacitanceLeft: number;
}

/** One inductance at one current, judged by every limit. */
export interface InductanceCheck extends InductancePoint {
  readonly trimmed: TrimmedTank;
  /** Startup loop gain at the worst condition [1]; 0 where there is no equilibrium or no tank. */
  readonly worstLoopGain: number;
  readonly worstCondition: Condition;
  /**
   * Supply power at the nominal condition: the mean over the orbit, at rest where there is none;
   * undefined where there is neither [W].
   */
  readonly power: number | undefined;
  /** Limits that are not kept, startup among them. */
  readonly broken: readonly BindingLimit[];
}

/**
 * The tank of an inductance, its capacitance trimmed so that the oscillator's port is resistive at the
 * frequency, at the nominal condition and a current, with 1/Q = 1/Q_coil + (C_left/C) / Q_capacitor.
 *
 * The devices' own capacitance counts as lossless beside their conductance.
 *
 * @throws {RangeError} when the frequency or the capacitor's quality factor is not positive
 */
export function trimTank<Design>(
  topology: Topology<Design>,
  { inductance, current }: InductancePoint,
  options: InductanceOptions<Design>,
): TrimmedTank {
  const { family, frequency, capacitorQuality, designWith, card, conditions } = options;
  if (!(frequency > 0 && capacitorQuality > 0)) {
    throw new RangeError(
      "Cannot trim the tank: frequency and the capacitor's quality factor must be > 0, got " +
        `${frequency} Hz and ${capacitorQuality}`,
    );
  }
  const member = family.member(inductance);
  const whole = 1 / ((2 * Math.PI * frequency) ** 2 * inductance);
  const tankWith = (capacitance: number): TankDesign => {
    const share = Math.max(0, capacitance - member.capacitance) / whole;
    return {
      inductance,
      quality: 1 / (1 / member.quality + share / capacitorQuality),
      qualityFrequency: frequency,
      capacitance,
    };
  };
  // The port's frequency answers to the capacitance as f^2 ~ 1/(C + own), own being what to find.
  let own = 0;
  for (let iteration = 0; iteration < TRIM_ITERATIONS; iteration++) {
    const capacitance = whole - own;
    if (!(capacitance > member.capacitance)) break;
    const design = topology.withCurrent(designWith(tankWith(capacitance)), current);
    const started = startup(topology.build(design, { card, condition: conditions[0] }));
    if (started.status !== "found") break;
    const total = 1 / ((2 * Math.PI * started.frequency) ** 2 * inductance);
    const change = total - capacitance - own;
    own += change;
    if (Math.abs(change) < TRIM_TOLERANCE * whole) break;
  }
  const tank = tankWith(whole - own);
  return { tank, member, capacitanceLeft: tank.capacitance - member.capacitance };
}

/** The nominal condition of a point. */
export interface NominalStart {
  readonly oscillator: BuiltOscillator;
  readonly started: Startup;
}

/** Startup of one point over all conditions. */
export interface WorstStart extends Omit<InductanceCheck, "power" | "broken"> {
  /** None where there is no equilibrium or no tank. */
  readonly nominal: NominalStart | undefined;
}

/**
 * The trimmed tank of one point and its startup loop gain at the worst condition, the other limits left
 * aside.
 */
export function worstStart<Design>(
  topology: Topology<Design>,
  point: InductancePoint,
  options: InductanceOptions<Design>,
): WorstStart {
  const { card, conditions, designWith } = options;
  const trimmed = trimTank(topology, point, options);
  const result = { ...point, trimmed, worstLoopGain: 0, worstCondition: conditions[0] };
  if (!(trimmed.capacitanceLeft > 0)) return { ...result, nominal: undefined };
  const design = topology.withCurrent(designWith(trimmed.tank), point.current);
  let nominal: NominalStart | undefined;
  let worstLoopGain = Infinity;
  let worstCondition: Condition = conditions[0];
  for (const condition of conditions) {
    const oscillator = topology.build(design, { card, condition });
    const started = startup(oscillator);
    const gain = started.status === "found" ? started.loopGain : 0;
    if (started.status === "found" && condition === conditions[0]) {
      nominal = { oscillator, started };
    }
    if (gain < worstLoopGain) {
      worstLoopGain = gain;
      worstCondition = condition;
    }
  }
  return { ...result, worstLoopGain, worstCondition, nominal };
}

/** Checks one inductance at one programmed current against every limit. */
export function checkInductance<Design>(
  topology: Topology<Design>,
  point: InductancePoint,
  options: InductanceOptions<Design>,
): InductanceCheck {
  const { nominal, ...start } = worstStart(topology, point, options);
  const { frequency, leastCapacitance, resonanceRatio, mostPower, loopGain, family } = options;
  const { member, capacitanceLeft } = start.trimmed;
  const power = nominal && powerOf(nominal, options.conditions[0].supply);
  const broken: BindingLimit[] = [];
  if (!(start.worstLoopGain >= loopGain)) broken.push("startup");
  if (!(capacitanceLeft > 0 && capacitanceLeft >= leastCapacitance)) {
    broken.push("fixed capacitance");
  }
  if (!(member.selfResonance >= resonanceRatio * frequency)) broken.push("self-resonance");
  if (power !== undefined && !(power <= mostPower)) broken.push("power");
  if (point.inductance < family.smallest) broken.push("smallest of the family");
  if (point.inductance > family.largest) broken.push("largest of the family");
  return { ...start, power, broken };
}

function powerOf({ oscillator, started }: NominalStart, supply: number): number {
  const orbit = oscillation(oscillator, { started });
  const current = (x: Float64Array) => oscillator.supplyCurrent(x);
  return supply *
    (orbit instanceof Orbit ? orbit.mean(current) : current(started.equilibrium.state));
}

/** The limits that a check breaks, with their figures, in words. */
export function brokenText<Design>(
  { broken, worstLoopGain: gain, power = NaN, trimmed, inductance, current }: InductanceCheck,
  options: InductanceOptions<Design>,
): string {
  const { loopGain, mostPower, leastCapacitance, resonanceRatio, frequency } = options;
  const text = (value: number, unit: string) => formatQuantity(value, unit, { digits: 3 });
  const parts = broken.map((limit) => {
    switch (limit) {
      case "startup":
        return `the loop gain is ${text(gain, "1")}, ${loopGain} is asked for`;
      case "power":
        return `the power is ${text(power, "W")}, at most ${text(mostPower, "W")} is allowed`;
      case "fixed capacitance":
        return `${text(trimmed.capacitanceLeft, "F")} is left for the capacitor, ${
          text(leastCapacitance, "F")
        } is needed`;
      case "self-resonance":
        return `the coil resonates at ${text(trimmed.member.selfResonance, "Hz")}, ${
          text(resonanceRatio * frequency, "Hz")
        } is needed`;
      default:
        return "the family has no such coil";
    }
  });
  return `at ${text(inductance, "H")} and ${text(current, "A")} ${parts.join("; ")}`;
}
