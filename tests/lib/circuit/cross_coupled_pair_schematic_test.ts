import { crossCoupledPair } from "../../../lib/circuit/cross_coupled_pair.ts";
import { assertEquals } from "../../assert.ts";

const DESIGN = {
  tank: { inductance: 1.2e-9, quality: 12, qualityFrequency: 5e9, capacitance: 650e-15 },
  pair: { width: 40e-6, length: 60e-9 },
  tail: { width: 160e-6, length: 200e-9 },
  current: 2e-3,
  mirrorRatio: 8,
  loadCapacitance: 50e-15,
  tailCapacitance: 200e-15,
  mirrorCapacitance: 10e-12,
};

Deno.test("crossCoupledPair: the schematic draws no capacitor of 0 F", () => {
  const bare = crossCoupledPair.schematic({
    ...DESIGN,
    loadCapacitance: 0,
    tailCapacitance: 0,
    mirrorCapacitance: 0,
  });
  assertEquals(bare.symbols.filter(({ kind }) => kind === "capacitor").map(({ name }) => name), [
    "tank capacitor",
  ]);
  assertEquals(bare.symbols.filter(({ kind }) => kind === "ground").length, 2);
});
