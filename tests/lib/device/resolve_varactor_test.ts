import { assertClose, assertThrows } from "../../assert.ts";
import {
  resolveAccumulationVaractor,
  resolveJunctionVaractor,
} from "../../../lib/device/resolve_varactor.ts";
import { resolveTransistor } from "../../../lib/device/resolve_transistor.ts";
import { illustrativeCard } from "./_card.ts";

const card = illustrativeCard();
const nominal = { corner: "typical", temperature: card.temperature.nominal } as const;
const ROUNDING = { rtol: 1e-13, atol: 0 };

Deno.test("resolveJunctionVaractor scales the card's figures with the area", () => {
  const found = resolveJunctionVaractor(card, { area: 100e-12, ...nominal });
  // 100 um^2 of 1.1 fF/um^2, 0.5 uA/m^2 and 700 ohm um^2.
  assertClose(
    [found.zeroBiasCapacitance, found.saturationCurrent, found.seriesResistance],
    [110e-15, 0.5e-16, 7],
    ROUNDING,
  );
  assertClose([found.builtInPotential, found.grading, found.emission], [0.75, 0.4, 1], ROUNDING);
});

Deno.test("resolveJunctionVaractor leaks more when hot, as the transistor's junctions do", () => {
  const hot = { corner: "typical", temperature: 398.15 } as const;
  const rise = resolveJunctionVaractor(card, { area: 1e-12, ...hot }).saturationCurrent /
    resolveJunctionVaractor(card, { area: 1e-12, ...nominal }).saturationCurrent;
  const junctions = [hot, nominal].map((condition) =>
    resolveTransistor(card, { kind: "n", ...condition }).junction.saturationCurrent
  ) as [number, number];
  assertClose(rise, junctions[0] / junctions[1], ROUNDING);
});

Deno.test("resolveAccumulationVaractor adds the fringe and a twelfth of the well", () => {
  const found = resolveAccumulationVaractor(card, { width: 50e-6, length: 0.2e-6, ...nominal });
  // 10 um^2 of 12 and 3.5 fF/um^2, 2 x 50 um of 0.2 fF/um; 500 ohm x 0.004/12 and 120 ohm um/50 um.
  assertClose(
    [found.maximumCapacitance, found.minimumCapacitance, found.seriesResistance],
    [140e-15, 55e-15, 500 * 0.004 / 12 + 2.4],
    ROUNDING,
  );
});

Deno.test("resolveAccumulationVaractor takes corner and temperature on its capacitance", () => {
  const slow = resolveAccumulationVaractor(card, {
    width: 50e-6,
    length: 0.2e-6,
    corner: "slow",
    temperature: card.temperature.nominal + 50,
  });
  assertClose(slow.maximumCapacitance, 140e-15 * 1.06 * (1 + 50 * 50e-6), ROUNDING);
});

Deno.test("resolveVaractor functions refuse sizes, temperatures and cards without one", () => {
  assertThrows(
    () => resolveJunctionVaractor(card, { area: 0, ...nominal }),
    RangeError,
    /area must be > 0 m\^2, got 0 m\^2/,
  );
  assertThrows(
    () => resolveAccumulationVaractor(card, { width: 1e-6, length: NaN, ...nominal }),
    RangeError,
    /length must be > 0 m, got NaN m/,
  );
  assertThrows(
    () => resolveJunctionVaractor(card, { area: 1e-12, corner: "fast", temperature: 500 }),
    RangeError,
    /Cannot resolve the varactor: temperature must lie between/,
  );
  const bare = { ...card, varactors: undefined };
  assertThrows(
    () => resolveAccumulationVaractor(bare, { width: 1e-6, length: 1e-6, ...nominal }),
    RangeError,
    /card "Illustrative 65 nm" has no accumulation-mode varactor/,
  );
  const other = { ...card, varactors: { ...card.varactors!, junction: undefined } };
  assertThrows(
    () => resolveJunctionVaractor(other, { area: 1e-12, ...nominal }),
    RangeError,
    /has no junction varactor/,
  );
});
