/** Skin depth against handbook values. */
import { assertClose } from "../assert.ts";
import { effectiveThickness, skinDepth } from "../../lib/device/skin_depth.ts";
import { BULK_METALS } from "../../lib/device/skin_metal.ts";

Deno.test("skinDepth gives the textbook depths of four metals at 10 GHz", () => {
  // D. M. Pozar, Microwave Engineering, example on skin depth: conductivity in S/m and depth in m, three
  // printed digits (from memory).
  const table = [
    ["aluminium", 3.816e7, 8.14e-7],
    ["copper", 5.813e7, 6.6e-7],
    ["gold", 4.098e7, 7.86e-7],
    ["silver", 6.173e7, 6.4e-7],
  ] as const;
  for (const [what, conductivity, depth] of table) {
    // Half the last printed digit, and as much again for the rounded conductivity.
    assertClose(skinDepth(1 / conductivity, 10e9), depth, { rtol: 0, atol: 1e-9, what });
  }
});

Deno.test("skinDepth and effectiveThickness give copper and aluminium films of 2 um", () => {
  // Resistivities at 20 C: CRC Handbook. Effective thickness: C. P. Yue, S. S. Wong, IEEE Trans. Electron
  // Devices 47 (2000) 560. Columns: frequency in GHz, depth and effective thickness in um, surface
  // resistance rho/delta in milliohm; evaluated by an independent program, printed digits (from memory but
  // for copper at 1 GHz).
  const table = {
    copper: [
      [1, 2.06288, 1.2805, 8.1439],
      [2.4, 1.33159, 1.03505, 12.6165],
      [5, 0.92255, 0.81699, 18.2104],
      [10, 0.65234, 0.62193, 25.7534],
    ],
    aluminium: [
      [1, 2.59085, 1.39359, 10.2283],
      [2.4, 1.67239, 1.1666, 15.8456],
      [5, 1.15867, 0.95245, 22.8711],
      [10, 0.8193, 0.74797, 32.3447],
    ],
  } as const;
  for (const metal of ["copper", "aluminium"] as const) {
    const { resistivity } = BULK_METALS[metal];
    for (const [gigahertz, depthUm, thicknessUm, milliohm] of table[metal]) {
      const depth = skinDepth(resistivity, gigahertz * 1e9);
      const thickness = effectiveThickness(2e-6, depth);
      const what = `${metal} at ${gigahertz} GHz`;
      assertClose(depth * 1e6, depthUm, { rtol: 1e-5, atol: 0, what });
      assertClose(thickness * 1e6, thicknessUm, { rtol: 1e-5, atol: 0, what });
      assertClose(resistivity / depth * 1e3, milliohm, { rtol: 1e-5, atol: 0, what });
    }
  }
});
