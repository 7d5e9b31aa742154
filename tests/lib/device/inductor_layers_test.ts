import { assertClose, assertThrows } from "../../assert.ts";
import { type CoilLayers, tracePi } from "../../../lib/device/inductor_layers.ts";
import { BULK_METALS } from "../../../lib/device/skin_metal.ts";

const layers: CoilLayers = {
  metal: BULK_METALS.copper,
  metalThickness: 3e-6,
  bridgeOxide: 1e-6,
  substrateOxide: 6e-6,
  substrateCapacitance: 1.6e-6,
  substrateConductance: 4e4,
};
const trace = { length: 1e-3, width: 10e-6, crossings: 2 };

Deno.test("tracePi has the direct-current resistance of the film at low frequency", () => {
  const { seriesResistance } = tracePi(trace, layers, { temperature: 293.15 });
  const direct = 1.68e-8 * 1e-3 / (10e-6 * 3e-6);
  assertClose(seriesResistance(0), direct, { rtol: 1e-14, atol: 0 });
  assertClose(seriesResistance(1), direct, { rtol: 1e-3, atol: 0 });
});

Deno.test("tracePi has a resistance that grows with the root of frequency where the skin is thin", () => {
  const { seriesResistance } = tracePi(trace, layers, { temperature: 293.15 });
  assertClose(seriesResistance(4e12) / seriesResistance(1e12), 2, { rtol: 1e-12, atol: 0 });
});

Deno.test("tracePi warms its metal and not its capacitances", () => {
  const cold = tracePi(trace, layers, { temperature: 293.15 });
  const hot = tracePi(trace, layers, { temperature: 393.15 });
  assertClose(hot.seriesResistance(0) / cold.seriesResistance(0), 1.39, { rtol: 1e-12, atol: 0 });
  assertClose(hot.parallelCapacitance, cold.parallelCapacitance, { rtol: 1e-15, atol: 0 });
});

Deno.test("tracePi refuses figures out of range", () => {
  const refuse = (change: Partial<CoilLayers>, wording: RegExp) =>
    assertThrows(
      () => tracePi(trace, { ...layers, ...change }, { temperature: 300 }),
      RangeError,
      wording,
    );
  refuse({ metalThickness: 0 }, /metal thickness must be > 0 m, got 0 m$/);
  refuse({ bridgeOxide: -1 }, /oxide at the bridge must be > 0 m, got -1 m$/);
  refuse({ substrateOxide: NaN }, /oxide to the substrate must be > 0 m, got NaN m$/);
  refuse({ oxidePermittivity: 0.5 }, /relative permittivity must be >= 1, got 0\.5$/);
  refuse(
    { substrateCapacitance: -1 },
    /substrate capacitance must be >= 0 F\/m\^2, got -1 F\/m\^2$/,
  );
  refuse({ substrateConductance: 0 }, /substrate conductance must be > 0 S\/m\^2, got 0 S\/m\^2$/);
  assertThrows(
    () => tracePi({ ...trace, length: 0 }, layers, { temperature: 300 }),
    RangeError,
    /trace length must be > 0 m, got 0 m$/,
  );
});
