import { assertClose } from "../../assert.ts";
import { loadedLoopGain } from "../../../lib/circuit/loaded_loop_gain.ts";

Deno.test("loadedLoopGain: the hand value where the source does not load the divider", () => {
  assertClose(loadedLoopGain(3, { quality: 1e6 }), 3, { rtol: 1e-11, atol: 0 });
});

Deno.test("loadedLoopGain: 1 at the threshold Q^2 / (Q^2 - 1)", () => {
  for (const quality of [2, 8, 30]) {
    const threshold = quality ** 2 / (quality ** 2 - 1);
    assertClose(loadedLoopGain(threshold, { quality }), 1, { rtol: 1e-14, atol: 0 });
  }
});

Deno.test("loadedLoopGain: the port's conductance at the frequency where it is real", () => {
  // Solved from the admittance itself: y = (w / w0)^2 with y^2 - y - (g/Q)^2 = 0, a = g / y.
  const [hand, quality] = [5, 8];
  const y = (1 + Math.sqrt(1 + 4 * 25 / 64)) / 2;
  assertClose(y * y - y, 25 / 64, { rtol: 1e-14, atol: 0 });
  assertClose(loadedLoopGain(hand, { quality }), hand / y, { rtol: 1e-14, atol: 0 });
});
