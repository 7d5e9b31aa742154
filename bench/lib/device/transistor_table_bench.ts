/** Time of one evaluation of a transistor's table, beside that of the model it stands for. */
import { Transistor, TRANSISTOR_VALUES } from "../../../lib/device/transistor.ts";
import { TransistorTable } from "../../../lib/device/transistor_table.ts";
import { benchParameters } from "./_parameters.ts";

const BIASES = 1024;
const POINTS = 33;
const size = { width: 20e-6, length: 60e-9 };
const model = new Transistor(benchParameters, size);

/** The model on a grid of 50 mV, with or without body voltage and charges. */
function tableOf({ bulks }: { readonly bulks: number }): TransistorTable {
  const axis = (from: number, to: number, count: number) =>
    Float64Array.from(
      { length: count },
      (_, i) => count > 1 ? from + (to - from) * i / (count - 1) : to,
    );
  const gateVoltages = axis(-0.2, 1.4, POINTS);
  const drainVoltages = axis(0, 1.6, POINTS);
  const bulkVoltages = axis(-0.8, 0, bulks);
  const points = POINTS * POINTS * bulks;
  const current = new Float64Array(points);
  const [drain, gate, source] = [0, 1, 2].map(() => new Float64Array(points)) as [
    Float64Array,
    Float64Array,
    Float64Array,
  ];
  const out = new Float64Array(TRANSISTOR_VALUES);
  const channel = new Transistor(benchParameters, { ...size, bulkJunctions: false });
  for (let k = 0; k < points; k++) {
    const vg = gateVoltages[Math.floor(k / (POINTS * bulks))]!;
    const vd = drainVoltages[Math.floor(k / bulks) % POINTS]!;
    channel.evaluate(vd, vg, 0, bulkVoltages[k % bulks]!, out);
    [current[k], drain[k], gate[k], source[k]] = [out[0]!, out[20]!, out[21]!, out[22]!];
  }
  return new TransistorTable(
    {
      gateVoltages,
      drainVoltages,
      bulkVoltages,
      current,
      ...(bulks > 1 ? { charges: { drain, gate, source } } : {}),
    },
    { parameters: benchParameters, size, characterizedWidth: size.width },
  );
}

const out = new Float64Array(TRANSISTOR_VALUES);
let sink = 0;

for (
  const [name, device] of [
    ["model", model],
    ["table of current over two voltages", tableOf({ bulks: 1 })],
    ["table of current and charges over three voltages", tableOf({ bulks: 9 })],
  ] as const
) {
  Deno.bench(`${name} (${BIASES} biases)`, { group: "transistor table" }, () => {
    for (let i = 0; i < BIASES; i++) {
      const swing = 0.5 * Math.cos(2 * Math.PI * i / BIASES);
      device.evaluate(0.9 + swing, 0.9 - swing, 0.25, 0, out);
    }
    sink += out[0]!;
  });
}
