import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import {
  type BankProcess,
  CapacitorBank,
  type CapacitorBankDesign,
} from "../../../lib/device/capacitor_bank.ts";
import { frequencyStep, switchedQuality } from "../../../lib/device/capacitor_bank_sizing.ts";

const process: BankProcess = { switchOnResistance: 400e-6, switchOffCapacitance: 0.4e-9 };
const design: CapacitorBankDesign = {
  bits: 5,
  weighting: "binary",
  unitCapacitance: 12e-15,
  switchWidth: 6e-6,
};
const at = { frequency: 4.5e9 };

/** C in series with R_on beside C_off, in complex numbers written out. */
function closedCell(weight: number): { g: number; b: number } {
  const w = 2 * Math.PI * at.frequency;
  const [gOn, bOff] = [weight * 6e-6 / 400e-6, w * 0.4e-9 * 6e-6 * weight];
  const bC = w * 12e-15 * weight;
  // Y = jb (g + jb')/(g + j(b + b')).
  const sum = bC + bOff;
  const square = gOn * gOn + sum * sum;
  return {
    g: (-bC * bOff * gOn + bC * gOn * sum) / square,
    b: (bC * gOn * gOn + bC * bOff * sum) / square,
  };
}

Deno.test("CapacitorBank all closed is the sum of its cells, whatever the weighting", () => {
  const { g, b } = closedCell(31);
  const w = 2 * Math.PI * at.frequency;
  for (const weighting of ["binary", "thermometer"] as const) {
    const bank = new CapacitorBank({ ...design, weighting }, process);
    assertEquals(bank.codes, 32);
    const { capacitance, conductance, quality } = bank.at(31, at);
    assertClose([capacitance, conductance, quality], [b / w, g, b / g], { rtol: 1e-12, atol: 0 });
  }
});

Deno.test("CapacitorBank with its switches growing with the capacitance has one quality in all cells", () => {
  const bank = new CapacitorBank(design, process);
  const cells = [1, 2, 4, 8, 16].map((code) => bank.branches(code, at).closed!);
  for (const { capacitance, seriesResistance } of cells) {
    const quality = 1 / (2 * Math.PI * at.frequency * capacitance * seriesResistance);
    const [first] = cells as [typeof cells[0]];
    assertClose(
      quality * first!.capacitance * first!.seriesResistance * 2 * Math.PI * at.frequency,
      1,
      {
        rtol: 1e-13,
        atol: 0,
      },
    );
    // 1/(w R C), and what C_off beside R adds: with a = w R C_off it is (1 + a^2)/(w R C) + a.
    const hand = switchedQuality(400e-6 / 6e-6, { ...at, capacitance: 12e-15 });
    const a = 2 * Math.PI * at.frequency * 400e-6 * 0.4e-9;
    assertClose(quality, hand * (1 + a * a) + a, { rtol: 1e-12, atol: 0 });
    assertClose(quality, hand, { rtol: 2e-4, atol: 0 });
  }
  // With one switch for all, the largest cell has a sixteenth of the smallest one's.
  const equal = new CapacitorBank({ ...design, switchScaling: "equal" }, process);
  const [small, large] = [1, 16].map((code) => {
    const { capacitance, seriesResistance } = equal.branches(code, at).closed!;
    return 1 / (2 * Math.PI * at.frequency * capacitance * seriesResistance);
  }) as [number, number];
  const a = 2 * Math.PI * at.frequency * 400e-6 * 0.4e-9;
  assertClose(large - a, (small - a) / 16, { rtol: 1e-12, atol: 0 });
});

Deno.test("CapacitorBank falls by 1 + C/C_off on opening and keeps R_on C_off at any width", () => {
  for (const switchWidth of [2e-6, 6e-6, 20e-6]) {
    const bank = new CapacitorBank({ ...design, switchWidth }, process);
    // Where the on-resistance does not count; at the oscillator's frequency it costs (w R C)^2.
    const hand = 1 + 12e-15 / (0.4e-9 * switchWidth);
    assertClose(bank.onOffRatio({ frequency: 1e5 }), hand, { rtol: 1e-10, atol: 0 });
    assertClose(bank.onOffRatio(at), hand, { rtol: 1e-2, atol: 0 });
    assertClose(bank.switchTimeConstant, 160e-15, { rtol: 1e-14, atol: 0 });
  }
});

Deno.test("CapacitorBank in a circuit's branches has the admittance of its code", () => {
  const bank = new CapacitorBank(
    { ...design, deviations: [0.01, -0.02, 0, 0.03, -0.01] },
    {
      ...process,
      biasResistance: 20e3,
      capacitorQuality: 120,
      capacitorQualityFrequency: 5e9,
      plateFraction: 0.03,
    },
  );
  const w = 2 * Math.PI * at.frequency;
  for (const code of [0, 1, 13, 31]) {
    const { closed, open, plateCapacitance } = bank.branches(code, at);
    assertEquals(closed === undefined, code === 0);
    assertEquals(open === undefined, code === 31);
    let [g, b] = [0, w * plateCapacitance];
    for (const branch of [closed, open]) {
      if (!branch) continue;
      const x = 1 / (w * branch.capacitance);
      const square = branch.seriesResistance ** 2 + x * x;
      g += branch.seriesResistance / square;
      b += x / square;
    }
    const state = bank.at(code, at);
    assertClose([g, b / w], [state.conductance, state.capacitance], { rtol: 1e-12, atol: 0 });
  }
});

Deno.test("CapacitorBank without loss in its open cells has a finite quality only through closed ones", () => {
  const bank = new CapacitorBank(design, process);
  assert(bank.at(0, at).quality === Infinity);
  const qualities = bank.table(at).slice(1).map(({ quality }) => quality);
  // The more cells are closed the less the open ones dilute the loss.
  qualities.slice(1).forEach((quality, k) => assert(quality < qualities[k]!));
  assertClose(
    qualities.at(-1)!,
    bank.branches(31, at).closed!.capacitance ** -1 /
      (2 * Math.PI * at.frequency * bank.branches(31, at).closed!.seriesResistance),
    {
      rtol: 1e-12,
      atol: 0,
    },
  );
});

Deno.test("CapacitorBank loses through the resistors that hold its open switches", () => {
  const held = new CapacitorBank(design, { ...process, biasResistance: 10e3 });
  const state = held.at(0, at);
  // C_off beside 2 R in series with C, all 31 in parallel.
  const w = 2 * Math.PI * at.frequency;
  const [gb, bOff, bC] = [1 / 20e3, w * 0.4e-9 * 6e-6, w * 12e-15];
  const conductance = 31 * bC * bC * gb / (gb * gb + (bC + bOff) ** 2);
  assertClose(state.conductance, conductance, { rtol: 1e-12, atol: 0 });
});

Deno.test("CapacitorBank names the codes where a binary bank steps back", () => {
  const bank = new CapacitorBank(design, process);
  assertEquals(bank.monotonyFaults(at), []);
  // The largest cell 10 % small: 14.4 units close where 15 open.
  const light = new CapacitorBank({ ...design, deviations: [0, 0, 0, 0, -0.1] }, process);
  const faults = light.monotonyFaults({ frequency: 1e5 });
  assertEquals(faults.map(({ code }) => code), [16]);
  const opened = (c: number, weight: number) => c - 1 / (1 / c + 1 / (0.4e-9 * 6e-6 * weight));
  const change = opened(14.4 * 12e-15, 16) - opened(15 * 12e-15, 15);
  assertClose(faults[0]!.change, change, { rtol: 1e-9, atol: 0 });
  const thermometer = new CapacitorBank({
    ...design,
    weighting: "thermometer",
    deviations: Array.from({ length: 31 }, (_, k) => k % 2 ? 0.3 : -0.3),
  }, process);
  assertEquals(thermometer.monotonyFaults(at), []);
});

Deno.test("CapacitorBank tunes in steps that grow with the cube of the frequency", () => {
  const bank = new CapacitorBank({ ...design, bits: 7, unitCapacitance: 11.3e-15 }, process);
  const tank = { inductance: 1e-9, capacitance: 1e-12 };
  const frequencies = bank.frequencies(tank);
  frequencies.slice(1).forEach((frequency, k) => assert(frequency < frequencies[k]!));
  // Every frequency solves its own resonance.
  for (const code of [0, 50, 127]) {
    const frequency = frequencies[code]!;
    const total = 1e-12 + bank.at(code, { frequency }).capacitance;
    assertClose((2 * Math.PI * frequency) ** 2 * 1e-9 * total, 1, { rtol: 1e-12, atol: 0 });
  }
  for (const code of [1, 127]) {
    const step = frequencies[code - 1]! - frequencies[code]!;
    const middle = Math.sqrt(frequencies[code - 1]! * frequencies[code]!);
    const change = bank.at(code, { frequency: middle }).capacitance -
      bank.at(code - 1, { frequency: middle }).capacitance;
    const hand = frequencyStep(change, { inductance: 1e-9, frequency: middle });
    // First order in a step of 1 % or less of the capacitance, at the middle of it.
    assertClose(step, hand, { rtol: 1e-3, atol: 0 });
  }
});

Deno.test("CapacitorBank refuses designs, processes and codes that are none", () => {
  const refused = (
    change: Partial<CapacitorBankDesign>,
    wording: RegExp,
    other: Partial<BankProcess> = {},
  ) =>
    assertThrows(
      () => new CapacitorBank({ ...design, ...change }, { ...process, ...other }),
      RangeError,
      wording,
    );
  refused({ bits: 0 }, /bits must be a whole number from 1 to 10, got 0/);
  refused({ bits: 2.5 }, /whole number/);
  refused({ unitCapacitance: 0 }, /unit capacitance must be > 0 F, got 0 F/);
  refused({ switchWidth: NaN }, /switch width must be > 0 m/);
  refused({ deviations: [0, 0] }, /there must be 5 deviations, one a cell, got 2/);
  refused({ deviations: [0, 0, 0, 0, -1] }, /a deviation must be > -1, got -1/);
  refused({}, /on-resistance must be > 0 ohm m/, { switchOnResistance: 0 });
  refused({}, /frequency of the capacitors' quality factor must be > 0 Hz/, {
    capacitorQuality: 50,
  });
  const bank = new CapacitorBank(design, process);
  assertThrows(
    () => bank.at(32, at),
    RangeError,
    /code must be a whole number from 0 to 31, got 32/,
  );
  assertThrows(() => bank.at(1, { frequency: 0 }), RangeError, /frequency must be > 0 Hz/);
});
