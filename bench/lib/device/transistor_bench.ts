/** Time of one evaluation of the transistor, the innermost call of every orbit. */
import { Transistor, TRANSISTOR_VALUES } from "../../../lib/device/transistor.ts";
import { benchParameters } from "./_parameters.ts";

/** Biases spread over a period of a swinging pair, so that all branches of the start are taken. */
const BIASES = 1024;
const biases = new Float64Array(2 * BIASES);
for (let i = 0; i < BIASES; i++) {
  const phase = 2 * Math.PI * i / BIASES;
  biases[2 * i] = 1 + 0.8 * Math.cos(phase);
  biases[2 * i + 1] = 1 - 0.8 * Math.cos(phase);
}

const out = new Float64Array(TRANSISTOR_VALUES);
const size = { width: 20e-6, length: 60e-9 };
const whole = new Transistor(benchParameters, size);
const channel = new Transistor(benchParameters, { ...size, bulkJunctions: false });

let sink = 0;

Deno.bench(`evaluate, with junctions (${BIASES} biases)`, { group: "transistor" }, () => {
  for (let i = 0; i < BIASES; i++) whole.evaluate(biases[2 * i]!, biases[2 * i + 1]!, 0.3, 0, out);
  sink += out[0]!;
});

Deno.bench(`evaluate, channel only (${BIASES} biases)`, { group: "transistor" }, () => {
  for (let i = 0; i < BIASES; i++) {
    channel.evaluate(biases[2 * i]!, biases[2 * i + 1]!, 0.3, 0, out);
  }
  sink += out[0]!;
});

Deno.bench(`channelNoise (${BIASES} biases)`, { group: "transistor" }, () => {
  for (let i = 0; i < BIASES; i++) {
    sink += whole.channelNoise(biases[2 * i]!, biases[2 * i + 1]!, 0.3, 0);
  }
});
