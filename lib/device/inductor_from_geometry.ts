import { coilHalves } from "./inductor_filaments.ts";
import { spiralDimensions, type SpiralGeometry } from "./inductor_geometry.ts";
import { type CoilLayers, tracePi } from "./inductor_layers.ts";
import { type CoilModel, coilModel } from "./inductor_model.ts";
import type { CoilExcitation, CoilParameters } from "./inductor_network.ts";
import { type SpiralFormula, spiralInductance } from "./inductor_spiral_formulas.ts";

/** Options of {@linkcode coilFromGeometry}. */
export interface CoilFromGeometryOptions {
  /**
   * A differential coil is symmetric and has a centre tap; a single-ended one is a spiral with its inner
   * end brought out at ground.
   */
  readonly excitation: CoilExcitation;
  /** Of the metal [K]. */
  readonly temperature: number;
  /** @default "current_sheet" */
  readonly formula?: SpiralFormula;
  /** Of the halves of a differential coil [1]. @default from {@linkcode coilHalves} */
  readonly coupling?: number;
}

/**
 * A coil from its drawing and the layers it is made in.
 *
 * The inductance is the closed form's; the rest is the pi network of {@linkcode tracePi}, with a crossing
 * per turn for a spiral and one less for a symmetric coil. The pi network puts half the substrate under
 * each end: driven differentially the voltage falls along the trace, and the true weight of the oxide is
 * nearer a third of that (linear voltage), so the self-resonance comes out low. Crowding of the current by
 * neighbouring turns is left out, so the quality factor comes out high where the trace is several skin
 * depths wide. Both are for a first choice; a drawn coil is read from a file.
 *
 * @throws {RangeError} when a figure is out of range
 * @throws {TypeError} when shape and formula do not go together
 */
export function coilFromGeometry(
  geometry: SpiralGeometry,
  layers: CoilLayers,
  options: CoilFromGeometryOptions,
): CoilModel {
  const { excitation, temperature, formula } = options;
  const { inductance, warnings } = spiralInductance(geometry, formula ? { formula } : {});
  const { turns, width } = geometry;
  const differential = excitation === "differential";
  const { length } = spiralDimensions(geometry);
  const parameters: CoilParameters = {
    inductance,
    ...tracePi({ length, width, crossings: differential ? turns - 1 : turns }, layers, {
      temperature,
    }),
    ...(differential
      ? {
        coupling: options.coupling ??
          coilHalves(geometry, { thickness: layers.metalThickness }).coupling,
      }
      : {}),
  };
  return coilModel(parameters, { origin: "geometry", excitation, warnings });
}
