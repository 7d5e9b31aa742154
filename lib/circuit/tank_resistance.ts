import type { TankDesign } from "./topology.ts";

/** Parallel loss resistance of a plain tank, Q w L at the frequency of its quality factor [ohm]. */
export function tankResistance({ inductance, quality, qualityFrequency }: TankDesign): number {
  return quality * 2 * Math.PI * qualityFrequency * inductance;
}
