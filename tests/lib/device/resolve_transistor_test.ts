import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { CORNERS } from "../../../lib/device/corner.ts";
import { resolveTransistor } from "../../../lib/device/resolve_transistor.ts";
import { Transistor } from "../../../lib/device/transistor.ts";
import { illustrativeCard } from "./_card.ts";

const card = illustrativeCard();
const nominal = card.temperature.nominal;

Deno.test("resolveTransistor gives the card's own figures at the typical corner and nominal temperature", () => {
  const found = resolveTransistor(card, { kind: "n", corner: "typical", temperature: nominal });
  const written = card.transistors[0]!;
  assertEquals(found.threshold, written.threshold);
  assertEquals(found.transconductanceParameter, written.transconductanceParameter);
  assertEquals(found.oxideCapacitance, written.oxideCapacitance);
  assertEquals(found.junction.saturationCurrent, written.junction.saturationCurrent);
});

Deno.test("resolveTransistor moves threshold, mobility and leakage with temperature", () => {
  const at = (temperature: number) =>
    resolveTransistor(card, { kind: "n", corner: "typical", temperature });
  const hot = at(nominal + 50);
  const cold = at(nominal);
  // The card's 0.7 mV/K and exponent 1.4.
  assertClose(cold.threshold - hot.threshold, 35e-3, { rtol: 1e-12, atol: 0 });
  assertClose(
    hot.transconductanceParameter / cold.transconductanceParameter,
    (nominal / (nominal + 50)) ** 1.4,
    { rtol: 1e-12, atol: 0 },
  );
  // Common practice: a silicon junction's leakage doubles about every 8 to 10 K without emission.
  const doublings = Math.log2(hot.junction.saturationCurrent / cold.junction.saturationCurrent);
  assert(50 / doublings > 5 && 50 / doublings < 10);
});

Deno.test("resolveTransistor shifts threshold, mobility and oxide at the corners", () => {
  const [slow, typical, fast] = CORNERS.map((corner) =>
    resolveTransistor(card, { kind: "p", corner, temperature: nominal })
  );
  assertClose(slow!.threshold - typical!.threshold, 0.04, { rtol: 1e-12, atol: 0 });
  assertClose(
    slow!.transconductanceParameter / typical!.transconductanceParameter,
    0.93 * 0.97,
    { rtol: 1e-12, atol: 0 },
  );
  assertClose(fast!.oxideCapacitance / typical!.oxideCapacitance, 1.03, { rtol: 1e-12, atol: 0 });
});

Deno.test("resolveTransistor gives a working transistor for everything on the card", () => {
  for (const { kind, flavour, minimumLength } of card.transistors) {
    const sign = kind === "n" ? 1 : -1;
    for (const corner of CORNERS) {
      for (const temperature of [card.temperature.lowest, nominal, card.temperature.highest]) {
        const parameters = resolveTransistor(card, { kind, flavour, corner, temperature });
        const device = new Transistor(parameters, { width: 1e-6, length: minimumLength });
        const supply = card.supply.nominal * sign;
        const on = Math.abs(device.operatingPoint(supply, supply, 0, 0).current);
        const off = Math.abs(device.operatingPoint(supply, 0, 0, 0).current);
        assert(on > 1e-4 && on < 3e-3 && off < 1e-2 * on, `${kind} ${flavour}: ${on} A, ${off} A`);
      }
    }
  }
});

Deno.test("resolveTransistor refuses an unknown flavour and a temperature outside the card", () => {
  const options = { kind: "n", corner: "typical", temperature: 300 } as const;
  assertThrows(
    () => resolveTransistor(card, { ...options, flavour: "thick" }),
    RangeError,
    /Cannot resolve the transistor: card "Illustrative 65 nm" has regular n, .*, got thick n/,
  );
  assertThrows(
    () => resolveTransistor(card, { ...options, temperature: 500 }),
    RangeError,
    /temperature must lie between 233.15 K and 398.15 K, got 500 K/,
  );
});
