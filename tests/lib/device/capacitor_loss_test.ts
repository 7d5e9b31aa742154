import { assert, assertClose, assertThrows } from "../../assert.ts";
import { capacitorLoss } from "../../../lib/device/capacitor_loss.ts";

Deno.test("capacitorLoss draws one impedance in two ways", () => {
  for (const quality of [0.5, 3, 40]) {
    const capacitor = { capacitance: 1e-12, quality, qualityFrequency: 5e9 };
    const { seriesResistance, parallelResistance, parallelCapacitance } = capacitorLoss(capacitor);
    const w = 2 * Math.PI * 5e9;
    assertClose(w * 1e-12 * seriesResistance * quality, 1, { rtol: 1e-14, atol: 0 });
    // Y of R in series with C: (w^2 C^2 R + jwC)/(1 + w^2 C^2 R^2).
    const x = w * 1e-12 * seriesResistance;
    assertClose(1 / parallelResistance, w * 1e-12 * x / (1 + x * x), { rtol: 1e-13, atol: 0 });
    assertClose(parallelCapacitance, 1e-12 / (1 + x * x), { rtol: 1e-13, atol: 0 });
    assertClose(w * parallelCapacitance * parallelResistance, quality, { rtol: 1e-13, atol: 0 });
  }
});

Deno.test("capacitorLoss of a lossless capacitor is none", () => {
  const loss = capacitorLoss({ capacitance: 1e-12, quality: Infinity, qualityFrequency: 5e9 });
  assert(loss.seriesResistance === 0 && loss.parallelResistance === Infinity);
  assert(loss.parallelCapacitance === 1e-12);
});

Deno.test("capacitorLoss refuses what is not above zero", () => {
  const good = { capacitance: 1e-12, quality: 30, qualityFrequency: 5e9 };
  assertThrows(
    () => capacitorLoss({ ...good, quality: 0 }),
    RangeError,
    /Cannot find the capacitor's loss: quality factor must be > 0, got 0/,
  );
  assertThrows(
    () => capacitorLoss({ ...good, capacitance: NaN }),
    RangeError,
    /capacitance must be > 0 F, got NaN F/,
  );
});
