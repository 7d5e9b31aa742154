/** One design of each topology, which the benchmarks share. */
export {
  CLASS_C_PAIR,
  COLPITTS,
  COMPLEMENTARY_PAIR,
  DIFFERENTIAL_COLPITTS,
  FILTERED_PAIR,
  P_PAIR,
  RESISTOR_TAIL_PAIR,
  STEERED_COLPITTS,
  UNTAILED_PAIR,
} from "../../../bench/lib/circuit/_topology_examples.ts";
