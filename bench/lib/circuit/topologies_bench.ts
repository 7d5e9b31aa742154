/**
 * Orbit, sensitivity and white noise of one design of each topology: continued from a neighbour 2 % below in current,
 * and from the equilibrium. The number of states stands in the name.
 */
import { readCard } from "../../../kernel/sheet/card.ts";
import { topologies } from "../../../lib/circuit/topologies.ts";
import type { BuiltOscillator, Condition, Topology } from "../../../lib/circuit/topology.ts";
import { oscillation } from "../../../lib/design/oscillation.ts";
import { startup } from "../../../lib/design/startup.ts";
import { findOrbit } from "../../../lib/orbit/find_orbit.ts";
import { Orbit } from "../../../lib/orbit/orbit.ts";
import { phaseDiffusion } from "../../../lib/orbit/phase_diffusion.ts";
import { design as pairDesign } from "../../_buoy_pair.ts";
import * as designs from "./_topology_examples.ts";

const CARD = new URL("../../../notebooks/cards/illustrative_65nm.yaml", import.meta.url);
const card = readCard(Deno.readTextFileSync(CARD), CARD.pathname);

const NOMINAL: Condition = { corner: "typical", temperature: 300.15, supply: 1 };

function benchmark<Design extends { readonly current: number }>(
  topology: Topology<Design>,
  design: Design,
): void {
  const build = (current: number) =>
    topology.build(topology.withCurrent(design, current), { card, condition: NOMINAL });
  const oscillator = build(design.current);
  const states = oscillator.circuit.system.dimension;
  const grown = (own: BuiltOscillator): Orbit => {
    const started = startup(own);
    if (started.status !== "found") throw new RangeError(`${topology.name}: ${started.reason}`);
    const orbit = oscillation(own, { started });
    if (!(orbit instanceof Orbit)) throw new RangeError(`${topology.name}: ${orbit.reason}`);
    return orbit;
  };
  const neighbour = grown(build(design.current / 1.02));
  const white = oscillator.circuit.sources.filter(({ color }) => color === "white");
  Deno.bench(`${topology.name}, ${states} states: from a neighbour`, { group: "neighbour" }, () => {
    const orbit = findOrbit(oscillator.circuit.system, { start: neighbour });
    if (!(orbit instanceof Orbit)) throw new RangeError(`${topology.name}: ${orbit.reason}`);
    phaseDiffusion(orbit, white);
  });
  Deno.bench(`${topology.name}, ${states} states: from the equilibrium`, { group: "grown" }, () => {
    phaseDiffusion(grown(oscillator), white);
  });
}

benchmark(topologies.n_pair, pairDesign);
benchmark(topologies.p_pair, designs.P_PAIR);
benchmark(topologies.n_pair, designs.FILTERED_PAIR);
benchmark(topologies.n_pair_resistor_tail, designs.RESISTOR_TAIL_PAIR);
benchmark(topologies.n_pair_no_tail, designs.UNTAILED_PAIR);
benchmark(topologies.complementary_pair, designs.COMPLEMENTARY_PAIR);
benchmark(topologies.class_c_pair, designs.CLASS_C_PAIR);
benchmark(topologies.colpitts, designs.COLPITTS);
benchmark(topologies.differential_colpitts, designs.DIFFERENTIAL_COLPITTS);
benchmark(topologies.steered_colpitts, designs.STEERED_COLPITTS);
