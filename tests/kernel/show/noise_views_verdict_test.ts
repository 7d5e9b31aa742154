import { noiseVerdict } from "../../../kernel/show/noise_views_verdict.ts";
import { assert, assertEquals, assertThrows } from "../../assert.ts";
import { nominal } from "./_bias_samples.ts";
import { samplePoint } from "./_noise_samples.ts";

const point = samplePoint();
const hot = { ...point, condition: { ...nominal, temperature: 398.15 } };

Deno.test("noiseVerdict: takes the condition with the least margin and says which", () => {
  let calls = 0;
  const { payload } = noiseVerdict("noise", [point, hot], {
    unit: "dB",
    of: () => ({ value: [5, 2][calls++]!, note: "neighbour" }),
    atLeast: 0,
    thin: 3,
  });
  assertEquals([payload.value, payload.state], [2, "thin"]);
  assertEquals(payload.note, "typical, 125 °C, 1 V: neighbour");
});

Deno.test("noiseVerdict: is not run where one condition has no orbit, with the reason", () => {
  const { condition, oscillator } = hot;
  const dead = { condition, oscillator, reason: "the motion dies out" };
  const { payload } = noiseVerdict("noise", [point, dead], {
    unit: "dB",
    of: () => ({ value: 5 }),
    atLeast: 0,
  });
  assertEquals([payload.value, payload.state], [null, "not run"]);
  assert(payload.note === "typical, 125 °C, 1 V: the motion dies out", payload.note);
});

Deno.test("noiseVerdict: refuses an empty list", () => {
  assertThrows(
    () => noiseVerdict("noise", [], { unit: "dB", of: () => ({ value: 1 }), atLeast: 0 }),
    RangeError,
    /there are no conditions/,
  );
});
