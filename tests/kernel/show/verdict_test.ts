import fc from "fast-check";
import { PAYLOAD_MIME } from "../../../kernel/show/payload.ts";
import { verdict, type VerdictOptions } from "../../../kernel/show/verdict.ts";
import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";

function stateOf(value: number | null, options: VerdictOptions): string {
  return verdict("gain", value, "1", options).payload.state;
}

Deno.test("verdict: met inside and on a lower limit, missed below it", () => {
  assertEquals(stateOf(2.5, { atLeast: 2 }), "met");
  assertEquals(stateOf(2, { atLeast: 2 }), "met");
  assertEquals(stateOf(1.999, { atLeast: 2 }), "missed");
});

Deno.test("verdict: met inside and on an upper limit, missed above it", () => {
  assertEquals(stateOf(-120, { atMost: -112 }), "met");
  assertEquals(stateOf(-112, { atMost: -112 }), "met");
  assertEquals(stateOf(-111, { atMost: -112 }), "missed");
});

Deno.test("verdict: thin when inside by less than the asked margin, met at exactly that margin", () => {
  assertEquals(stateOf(2.2, { atLeast: 2, thin: 0.3 }), "thin");
  assertEquals(stateOf(2.5, { atLeast: 2, thin: 0.5 }), "met");
  // 1.3 - 1.2 is 0.10000000000000009 and 1.2 - 1.1 is 0.09999999999999987 in binary.
  assertEquals(stateOf(1.2, { atLeast: 1.1, thin: 0.1 }), "met");
  assertEquals(stateOf(1.9, { atLeast: 2, thin: 0.3 }), "missed");
});

Deno.test("verdict: with two limits the nearer one sets margin and state", () => {
  const { payload } = verdict("supply", 1.08, "V", { atLeast: 0.9, atMost: 1.1, thin: 0.05 });
  assertEquals(payload.state, "thin");
  assertClose(payload.margin!, 0.02, { rtol: 1e-12, atol: 0 });
  assertEquals(payload.limit, { atLeast: 0.9, atMost: 1.1 });
  assertEquals(stateOf(0.89, { atLeast: 0.9, atMost: 1.1 }), "missed");
  assertEquals(stateOf(1.11, { atLeast: 0.9, atMost: 1.1 }), "missed");
});

Deno.test("verdict: not run without a finite value, with the reason and never NaN", () => {
  const given = verdict("overlap", null, "%", {
    atLeast: 0.3,
    note: "the bank has no second code",
  });
  assertEquals(given.payload.state, "not run");
  assertEquals(given.payload.value, null);
  assertEquals(given.payload.margin, null);
  assertEquals(given.payload.note, "the bank has no second code");
  assertEquals(
    verdict("overlap", NaN, "%", { atLeast: 0.3 }).payload.note,
    "the computed value is not a number",
  );
  assertEquals(
    verdict("start time", Infinity, "s", { atMost: 1e-6, note: "slow" }).payload.note,
    "slow; the computed value is infinite",
  );
  assert(verdict("overlap", null, "%", { atLeast: 0.3 }).payload.note!.includes("no reason"));
  for (const text of Object.values(verdict("x", NaN, "V", { atMost: 1 }).bundle)) {
    assert(!JSON.stringify(text).includes("NaN"));
  }
});

Deno.test("verdict: margin is positive exactly inside the limits", () => {
  const finite = fc.double({ min: -1e6, max: 1e6, noNaN: true });
  fc.assert(fc.property(finite, finite, finite, (value, a, b) => {
    const [atLeast, atMost] = a <= b ? [a, b] : [b, a];
    const { margin, state } = verdict("x", value, "V", { atLeast, atMost }).payload;
    assertEquals(margin! >= 0, value >= atLeast && value <= atMost);
    assertEquals(state === "missed", margin! < 0);
  }));
});

Deno.test("verdict: its plain text stands alone and its payload travels beside it", () => {
  const { bundle, payload } = verdict("Phase noise at 1 MHz", -110.5, "dBc/Hz", {
    atMost: -112,
    note: "slow, 125 °C",
  });
  assertEquals(
    bundle["text/plain"],
    "\u2717 missed: Phase noise at 1 MHz: -110.5 dBc/Hz " +
      "(limit: at most -112.0 dBc/Hz, margin -1.5 dB); slow, 125 °C",
  );
  assertEquals(bundle[PAYLOAD_MIME], payload);
  assertEquals(payload.kind, "verdict");
  assert(String(bundle["text/html"]).includes("\u2717 missed"), "the state is a word and a symbol");
});

Deno.test("verdict: what a person typed is escaped", () => {
  const { bundle } = verdict("<img src=x>", 1, "V", { atMost: 2, note: "<script>" });
  assert(!/<(?:img|script)/.test(String(bundle["text/html"])));
});

Deno.test("verdict: limits that say nothing are refused", () => {
  assertThrows(() => verdict("x", 1, "V", {}), TypeError, /atLeast or atMost must be given/);
  assertThrows(
    () => verdict("x", 1, "V", { atLeast: NaN }),
    RangeError,
    /must be finite, got NaN V/,
  );
  assertThrows(() => verdict("x", 1, "V", { atLeast: 2, atMost: 1 }), RangeError, /got 2 and 1 V/);
  assertThrows(
    () => verdict("x", 1, "V", { atMost: 1, thin: -1 }),
    RangeError,
    /thin must be >= 0/,
  );
});
