/**
 * Topologies on equal terms: the same tank, supply and power.
 *
 * @module
 */
import type { Condition, Topology } from "../circuit/topology.ts";
import type { TechnologyCard } from "../device/technology_card.ts";
import { Orbit } from "../orbit/orbit.ts";
import {
  type DeviceStress,
  deviceStresses,
  type OperatingFigures,
  operatingFigures,
} from "./operating_figures.ts";
import { oscillation } from "./oscillation.ts";
import { startup } from "./startup.ts";

const CURRENT_ITERATIONS = 12;
/** Relative accuracy to which the power is met. */
const POWER_TOLERANCE = 1e-3;
/** Largest change of the current in one iteration, as a factor. */
const LARGEST_CHANGE = 2;

/** One topology with its design on the common tank; the current is found. */
export interface Candidate<Design> {
  readonly topology: Topology<Design>;
  readonly design: Design;
}

/** A candidate with its design hidden, so that different topologies stand in one list. */
export interface Contender {
  readonly name: string;
  readonly title: string;
  /** Solves the candidate at a power [W] in a condition. */
  solve(options: ContenderOptions): TopologyResult;
}

/** At what the candidates are compared. */
export interface ContenderOptions {
  readonly card: TechnologyCard;
  readonly condition: Condition;
  /** Offset of the phase noise [Hz]. */
  readonly offset: number;
  /** Supply power every candidate gets [W]. */
  readonly power: number;
  /** Programmed current the search begins with [A]. */
  readonly current: number;
}

/** How one topology does. */
export interface TopologyResult {
  readonly name: string;
  readonly title: string;
  /** Programmed current that draws the power [A]. */
  readonly current: number;
  /** Startup loop gain there [1]; undefined without an equilibrium. */
  readonly loopGain: number | undefined;
  /** Whether it starts by itself. */
  readonly starts: boolean;
  readonly figures: OperatingFigures | undefined;
  /** Peak voltages against the card's limits, the nearest first. */
  readonly stresses: readonly DeviceStress[];
  /** Why there are no figures. */
  readonly reason?: string;
}

/** Wraps a topology and its design for a comparison. */
export function contender<Design>({ topology, design }: Candidate<Design>): Contender {
  return {
    name: topology.name,
    title: topology.title,
    solve: (options) => atPower(topology, design, options),
  };
}

/**
 * The candidate at the programmed current that draws the asked power: iteration on the current with
 * the orbit's mean supply current.
 */
function atPower<Design>(
  topology: Topology<Design>,
  design: Design,
  { card, condition, offset, power, current: first }: ContenderOptions,
): TopologyResult {
  if (!(power > 0)) {
    throw new RangeError(`Cannot compare topologies: power must be > 0 W, got ${power} W`);
  }
  const { name, title } = topology;
  let current = first;
  let result: TopologyResult = {
    name,
    title,
    current,
    loopGain: undefined,
    starts: false,
    figures: undefined,
    stresses: [],
    reason: "no operating point was found",
  };
  for (let iteration = 0; iteration < CURRENT_ITERATIONS; iteration++) {
    const oscillator = topology.build(topology.withCurrent(design, current), { card, condition });
    const started = startup(oscillator);
    if (started.status !== "found") return { ...result, current, reason: started.reason };
    const base = {
      name,
      title,
      current,
      loopGain: started.loopGain,
      starts: started.starts,
      stresses: [],
    };
    const orbit = oscillation(oscillator, { started });
    if (!(orbit instanceof Orbit)) return { ...base, figures: undefined, reason: orbit.reason };
    const figures = operatingFigures(oscillator, orbit, { supply: condition.supply, offset });
    const ratio = power / figures.power;
    if (Math.abs(ratio - 1) < POWER_TOLERANCE) {
      const stresses = deviceStresses(oscillator, orbit, card);
      stresses.sort((a, b) => b.peak / b.limit - a.peak / a.limit);
      return { ...base, figures, stresses };
    }
    result = { ...base, figures: undefined, reason: `the power ${power} W was not reached` };
    current *= Math.min(LARGEST_CHANGE, Math.max(1 / LARGEST_CHANGE, ratio));
  }
  return result;
}
