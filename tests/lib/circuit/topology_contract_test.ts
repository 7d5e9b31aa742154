/** The contract of every topology. */
import { crossCoupledPair } from "../../../lib/circuit/cross_coupled_pair.ts";
import { contract } from "./_contract.ts";
import { PAIR_DESIGN } from "./_examples.ts";

contract({
  topology: crossCoupledPair,
  design: PAIR_DESIGN,
  sides: [["plus", "minus"]],
});
