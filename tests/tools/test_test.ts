import { assertEquals } from "../assert.ts";
import { withTree } from "./temporary_tree.ts";

const TOOL = new URL("../../tools/test.ts", import.meta.url).href;

/** Last line and status of `tools/test.ts` on a folder of files. */
function runTests(files: Record<string, string>): Promise<{ line: string; failed: boolean }> {
  return withTree({ ...files, "deno.json": "{}" }, async (root) => {
    const { stdout, code } = await new Deno.Command(Deno.execPath(), {
      args: ["run", "-A", TOOL, "--no-check", "."],
      cwd: root,
      stderr: "null",
    }).output();
    const line = new TextDecoder().decode(stdout).trimEnd().split("\n").at(-1) ?? "";
    return { line, failed: code !== 0 };
  });
}

Deno.test("test prints the counts alone on its last line", async () => {
  const files = { "a_test.ts": `Deno.test("a", () => {}); Deno.test.ignore("b", () => {});` };
  assertEquals(await runTests(files), { line: "1 passed, 0 failed, 1 skipped", failed: false });
});

Deno.test("test fails with a failing test", async () => {
  const files = { "a_test.ts": `Deno.test("a", () => { throw new Error("no"); });` };
  assertEquals(await runTests(files), { line: "0 passed, 1 failed", failed: true });
});

Deno.test("test fails with a file that cannot be loaded", async () => {
  const files = { "a_test.ts": `import "./missing.ts";`, "b_test.ts": `Deno.test("b", () => {});` };
  assertEquals(await runTests(files), { line: "0 passed, 1 failed", failed: true });
});
