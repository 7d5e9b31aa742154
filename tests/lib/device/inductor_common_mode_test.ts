import { assertClose, assertThrows } from "../../assert.ts";
import {
  commonModeInductance,
  couplingFromModes,
} from "../../../lib/device/inductor_common_mode.ts";

const coil = { inductance: 2e-9, seriesResistance: () => 1, parallelCapacitance: 0 };

Deno.test("commonModeInductance is a quarter without coupling and vanishes with full coupling", () => {
  const rounding = { rtol: 1e-15, atol: 0 };
  assertClose(commonModeInductance({ ...coil, coupling: 0 }), 0.5e-9, rounding);
  assertClose(commonModeInductance({ ...coil, coupling: 0.6 }), 2e-9 * 0.4 / 6.4, rounding);
  assertClose(commonModeInductance({ ...coil, coupling: 1 - 1e-12 }), 0, { rtol: 0, atol: 1e-20 });
  assertThrows(() => commonModeInductance(coil), TypeError, /must have a centre tap, got none$/);
});

Deno.test("couplingFromModes undoes commonModeInductance", () => {
  for (const coupling of [-0.3, 0, 0.62, 0.9]) {
    const common = commonModeInductance({ ...coil, coupling });
    assertClose(couplingFromModes(coil.inductance, common), coupling, { rtol: 1e-14, atol: 1e-15 });
  }
  assertThrows(
    () => couplingFromModes(0, 1e-9),
    RangeError,
    /differential inductance must be > 0 H, got 0 H$/,
  );
  assertThrows(
    () => couplingFromModes(1e-9, -1e-9),
    RangeError,
    /common-mode inductance must be > 0 H, got -1e-9 H$/,
  );
});
