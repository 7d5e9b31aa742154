/**
 * Topologies on equal terms: the same coil, frequency, supply and power.
 *
 * @module
 */
import type { Schematic } from "../circuit/schematic.ts";
import type { BuiltOscillator, Condition, Topology } from "../circuit/topology.ts";
import type { TechnologyCard } from "../device/technology_card.ts";
import { Orbit } from "../orbit/orbit.ts";
import {
  type DeviceStress,
  deviceStresses,
  type OperatingFigures,
  operatingFigures,
} from "./operating_figures.ts";
import { oscillation } from "./oscillation.ts";
import { type Startup, startup } from "./startup.ts";

const ITERATIONS = 24;
/** Relative accuracy to which power and frequency are met. */
const POWER_TOLERANCE = 1e-3;
const FREQUENCY_TOLERANCE = 1e-4;
/** Largest change of the current in one iteration, as a factor. */
const LARGEST_CHANGE = 2;

/** What is found for a candidate: its programmed current and the capacitance across its coil. */
export interface CandidatePoint {
  /** [A] */
  readonly current: number;
  /** All capacitance of the design across the coil, a divider's in series, devices not counted [F]. */
  readonly capacitance: number;
}

/** One topology with its designs on the common tank. */
export interface Candidate<Design> {
  readonly topology: Topology<Design>;
  /** Inductance of its coil [H]. */
  readonly inductance: number;
  /** The design at a current and a capacitance; throws a RangeError where there is none. */
  readonly designAt: (point: CandidatePoint) => Design;
}

/** At what the candidates are compared. */
export interface ContenderOptions {
  readonly card: TechnologyCard;
  readonly condition: Condition;
  /** Of the oscillation: every candidate is trimmed to it [Hz]. */
  readonly frequency: number;
  /** Offset of the phase noise [Hz]. */
  readonly offset: number;
  /** Supply power every candidate gets [W]. */
  readonly power: number;
  /** Programmed current the search begins with [A]. */
  readonly current: number;
}

/** A candidate with its design hidden, so that different topologies stand in one list. */
export interface Contender {
  readonly name: string;
  readonly title: string;
  /**
   * Finds the current and the capacitance at which the candidate draws the power at the frequency.
   *
   * @throws {RangeError} when the power or the frequency is not positive
   */
  solve(options: ContenderOptions): TopologyResult;
}

/** How a fixed design does in one condition. */
export interface ContenderAt {
  readonly condition: Condition;
  /** Startup loop gain [1]; undefined without an equilibrium. */
  readonly loopGain: number | undefined;
  /** Whether it starts by itself. */
  readonly starts: boolean;
  /** Undefined where there is no orbit. */
  readonly figures: OperatingFigures | undefined;
  /** Peak voltages against the card's limits, the nearest first; empty where there is no orbit. */
  readonly stresses: readonly DeviceStress[];
  /** Why there are no figures. */
  readonly reason?: string;
}

/** How one topology does at the power. */
export interface TopologyResult extends ContenderAt, CandidatePoint {
  readonly name: string;
  readonly title: string;
  /** Schematic with the values found; undefined where no design could be made. */
  readonly schematic: Schematic | undefined;
  /** The same design in another condition. */
  readonly in: (condition: Condition) => ContenderAt;
  /** Its startup loop gain alone in another condition [1]; undefined without an equilibrium. */
  readonly loopGainIn: (condition: Condition) => number | undefined;
}

/** Wraps a topology and its designs for a comparison. */
export function contender<Design>(candidate: Candidate<Design>): Contender {
  const { name, title } = candidate.topology;
  return { name, title, solve: (options) => new Comparison(candidate, options).solve() };
}

interface Solved {
  readonly oscillator: BuiltOscillator;
  readonly started: Startup;
}

/** One candidate being brought to the power and the frequency. */
class Comparison<Design> {
  constructor(
    readonly candidate: Candidate<Design>,
    readonly options: ContenderOptions,
  ) {
    const { power, frequency } = options;
    if (!(power > 0 && frequency > 0)) {
      throw new RangeError(
        `Cannot compare topologies: power and frequency must be > 0, got ${power} W and ${frequency} Hz`,
      );
    }
  }

  /** First with the circuit at rest, which is cheap, then over the orbit. */
  solve(): TopologyResult {
    const { current, condition } = this.options;
    let point: CandidatePoint = { current, capacitance: this.#whole };
    try {
      for (const over of ["rest", "orbit"] as const) {
        for (let iteration = 0;; iteration++) {
          const solved = this.#start(point, condition);
          if (typeof solved === "string") return this.#lost(point, solved);
          const seen = this.#seen(solved, over);
          if (typeof seen === "string") return this.#result(point);
          const next = this.#next(point, seen);
          if (next === undefined) break;
          if (iteration === ITERATIONS) {
            return this.#lost(point, "power and frequency were not reached together");
          }
          if (!(next.capacitance > 0)) {
            return this.#lost(point, "its devices' own capacitance is too much at the frequency");
          }
          point = next;
        }
      }
      return this.#result(point);
    } catch (error) {
      if (error instanceof RangeError) return this.#lost(point, error.message);
      throw error;
    }
  }

  get #whole(): number {
    return 1 / ((2 * Math.PI * this.options.frequency) ** 2 * this.candidate.inductance);
  }

  #design(point: CandidatePoint): Design {
    return this.candidate.designAt(point);
  }

  #start(point: CandidatePoint, condition: Condition): Solved | string {
    const { topology } = this.candidate;
    const { card } = this.options;
    const oscillator = topology.build(this.#design(point), { card, condition });
    const started = startup(oscillator);
    return started.status === "found" ? { oscillator, started } : started.reason;
  }

  /** Power and frequency at rest, the latter from the startup, or over the orbit. */
  #seen(
    { oscillator, started }: Solved,
    over: "rest" | "orbit",
  ): { power: number; frequency: number } | string {
    const { supply } = this.options.condition;
    const current = (x: Float64Array) => oscillator.supplyCurrent(x);
    if (over === "rest") {
      const { equilibrium: { state }, frequency } = started;
      return { power: supply * current(state), frequency };
    }
    const orbit = oscillation(oscillator, { started });
    return orbit instanceof Orbit
      ? { power: supply * orbit.mean(current), frequency: orbit.frequency }
      : orbit.reason;
  }

  /** A better point; undefined where this one is good enough. */
  #next(
    { current, capacitance }: CandidatePoint,
    seen: { power: number; frequency: number },
  ): CandidatePoint | undefined {
    const ratio = this.options.power / seen.power;
    const pitch = seen.frequency / this.options.frequency;
    if (
      Math.abs(ratio - 1) < POWER_TOLERANCE && Math.abs(pitch - 1) < FREQUENCY_TOLERANCE
    ) return undefined;
    const factor = Math.min(LARGEST_CHANGE, Math.max(1 / LARGEST_CHANGE, ratio));
    // f^2 ~ 1/(C + own): the devices' own stays, so C moves by the whole's lack.
    return {
      current: current * factor,
      capacitance: capacitance + this.#whole * (1 - pitch ** -2),
    };
  }

  #result(point: CandidatePoint): TopologyResult {
    const { topology } = this.candidate;
    return {
      ...point,
      name: topology.name,
      title: topology.title,
      schematic: topology.schematic(this.#design(point)),
      ...this.#at(point, this.options.condition),
      in: (condition) => this.#at(point, condition),
      loopGainIn: (condition) => {
        const solved = this.#start(point, condition);
        return typeof solved === "string" ? undefined : solved.started.loopGain;
      },
    };
  }

  #at(point: CandidatePoint, condition: Condition): ContenderAt {
    const { card, offset } = this.options;
    const solved = this.#start(point, condition);
    const none = { condition, figures: undefined, stresses: [] };
    if (typeof solved === "string") {
      return { ...none, loopGain: undefined, starts: false, reason: solved };
    }
    const { oscillator, started } = solved;
    const { loopGain, starts } = started;
    const orbit = oscillation(oscillator, { started });
    if (!(orbit instanceof Orbit)) return { ...none, loopGain, starts, reason: orbit.reason };
    const stresses = deviceStresses(oscillator, orbit, card);
    stresses.sort((a, b) => b.peak / b.limit - a.peak / a.limit);
    const figures = operatingFigures(oscillator, orbit, { supply: condition.supply, offset });
    return { condition, loopGain, starts, figures, stresses };
  }

  #lost(point: CandidatePoint, reason: string): TopologyResult {
    const { name, title } = this.candidate.topology;
    const nothing = (condition: Condition): ContenderAt => ({
      condition,
      loopGain: undefined,
      starts: false,
      figures: undefined,
      stresses: [],
      reason,
    });
    return {
      ...point,
      name,
      title,
      schematic: undefined,
      ...nothing(this.options.condition),
      in: nothing,
      loopGainIn: () => undefined,
    };
  }
}
