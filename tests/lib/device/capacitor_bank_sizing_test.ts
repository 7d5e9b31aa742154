import { assertClose, assertThrows } from "../../assert.ts";
import {
  frequencyStep,
  switchedQuality,
  switchOnResistance,
} from "../../../lib/device/capacitor_bank_sizing.ts";

Deno.test("switchOnResistance of a quality of 40, 11.3 fF and 4.494 GHz is 78 ohm", () => {
  // Hand calculation: 1/(2 pi 4.494 GHz x 11.3 fF) = 3134 ohm, over 40.
  const cell = { frequency: 4.494e9, capacitance: 11.3e-15 };
  assertClose(switchOnResistance(40, cell), 78.35, { rtol: 0, atol: 0.01 });
});

Deno.test("switchedQuality times w R C is 1, and undoes switchOnResistance", () => {
  for (const frequency of [1e9, 28e9]) {
    const cell = { frequency, capacitance: 20e-15 };
    const quality = switchedQuality(55, cell);
    assertClose(quality * 2 * Math.PI * frequency * 55 * 20e-15, 1, { rtol: 1e-14, atol: 0 });
    assertClose(switchOnResistance(quality, cell), 55, { rtol: 1e-14, atol: 0 });
  }
});

Deno.test("frequencyStep is the derivative of the resonance", () => {
  const inductance = 1e-9;
  const frequency = 4.494e9;
  const capacitance = 1 / ((2 * Math.PI * frequency) ** 2 * inductance);
  const resonance = (c: number) => 1 / (2 * Math.PI * Math.sqrt(inductance * c));
  const change = 1e-4 * capacitance;
  const difference = resonance(capacitance - change) - resonance(capacitance + change);
  assertClose(frequencyStep(2 * change, { inductance, frequency }), difference, {
    rtol: 1e-7,
    atol: 0,
  });
});

Deno.test("frequencyStep and its exact counterpart on a plan of 3.069 to 4.494 GHz with 1 nH", () => {
  // Hand calculation: 64, 128 and 256 codes over 1.254 to 2.689 pF; printed to the last digit shown.
  const [least, most] = [3.069e9, 4.494e9].map((f) => 1 / ((2 * Math.PI * f) ** 2 * 1e-9))
    .reverse() as [
      number,
      number,
    ];
  assertClose([least, most], [1.254e-12, 2.689e-12], { rtol: 0, atol: 0.6e-15 });
  const table = [[64, 40.8e6], [128, 20.2e6], [256, 10.1e6]] as const;
  for (const [codes, step] of table) {
    const unit = (most - least) / (codes - 1);
    const found = frequencyStep(unit, { inductance: 1e-9, frequency: 4.494e9 });
    assertClose(found, step, { rtol: 0, atol: 0.06e6 });
  }
  const next = least + (most - least) / 63;
  assertClose(4.494e9 - 1 / (2 * Math.PI * Math.sqrt(1e-9 * next)), 40.3e6, {
    rtol: 0,
    atol: 0.06e6,
  });
});

Deno.test("Sizing of a bank refuses what is not above zero", () => {
  const cell = { frequency: 1e9, capacitance: 1e-15 };
  assertThrows(() => switchOnResistance(0, cell), RangeError, /quality factor must be > 0, got 0/);
  assertThrows(
    () => switchedQuality(50, { ...cell, frequency: -1 }),
    RangeError,
    /frequency must be > 0 Hz, got -1 Hz/,
  );
  assertThrows(
    () => frequencyStep(1e-15, { inductance: 0, frequency: 1e9 }),
    RangeError,
    /inductance must be > 0 H, got 0 H/,
  );
});
