/**
 * The smallest inductance that still starts, over a family of inductors at a fixed frequency, and the
 * map of inductance against bias current behind it.
 *
 * @module
 */
import type { BuiltOscillator, Condition, TankDesign, Topology } from "../circuit/topology.ts";
import type { TechnologyCard } from "../device/technology_card.ts";
import { type BiasSweep, biasSweep } from "./bias.ts";
import { startup } from "./startup.ts";

const CAPACITANCE_ITERATIONS = 12;
/** Relative accuracy of the frequency to which the capacitance is trimmed. */
const FREQUENCY_TOLERANCE = 1e-6;
const ROOT_ITERATIONS = 40;
/** Relative accuracy of the smallest inductance and of the boundary currents. */
const ROOT_TOLERANCE = 1e-4;
/** Relative step of the quality factor for the sensitivity of the answer. */
const QUALITY_STEP = 0.02;

/** A member of a family of inductors. */
export interface FamilyMember {
  /** Quality factor of the coil at the frequency asked for [1]. */
  readonly quality: number;
  /** Self-resonance [Hz]; Infinity where the family does not know it. */
  readonly selfResonance: number;
}

/** A family of inductors: what a coil of a given inductance is like at the frequency. */
export interface InductorFamily {
  readonly name: string;
  /** Smallest and largest inductance the family offers [H]. */
  readonly smallest: number;
  readonly largest: number;
  /** The member with a differential inductance [H]. */
  member(inductance: number): FamilyMember;
}

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
  /** Quality factor of the capacitance [1]. */
  readonly capacitorQuality: number;
  /** Least trimmed capacitance between the outputs, what tuning needs [F]. */
  readonly leastCapacitance: number;
  /** Self-resonance over frequency that the coil must keep [1]. */
  readonly resonanceRatio: number;
  /** Most power at the nominal condition [W]. */
  readonly mostPower: number;
}

/** A tank trimmed to the frequency. */
export interface TrimmedTank {
  readonly tank: TankDesign;
  /** Quality factor of the coil alone [1]. */
  readonly coilQuality: number;
  readonly selfResonance: number;
}

/** One inductance at one current. */
export interface InductanceCheck {
  readonly inductance: number;
  readonly current: number;
  readonly trimmed: TrimmedTank;
  /** Startup loop gain at the worst condition [1]. */
  readonly worstLoopGain: number;
  readonly worstCondition: Condition;
  /** Supply power at the nominal operating point [W]. */
  readonly power: number;
  /** Limits that are not kept, startup among them. */
  readonly broken: readonly BindingLimit[];
}

/**
 * The tank of an inductance, its capacitance trimmed so that the oscillator's port is resistive at the
 * frequency, at the nominal condition and a current.
 *
 * @returns the tank; its capacitance is negative where the devices' own is already too much
 */
export function trimTank<Design>(
  topology: Topology<Design>,
  { inductance, current }: { readonly inductance: number; readonly current: number },
  options: InductanceOptions<Design>,
): TrimmedTank {
  const { family, frequency, capacitorQuality, designWith, card, conditions } = options;
  const { quality: coilQuality, selfResonance } = family.member(inductance);
  const whole = 1 / ((2 * Math.PI * frequency) ** 2 * inductance);
  const quality = 1 / (1 / coilQuality + 1 / capacitorQuality);
  const tankWith = (capacitance: number): TankDesign => ({
    inductance,
    quality,
    qualityFrequency: frequency,
    capacitance,
  });
  // The port's frequency answers to the capacitance as f^2 ~ 1/(C + own), own being what to find.
  let own = 0;
  for (let iteration = 0; iteration < CAPACITANCE_ITERATIONS; iteration++) {
    const capacitance = whole - own;
    if (!(capacitance > 0)) break;
    const design = topology.withCurrent(designWith(tankWith(capacitance)), current);
    const started = startup(topology.build(design, { card, condition: conditions[0] }));
    if (started.status !== "found") break;
    const total = 1 / ((2 * Math.PI * started.frequency) ** 2 * inductance);
    const change = total - capacitance - own;
    own += change;
    if (Math.abs(change) < FREQUENCY_TOLERANCE * whole) break;
  }
  return { tank: tankWith(whole - own), coilQuality, selfResonance };
}

/**
 * Checks one inductance at one programmed current against every limit.
 *
 * @throws RangeError where an operating point cannot be found
 */
export function checkInductance<Design>(
  topology: Topology<Design>,
  point: { readonly inductance: number; readonly current: number },
  options: InductanceOptions<Design>,
): InductanceCheck {
  const { frequency, leastCapacitance, resonanceRatio, mostPower, loopGain, family } = options;
  const trimmed = trimTank(topology, point, options);
  const capacitance = trimmed.tank.capacitance;
  let worstLoopGain = Infinity;
  let worstCondition = options.conditions[0];
  let power = NaN;
  if (capacitance > 0) {
    const design = topology.withCurrent(options.designWith(trimmed.tank), point.current);
    for (const condition of options.conditions) {
      const oscillator = topology.build(design, { card: options.card, condition });
      const started = startup(oscillator);
      const gain = started.status === "found" ? started.loopGain : 0;
      if (started.status === "found" && condition === options.conditions[0]) {
        power = quiescentPower(oscillator, started.equilibrium.state, condition);
      }
      if (gain < worstLoopGain) {
        worstLoopGain = gain;
        worstCondition = condition;
      }
    }
  }
  const broken: BindingLimit[] = [];
  if (!(worstLoopGain >= loopGain) || worstLoopGain === Infinity) broken.push("startup");
  if (!(capacitance >= leastCapacitance)) broken.push("fixed capacitance");
  if (!(trimmed.selfResonance >= resonanceRatio * frequency)) broken.push("self-resonance");
  if (!(power <= mostPower) && !Number.isNaN(power)) broken.push("power");
  if (point.inductance < family.smallest) broken.push("smallest of the family");
  if (point.inductance > family.largest) broken.push("largest of the family");
  return { ...point, trimmed, worstLoopGain, worstCondition, power, broken };
}

function quiescentPower(
  oscillator: BuiltOscillator,
  state: Float64Array,
  { supply }: Condition,
): number {
  return supply * oscillator.supplyCurrent(state);
}

/** The smallest inductance and what it rests on. */
export interface InductanceAnswer {
  readonly status: "found";
  readonly check: InductanceCheck;
  /** What keeps a smaller one from being used. */
  readonly binding: BindingLimit;
  /** d ln L / d ln Q of the coil [1]: -1 when the parallel resistance alone decides. */
  readonly qualitySensitivity: number;
}

/** Why no inductance of the family does. */
export interface NoInductance {
  readonly status: "none";
  readonly binding: BindingLimit;
  /** In words. */
  readonly reason: string;
  /** The largest that could be tried. */
  readonly check: InductanceCheck;
}

/**
 * The smallest inductance of the family whose startup loop gain at the worst condition reaches the one
 * asked for at a programmed current, within power, capacitance and self-resonance limits.
 *
 * The worst loop gain is taken to rise with inductance over the family, which a rising parallel
 * resistance gives; the bisection's end is checked against its neighbours.
 *
 * @param current programmed current [A]
 */
export function smallestInductance<Design>(
  topology: Topology<Design>,
  current: number,
  options: InductanceOptions<Design>,
): InductanceAnswer | NoInductance {
  const bound = smallestStarting(topology, current, options);
  const { check } = bound;
  if (check.broken.length > 0) {
    const [binding = "startup"] = check.broken;
    return {
      status: "none",
      binding,
      check,
      reason: reasonOf(check, options),
    };
  }
  const higher = smallestStarting(topology, current, withQuality(options, 1 + QUALITY_STEP));
  const lower = smallestStarting(topology, current, withQuality(options, 1 - QUALITY_STEP));
  const span = Math.log((1 + QUALITY_STEP) / (1 - QUALITY_STEP));
  return {
    status: "found",
    check,
    binding: bound.atEdge ? "smallest of the family" : "startup",
    qualitySensitivity: Math.log(higher.check.inductance / lower.check.inductance) / span,
  };
}

function withQuality<Design>(
  options: InductanceOptions<Design>,
  factor: number,
): InductanceOptions<Design> {
  const { family } = options;
  return {
    ...options,
    family: {
      ...family,
      member: (inductance) => {
        const { quality, selfResonance } = family.member(inductance);
        return { quality: quality * factor, selfResonance };
      },
    },
  };
}

/** The smallest inductance that starts, or the largest of the family when none does. */
function smallestStarting<Design>(
  topology: Topology<Design>,
  current: number,
  options: InductanceOptions<Design>,
): { check: InductanceCheck; atEdge: boolean } {
  const { smallest, largest } = options.family;
  const at = (inductance: number) => checkInductance(topology, { inductance, current }, options);
  const starts = (check: InductanceCheck) => !check.broken.includes("startup");
  const first = at(smallest);
  if (starts(first)) return { check: first, atEdge: true };
  // Where the devices' capacitance is too much, no larger inductance can follow: step back from there.
  let high = largest;
  let check = at(high);
  for (let k = 0; k < ROOT_ITERATIONS && !(check.trimmed.tank.capacitance > 0); k++) {
    high = Math.sqrt(high * smallest);
    check = at(high);
  }
  if (!starts(check)) return { check, atEdge: false };
  let low = smallest;
  for (let k = 0; k < ROOT_ITERATIONS && high / low > 1 + ROOT_TOLERANCE; k++) {
    const middle = Math.sqrt(low * high);
    const candidate = at(middle);
    if (starts(candidate)) {
      high = middle;
      check = candidate;
    } else {
      low = middle;
    }
  }
  return { check, atEdge: false };
}

function reasonOf<Design>(
  { broken, worstLoopGain, power, trimmed, inductance }: InductanceCheck,
  { loopGain, mostPower, leastCapacitance, resonanceRatio, frequency }: InductanceOptions<Design>,
): string {
  const parts = broken.map((limit) => {
    switch (limit) {
      case "startup":
        return `the loop gain is ${worstLoopGain.toPrecision(3)}, ${loopGain} is asked for`;
      case "power":
        return `the power is ${power.toPrecision(3)} W, at most ${mostPower} W is allowed`;
      case "fixed capacitance":
        return `${
          trimmed.tank.capacitance.toPrecision(3)
        } F is left for the capacitor, ${leastCapacitance} F is needed`;
      case "self-resonance":
        return `the coil resonates at ${trimmed.selfResonance.toPrecision(3)} Hz, ${
          (resonanceRatio * frequency).toPrecision(3)
        } Hz is needed`;
      default:
        return `the inductance is outside the family`;
    }
  });
  return `at ${inductance.toPrecision(3)} H ${parts.join("; ")}`;
}

/** One column of the map: a sweep of the current at one inductance. */
export interface InductanceColumn {
  readonly inductance: number;
  readonly trimmed: TrimmedTank;
  readonly sweep: BiasSweep;
  /** Programmed current at which the worst loop gain reaches the one asked for [A]; undefined outside. */
  readonly startupCurrent: number | undefined;
  /** Programmed current at which the power limit is reached [A]; undefined outside. */
  readonly powerCurrent: number | undefined;
  /** Limits of the coil that this inductance breaks whatever the current. */
  readonly broken: readonly BindingLimit[];
}

/**
 * One column of the map of inductance against bias current; the map is a list of these, one per
 * inductance, so that a caller can show progress and stop between them.
 *
 * @param currents programmed currents, increasing [A]
 * @param offset of the phase noise [Hz]
 */
export function inductanceColumn<Design>(
  topology: Topology<Design>,
  inductance: number,
  { currents, offset, kneeExponent, ...options }: InductanceOptions<Design> & {
    readonly currents: readonly number[];
    readonly offset: number;
    readonly kneeExponent?: number;
  },
): InductanceColumn | undefined {
  const middle = currents[Math.floor(currents.length / 2)] ?? NaN;
  const trimmed = trimTank(topology, { inductance, current: middle }, options);
  if (!(trimmed.tank.capacitance > 0)) return undefined;
  const sweep = biasSweep(topology, options.designWith(trimmed.tank), {
    card: options.card,
    condition: options.conditions[0],
    currents,
    offset,
    ...(kneeExponent === undefined ? {} : { kneeExponent }),
  });
  const check = (current: number) => checkInductance(topology, { inductance, current }, options);
  const broken = check(middle).broken.filter((limit) => limit !== "startup" && limit !== "power");
  return {
    inductance,
    trimmed,
    sweep,
    startupCurrent: crossing(
      currents,
      (current) => check(current).worstLoopGain / options.loopGain - 1,
    ),
    powerCurrent: crossing(
      currents,
      (current) => check(current).power / options.mostPower - 1,
    ),
    broken,
  };
}

/** Where a rising function of the current passes zero, by bisection in ln I; undefined outside. */
function crossing(
  currents: readonly number[],
  value: (current: number) => number,
): number | undefined {
  let low = currents[0] ?? NaN;
  let high = currents[currents.length - 1] ?? NaN;
  if (!(value(low) < 0 && value(high) >= 0)) return undefined;
  for (let k = 0; k < ROOT_ITERATIONS && high / low > 1 + ROOT_TOLERANCE; k++) {
    const middle = Math.sqrt(low * high);
    if (value(middle) < 0) low = middle;
    else high = middle;
  }
  return high;
}
