import { assertClose, assertThrows } from "../../assert.ts";
import {
  carrierLine,
  figureOfMerit,
  leesonPhaseNoise,
  whitePhaseNoise,
} from "../../../lib/noise/phase_noise.ts";

const at = { frequency: 2.4e9, offset: 1e6 };

Deno.test("whitePhaseNoise: falls by 20 dB per decade of offset and rises by 20 of frequency", () => {
  const base = whitePhaseNoise(1e-18, at);
  const farther = whitePhaseNoise(1e-18, { ...at, offset: 1e7 });
  const higher = whitePhaseNoise(1e-18, { ...at, frequency: 2.4e10 });
  assertClose([farther, higher], [base - 20, base + 20], { rtol: 0, atol: 1e-11 });
});

Deno.test("carrierLine: takes no offset and either side", () => {
  const { frequency } = at;
  const peak = carrierLine(1e-18, { frequency, offset: 0 });
  assertClose(peak, 1 / (Math.PI ** 2 * frequency ** 2 * 1e-18), { rtol: 1e-14, atol: 0 });
});

Deno.test("figureOfMerit: a decibel of noise or of power is a decibel", () => {
  const base = figureOfMerit(-120, { ...at, power: 1e-3 });
  const others = [
    figureOfMerit(-121, { ...at, power: 1e-3 }),
    figureOfMerit(-120, { ...at, power: 1e-3 * 10 ** 0.1 }),
  ];
  assertClose(others, [base + 1, base - 1], { rtol: 0, atol: 1e-11 });
});

const LEESON = {
  thermalEnergy: 4e-21,
  resistance: 300,
  amplitude: 1,
  quality: 10,
  noiseFactor: 2,
  ...at,
};

for (const value of [0, -1, NaN, Infinity]) {
  Deno.test(`phase noise: refuses ${value} wherever a size is asked for`, () => {
    const refused = (action: () => unknown, wording: RegExp) =>
      assertThrows(action, RangeError, wording);
    refused(() => whitePhaseNoise(value, at), /diffusion must be > 0 s, got .* s$/);
    refused(() => whitePhaseNoise(1, { ...at, frequency: value }), /frequency must be > 0 Hz/);
    refused(() => whitePhaseNoise(1, { ...at, offset: value }), /offset must be > 0 Hz/);
    refused(() => carrierLine(value, at), /diffusion must be > 0 s/);
    refused(() => carrierLine(1, { ...at, frequency: value }), /frequency must be > 0 Hz/);
    refused(() => figureOfMerit(-100, { ...at, power: value }), /power must be > 0 W/);
    refused(() => figureOfMerit(-100, { ...at, power: 1, offset: value }), /offset must be/);
    const parts = [
      ["thermalEnergy", /thermal energy must be > 0 J/],
      ["resistance", /resistance must be > 0 ohm/],
      ["amplitude", /amplitude must be > 0 V/],
      ["quality", /quality factor must be > 0, got \S+$/],
      ["noiseFactor", /noise factor must be > 0, got \S+$/],
      ["frequency", /frequency must be > 0 Hz/],
      ["offset", /offset must be > 0 Hz/],
    ] as const;
    for (const [name, wording] of parts) {
      refused(() => leesonPhaseNoise({ ...LEESON, [name]: value }), wording);
    }
  });
}

Deno.test("phase noise: never answers NaN", () => {
  assertThrows(() => carrierLine(1e-18, { ...at, offset: NaN }), RangeError, /offset/);
  assertThrows(() => figureOfMerit(NaN, { ...at, power: 1e-3 }), RangeError, /phase noise/);
});
