import { assert, assertClose, assertThrows } from "../../assert.ts";
import { resistorTailPair, tailResistanceFor } from "../../../lib/circuit/resistor_tail_pair.ts";
import { findEquilibrium } from "../../../lib/orbit/equilibrium.ts";
import { illustrativeCard } from "../device/_card.ts";
import { RESISTOR_TAIL_PAIR } from "./_topology_examples.ts";

const card = illustrativeCard();
const condition = {
  corner: "typical",
  temperature: card.temperature.nominal,
  supply: card.supply.nominal,
} as const;
const { pair } = RESISTOR_TAIL_PAIR;

Deno.test("tailResistanceFor: the pair at rest carries the current it was sized for", () => {
  for (const current of [0.5e-3, 2e-3, 5e-3]) {
    const tailResistance = tailResistanceFor(current, { card, pair });
    const { circuit, guess } = resistorTailPair.build(
      { ...RESISTOR_TAIL_PAIR, current, tailResistance },
      { card, condition },
    );
    const rest = findEquilibrium(circuit.system, { guess });
    assert(rest.status === "found");
    const found = circuit.potential("tail", rest.state) / tailResistance;
    // The drain junctions leak 1e-12 of it.
    assertClose(found, current, { rtol: 1e-9, atol: 0 });
  }
});

Deno.test("tailResistanceFor refuses what the pair cannot carry", () => {
  assertThrows(
    () => tailResistanceFor(0.5, { card, pair }),
    RangeError,
    /must carry more than 0\.5 A with its sources at ground/,
  );
  assertThrows(() => tailResistanceFor(0, { card, pair }), RangeError, /current must be > 0 A/);
});

Deno.test("resistorTailPair: another current scales the resistor", () => {
  const { current, tailResistance } = RESISTOR_TAIL_PAIR;
  const half = resistorTailPair.withCurrent(RESISTOR_TAIL_PAIR, current / 2);
  assertClose(half.tailResistance, 2 * tailResistance, { rtol: 1e-14, atol: 0 });
});

Deno.test("resistorTailPair refuses a resistance that is not positive", () => {
  const build = () =>
    resistorTailPair.build({ ...RESISTOR_TAIL_PAIR, tailResistance: 0 }, { card, condition });
  assertThrows(build, RangeError, /tail resistance must be > 0 ohm, got 0 ohm$/);
});
