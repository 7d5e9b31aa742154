import { assertClose, assertThrows } from "../../assert.ts";
import { BULK_METALS, resistivityAt } from "../../../lib/device/skin_metal.ts";

Deno.test("resistivityAt grows linearly from the reference temperature", () => {
  const { copper } = BULK_METALS;
  assertClose(resistivityAt(copper, copper.referenceTemperature), copper.resistivity, {
    rtol: 0,
    atol: 0.5e-23,
  });
  assertClose(
    resistivityAt({ ...copper, temperatureCoefficient: 4e-3 }, copper.referenceTemperature + 100),
    1.4 * copper.resistivity,
    { rtol: 1e-14, atol: 0 },
  );
});

Deno.test("resistivityAt refuses a metal without resistivity and a temperature off the line", () => {
  const { gold } = BULK_METALS;
  assertThrows(
    () => resistivityAt({ ...gold, resistivity: -1 }, 300),
    RangeError,
    /resistivity must be > 0 ohm m, got -1 ohm m$/,
  );
  assertThrows(
    () => resistivityAt(gold, 4),
    RangeError,
    /temperature must be one where the linear law is positive, got 4 K$/,
  );
});
