/** Tables made from the model, and what their tests ask of them. */
import { resolveTransistor } from "../../../lib/device/resolve_transistor.ts";
import { Transistor, TRANSISTOR_VALUES } from "../../../lib/device/transistor.ts";
import type { TransistorModel } from "../../../lib/device/transistor_model.ts";
import { TransistorTable } from "../../../lib/device/transistor_table.ts";
import { parseTransistorTable } from "../../../lib/device/transistor_table_csv.ts";
import { seededUniform } from "./_biases.ts";
import { illustrativeCard } from "./_card.ts";
import { tableCsv, type TableCsvOptions } from "./_table_csv.ts";

/** Potentials of drain, gate, source and bulk. */
export type Bias = [number, number, number, number];

const card = illustrativeCard();
const typical = { corner: "typical", temperature: 300 } as const;
export const nParameters = resolveTransistor(card, { kind: "n", ...typical });
export const pParameters = resolveTransistor(card, { kind: "p", ...typical });
export const size = { width: 20e-6, length: 60e-9 };
export const nDevice = new Transistor(nParameters, size);
export const channel = new Transistor(nParameters, { ...size, bulkJunctions: false });

/** The table of a device, made and used again. */
export function tableOf(
  device: Transistor,
  options: TableCsvOptions,
  { used = device.size, parameters = device.parameters } = {},
): TransistorTable {
  return new TransistorTable(parseTransistorTable(tableCsv(device, options)), {
    parameters,
    size: used,
    characterizedWidth: device.size.width,
  });
}

/** What a device evaluates to. */
export function values(device: TransistorModel, bias: Bias): Float64Array {
  const out = new Float64Array(TRANSISTOR_VALUES).fill(NaN);
  device.evaluate(...bias, out);
  return out;
}

/** Biases inside a table of vgs -0.3 to 1.4, vds to 1.6 and vbs -0.8 to 0.4, either sign of vds. */
export function biases(count: number, sign = 1): Bias[] {
  const uniform = seededUniform(31);
  return Array.from({ length: count }, (): Bias => {
    const across = 2.6 * uniform() - 1.3;
    const gate = 1.1 * uniform();
    const bulk = -0.5 * uniform();
    const up = 0.2 * uniform();
    const [drain, source] = across > 0 ? [across, 0] : [0, -across];
    return [drain + up, gate + up, source + up, bulk + up].map((v) => sign * v) as Bias;
  });
}

export const COARSE: TableCsvOptions = {
  vgs: [-0.3, 1.4, 18],
  vds: [0, 1.6, 17],
  vbs: [-0.8, 0.4, 7],
  charges: true,
};
export const FINE: TableCsvOptions = {
  vgs: [-0.3, 1.4, 35],
  vds: [0, 1.6, 33],
  vbs: [-0.8, 0.4, 13],
  charges: true,
};
export const coarse = tableOf(channel, COARSE);
export const fine = tableOf(channel, FINE);

/** Largest error of entries `from` to `to` over the biases, over the largest such entry. */
export function worst(
  table: TransistorModel,
  device: TransistorModel,
  { from, to, at }: { from: number; to: number; at: readonly Bias[] },
): number {
  let [error, largest] = [0, 0];
  for (const bias of at) {
    const [a, b] = [values(table, bias), values(device, bias)];
    for (let e = from; e < to; e++) {
      error = Math.max(error, Math.abs(a[e]! - b[e]!));
      largest = Math.max(largest, Math.abs(b[e]!));
    }
  }
  return error / largest;
}
