import { topologies } from "../../lib/circuit/topologies.ts";
import { assert, assertEquals } from "../assert.ts";
import { outcomeOf } from "./_verdicts.ts";

Deno.test("topology_choice: compares every topology and judges the shipped revision's choice", async () => {
  const { verdicts, figures, text } = await outcomeOf("topology_choice", "surface_buoy/rev_b.yaml");
  assertEquals(verdicts, {
    "startup of the chosen topology": "met",
    "noise above the quietest that starts everywhere": "met",
    "device voltage of the chosen topology": "met",
  });
  for (const name of Object.keys(topologies)) {
    assert(new RegExp(`^${name}( \\(chosen\\))?  `, "m").test(text), `${name} is not in the table`);
  }
  assert(figures["figure of merit of the chosen topology"]! > 180);
  assert(!/NaN|undefined|Infinity/.test(text));
});
