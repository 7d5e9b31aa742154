import { assert, assertClose, assertEquals } from "../assert.ts";
import { outcomeOf } from "./_verdicts.ts";

Deno.test("inductance_minimization: the shipped revision b keeps every limit near the smallest", async () => {
  const { verdicts, figures, text } = await outcomeOf(
    "inductance_minimization",
    "surface_buoy/rev_b.yaml",
  );
  assertEquals(verdicts, {
    "inductance over the smallest that starts": "met",
    "worst loop gain, trimmed": "met",
    "capacitance left": "met",
    "self-resonance over frequency": "met",
    "power, trimmed": "met",
    "quality factor of the tank": "met",
  });
  const smallest = figures["smallest inductance that starts"]!;
  assert(smallest < 1.8e-9 && smallest > 1.8e-9 / 1.25);
  // The recommended line has more current there, so it needs no more inductance.
  assert(figures["inductance on the recommended line"]! < smallest);
  assert(/by trial of 60 inductances.*agrees within its step/.test(text));
  assert(
    text.includes("what keeps the inductance from being smaller at the proposed current: startup"),
  );
  assert(!/NaN|undefined|Infinity/.test(text));
});

Deno.test("inductance_minimization: revision a does not reach the smallest that starts", async () => {
  const { verdicts, figures } = await outcomeOf(
    "inductance_minimization",
    "surface_buoy/rev_a.yaml",
  );
  assertEquals(verdicts["inductance over the smallest that starts"], "missed");
  assertEquals(verdicts["worst loop gain, trimmed"], "missed");
  assert(figures["smallest inductance that starts"]! > 1.8e-9);
  assertClose(figures["smallest inductance that starts"]!, 1.9e-9, { rtol: 0.02, atol: 0 });
});
