import { assertEquals } from "../assert.ts";
import { findLongFiles } from "../../tools/structure/long_files.ts";
import { readSourceTree } from "../../tools/structure/source_tree.ts";
import { findUntestedFiles } from "../../tools/structure/untested_files.ts";
import { withTree } from "./temporary_tree.ts";

Deno.test("findUntestedFiles() accepts an excuse that is needed and refuses one that is not", async () => {
  const files = await withTree({
    "deno.json": "{}",
    "reports/main.ts": "console.log(1);",
    "reports/page.ts": "export const page = 1;",
    "tests/reports/page_test.ts": "",
  }, readSourceTree);
  assertEquals(findUntestedFiles(files, { "reports/main.ts": "reason" }), []);
  assertEquals(findUntestedFiles(files, { "reports/main.ts": "", "reports/page.ts": "" }), [
    "reports/page.ts:1: is excused from a test in tools/structure/ but needs no excuse",
  ]);
});

Deno.test("findLongFiles() accepts a justification that is needed and refuses one that is not", async () => {
  const files = await withTree(
    { "deno.json": "{}", "lib/a.ts": "\n".repeat(401), "lib/b.ts": "\n".repeat(400) },
    readSourceTree,
  );
  assertEquals(findLongFiles(files, { "lib/a.ts": "reason" }), []);
  assertEquals(findLongFiles(files, { "lib/a.ts": "reason", "lib/b.ts": "reason" }), [
    "lib/b.ts:1: is justified as a long file but is not long",
  ]);
});
