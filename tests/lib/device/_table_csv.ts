/** Characterization tables written from the model, for the tests of the transistor table. */
import { type Transistor, TRANSISTOR_VALUES } from "../../../lib/device/transistor.ts";

/** From, to and number of voltages. */
export type Sweep = readonly [number, number, number];

export interface TableCsvOptions {
  readonly vgs: Sweep;
  readonly vds: Sweep;
  /** Left out: at a bulk-source voltage of zero, without the column. */
  readonly vbs?: Sweep;
  readonly conductances?: boolean;
  readonly charges?: boolean;
}

function voltages([from, to, count]: Sweep): number[] {
  // Rounded to a microvolt, as an instrument's list would be.
  return Array.from(
    { length: count },
    (_, i) => Number((from + (to - from) * i / (count - 1)).toFixed(6)),
  );
}

/** The characterization of a transistor; a p device with all voltages of the sweeps negated. */
export function tableCsv(device: Transistor, options: TableCsvOptions): string {
  const { vgs, vds, vbs, conductances = true, charges = false } = options;
  const sign = device.parameters.kind === "n" ? 1 : -1;
  const names = [
    "vgs [V]",
    "vds [V]",
    ...(vbs ? ["vbs [V]"] : []),
    "id [uA]",
    ...(conductances ? ["gm [mS]", "gds [mS]", "gmb [mS]"] : []),
    ...(charges ? ["qd [fC]", "qg [fC]", "qs [fC]", "qb [fC]"] : []),
  ];
  const lines = [names.join(",")];
  const out = new Float64Array(TRANSISTOR_VALUES);
  for (const b of vbs ? voltages(vbs) : [0]) {
    for (const g of voltages(vgs)) {
      for (const d of voltages(vds)) {
        device.evaluate(sign * d, sign * g, 0, sign * b, out);
        lines.push([
          sign * g,
          sign * d,
          ...(vbs ? [sign * b] : []),
          out[0]! * 1e6,
          ...(conductances ? [out[5]! * 1e3, out[4]! * 1e3, out[7]! * 1e3] : []),
          ...(charges ? [20, 21, 22, 23].map((k) => out[k]! * 1e15) : []),
        ].join(","));
      }
    }
  }
  return lines.join("\n") + "\n";
}
