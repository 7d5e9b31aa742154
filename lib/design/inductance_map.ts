/**
 * The map of inductance against bias current: a sweep of the current at each inductance, with the limits
 * between which the two may be chosen.
 *
 * @module
 */
import type { Topology } from "../circuit/topology.ts";
import { closeIn } from "./_close_in.ts";
import { type BiasPoint, type BiasSweep, biasSweep } from "./bias.ts";
import { handComparisons } from "./hand_values.ts";
import type { InductanceAnswer, NoInductance } from "./inductance.ts";
import {
  type BindingLimit,
  brokenText,
  checkInductance,
  type InductanceCheck,
  type InductanceOptions,
  type TrimmedTank,
  trimTank,
  worstStart,
} from "./inductance_check.ts";

/** Of a column's currents, every so many is tried for the startup before the boundary is closed in on. */
const STARTUP_STRIDE = 3;
/** Places at which a family without gaps is looked at for where its limits end. */
const LIMIT_PLACES = 25;
/** Neighbours of a point, as factors on its current, from which the slope at it is taken. */
const ASIDE = 1.02;

/** Options of {@linkcode inductanceColumn}. */
export interface InductanceColumnOptions<Design> extends InductanceOptions<Design> {
  /** Programmed currents, increasing [A]. */
  readonly currents: readonly number[];
  /** Offset of the phase noise [Hz]. */
  readonly offset: number;
  /** d ln A / d ln I at the knee [1]. @default 0.5 */
  readonly kneeExponent?: number;
}

/** One inductance of the map: a sweep of the current. */
export interface InductanceColumn {
  /** [H] */
  readonly inductance: number;
  /** Trimmed at the middle current of the sweep. */
  readonly trimmed: TrimmedTank;
  /** At the nominal condition. */
  readonly sweep: BiasSweep;
  /**
   * Programmed current from which the worst loop gain reaches the one asked for: the first of the sweep
   * where that one does already; undefined where none does [A].
   */
  readonly startupCurrent: number | undefined;
  /** Programmed current at which the power limit is reached; undefined where the sweep stays below it [A]. */
  readonly powerCurrent: number | undefined;
}

/**
 * One column of the map of inductance against bias current; the map is a list of these, one per
 * inductance, so that a caller can show progress and stop between them.
 *
 * @param inductance one that the family offers [H]
 * @returns undefined where no capacitance is left at that inductance
 * @throws {RangeError} for currents that are not positive and increasing
 */
export function inductanceColumn<Design>(
  topology: Topology<Design>,
  inductance: number,
  { currents, offset, kneeExponent, ...options }: InductanceColumnOptions<Design>,
): InductanceColumn | undefined {
  const middle = currents[Math.floor(currents.length / 2)] ?? NaN;
  const trimmed = trimTank(topology, { inductance, current: middle }, options);
  if (!(trimmed.capacitanceLeft > 0)) return undefined;
  const sweep = biasSweep(topology, options.designWith(trimmed.tank), {
    card: options.card,
    condition: options.conditions[0],
    currents,
    offset,
    ...(kneeExponent === undefined ? {} : { kneeExponent }),
  });
  const starts = (current: number) =>
    worstStart(topology, { inductance, current }, options).worstLoopGain >= options.loopGain;
  return {
    inductance,
    trimmed,
    sweep,
    startupCurrent: firstStart(currents, starts),
    powerCurrent: powerCurrentOf(sweep, options.mostPower),
  };
}

function firstStart(
  currents: readonly number[],
  starts: (current: number) => boolean,
): number | undefined {
  let low: number | undefined;
  for (const [k, high] of currents.entries()) {
    if (k % STARTUP_STRIDE !== 0 && k !== currents.length - 1) continue;
    if (starts(high)) return low === undefined ? high : closeIn({ low, high }, starts).high;
    low = high;
  }
  return undefined;
}

/** By interpolation of ln P over ln I between the points of the sweep. */
function powerCurrentOf({ points, condition }: BiasSweep, mostPower: number): number | undefined {
  const curve = points.flatMap(({ current, figures, startup, oscillator }) => {
    const power = figures?.power ??
      (startup && condition.supply * oscillator.supplyCurrent(startup.equilibrium.state));
    return power === undefined ? [] : [{ current, power }];
  });
  for (const [k, { current, power }] of curve.entries()) {
    if (!(power > mostPower)) continue;
    const before = curve[k - 1];
    if (!before) return current;
    const part = Math.log(mostPower / before.power) / Math.log(power / before.power);
    return before.current * (current / before.current) ** part;
  }
  return undefined;
}

/** Where the family ends, or a limit of its coils does. */
export interface FamilyLimit {
  readonly limit: BindingLimit;
  /** Which inductances it forbids. */
  readonly forbids: "above" | "below";
  /** [H] */
  readonly inductance: number;
}

/**
 * Where the family's coils stop being of use, whatever the startup: its two ends, the largest inductance
 * that leaves the capacitance asked for, and the largest with the self-resonance asked for.
 *
 * @param current programmed current at which the tanks are trimmed [A]
 */
export function familyLimits<Design>(
  topology: Topology<Design>,
  current: number,
  options: InductanceOptions<Design>,
): FamilyLimit[] {
  const { family, leastCapacitance, resonanceRatio, frequency } = options;
  const { smallest, largest, inductances } = family;
  const ends: FamilyLimit[] = [
    { limit: "smallest of the family", forbids: "below", inductance: smallest },
    { limit: "largest of the family", forbids: "above", inductance: largest },
  ];
  const places = inductances ?? Array.from(
    { length: LIMIT_PLACES },
    (_, k) =>
      k === LIMIT_PLACES - 1
        ? largest
        : smallest * (largest / smallest) ** (k / (LIMIT_PLACES - 1)),
  );
  const broken: readonly [BindingLimit, (inductance: number) => boolean][] = [
    ["fixed capacitance", (inductance) => {
      const { capacitanceLeft } = trimTank(topology, { inductance, current }, options);
      return !(capacitanceLeft > 0 && capacitanceLeft >= leastCapacitance);
    }],
    [
      "self-resonance",
      (inductance) => !(family.member(inductance).selfResonance >= resonanceRatio * frequency),
    ],
  ];
  return [
    ...ends,
    ...broken.flatMap(([limit, breaks]): FamilyLimit[] => {
      const k = places.findIndex(breaks);
      const [high, low] = [places[k], places[k - 1]];
      if (high === undefined) return [];
      const inductance = low === undefined
        ? high
        : inductances
        ? Math.sqrt(low * high)
        : closeIn({ low, high }, breaks).low;
      return [{ limit, forbids: "above", inductance }];
    }),
  ];
}

/**
 * The smallest inductance on the line of the recommended current, the lead's multiple of the knee current,
 * within every limit: what the map recommends. The knee current between columns, and beyond the last that
 * reaches its knee, follows a power law through the two nearest.
 *
 * @param columns of the map, by rising inductance, from the smallest of the family
 * @returns the answer without a sensitivity; where a limit forbids every column, the one nearest to keeping all
 * @throws {RangeError} when no column has a knee
 */
export function smallestOnKneeLine<Design>(
  topology: Topology<Design>,
  columns: readonly InductanceColumn[],
  { kneeMultiple, ...options }: InductanceOptions<Design> & {
    /** Recommended current over knee current, the lead's [1]. */
    readonly kneeMultiple: number;
  },
): Omit<InductanceAnswer, "qualitySensitivity"> | NoInductance {
  const knees = columns.flatMap(({ inductance, sweep: { knee } }) =>
    knee === undefined ? [] : [{ inductance, knee }]
  );
  const checkAt = (inductance: number) => {
    const current = kneeMultiple * kneeAt(knees, inductance);
    return checkInductance(topology, { inductance, current }, options);
  };
  const checks = knees.length === 0 ? [] : columns.map(({ inductance }) => checkAt(inductance));
  const k = checks.findIndex(({ broken }) => broken.length === 0);
  const [kept, before] = [checks[k], checks[k - 1]];
  if (!kept) {
    const [nearest] = [...checks].sort((a, b) =>
      a.broken.length - b.broken.length || b.worstLoopGain - a.worstLoopGain
    );
    if (!nearest) {
      throw new RangeError(
        "Cannot follow the knee line: at least one column must reach its knee, got none",
      );
    }
    const [binding = "startup"] = nearest.broken;
    return { status: "none", binding, check: nearest, reason: brokenText(nearest, options) };
  }
  if (!before) return { status: "found", check: kept, binding: "smallest of the family" };
  if (options.family.inductances) {
    return { status: "found", check: kept, binding: before.broken[0] ?? "startup" };
  }
  let [check, last]: InductanceCheck[] = [kept, before];
  closeIn({ low: before.inductance, high: kept.inductance }, (inductance) => {
    const tried = checkAt(inductance);
    if (tried.broken.length === 0) check = tried;
    else last = tried;
    return tried.broken.length === 0;
  });
  return { status: "found", check: check!, binding: last!.broken[0] ?? "startup" };
}

/** Knee current at an inductance: a power law through the two columns around it, or the two nearest. */
function kneeAt(
  knees: readonly { readonly inductance: number; readonly knee: number }[],
  inductance: number,
): number {
  const above = knees.findIndex((entry) => entry.inductance >= inductance);
  const last = knees.length - 1;
  const right = Math.max(Math.min(above < 0 ? last : above, last), Math.min(1, last));
  const [a, b] = [knees[right - 1], knees[right]!];
  const exponent = a ? Math.log(b.knee / a.knee) / Math.log(b.inductance / a.inductance) : -1;
  return b.knee * (inductance / b.inductance) ** exponent;
}

/** White noise at one inductance, computed and by the closed form. */
export interface InductanceTrendPoint {
  /** [H] */
  readonly inductance: number;
  /** [A] */
  readonly current: number;
  readonly point: BiasPoint;
  /** Computed white phase noise [dBc/Hz]; undefined where there is no orbit. */
  readonly computed: number | undefined;
  /** By the closed form of the topology [dBc/Hz]; undefined where it has none. */
  readonly hand: number | undefined;
  /** Assumptions of the closed form that do not hold, in words. */
  readonly broken: readonly string[];
}

/** Options of {@linkcode inductanceTrend}. */
export interface InductanceTrendOptions<Design> extends InductanceOptions<Design> {
  /** Current at a column [A]; a column without one is left out. */
  readonly currentOf: (column: InductanceColumn) => number | undefined;
  /**
   * Whose amplitude the closed form takes: the computed one, which the supply decides at the knee, or that
   * by hand, which the current decides below it.
   */
  readonly amplitude: "computed" | "hand";
  /** Offset of the phase noise [Hz]. */
  readonly offset: number;
}

/**
 * White noise over the inductance along a line of the map, each point solved at its own current, beside
 * L = 4 k T R F / A^2 (f0 / (2 Q f))^2: in proportion to L where the supply holds the amplitude A, and to
 * 1/(I^2 Q^3 L) where A ~ I R, as long as F does not move.
 */
export function inductanceTrend<Design>(
  topology: Topology<Design>,
  columns: readonly InductanceColumn[],
  { currentOf, amplitude, offset, ...options }: InductanceTrendOptions<Design>,
): InductanceTrendPoint[] {
  const { card, designWith, conditions: [condition] } = options;
  return columns.flatMap((column): InductanceTrendPoint[] => {
    const current = currentOf(column);
    if (current === undefined) return [];
    const { inductance } = column;
    const { tank } = trimTank(topology, { inductance, current }, options);
    if (!(tank.capacitance > 0)) return [];
    const { points } = biasSweep(topology, designWith(tank), {
      card,
      condition,
      currents: [current / ASIDE, current, current * ASIDE],
      offset,
    });
    const point = points[1]!;
    const rows = handComparisons(topology, point, { offset, temperature: condition.temperature });
    const noise = rows.find(({ unit }) => unit === "dBc/Hz");
    const swing = rows.find(({ unit }) => unit === "V");
    const byHand = amplitude === "hand" && swing ? 20 * Math.log10(swing.computed / swing.hand) : 0;
    return [{
      inductance,
      current,
      point,
      computed: point.figures?.phaseNoise,
      hand: noise && noise.hand + byHand,
      broken: noise?.broken ?? [],
    }];
  });
}
