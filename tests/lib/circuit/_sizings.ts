/** The random sizings, which the benchmarks share. */
export { BOX_NAMES, type Sizing, startableSizings } from "../../../bench/lib/circuit/_sizings.ts";
