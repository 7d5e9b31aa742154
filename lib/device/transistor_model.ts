import type { Transistor } from "./transistor.ts";

/** What a circuit takes from a transistor, be it the model or a table. */
export type TransistorModel = Pick<
  Transistor,
  "parameters" | "size" | "evaluate" | "channelNoise" | "flickerNoise" | "operatingPoint"
>;
