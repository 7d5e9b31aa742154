import { classCPair } from "./class_c_pair.ts";
import { colpitts } from "./colpitts.ts";
import { complementaryPair } from "./complementary_pair.ts";
import { crossCoupledPair, crossCoupledPairP } from "./cross_coupled_pair.ts";
import { differentialColpitts } from "./differential_colpitts.ts";
import { resistorTailPair } from "./resistor_tail_pair.ts";
import { steeredColpitts } from "./steered_colpitts.ts";
import { untailedPair } from "./untailed_pair.ts";

/** Every topology by its name. */
export const topologies = {
  n_pair: crossCoupledPair,
  p_pair: crossCoupledPairP,
  n_pair_resistor_tail: resistorTailPair,
  n_pair_no_tail: untailedPair,
  complementary_pair: complementaryPair,
  class_c_pair: classCPair,
  colpitts,
  differential_colpitts: differentialColpitts,
  steered_colpitts: steeredColpitts,
} as const;

/** Name of a topology, as revisions give it. */
export type TopologyName = keyof typeof topologies;
