/** What every topology of the list must do. */
import { assert, assertClose, assertEquals } from "../../assert.ts";
import { topologies } from "../../../lib/circuit/topologies.ts";
import type { Topology } from "../../../lib/circuit/topology.ts";
import { biasSweep } from "../../../lib/design/bias.ts";
import { handComparisons } from "../../../lib/design/hand_values.ts";
import { noiseClosedForm } from "../../../lib/noise/closed_forms.ts";
import { illustrativeCard } from "../device/_card.ts";
import { contract } from "./_contract.ts";
import { NOMINAL, PAIR_DESIGN } from "./_examples.ts";
import { assertWiring, type WiringOptions } from "./_schematic_wiring.ts";
import {
  CLASS_C_PAIR,
  COLPITTS,
  COMPLEMENTARY_PAIR,
  DIFFERENTIAL_COLPITTS,
  FILTERED_PAIR,
  P_PAIR,
  RESISTOR_TAIL_PAIR,
  STEERED_COLPITTS,
  UNTAILED_PAIR,
} from "./_topology_examples.ts";

const PLAIN: readonly (readonly [string, string])[] = [["plus", "minus"]];
const SOURCES: readonly (readonly [string, string])[] = [
  ["plus", "minus"],
  ["source plus", "source minus"],
];
const GATES: readonly (readonly [string, string])[] = [
  ["plus", "minus"],
  ["gate plus", "gate minus"],
];

/** Topologies beyond the N pair, whose contract is registered elsewhere. */
contract({ topology: topologies.p_pair, design: P_PAIR, sides: PLAIN });
contract({
  topology: { ...topologies.n_pair, name: "n_pair with tail filter" },
  design: FILTERED_PAIR,
  sides: PLAIN,
});
contract({ topology: topologies.n_pair_resistor_tail, design: RESISTOR_TAIL_PAIR, sides: PLAIN });
contract({ topology: topologies.n_pair_no_tail, design: UNTAILED_PAIR, sides: PLAIN });
contract({ topology: topologies.complementary_pair, design: COMPLEMENTARY_PAIR, sides: PLAIN });
contract({ topology: topologies.class_c_pair, design: CLASS_C_PAIR, sides: GATES });
contract({ topology: topologies.colpitts, design: COLPITTS, sides: [] });
contract({
  topology: topologies.differential_colpitts,
  design: DIFFERENTIAL_COLPITTS,
  sides: SOURCES,
});
contract({
  topology: topologies.steered_colpitts,
  design: { ...STEERED_COLPITTS, joined: true },
  sides: SOURCES,
});

type AnyTopology = Topology<{ readonly current: number }>;
const DESIGNS: Record<keyof typeof topologies, { readonly current: number }> = {
  n_pair: PAIR_DESIGN,
  p_pair: P_PAIR,
  n_pair_resistor_tail: RESISTOR_TAIL_PAIR,
  n_pair_no_tail: UNTAILED_PAIR,
  complementary_pair: COMPLEMENTARY_PAIR,
  class_c_pair: CLASS_C_PAIR,
  colpitts: COLPITTS,
  differential_colpitts: DIFFERENTIAL_COLPITTS,
  steered_colpitts: STEERED_COLPITTS,
};
const ALL = Object.entries(topologies) as unknown as [keyof typeof topologies, AnyTopology][];
const card = illustrativeCard();

Deno.test("topologies: each stands under its own name", () => {
  for (const [key, { name, title }] of ALL) {
    assertEquals(name, key);
    assert(title.length > 10);
  }
});

for (const [key, topology] of ALL) {
  Deno.test(`${key}: formulas say what they are, where from and where they hold`, () => {
    for (
      const { formula, source, holds = "" } of [topology.amplitudeFormula, topology.loopGainFormula]
    ) {
      assert(formula.includes("="), formula);
      assert(source.length > 20 && holds.length > 10, `${source}; ${holds}`);
    }
  });

  Deno.test(`${key}: at another programmed current the design is the same but for what follows it`, () => {
    const design = DESIGNS[key];
    const twice = topology.withCurrent(design, 2 * design.current);
    assertClose(twice.current, 2 * design.current, { rtol: 1e-15, atol: 0 });
    const back = topology.withCurrent(twice, design.current);
    assertEquals(JSON.stringify(back), JSON.stringify(design));
  });

  Deno.test(`${key}: a sweep of the current finds orbits, and the hand formulas stand beside them`, () => {
    const design = DESIGNS[key];
    const currents = [0.9, 1, 1.1].map((part) => part * design.current);
    const options = { card, condition: NOMINAL, currents, offset: 1e6 };
    const { points } = biasSweep(topology, design, options);
    for (const point of points) {
      assert(point.orbit, point.reason ?? "");
      const hand = handComparisons(topology, point, {
        offset: 1e6,
        temperature: NOMINAL.temperature,
      });
      assertEquals(hand.length, noiseClosedForm(key) ? 4 : 2);
      for (const { hand: value, computed, name } of hand) {
        assert(Number.isFinite(value) && Number.isFinite(computed), name);
      }
    }
  });
}

/** Drawn under names of their own: the coil's two halves and the loss on both sides. */
const TAPPED: WiringOptions = {
  nodesOf: { "coil, both halves": ["plus", "supply"], "tank loss": ["plus", "minus"] },
  undrawn: ["coil", "tank loss plus", "tank loss minus"],
};
const GROUNDED: WiringOptions = {
  ...TAPPED,
  nodesOf: { "coil, both halves": ["plus", "ground"], "tank loss": ["plus", "minus"] },
};
const DRAWN:
  readonly (readonly [string, AnyTopology, { readonly current: number }, WiringOptions])[] = (
    [
      ["n_pair", topologies.n_pair, PAIR_DESIGN, TAPPED],
      [
        "n_pair with every capacitor",
        topologies.n_pair,
        {
          ...PAIR_DESIGN,
          loadCapacitance: 50e-15,
          tailCapacitance: 200e-15,
          mirrorCapacitance: 10e-12,
        },
        TAPPED,
      ],
      ["n_pair with tail filter", topologies.n_pair, FILTERED_PAIR, TAPPED],
      ["p_pair", topologies.p_pair, P_PAIR, GROUNDED],
      [
        "p_pair with tail filter",
        topologies.p_pair,
        { ...P_PAIR, tailFilter: FILTERED_PAIR.tailFilter },
        GROUNDED,
      ],
      ["n_pair_resistor_tail", topologies.n_pair_resistor_tail, RESISTOR_TAIL_PAIR, TAPPED],
      ["n_pair_no_tail", topologies.n_pair_no_tail, UNTAILED_PAIR, TAPPED],
      ["complementary_pair", topologies.complementary_pair, COMPLEMENTARY_PAIR, { nodesOf: {} }],
      [
        "class_c_pair",
        topologies.class_c_pair,
        { ...CLASS_C_PAIR, mirrorCapacitance: 1e-12 },
        TAPPED,
      ],
      ["colpitts", topologies.colpitts, COLPITTS, { nodesOf: {} }],
      [
        "colpitts with a tank capacitor",
        topologies.colpitts,
        {
          ...COLPITTS,
          tank: { ...COLPITTS.tank, capacitance: 100e-15 },
          gateBias: 0.8,
          mirrorCapacitance: 1e-12,
        },
        { nodesOf: {} },
      ],
      ["differential_colpitts", topologies.differential_colpitts, DIFFERENTIAL_COLPITTS, TAPPED],
      [
        "differential_colpitts, grounded",
        topologies.differential_colpitts,
        {
          ...DIFFERENTIAL_COLPITTS,
          joined: false,
          gateBias: 0.8,
          mirrorCapacitance: 1e-12,
          tank: { ...DIFFERENTIAL_COLPITTS.tank, capacitance: 100e-15 },
        },
        TAPPED,
      ],
      [
        "steered_colpitts",
        topologies.steered_colpitts,
        { ...STEERED_COLPITTS, tailCapacitance: 100e-15, mirrorCapacitance: 1e-12 },
        TAPPED,
      ],
      [
        "steered_colpitts, joined",
        topologies.steered_colpitts,
        { ...STEERED_COLPITTS, joined: true },
        TAPPED,
      ],
    ] as const
  ).map(([name, topology, design, options]) =>
    [name, topology as unknown as AnyTopology, design, options] as const
  );

for (const [name, topology, design, options] of DRAWN) {
  Deno.test(`${name}: the schematic joins what the circuit joins and draws every element`, () => {
    const { circuit } = topology.build(design, { card, condition: NOMINAL });
    assertWiring(topology.schematic(design), circuit, options);
  });
}
