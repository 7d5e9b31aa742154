import type { Condition } from "../../lib/circuit/topology.ts";
import { formatQuantity } from "../../lib/quantity/format_quantity.ts";

/** A condition in one line: "slow, 125 °C, 0.95 V". */
export function conditionText({ corner, temperature, supply }: Condition): string {
  // A supply is said in volts, also below one.
  const volts = Number(supply.toPrecision(4));
  return `${corner}, ${formatQuantity(temperature, "°C")}, ${volts} V`;
}
