import { assertEquals } from "../assert.ts";
import { lastSummary } from "../../tools/test_summary.ts";

Deno.test("lastSummary() reads passed, failed and skipped", () => {
  const output = "ok | 9 passed | 0 failed (1ms)\n\n" +
    "FAILED | 2 passed (2 steps) | 1 failed (3 steps) | 4 ignored (388ms)\n";
  assertEquals(lastSummary(output, 1), {
    passed: 2,
    failed: 1,
    skipped: 4,
    line: "2 passed, 1 failed, 4 skipped",
    status: 1,
  });
});

Deno.test("lastSummary() counts a run that gave no summary as one failure", () => {
  assertEquals(lastSummary("error: Module not found", 1).line, "0 passed, 1 failed");
});

Deno.test("lastSummary() counts a run without tests as one failure, whatever its status", () => {
  const summary = lastSummary("ok | 0 passed | 0 failed | 3 filtered out (11ms)\n", 0);
  assertEquals([summary.line, summary.status], ["0 passed, 1 failed", 1]);
});

Deno.test("lastSummary() counts a bad end of an otherwise passing run as a failure", () => {
  assertEquals(lastSummary("ok | 3 passed | 0 failed (1ms)\n", 133), {
    passed: 3,
    failed: 1,
    skipped: 0,
    line: "3 passed, 1 failed",
    status: 133,
  });
});
