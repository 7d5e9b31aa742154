import { assertEquals } from "../assert.ts";
import { checkWords, findForbiddenWords } from "../../tools/check_words.ts";
import { withTree } from "./temporary_tree.ts";

for (
  const text of [
    "// see /home/someone/x",
    'const folder = "/tmp/x";',
    "// TODO: later",
    "as the lecture says",
    "  // console.log(gain);",
    "  // const gain = 2;",
    'Deno.test.only("x", () => {});',
  ]
) {
  Deno.test(`findForbiddenWords() finds ${text.trim()}`, () => {
    assertEquals(findForbiddenWords("kernel/a.ts", `const a = 1;\n${text}\n`).length, 1);
  });
}

Deno.test("findForbiddenWords() lets ordinary text pass", () => {
  const text =
    "// const by choice: the return of the tank\n// let the pole settle\nawait work/tmp;\n" +
    "// Lecture Notes in Mathematics 1234 (1987)";
  assertEquals(findForbiddenWords("kernel/a.ts", text), []);
});

Deno.test("checkWords() names file and line, in every kind of text file", async () => {
  const findings = await withTree(
    { "a/b.md": "fine\nFIXME", "c.yaml": "# TODO", "d.bin": "TODO" },
    checkWords,
  );
  assertEquals(findings.map((finding) => finding.split(" ")[0]), ["a/b.md:2:", "c.yaml:1:"]);
});
