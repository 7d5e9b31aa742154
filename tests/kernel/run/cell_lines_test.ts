import { findSyntaxProblem, withLineMarks } from "../../../kernel/run/cell_lines.ts";
import { assert, assertEquals } from "../../assert.ts";

Deno.test("findSyntaxProblem, finds line and column", () => {
  assertEquals(findSyntaxProblem("const a = 1;\nconst b = ;\n"), {
    line: 2,
    column: 11,
    message: "Expression expected.",
  });
  assertEquals(findSyntaxProblem("f(1\n")?.line, 2);
});

Deno.test("findSyntaxProblem, has nothing against what the kernel accepts", () => {
  for (
    const source of [
      "",
      "// only a comment",
      `import { a } from "b";\nawait a();`,
      "const a: number = 1; a",
      "{ a: 1, b: 2 }",
      "{ const a = 1; a }",
      "let a = 1\na",
      "enum A { B }",
    ]
  ) assertEquals(findSyntaxProblem(source), undefined, source);
});

Deno.test("withLineMarks, marks each top-level statement on its own line", () => {
  const marked = withLineMarks(
    `import { a } from "b";\n\n// text\nconst c: number = a(\n  1,\n); c\nfunction d() {}\n{ d() }\n`,
  );
  const mark = (line: number) => `var __tankwrightLine=${line};`;
  assertEquals(
    marked,
    `${mark(1)}import { a } from "b";\n\n// text\n${mark(4)}const c: number = a(\n  1,\n); ` +
      `${mark(6)}c\nfunction d() {}\n{ d() }\n`,
  );
});

Deno.test("withLineMarks, leaves the lines and the value of a cell alone", () => {
  for (const source of ["1\n2", "const a = 1\nconst b = 2", "a\n(1)", "`\n${1}\n`", ""]) {
    const marked = withLineMarks(source);
    assertEquals(marked.split("\n").length, source.split("\n").length);
    assertEquals(marked.replaceAll(/var __tankwrightLine=\d+;/g, ""), source);
    // Indirect evaluation answers the value a script ends with, as a kernel shows it.
    const valueOf = (text: string) => (0, eval)(text.replaceAll("const", "var"));
    if (!source.startsWith("a")) assertEquals(valueOf(marked), valueOf(source), source);
  }
  assert(withLineMarks("x").startsWith("var"));
});
