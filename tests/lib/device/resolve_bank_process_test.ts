import { assert, assertClose, assertThrows } from "../../assert.ts";
import { CapacitorBank } from "../../../lib/device/capacitor_bank.ts";
import { resolveBankProcess } from "../../../lib/device/resolve_bank_process.ts";
import { illustrativeCard } from "./_card.ts";

const card = illustrativeCard();
const nominal = card.temperature.nominal;

Deno.test("resolveBankProcess gives the card's figures at its nominal temperature", () => {
  const found = resolveBankProcess(card, { corner: "typical", temperature: nominal });
  assertClose(
    [found.switchOnResistance, found.switchOffCapacitance, found.capacitorQuality!],
    [420e-6, 0.4e-9, 150],
    { rtol: 1e-13, atol: 0 },
  );
  assert(found.biasResistance === Infinity && found.capacitorFactor === 1);
  const bank = new CapacitorBank(
    { bits: 3, weighting: "binary", unitCapacitance: 20e-15, switchWidth: 8e-6 },
    found,
  );
  assertClose(bank.switchTimeConstant, 168e-15, { rtol: 1e-13, atol: 0 });
});

Deno.test("resolveBankProcess takes corner and temperature of switches, capacitors and resistors", () => {
  const slow = resolveBankProcess(card, {
    corner: "slow",
    temperature: nominal + 40,
    biasResistance: 10e3,
  });
  assertClose(
    [
      slow.switchOnResistance,
      slow.switchOffCapacitance,
      slow.biasResistance!,
      slow.capacitorFactor,
    ],
    [420e-6 * 1.2 * 1.08, 0.4e-9 * 1.03, 10e3 * 1.15 * (1 - 0.008), 1.1 * (1 + 40 * 20e-6)],
    { rtol: 1e-12, atol: 0 },
  );
});

Deno.test("resolveBankProcess refuses a temperature outside the card and a card without a bank", () => {
  assertThrows(
    () => resolveBankProcess(card, { corner: "slow", temperature: 100 }),
    RangeError,
    /Cannot resolve the capacitor bank: temperature must lie between/,
  );
  assertThrows(
    () =>
      resolveBankProcess({ ...card, capacitorBank: undefined }, {
        corner: "slow",
        temperature: nominal,
      }),
    RangeError,
    /card "Illustrative 65 nm" has no bank/,
  );
});
