import { cornerVerdict } from "../../../kernel/show/corner_verdict.ts";
import { assertEquals, assertThrows } from "../../assert.ts";
import { deadPoint, nominal, sampleCorner } from "./_bias_samples.ts";

const here = sampleCorner(nominal);
const elsewhere = { ...here, condition: { ...nominal, corner: "slow" } as const, distance: 0.2 };

Deno.test("cornerVerdict judges the corner with the least margin to either limit", () => {
  const of = ({ distance }: { distance: number | undefined }) => distance;
  const far = { ...here, distance: 0.9 };
  const low = cornerVerdict("distance", [far, elsewhere], { unit: "1", of, atLeast: 0, atMost: 2 });
  assertEquals([low.payload.value, low.payload.note], [0.2, "slow, 27 °C, 1 V"]);
  const high = cornerVerdict("distance", [far, elsewhere], {
    unit: "1",
    of,
    atLeast: 0,
    atMost: 0.95,
  });
  assertEquals([high.payload.value, high.payload.note], [0.9, "typical, 27 °C, 1 V"]);
});

Deno.test("cornerVerdict is not run where one corner has no figure, and says which and why", () => {
  const dead = { ...elsewhere, proposed: { ...deadPoint(1e-3), reason: "no orbit there" } };
  const { payload } = cornerVerdict("amplitude", [here, dead], {
    unit: "V",
    of: ({ proposed }) => proposed.figures?.amplitude,
    atLeast: 0.1,
  });
  assertEquals([payload.state, payload.value], ["not run", null]);
  assertEquals(payload.note, "slow, 27 °C, 1 V: no orbit there");
});

Deno.test("cornerVerdict refuses to judge no corners", () => {
  assertThrows(
    () => cornerVerdict("amplitude", [], { unit: "V", of: () => 1, atLeast: 0 }),
    RangeError,
    /there are no corners/,
  );
});
