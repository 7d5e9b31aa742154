/** Random startable sizings of every topology, from the box in tests/lib/circuit/data/sizing_boxes.json. */
import type { TechnologyCard } from "../../../lib/device/technology_card.ts";
import { CORNERS } from "../../../lib/device/corner.ts";
import { type Startup, startup } from "../../../lib/design/startup.ts";
import type { BuiltOscillator, Condition, Topology } from "../../../lib/circuit/topology.ts";
import { topologies } from "../../../lib/circuit/topologies.ts";

type Range = readonly [number, number];
type Box = Readonly<Record<string, Range>>;

const BOXES = JSON.parse(
  Deno.readTextFileSync(
    new URL("../../../tests/lib/circuit/data/sizing_boxes.json", import.meta.url),
  ),
);

/** Uniform numbers in [0, 1) from a seed: a 32-bit linear congruential generator (Numerical Recipes). */
function seededUniform(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
}

/** Draws one value of a range of the box. */
type Draw = (name: string) => number;

/** Topologies of the box by its names, each with how a design is drawn. */
const DRAWN: Readonly<Record<string, (draw: Draw) => [Topology<never>, object]>> = {
  n_pair: (draw) => [topologies.n_pair as Topology<never>, tailedPair(draw)],
  p_pair: (draw) => [topologies.p_pair as Topology<never>, tailedPair(draw)],
  n_pair_filtered: (draw) => {
    const design = {
      ...plainTank(draw),
      ...pairAndTail(draw),
      tailCapacitance: draw("tailCapacitance"),
    };
    const inductance = draw("filterInductance");
    const resonance = 2 * Math.PI * 2 * design.tank.qualityFrequency * draw("filterDetuning");
    return [topologies.n_pair as Topology<never>, {
      ...design,
      tailFilter: {
        inductance,
        quality: draw("filterQuality"),
        capacitance: 1 / resonance ** 2 / inductance,
      },
    }];
  },
  n_pair_resistor_tail: (draw) => [topologies.n_pair_resistor_tail as Topology<never>, {
    ...plainTank(draw),
    pair: { width: draw("width"), length: draw("length") },
    tailResistance: draw("tailResistance"),
    current: draw("current"),
    tailCapacitance: draw("tailCapacitance"),
  }],
  n_pair_no_tail: (draw) => [topologies.n_pair_no_tail as Topology<never>, {
    ...plainTank(draw),
    pair: { width: draw("width"), length: draw("length") },
    current: draw("current"),
  }],
  complementary_pair: (draw) => {
    const design = tailedPair(draw);
    return [topologies.complementary_pair as Topology<never>, {
      ...design,
      pairP: { ...design.pair, width: draw("widthP") },
    }];
  },
  class_c_pair: (draw) => {
    const design = { ...plainTank(draw), ...pairAndTail(draw) };
    return [topologies.class_c_pair as Topology<never>, {
      ...design,
      gateBias: draw("gateBias"),
      biasResistance: draw("biasResistance"),
      couplingCapacitance: draw("couplingPart") * design.tank.capacitance,
      biasFilter: {
        resistance: draw("biasFilterResistance"),
        capacitance: draw("biasFilterCapacitance"),
      },
      tailCapacitance: draw("tailCapacitance"),
    }];
  },
  colpitts: (draw) => [topologies.colpitts as Topology<never>, {
    ...dividedTank(draw, { sides: 1 }),
    ...coreAndTail(draw),
  }],
  differential_colpitts: (draw) => [topologies.differential_colpitts as Topology<never>, {
    ...dividedTank(draw, { sides: 2 }),
    ...coreAndTail(draw),
  }],
  steered_colpitts: (draw) => {
    const design = { ...dividedTank(draw, { sides: 2 }), ...coreAndTail(draw) };
    return [topologies.steered_colpitts as Topology<never>, {
      ...design,
      steering: { width: draw("steeringWidth"), length: design.core.length },
      tailCapacitance: draw("tailCapacitance"),
    }];
  },
};

/** Names of the entries of the box. */
export const BOX_NAMES: readonly string[] = Object.keys(DRAWN);

/** A startable sizing. */
export interface Sizing {
  readonly topology: Topology<never>;
  readonly design: object;
  readonly condition: Condition;
  readonly oscillator: BuiltOscillator;
  readonly started: Startup;
}

/**
 * The first `count` startable sizings of an entry of the box, always the same ones.
 *
 * @returns them, how many were drawn, and why equilibria were missing among those
 */
export function startableSizings(
  name: string,
  { count, card }: { count: number; card: TechnologyCard },
): { sizings: Sizing[]; drawn: number; noEquilibrium: string[] } {
  const box = BOXES[name] as Box;
  const order = BOX_NAMES.indexOf(name);
  const next = seededUniform(BOXES.seed + 7919 * order);
  const between = ([low, high]: Range) => low * (high / low) ** next();
  const sizings: Sizing[] = [];
  const noEquilibrium: string[] = [];
  let drawn = 0;
  while (sizings.length < count) {
    if (drawn >= 40 * count) throw new Error(`${name}: the box is hardly startable`);
    const [topology, design] = DRAWN[name]!((field) => between(box[field]!));
    const condition: Condition = {
      corner: CORNERS[drawn % CORNERS.length]!,
      temperature: between(BOXES.condition.temperature),
      supply: between(BOXES.condition.supply),
    };
    drawn++;
    const oscillator = topology.build(design as never, { card, condition });
    const started = startup(oscillator);
    if (started.status !== "found") noEquilibrium.push(started.reason);
    else if (started.loopGain >= BOXES.startableFrom) {
      sizings.push({ topology, design, condition, oscillator, started });
    }
  }
  return { sizings, drawn, noEquilibrium };
}

function plainTank(draw: Draw) {
  const inductance = draw("inductance");
  const qualityFrequency = draw("frequency");
  return {
    tank: {
      inductance,
      quality: draw("quality"),
      qualityFrequency,
      capacitance: 1 / (2 * Math.PI * qualityFrequency) ** 2 / inductance,
    },
    loadCapacitance: draw("loadCapacitance"),
  };
}

function pairAndTail(draw: Draw) {
  return {
    pair: { width: draw("width"), length: draw("length") },
    tail: { width: draw("tailWidth"), length: draw("tailLength") },
    current: draw("current"),
    mirrorRatio: draw("mirrorRatio"),
  };
}

function tailedPair(draw: Draw) {
  return {
    ...plainTank(draw),
    ...pairAndTail(draw),
    tailCapacitance: draw("tailCapacitance"),
    mirrorCapacitance: draw("mirrorCapacitance"),
  };
}

/** A tank whose whole capacitance is the divider's, seen from the coil of one or two sides. */
function dividedTank(draw: Draw, { sides }: { sides: 1 | 2 }) {
  const inductance = draw("inductance");
  const qualityFrequency = draw("frequency");
  const series = sides / (2 * Math.PI * qualityFrequency) ** 2 / inductance;
  const tap = draw("tap");
  return {
    tank: { inductance, quality: draw("quality"), qualityFrequency, capacitance: 0 },
    divider: { first: series / (1 - tap), second: series / tap },
  };
}

function coreAndTail(draw: Draw) {
  return {
    core: { width: draw("width"), length: draw("length") },
    tail: { width: draw("tailWidth"), length: draw("tailLength") },
    current: draw("current"),
    mirrorRatio: draw("mirrorRatio"),
  };
}
