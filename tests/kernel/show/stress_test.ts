import { PAYLOAD_MIME } from "../../../kernel/show/payload.ts";
import { stress, stressJudgement } from "../../../kernel/show/stress.ts";
import { assert, assertEquals, assertThrows } from "../../assert.ts";

const row = {
  device: "M1",
  quantity: "gate to drain voltage, peak",
  value: 1.31,
  limit: 1.2,
  unit: "V",
  at: "fast, -40 °C",
};

Deno.test("stress: flags what is over its limit in words, and hands the rows over", () => {
  const { bundle } = stress([row, { ...row, value: 1.2 }]);
  assertEquals(bundle[PAYLOAD_MIME], { kind: "stress", rows: [row, { ...row, value: 1.2 }] });
  const lines = bundle["text/plain"].split("\n");
  assert(lines[3]!.includes("109") && lines[3]!.endsWith("✗ over the limit"));
  assert(
    lines[4]!.includes("100") && lines[4]!.endsWith("✓ within"),
    "the limit itself is allowed",
  );
});

Deno.test("stressJudgement: over exactly above the limit", () => {
  assertEquals(stressJudgement({ value: 1.2, limit: 1.2 }), "✓ within");
  assertEquals(stressJudgement({ value: 1.2000001, limit: 1.2 }), "✗ over the limit");
});

Deno.test("stress: a value or limit that cannot be compared is refused", () => {
  assertThrows(
    () => stress([{ ...row, value: NaN }]),
    RangeError,
    /peak of M1: value must be finite/,
  );
  assertThrows(() => stress([{ ...row, limit: 0 }]), RangeError, /limit must be finite and > 0 V/);
});
