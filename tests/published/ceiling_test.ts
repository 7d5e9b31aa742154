/**
 * The thermodynamic limit on the figure of merit.
 *
 * 10 log(2e-3 / (k T)) + 20 log Q + 10 log(efficiency / F): P. Kinget, in Analog Circuit Design (1999) 353; M. Garampazzi,
 * S. Dal Toso, A. Liscidini, D. Manstretta, P. Mendez, L. Romano, R. Castello, IEEE J. Solid-State Circuits 49 (2014)
 * 635. Constants by arithmetic from the exact k.
 */
import { assert, assertClose, assertEquals } from "../assert.ts";
import { ceiling, judgeFigureOfMerit } from "../../lib/noise/ceiling.ts";
import { figureOfMerit, leesonPhaseNoise } from "../../lib/noise/phase_noise.ts";
import { BOLTZMANN } from "../../lib/quantity/constants.ts";

Deno.test("ceiling: 10 log(2e-3 / kT) at four temperatures", () => {
  const table = [[290, 176.98548715], [293.15, 176.93856814], [298.15, 176.86511899], [
    300,
    176.83825458,
  ]] as const;
  for (const [temperature, expected] of table) {
    assertClose(ceiling({ quality: 1, temperature }).limit, expected, { rtol: 0, atol: 5e-9 });
  }
});

Deno.test("ceiling: class B, Q 10, efficiency 2/pi, F 5/3 at 300 K is 192.6586", () => {
  const { ceiling: top } = ceiling({
    quality: 10,
    efficiency: 2 / Math.PI,
    noiseFactor: 5 / 3,
    temperature: 300,
  });
  assertClose(top, 192.6586, { rtol: 0, atol: 5e-5 });
});

Deno.test("ceiling: Q 12 and F 2 give 195.4 at full efficiency and 193.5 in class B; 198 is not credible", () => {
  const values = { quality: 12, noiseFactor: 2, temperature: 300 };
  assertClose(ceiling(values).ceiling, 195.4, { rtol: 0, atol: 0.05 });
  const classB = { ...values, efficiency: 2 / Math.PI };
  assertClose(ceiling(classB).ceiling, 193.5, { rtol: 0, atol: 0.05 });
  assertEquals(judgeFigureOfMerit(198, values).status, "impossible");
  assertEquals(judgeFigureOfMerit(194, classB).status, "impossible");
  assertEquals(judgeFigureOfMerit(193, classB).status, "below");
});

Deno.test("ceiling: a design of 2.4 GHz has 181.69, its efficiency and noise factor account for the rest", () => {
  // f0 2.4 GHz, L 2 nH, Q 10, 1 mA from 1.2 V, A 0.192 V, R 301.59 ohm, F 5/3, 300 K: figures by arithmetic.
  const level = -114.877056;
  const merit = figureOfMerit(level, { frequency: 2.4e9, offset: 1e6, power: 1.2e-3 });
  assertClose(merit, 181.689468, { rtol: 0, atol: 1e-5 });
  const judged = judgeFigureOfMerit(merit, {
    quality: 10,
    efficiency: 0.0509296,
    noiseFactor: 5 / 3,
    temperature: 300,
  });
  // The efficiency is printed to six digits.
  assertClose(judged.margin, 0, { rtol: 0, atol: 1e-5 });
});

Deno.test("judgeFigureOfMerit: four invented designs lie below the limit of their tanks", () => {
  // Noise factors, amplitudes and powers by hand; figures of merit to 0.3 dB where they are given.
  const designs = [
    { f: 4.88e9, r: 736, q: 12, a: 0.562, factor: 6.42, power: 0.6e-3, merit: undefined },
    { f: 5.5e9, r: 332, q: 12, a: 0.634, factor: 2, power: 3e-3, merit: 188.5 },
    { f: 3.66e9, r: 193, q: 14, a: 1.164, factor: 2.5, power: 11.4e-3, merit: 190.7 },
    { f: 28e9, r: 157, q: 7.43, a: 0.6, factor: 2.3, power: 5.4e-3, merit: 183.9 },
  ];
  for (const { f, r, q, a, factor, power, merit } of designs) {
    const level = leesonPhaseNoise({
      thermalEnergy: BOLTZMANN * 300,
      resistance: r,
      amplitude: a,
      quality: q,
      noiseFactor: factor,
      frequency: f,
      offset: 1e6,
    });
    const found = figureOfMerit(level, { frequency: f, offset: 1e6, power });
    if (merit !== undefined) assertClose(found, merit, { rtol: 0, atol: 0.3 });
    const judged = judgeFigureOfMerit(found, { quality: q, temperature: 300 });
    assert(judged.status === "below" && judged.margin > 3, `${f} Hz: margin ${judged.margin} dB`);
  }
});

Deno.test("judgeFigureOfMerit: a published simulation whose own numbers need a quality above 23", () => {
  // Aqeeli et al., "Low-power and wideband LC VCO for WiMAX" (simulated): 5.72 GHz, 2.21 mW, -132.68 dBc/Hz at 1 MHz.
  const merit = figureOfMerit(-132.68, { frequency: 5.72e9, offset: 1e6, power: 2.21e-3 });
  assertClose(merit, 204.38, { rtol: 0, atol: 0.01 });
  const judge = (quality: number) =>
    judgeFigureOfMerit(merit, { quality, temperature: 300 }).status;
  assertEquals([judge(15), judge(23.8), judge(23.9)], ["impossible", "impossible", "below"]);
});
