import { assert } from "../../assert.ts";
import { crossCoupledPair } from "../../../lib/circuit/cross_coupled_pair.ts";
import { findEquilibrium } from "../../../lib/orbit/equilibrium.ts";
import { phaseDiffusion } from "../../../lib/orbit/phase_diffusion.ts";
import { illustrativeCard } from "../device/_card.ts";
import { orbitOf } from "../orbit/_systems.ts";
import { NOMINAL } from "./_examples.ts";
import { FILTERED_PAIR } from "./_topology_examples.ts";

function tailAndPair(design: typeof FILTERED_PAIR) {
  const { circuit, guess, parts } = crossCoupledPair.build(design, {
    card: illustrativeCard(),
    condition: NOMINAL,
  });
  const orbit = orbitOf(circuit.system, { start: findEquilibrium(circuit.system, { guess }) });
  const { sources } = phaseDiffusion(
    orbit,
    circuit.sources.filter(({ color }) => color === "white"),
  );
  const of = (part: string) =>
    sources.filter(({ device }) => parts[part]!.includes(device))
      .reduce((sum, { diffusion }) => sum + diffusion, 0);
  return { tail: of("tail") / of("tank"), pair: of("pair") / of("tank") };
}

Deno.test("tail filter: at twice the frequency it keeps the tail's noise and the pair's triode out of the tank", () => {
  const { tailFilter: _, ...unfiltered } = FILTERED_PAIR;
  const plain = tailAndPair({ ...unfiltered, tailCapacitance: 50e-15 });
  const bypassed = tailAndPair(unfiltered);
  const filtered = tailAndPair(FILTERED_PAIR);
  // E. Hegazi, H. Sjoland, A. Abidi, IEEE J. Solid-State Circuits 36 (2001) 1921: the bypass takes the tail's noise away,
  // the coil keeps the pair's sources from being grounded by it.
  const figures = JSON.stringify({ plain, bypassed, filtered });
  assert(filtered.tail < 0.05 * plain.tail, figures);
  assert(filtered.pair <= bypassed.pair, figures);
});
