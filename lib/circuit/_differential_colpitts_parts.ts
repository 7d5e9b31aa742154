/**
 * The upper half of the differential Colpitts oscillators: tank, dividers, common-gate transistors.
 *
 * @module
 */
import type { TransistorSize } from "../device/transistor_parameters.ts";
import { demandDivider, heldGate, seriesCapacitance, tapOf } from "./_colpitts_parts.ts";
import type { PairFoot } from "./_pair_parts.ts";
import {
  capacitors,
  coreOf,
  currentLeaving,
  differentialKick,
  differentialTank,
  SUPPLY,
  tankLosses,
  tappedTank,
  watchedTransistors,
  type Workshop,
} from "./_topology_parts.ts";
import { assemble } from "./circuit.ts";
import { GROUND } from "./element.ts";
import { tankResistance } from "./tank_resistance.ts";
import type { BuiltOscillator, Divider, TankDesign } from "./topology.ts";

/** The upper half on a foot; `foot.parts` names the tails, `foot.watched` what else is watched. */
export function buildDifferentialColpitts(
  shop: Workshop,
  { design, foot }: {
    readonly design: {
      readonly tank: TankDesign;
      readonly divider: Divider;
      readonly joined?: boolean;
      readonly core: TransistorSize;
      readonly gateBias?: number;
      readonly mirrorCapacitance?: number;
    };
    readonly foot: PairFoot;
  },
): BuiltOscillator {
  const { tank, divider, joined = true, core } = design;
  demandDivider(divider);
  const { supply } = shop.condition;
  const factor = shop.passives.capacitor;
  const second = divider.second * factor;
  const gate = heldGate(design.gateBias, { supply });
  const circuit = assemble([
    { kind: "potential", name: "supply", node: SUPPLY, potential: supply },
    ...gate.elements,
    ...tappedTank(tank, { tap: SUPPLY, shop }),
    ...capacitors([
      ["first capacitor plus", ["plus", "source plus"], divider.first * factor],
      ["first capacitor minus", ["minus", "source minus"], divider.first * factor],
      ...(joined
        ? [["second capacitor", ["source plus", "source minus"], second / 2] as const]
        : (["plus", "minus"] as const).map((side) =>
          [`second capacitor ${side}`, [`source ${side}`, GROUND], second] as const
        )),
      ["mirror capacitor", ["mirror", GROUND], design.mirrorCapacitance],
    ]),
    ...(["plus", "minus"] as const).map((side) =>
      shop.transistor(`core ${side}`, {
        kind: "n",
        size: core,
        at: { drain: side, gate: gate.node, source: `source ${side}`, bulk: GROUND },
      })
    ),
    ...foot.elements,
  ]);
  const tap = tapOf(divider);
  const potentials = {
    plus: supply,
    minus: supply,
    "source plus": gate.potential / 3,
    "source minus": gate.potential / 3,
    mirror: supply / 2,
    ...foot.guess,
  };
  const kick = differentialKick(circuit, {
    potentials,
    supply,
    inductance: tank.inductance,
    capacitance: tank.capacitance + seriesCapacitance(divider) / 2,
  });
  // The sources have followed the outputs by the divider.
  const apart = circuit.voltage("plus", "minus", kick.state) / 2;
  for (const [side, sign] of [["plus", 1], ["minus", -1]] as const) {
    const at = circuit.indexOf(`source ${side}`);
    if (at !== undefined) kick.state[at] = gate.potential / 3 + sign * tap * apart;
  }
  return {
    circuit,
    supplyNode: SUPPLY,
    tank: differentialTank({
      tank,
      resistance: tankResistance(tank) / shop.passives.metalResistance,
    }),
    supplyCurrent: currentLeaving(circuit, SUPPLY),
    guess: circuit.stateAt(potentials),
    kick,
    core: coreOf(circuit, "core plus", { of: "gms" }),
    tap,
    watched: watchedTransistors(circuit, ["core plus", "core minus", ...foot.watched]),
    patterns: [
      {
        name: "tank",
        weights: { plus: 1, minus: -1, "source plus": tap, "source minus": -tap },
      },
      { name: "common mode", weights: { plus: 1, minus: 1 } },
      { name: "source nodes, in phase", weights: { "source plus": 1, "source minus": 1 } },
      { name: "source nodes, apart", weights: { "source plus": 1, "source minus": -1 } },
      { name: "mirror node", weights: { mirror: 1 } },
      ...foot.patterns,
    ],
    parts: {
      tank: tankLosses(tank),
      pair: ["core plus", "core minus"],
      mirror: ["mirror"],
      ...foot.parts,
    },
  };
}
