/**
 * Integration in time until the motion nearly closes on itself: where Newton finds its start.
 *
 * Indices stay inside the arrays by construction; `!` says so to the compiler.
 *
 * @module
 */
import { type GaussMethod, lagrangeBasis } from "../numeric/gauss.ts";
import type { ChargeCoordinates } from "./charge_coordinates.ts";
import { GaussStepper } from "./gauss_step.ts";
import type { Path } from "./period_map.ts";

/** Largest miss of the stages predicted from the step before, relative to the motion's range. */
const STEP_TARGET = 5e-4;
/** A miss this many times the target repeats the step. */
const REPEAT = 8;
/** Repeats after which a step is taken as it is: behind a stiff layer no prediction is good. */
const REPEATS = 5;
const STEP_TOLERANCE = 1e-7;
const GROWTH_LIMIT = 1.5;
const SHRINK_LIMIT = 0.25;
const SAFETY = 0.9;
const STEP_ATTEMPTS = 60;
/** Smallest range a motion is measured against, scaled. */
const RANGE_FLOOR = 1e-4;
/** Part of the range forgotten each step, so that an early excursion does not blind the control. */
const RANGE_DECAY = 0.002;
/** A return closes when it misses the anchor by less than this part of the range. */
const RETURN_DISTANCE = 0.25;
/** A motion this far below its largest, and shrinking, is dying out. */
const DYING = 1e-3;
/** Consecutive steps without motion after which the system is at rest. */
const REST_STEPS = 40;
const REST_MOTION = 1e-9;
/** A state this many times its scale is on its way to infinity. */
const RUNAWAY = 1e8;
/** Most points the motion may return to that are kept: most crossings within one round. */
const MOST_ANCHORS = 24;
/** A shorter return is a wiggle of the steps themselves, not a cycle. */
const FEWEST_CYCLE_STEPS = 8;
/** Steps without any crossing after which a new anchor is dropped. */
const CYCLE_STEPS = 1500;
const CROSSING_ITERATIONS = 12;
const CROSSING_TOLERANCE = 1e-7;

/**
 * How the next cycle of a transient ended.
 *
 * @internal
 */
export type CycleOutcome =
  | {
    readonly status: "closed";
    readonly path: Path;
    /** Largest range of a scaled charge over the cycle. */
    readonly size: number;
    /** Natural logarithm of the size over that of the cycle before; NaN for the first. */
    readonly growth: number;
  }
  | { readonly status: "at rest" }
  | { readonly status: "lost"; readonly reason: string };

interface Step {
  readonly h: number;
  /** Scaled charges at the start. */
  readonly charges: Float64Array;
  readonly stages: Float64Array;
}

/** A point that the motion may return to, with the section through it across the motion. */
interface Anchor {
  readonly charges: Float64Array;
  readonly normal: Float64Array;
  /** Place in the record of the first step that leaves it. */
  first: number;
}

/** Running lowest and highest values that slowly forget. */
class Ranges {
  readonly #low: Float64Array;
  readonly #high: Float64Array;
  constructor(start: Float64Array) {
    this.#low = start.slice();
    this.#high = start.slice();
  }
  widen(values: Float64Array, at = 0): void {
    for (let i = 0; i < this.#low.length; i++) {
      const value = values[at + i]!;
      this.#low[i] = Math.min(value, this.#low[i]! + RANGE_DECAY * (value - this.#low[i]!));
      this.#high[i] = Math.max(value, this.#high[i]! + RANGE_DECAY * (value - this.#high[i]!));
    }
  }
  of(i: number): number {
    return Math.max(this.#high[i]! - this.#low[i]!, RANGE_FLOOR);
  }
}

/**
 * A motion integrated cycle by cycle.
 *
 * @internal
 */
export class Transient {
  readonly stepper: GaussStepper;
  steps = 0;
  readonly #coordinates: ChargeCoordinates;
  readonly #method: GaussMethod;
  readonly #longestStep: number;
  readonly #chargeRange: Ranges;
  readonly #stateRange: Ranges;
  #h: number;
  /** Scaled charges now. */
  #y: Float64Array;
  #last: Step | undefined;
  readonly #start: Float64Array;
  /** Oldest first; the record of steps begins at the oldest. */
  #anchors: Anchor[] = [];
  #record: Step[] = [];
  #previousSize = NaN;
  #largestSize = 0;
  #resting = 0;

  /** @param start scaled state, shape (n,), and its scaled charges, shape (r,) */
  constructor(
    coordinates: ChargeCoordinates,
    method: GaussMethod,
    { start, charges, firstStep, longestStep }: {
      start: Float64Array;
      charges: Float64Array;
      firstStep: number;
      longestStep: number;
    },
  ) {
    this.#coordinates = coordinates;
    this.#method = method;
    this.stepper = new GaussStepper(coordinates, method);
    this.#start = start.slice();
    this.#h = firstStep;
    this.#longestStep = longestStep;
    this.#y = charges.slice();
    this.#chargeRange = new Ranges(charges);
    this.#stateRange = new Ranges(start);
    this.#anchors = [{ charges: this.#y, normal: this.#direction(start), first: 0 }];
  }

  /** Direction of motion at a scaled state, measured in the present ranges. */
  #direction(state: Float64Array): Float64Array {
    const { flow } = this.#coordinates.reducedFlow(state);
    return flow.map((value, i) => value / this.#chargeRange.of(i) ** 2);
  }

  /** Adds an anchor at the present point. */
  #dropAnchor(): void {
    const { n } = this.#coordinates;
    const state = this.stepper.stages.slice(this.stepper.stages.length - n);
    if (!this.#coordinates.stateOf(this.#y, 0, state, 0)) return;
    this.#anchors.push({
      charges: this.#y,
      normal: this.#direction(state),
      first: this.#record.length,
    });
    if (this.#anchors.length > MOST_ANCHORS) this.#anchors.shift();
    this.#trim();
  }

  /** Forgets the steps before the oldest anchor. */
  #trim(): void {
    const gone = this.#anchors[0]?.first ?? this.#record.length;
    if (gone === 0) return;
    this.#record.splice(0, gone);
    for (const anchor of this.#anchors) anchor.first -= gone;
  }

  /** Distance of scaled charges from an anchor, relative to the ranges. */
  #miss({ charges }: Anchor, y: Float64Array): number {
    let largest = 0;
    for (let i = 0; i < y.length; i++) {
      largest = Math.max(largest, Math.abs(y[i]! - charges[i]!) / this.#chargeRange.of(i));
    }
    return largest;
  }

  /**
   * Integrates until the motion next returns to a point it has passed, the latest where there are
   * several: one round is found before two.
   *
   * @param stepLimit most steps this transient may have taken in all
   */
  nextCycle(stepLimit: number): CycleOutcome {
    for (;;) {
      if (this.steps >= stepLimit) {
        return { status: "lost", reason: `no closed motion within ${stepLimit} time steps` };
      }
      const before = this.#y;
      const failure = this.#advance();
      if (failure) return { status: "lost", reason: failure };
      if (this.#resting >= REST_STEPS) return { status: "at rest" };
      const crossed = this.#anchors.filter((anchor) =>
        section(anchor, before) < 0 && section(anchor, this.#y) >= 0
      );
      const anchor = crossed.findLast((own) =>
        this.#record.length - own.first >= FEWEST_CYCLE_STEPS &&
        this.#miss(own, this.#y) < RETURN_DISTANCE
      );
      if (anchor) return this.#close(anchor);
      const latest = this.#anchors[this.#anchors.length - 1];
      const lost = this.#record.length - (latest?.first ?? 0) > CYCLE_STEPS;
      if (!latest || lost || crossed.includes(latest)) this.#dropAnchor();
    }
  }

  /** Shortens the last step to end on the section and turns the cycle into a path. */
  #close(anchor: Anchor): CycleOutcome {
    const { r } = this.#coordinates;
    const cycle = this.#record.slice(anchor.first);
    const last = cycle.pop()!;
    const { stepper } = this;
    const end = this.#y;
    let low = 0;
    let high = last.h;
    let h = last.h;
    const y = new Float64Array(r);
    for (let iteration = 0; iteration < CROSSING_ITERATIONS; iteration++) {
      h = (low + high) / 2;
      if (iteration === 0) {
        const start = section(anchor, last.charges);
        const slope = section(anchor, end) - start;
        h = Math.min(Math.max(-start / slope, 0.02), 0.98) * last.h;
      }
      stepper.stages.set(last.stages);
      if (!stepper.solve(last.charges, { h, tolerance: STEP_TOLERANCE })) break;
      stepper.advance(last.charges, { h, end: y });
      const place = section(anchor, y);
      if (Math.abs(high - low) < CROSSING_TOLERANCE * last.h) break;
      if (place < 0) low = h;
      else high = h;
    }
    const closing: Step = { h, charges: last.charges, stages: stepper.stages.slice() };
    const size = sizeOf(cycle);
    const growth = Math.log(size / this.#previousSize);
    const path = pathOf([...cycle, closing]);
    // Time goes on from the end of the whole last step.
    stepper.stages.set(last.stages);
    this.#previousSize = size;
    this.#largestSize = Math.max(this.#largestSize, size);
    this.#anchors = [];
    this.#dropAnchor();
    if (size < DYING * this.#largestSize && growth < 0) return { status: "at rest" };
    return { status: "closed", path, size, growth };
  }

  /** One accepted step; a failure in words. */
  #advance(): string | undefined {
    const { stepper } = this;
    const { n, r } = this.#coordinates;
    const lastStage = (this.#method.stages - 1) * n;
    const end = new Float64Array(r);
    for (let attempt = 0; attempt < STEP_ATTEMPTS; attempt++) {
      const h = this.#h;
      this.#predict(h);
      const predicted = stepper.stages.slice(lastStage);
      const solved = stepper.solve(this.#y, { h, tolerance: STEP_TOLERANCE }) &&
        this.#coordinates.isFinite(stepper.stages, lastStage);
      if (!solved) {
        this.#h = h * SHRINK_LIMIT;
        continue;
      }
      let miss = 0;
      for (let k = 0; k < n; k++) {
        const change = Math.abs(stepper.stages[lastStage + k]! - predicted[k]!);
        miss = Math.max(miss, change / this.#stateRange.of(k));
      }
      const wanted = SAFETY * (STEP_TARGET / miss) ** (1 / (this.#method.stages + 1));
      const ratio = Math.min(GROWTH_LIMIT, Math.max(SHRINK_LIMIT, wanted));
      this.#h = Math.min(this.#longestStep, h * ratio);
      if (miss > REPEAT * STEP_TARGET && this.#last && attempt < REPEATS) continue;
      stepper.advance(this.#y, { h, end });
      const before = this.#last?.stages.subarray(lastStage) ?? this.#start;
      this.#last = { h, charges: this.#y, stages: stepper.stages.slice() };
      this.#record.push(this.#last);
      // Stage states, not charges: behind steps longer than every time constant the charges only
      // change sign, while the stages lie at the equilibrium.
      let motion = 0;
      let size = 0;
      for (let k = 0; k < stepper.stages.length; k++) {
        const value = stepper.stages[k]!;
        motion = Math.max(motion, Math.abs(value - before[k % n]!));
        size = Math.max(size, Math.abs(value));
      }
      if (!(size < RUNAWAY)) return "the motion grows without bound";
      this.#resting = motion < REST_MOTION ? this.#resting + 1 : 0;
      this.#chargeRange.widen(end);
      this.#stateRange.widen(stepper.stages, lastStage);
      this.#y = end;
      this.steps++;
      return undefined;
    }
    return "the equations of a time step could not be solved";
  }

  /** Starts the stages of a step of length `h` from the polynomial through those of the last one. */
  #predict(h: number): void {
    const last = this.#last;
    const { n } = this.#coordinates;
    const { nodes, stages: s } = this.#method;
    for (let i = 0; i < s; i++) {
      if (!last) {
        this.stepper.stages.set(this.#start, i * n);
        continue;
      }
      const basis = lagrangeBasis(nodes, 1 + nodes[i]! * h / last.h);
      for (let k = 0; k < n; k++) {
        let value = 0;
        for (let j = 0; j < s; j++) value += basis[j]! * last.stages[j * n + k]!;
        this.stepper.stages[i * n + k] = value;
      }
    }
  }
}

/** Signed distance of scaled charges from the section through an anchor. */
function section({ charges, normal }: Anchor, y: Float64Array): number {
  let value = 0;
  for (let i = 0; i < y.length; i++) value += normal[i]! * (y[i]! - charges[i]!);
  return value;
}

/** Largest range of a scaled charge over a cycle. */
function sizeOf(cycle: readonly Step[]): number {
  const count = cycle[0]?.charges.length ?? 0;
  let size = 0;
  for (let i = 0; i < count; i++) {
    let low = Infinity;
    let high = -Infinity;
    for (const { charges } of cycle) {
      low = Math.min(low, charges[i]!);
      high = Math.max(high, charges[i]!);
    }
    size = Math.max(size, high - low);
  }
  return size;
}

function pathOf(cycle: readonly Step[]): Path {
  const period = cycle.reduce((sum, step) => sum + step.h, 0);
  const first = cycle[0]!;
  const mesh = new Float64Array(cycle.length + 1);
  const stages = new Float64Array(cycle.length * first.stages.length);
  const charges = new Float64Array((cycle.length + 1) * first.charges.length);
  let time = 0;
  cycle.forEach((step, k) => {
    mesh[k] = time / period;
    stages.set(step.stages, k * step.stages.length);
    charges.set(step.charges, k * step.charges.length);
    time += step.h;
  });
  mesh[cycle.length] = 1;
  charges.set(first.charges, cycle.length * first.charges.length);
  return { mesh, stages, charges, period };
}
