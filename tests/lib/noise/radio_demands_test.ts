import { assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { maskAt, maskFrom, translateMask } from "../../../lib/noise/mask.ts";
import { radioDemands, type RadioNumbers } from "../../../lib/noise/radio_demands.ts";

/** Short-range radio of 1 Mbit/s, VCO at twice the carrier; hand arithmetic beside each figure. */
const RADIO: RadioNumbers = {
  carrier: 2.44e9,
  bandwidth: 1e6,
  coChannel: 21,
  impairments: 0,
  neighbours: [
    { offset: 1e6, carrierToInterferer: 15 },
    { offset: 2e6, carrierToInterferer: -17 },
    { offset: 3e6, carrierToInterferer: -27 },
  ],
  blocker: { offset: 20e6, wanted: -67, level: -27 },
  transmit: { offset: 50e6, noise: -79, output: 33, bandwidth: 100e3 },
  modulation: { accuracy: -32, below: 6 },
  jitter: 1e-12,
  loop: { bandwidth: 200e3, share: 0.5 },
  upTo: 100e6,
};

Deno.test("radioDemands: -66, -98 and -108 dBc/Hz at 1, 2 and 3 MHz, and what blocker and transmitter ask", () => {
  // Bluetooth Core Specification Vol 6 Part A 4.2 (LE 1M): C/I 21, 15, -17, -27 dB, 1 MHz.
  const mask = maskFrom(radioDemands(RADIO).slice(2), { frequency: RADIO.carrier });
  const at = (offset: number) => maskAt(mask, offset)!.level;
  assertClose([at(1e6), at(2e6), at(3e6), at(10e6)], [-66, -98, -108, -108], {
    rtol: 0,
    atol: 1e-9,
  });
  // -67 + 27 - 21 - 60; 3GPP TS 45.005 4.3.3 (from memory): -79 dBm in 100 kHz at 33 dBm is -162 dBc/Hz.
  assertClose([at(30e6), at(60e6)], [-121, -162], { rtol: 0, atol: 1e-9 });
  assertEquals(maskAt(mask, 10e6)!.origin.label, "neighbour 3");
  // In front of a divider by two 6.02 dB more.
  assertClose(maskAt(translateMask(mask, 4.88e9), 3e6)!.level, -108 + 20 * Math.log10(2), {
    rtol: 0,
    atol: 1e-9,
  });
});

Deno.test("radioDemands: modulation accuracy and jitter as lines of 1/f^2 behind the loop", () => {
  const [accuracy, jitter] = radioDemands(RADIO);
  // 10^(-38/20) = 12.6 mrad; share phi^2 fc / (pi f^2) at fc.
  const phase = 10 ** (-38 / 20);
  const level = 10 * Math.log10(0.5 * phase ** 2 / (Math.PI * 200e3));
  assertClose(accuracy!.level, level, { rtol: 0, atol: 1e-9 });
  assertEquals([accuracy!.from, accuracy!.slope], [200e3, -20]);
  const turn = 2 * Math.PI * 2.44e9 * 1e-12;
  assertClose(jitter!.level, level + 20 * Math.log10(turn / phase), { rtol: 0, atol: 1e-9 });
});

Deno.test("radioDemands: impairments lower the receiver's and transmitter's demands, not the phase error's", () => {
  const levels = (impairments: number) =>
    radioDemands({ ...RADIO, impairments }).map(({ level }) => level);
  const [none, three] = [levels(0), levels(3)];
  const change = none.map((level, k) => level - three[k]!);
  assertClose(change, [0, 0, 3, 3, 3, 3, 3], { rtol: 0, atol: 1e-12 });
});

Deno.test("radioDemands: a number that makes no sense is refused by the demand's name", () => {
  assertThrows(
    () => radioDemands({ ...RADIO, bandwidth: 0 }),
    RangeError,
    /"neighbour 1".*bandwidth/,
  );
  assertThrows(() => radioDemands({ ...RADIO, jitter: -1 }), RangeError, /"clock jitter".*jitter/);
});
