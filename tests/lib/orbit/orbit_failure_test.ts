import { assertEquals } from "../../assert.ts";
import { orbitFailure } from "../../../lib/orbit/orbit_failure.ts";

Deno.test("orbitFailure() fills in an empty history and no work", () => {
  assertEquals(orbitFailure("settles", "the motion dies out"), {
    status: "settles",
    reason: "the motion dies out",
    history: [],
    work: { evaluations: 0, factorizations: 0, passes: 0, transientSteps: 0 },
  });
});
