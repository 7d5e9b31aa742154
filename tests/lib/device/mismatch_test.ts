import { assertClose } from "../../assert.ts";
import { deviatedTransistor, mismatchDeviation } from "../../../lib/device/mismatch.ts";
import { resolveTransistor } from "../../../lib/device/resolve_transistor.ts";
import { Transistor } from "../../../lib/device/transistor.ts";
import { illustrativeCard } from "./_card.ts";

const parameters = resolveTransistor(illustrativeCard(), {
  kind: "n",
  corner: "typical",
  temperature: 300,
});

Deno.test("mismatchDeviation gives the difference of a pair A / sqrt(W L)", () => {
  const { threshold, gain } = mismatchDeviation(parameters, {
    width: 2e-6,
    length: 0.5e-6,
    multiplier: 4,
  });
  // The card's 3 mV um and 0.8 % um over 2 um; one device of a pair has 1/sqrt(2) of it.
  assertClose(threshold * Math.SQRT2, 1.5e-3, { rtol: 1e-12, atol: 0 });
  assertClose(gain * Math.SQRT2, 0.4e-2, { rtol: 1e-12, atol: 0 });
});

Deno.test("deviatedTransistor shifts the current by gm times the threshold and by the gain", () => {
  const size = { width: 20e-6, length: 60e-9 };
  const point = new Transistor(parameters, size).operatingPoint(0.6, 0.5, 0, 0);
  const current = (threshold: number, gain: number) =>
    new Transistor(deviatedTransistor(parameters, { threshold, gain }), size)
      .operatingPoint(0.6, 0.5, 0, 0).current;
  const d = 1e-6;
  assertClose((current(d, 0) - current(-d, 0)) / (2 * d), -point.gm, { rtol: 1e-6, atol: 0 });
  // Without velocity saturation the current is proportional to the gain.
  const relaxed = { ...parameters, saturationVelocity: Infinity };
  const base = new Transistor(relaxed, size).operatingPoint(0.6, 0.5, 0, 0).current;
  const more = new Transistor(deviatedTransistor(relaxed, { threshold: 0, gain: 0.1 }), size)
    .operatingPoint(0.6, 0.5, 0, 0).current;
  assertClose(more, 1.1 * base, { rtol: 1e-12, atol: 0 });
});
