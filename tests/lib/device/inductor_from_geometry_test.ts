import { assert, assertClose, assertEquals } from "../../assert.ts";
import { coilHalves } from "../../../lib/device/inductor_filaments.ts";
import { coilFromGeometry } from "../../../lib/device/inductor_from_geometry.ts";
import { spiralDimensions, type SpiralGeometry } from "../../../lib/device/inductor_geometry.ts";
import { type CoilLayers, tracePi } from "../../../lib/device/inductor_layers.ts";
import { spiralInductance } from "../../../lib/device/inductor_spiral_formulas.ts";
import { BULK_METALS } from "../../../lib/device/skin_metal.ts";

const geometry: SpiralGeometry = {
  shape: "octagonal",
  turns: 3,
  width: 10e-6,
  spacing: 3e-6,
  outerDiameter: 220e-6,
};
const layers: CoilLayers = {
  metal: BULK_METALS.copper,
  metalThickness: 3e-6,
  bridgeOxide: 1e-6,
  substrateOxide: 6e-6,
  substrateCapacitance: 1.6e-6,
  substrateConductance: 4e4,
};
const temperature = 330;

Deno.test("coilFromGeometry joins the closed form with the pi network of its trace", () => {
  const coil = coilFromGeometry(geometry, layers, {
    excitation: "single_ended",
    temperature,
    formula: "modified_wheeler",
  });
  const { length } = spiralDimensions(geometry);
  const pi = tracePi({ length, width: 10e-6, crossings: 3 }, layers, { temperature });
  assertEquals(
    coil.parameters.inductance,
    spiralInductance(geometry, { formula: "modified_wheeler" }).inductance,
  );
  assertEquals(coil.parameters.substrate, pi.substrate);
  assertEquals(coil.parameters.parallelCapacitance, pi.parallelCapacitance);
  assertEquals(coil.parameters.seriesResistance(3e9), pi.seriesResistance(3e9));
  assertEquals(coil.parameters.coupling, undefined);
});

Deno.test("coilFromGeometry gives a differential coil a tap, with its coupling from the filaments", () => {
  const options = { excitation: "differential", temperature } as const;
  const coil = coilFromGeometry(geometry, layers, options);
  assertEquals(coil.parameters.coupling, coilHalves(geometry, { thickness: 3e-6 }).coupling);
  assertEquals(
    coilFromGeometry(geometry, layers, { ...options, coupling: 0.5 }).parameters.coupling,
    0.5,
  );
});

Deno.test("coilFromGeometry has more Q and a higher self-resonance when driven differentially", () => {
  // M. Danesh, J. R. Long, IEEE Trans. Microwave Theory Tech. 50 (2002) 332 (from memory).
  const [differential, single] = (["differential", "single_ended"] as const).map((excitation) =>
    coilFromGeometry(geometry, layers, { excitation, temperature })
  );
  assert(differential!.quality(8e9) > single!.quality(8e9));
  assert((differential!.selfResonance ?? NaN) > (single!.selfResonance ?? NaN));
  // At low frequency the drives cannot be told apart.
  assertClose(differential!.quality(1e8), single!.quality(1e8), { rtol: 1e-3, atol: 0 });
});

Deno.test("coilFromGeometry passes on the warnings of the closed form", () => {
  const coil = coilFromGeometry({ ...geometry, turns: 1 }, layers, {
    excitation: "differential",
    temperature,
  });
  assertEquals(coil.warnings.map(({ quantity }) => quantity), ["fill ratio"]);
});
