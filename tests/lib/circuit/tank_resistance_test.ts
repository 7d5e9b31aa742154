import { assertClose } from "../../assert.ts";
import { tankResistance } from "../../../lib/circuit/tank_resistance.ts";
import { PAIR_DESIGN } from "./_examples.ts";

Deno.test("tankResistance() is Q w L", () => {
  // 12 times 18.0956 ohm, the reactance of 1.2 nH at 2.4 GHz.
  assertClose(tankResistance(PAIR_DESIGN.tank), 12 * 2 * Math.PI * 2.4e9 * 1.2e-9, {
    rtol: 1e-14,
    atol: 0,
  });
  assertClose(tankResistance(PAIR_DESIGN.tank), 217.147, { rtol: 0, atol: 5e-4 });
});
