import { assertEquals } from "../assert.ts";
import { checkDocs } from "../../tools/check_docs.ts";
import { withTree } from "./temporary_tree.ts";

Deno.test("checkDocs() finds a missing comment, a missing parameter and a missing unit", async () => {
  const files = {
    "deno.json": "{}",
    "lib/tank/bare.ts": "export const bare = 1;",
    "lib/tank/gain.ts": `/** Gain. */\nexport function gain(current: number) {}`,
    "lib/tank/swing.ts":
      `/**\n * Swing.\n *\n * @param current bias\n */\nexport function swing(current: number) {}`,
  };
  assertEquals(await withTree(files, checkDocs), [
    "lib/tank/bare.ts:1: bare has no doc comment",
    "lib/tank/gain.ts:2: gain has no @param current [unit]",
    "lib/tank/swing.ts:6: @param current of swing has no [unit]; [1] for a pure number",
  ]);
});

Deno.test("checkDocs() lets documented, internal and private symbols pass", async () => {
  const files = {
    "deno.json": "{}",
    "lib/tank/swing.ts":
      `/**\n * Swing.\n *\n * @param current [A] bias\n */\nexport function swing(current: number) {}\n` +
      `/** @internal */\nexport function half(x: number) {}`,
    "lib/tank/choice.ts":
      `/** One. */\nexport function choice(x: string): void;\nexport function choice(x: number[]): void;\n` +
      `export function choice(x: unknown) {}`,
    "lib/tank/_helper.ts": "export const helper = 1;",
    "lib/tank/mod.ts": `export { swing } from "./swing.ts";`,
  };
  assertEquals(await withTree(files, checkDocs), []);
});
