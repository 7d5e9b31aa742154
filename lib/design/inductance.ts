/**
 * The smallest inductance that still starts, over a family of inductors at a fixed frequency and a
 * programmed current.
 *
 * @module
 */
import type { BuiltOscillator, Condition, TankDesign, Topology } from "../circuit/topology.ts";
import type { TechnologyCard } from "../device/technology_card.ts";
import { Orbit } from "../orbit/orbit.ts";
import type { FamilyMember, InductorFamily } from "./inductor_family.ts";
import { oscillation } from "./oscillation.ts";
import { type Startup, startup } from "./startup.ts";

const TRIM_ITERATIONS = 12;
/** Relative accuracy of the capacitance to which the frequency is trimmed. */
const TRIM_TOLERANCE = 1e-6;
/** Inductances at which a family without gaps is looked at before a boundary is closed in on. */
const SCAN_POINTS = 13;
const ROOT_ITERATIONS = 40;
/** Relative accuracy of the smallest inductance and of the boundaries. */
const ROOT_TOLERANCE = 1e-4;
/** Relative step of the quality factor for the sensitivity of the answer. */
const QUALITY_STEP = 0.02;

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

interface NominalStart {
  readonly oscillator: BuiltOscillator;
  readonly started: Startup;
}

type WorstStart =
  & Pick<
    InductanceCheck,
    "inductance" | "current" | "trimmed" | "worstLoopGain" | "worstCondition"
  >
  & { readonly nominal: NominalStart | undefined };

/** The trimmed tank and the worst startup of one point. */
function worstStart<Design>(
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

/** Startup loop gain at the worst condition, the tank trimmed at that current [1]; 0 where nothing starts. */
export function worstLoopGain<Design>(
  topology: Topology<Design>,
  point: InductancePoint,
  options: InductanceOptions<Design>,
): number {
  return worstStart(topology, point, options).worstLoopGain;
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

/** The smallest inductance and what it rests on. */
export interface InductanceAnswer {
  readonly status: "found";
  readonly check: InductanceCheck;
  /** What keeps a smaller one from being used. */
  readonly binding: BindingLimit;
  /**
   * d ln L / d ln Q of the coil [1]: -1 when the parallel resistance alone decides; undefined where the
   * family's end or its steps decide.
   */
  readonly qualitySensitivity: number | undefined;
}

/** Why no inductance of the family does. */
export interface NoInductance {
  readonly status: "none";
  /** What would have to give way. */
  readonly binding: BindingLimit;
  /** In words. */
  readonly reason: string;
  /** The one that comes nearest to starting. */
  readonly check: InductanceCheck;
}

/**
 * The smallest inductance of the family whose startup loop gain at the worst condition reaches the one
 * asked for at a programmed current, within power, capacitance and self-resonance limits.
 *
 * A family without gaps is looked at in thirteen places before the boundary is closed in on to 1e-4, so a
 * loop gain that does not rise all the way with inductance does no harm. A larger coil has less
 * capacitance left and a lower self-resonance and draws no less, so one that breaks those limits where
 * it first starts has none above it.
 *
 * @param current programmed current [A]
 */
export function smallestInductance<Design>(
  topology: Topology<Design>,
  current: number,
  options: InductanceOptions<Design>,
): InductanceAnswer | NoInductance {
  const bound = smallestStarting(topology, current, options);
  const { inductance } = bound;
  const check = checkInductance(topology, { inductance, current }, options);
  if (check.broken.length > 0) {
    const [limit = "startup"] = check.broken.filter((name) => name !== "startup");
    const binding = bound.starts ? limit : bound.end;
    return { status: "none", binding, check, reason: brokenText(check, options) };
  }
  const moved = bound.atEdge || options.family.inductances
    ? []
    : [1 + QUALITY_STEP, 1 - QUALITY_STEP].map((factor) =>
      smallestStarting(topology, current, withQuality(options, factor))
    ).filter(({ starts, atEdge }) => starts && !atEdge);
  const [higher, lower] = moved;
  const span = Math.log((1 + QUALITY_STEP) / (1 - QUALITY_STEP));
  return {
    status: "found",
    check,
    binding: bound.atEdge ? "smallest of the family" : "startup",
    qualitySensitivity: higher && lower
      ? Math.log(higher.inductance / lower.inductance) / span
      : undefined,
  };
}

/**
 * The smallest of a list of inductances that keeps every limit, each tried in turn: what
 * {@linkcode smallestInductance} must agree with.
 *
 * @param current programmed current [A]
 * @returns undefined where none does
 */
export function smallestByTrial<Design>(
  topology: Topology<Design>,
  current: number,
  { inductances, ...options }: InductanceOptions<Design> & {
    /** To be tried, rising [H]. */
    readonly inductances: readonly number[];
  },
): InductanceCheck | undefined {
  for (const inductance of inductances) {
    const check = checkInductance(topology, { inductance, current }, options);
    if (check.broken.length === 0) return check;
  }
  return undefined;
}

function withQuality<Design>(
  options: InductanceOptions<Design>,
  factor: number,
): InductanceOptions<Design> {
  const { family } = options;
  const member = (inductance: number) => {
    const own = family.member(inductance);
    return { ...own, quality: own.quality * factor };
  };
  return { ...options, family: { ...family, member } };
}

interface Boundary {
  readonly inductance: number;
  readonly starts: boolean;
  /** Whether the smallest of the family starts. */
  readonly atEdge: boolean;
  /** What ends the family where none starts. */
  readonly end: "fixed capacitance" | "largest of the family";
}

/** The smallest inductance that starts, whatever the other limits, or the one nearest to it. */
function smallestStarting<Design>(
  topology: Topology<Design>,
  current: number,
  options: InductanceOptions<Design>,
): Boundary {
  const at = (inductance: number) => {
    const { worstLoopGain: gain, trimmed } = worstStart(
      topology,
      { inductance, current },
      options,
    );
    return { starts: gain >= options.loopGain, possible: trimmed.capacitanceLeft > 0, gain };
  };
  let best = { inductance: options.family.smallest, gain: -Infinity };
  let below: number | undefined;
  for (const inductance of scanned(options.family)) {
    const { starts, possible, gain } = at(inductance);
    if (gain > best.gain) best = { inductance, gain };
    const whole = { atEdge: below === undefined, end: "largest of the family" } as const;
    if (options.family.inductances && starts) return { inductance, starts, ...whole };
    if (starts && below === undefined) return { inductance, starts, ...whole };
    if (starts && below !== undefined) {
      const { high } = closeIn({ low: below, high: inductance }, (L) => at(L).starts);
      return { inductance: high, starts, ...whole };
    }
    if (!possible) {
      const end = "fixed capacitance" as const;
      if (below === undefined || options.family.inductances) {
        return { inductance: best.inductance, starts: false, atEdge: false, end };
      }
      // The last inductance with any capacitance left may be the first that starts.
      const { low: last } = closeIn({ low: below, high: inductance }, (L) => !at(L).possible);
      if (!at(last).starts) return { inductance: last, starts: false, atEdge: false, end };
      const { high } = closeIn({ low: below, high: last }, (L) => at(L).starts);
      return { inductance: high, starts: true, atEdge: false, end };
    }
    below = inductance;
  }
  const { inductance } = best;
  return { inductance, starts: false, atEdge: false, end: "largest of the family" };
}

function scanned({ smallest, largest, inductances }: InductorFamily): readonly number[] {
  return inductances ?? Array.from(
    { length: SCAN_POINTS },
    (_, k) => k === SCAN_POINTS - 1 ? largest : smallest * (largest / smallest) ** (k / 12),
  );
}

/** Closes in on where `holds` turns true between a low end where it does not and a high end where it does. */
export function closeIn(
  ends: { readonly low: number; readonly high: number },
  holds: (value: number) => boolean,
): { low: number; high: number } {
  let { low, high } = ends;
  for (let k = 0; k < ROOT_ITERATIONS && high / low > 1 + ROOT_TOLERANCE; k++) {
    const middle = Math.sqrt(low * high);
    if (holds(middle)) high = middle;
    else low = middle;
  }
  return { low, high };
}

/** The limits that a check breaks, with their figures, in words. */
export function brokenText<Design>(
  { broken, worstLoopGain: gain, power = NaN, trimmed, inductance, current }: InductanceCheck,
  options: InductanceOptions<Design>,
): string {
  const { loopGain, mostPower, leastCapacitance, resonanceRatio, frequency } = options;
  const short = (value: number) => String(Number(value.toPrecision(3)));
  const parts = broken.map((limit) => {
    switch (limit) {
      case "startup":
        return `the loop gain is ${short(gain)}, ${loopGain} is asked for`;
      case "power":
        return `the power is ${short(power * 1e3)} mW, at most ${short(mostPower * 1e3)} mW`;
      case "fixed capacitance":
        return `${short(trimmed.capacitanceLeft * 1e15)} fF is left for the capacitor, ${
          short(leastCapacitance * 1e15)
        } fF is needed`;
      case "self-resonance":
        return `the coil resonates at ${short(trimmed.member.selfResonance / 1e9)} GHz, ${
          short(resonanceRatio * frequency / 1e9)
        } GHz is needed`;
      default:
        return "the family has no such coil";
    }
  });
  return `at ${short(inductance * 1e9)} nH and ${short(current * 1e3)} mA ${parts.join("; ")}`;
}
