import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { resolvePassives } from "../../../lib/device/resolve_passives.ts";
import { illustrativeCard } from "./_card.ts";

const card = illustrativeCard();
const { nominal } = card.temperature;

Deno.test("resolvePassives is 1 throughout at the typical corner and nominal temperature", () => {
  assertEquals(resolvePassives(card, { corner: "typical", temperature: nominal }), {
    capacitor: 1,
    resistor: 1,
    metalResistance: 1,
  });
});

Deno.test("resolvePassives multiplies the corner by the temperature", () => {
  const factors = resolvePassives(card, { corner: "slow", temperature: nominal + 80 });
  // The card: 10 % and 20 ppm/K, 15 % and -200 ppm/K, 0.35 %/K.
  assertClose(
    [factors.capacitor, factors.resistor, factors.metalResistance],
    [1.1 * 1.0016, 1.15 * 0.984, 1.28],
    { rtol: 1e-12, atol: 0 },
  );
  const fast = resolvePassives(card, { corner: "fast", temperature: nominal });
  assert(fast.capacitor < 1 && fast.resistor < 1);
});

Deno.test("resolvePassives refuses a temperature outside the card", () => {
  assertThrows(
    () => resolvePassives(card, { corner: "slow", temperature: 100 }),
    RangeError,
    /Cannot resolve the passives: temperature must lie between/,
  );
});
