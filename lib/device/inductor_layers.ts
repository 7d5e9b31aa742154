import { EPSILON_0 } from "../quantity/constants.ts";
import type { CoilParameters, SubstrateBranch } from "./inductor_network.ts";
import { effectiveThickness, skinDepth } from "./skin_depth.ts";
import { type ConductorMetal, resistivityAt } from "./skin_metal.ts";

/** The layers a coil is made in. */
export interface CoilLayers {
  readonly metal: ConductorMetal;
  /** Of the trace [m]. */
  readonly metalThickness: number;
  /** Of the oxide between the trace and the bridge that crosses under it [m]. */
  readonly bridgeOxide: number;
  /** Of the oxide between the trace and the silicon [m]. */
  readonly substrateOxide: number;
  /** Relative permittivity of both oxides [1]. @default 3.9 */
  readonly oxidePermittivity?: number;
  /** Of the silicon, per area of trace [F/m^2]. */
  readonly substrateCapacitance: number;
  /** Of the silicon, per area of trace [S/m^2]. */
  readonly substrateConductance: number;
}

/** The trace of a coil. */
export interface CoilTrace {
  /** [m] */
  readonly length: number;
  /** [m] */
  readonly width: number;
  /** Places where the bridge crosses under the trace [1]. */
  readonly crossings: number;
}

/** Resistance and capacitances of a trace over a substrate. */
export type TracePi =
  & Pick<CoilParameters, "seriesResistance" | "parallelCapacitance">
  & { readonly substrate: SubstrateBranch };

const SILICON_DIOXIDE = 3.9;

/**
 * Series resistance, self-capacitance and substrate branch of a trace.
 *
 * R_s = rho l / (w t_eff), C_s = n w^2 eps / t_bridge, C_ox = l w eps / (2 t_ox), C_si = l w C_sub / 2,
 * R_si = 2 / (l w G_sub).
 *
 * @param options temperature of the metal [K]; the silicon is taken as given
 * @throws {RangeError} when a figure is out of range
 * @see C. P. Yue, S. S. Wong, "On-chip spiral inductors with patterned ground shields for Si-based RF
 *   ICs", IEEE J. Solid-State Circuits 33 (1998) 743, and IEEE Trans. Electron Devices 47 (2000) 560 (from
 *   memory)
 */
export function tracePi(
  trace: CoilTrace,
  layers: CoilLayers,
  { temperature }: { readonly temperature: number },
): TracePi {
  const { length, width, crossings } = trace;
  const { metalThickness, bridgeOxide, substrateOxide } = layers;
  const { substrateCapacitance, substrateConductance } = layers;
  const { oxidePermittivity = SILICON_DIOXIDE } = layers;
  demand(length > 0, "trace length must be > 0 m", `${length} m`);
  demand(width > 0, "trace width must be > 0 m", `${width} m`);
  demand(crossings >= 0, "number of crossings must be >= 0", `${crossings}`);
  demand(metalThickness > 0, "metal thickness must be > 0 m", `${metalThickness} m`);
  demand(bridgeOxide > 0, "oxide at the bridge must be > 0 m", `${bridgeOxide} m`);
  demand(substrateOxide > 0, "oxide to the substrate must be > 0 m", `${substrateOxide} m`);
  demand(oxidePermittivity >= 1, "relative permittivity must be >= 1", `${oxidePermittivity}`);
  demand(
    substrateCapacitance >= 0,
    "substrate capacitance must be >= 0 F/m^2",
    `${substrateCapacitance} F/m^2`,
  );
  demand(
    substrateConductance > 0,
    "substrate conductance must be > 0 S/m^2",
    `${substrateConductance} S/m^2`,
  );
  const resistivity = resistivityAt(layers.metal, temperature);
  const permittivity = EPSILON_0 * oxidePermittivity;
  const halfArea = length * width / 2;
  return {
    seriesResistance: (frequency) =>
      resistivity * length /
      (width * effectiveThickness(metalThickness, skinDepth(resistivity, frequency))),
    parallelCapacitance: crossings * width ** 2 * permittivity / bridgeOxide,
    substrate: {
      oxideCapacitance: halfArea * permittivity / substrateOxide,
      siliconCapacitance: halfArea * substrateCapacitance,
      siliconResistance: 1 / (halfArea * substrateConductance),
    },
  };
}

function demand(condition: boolean, wording: string, value: string): void {
  if (!condition) {
    throw new RangeError(`Cannot compute the coil's losses: ${wording}, got ${value}`);
  }
}
