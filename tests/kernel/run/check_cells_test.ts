import { checkCells, problemText } from "../../../kernel/run/check_cells.ts";
import { parseNotebook } from "../../../kernel/run/notebook.ts";
import { assert, assertEquals, assertRejects } from "../../assert.ts";
import { notebookText } from "./sample_notebook.ts";

const root = new URL("../../../", import.meta.url);
const config = decodeURIComponent(new URL("deno.json", root).pathname);

function notebook(name: string, ...sources: string[]) {
  const cells = sources.map((source, i) => ({ id: `c${i}`, source }));
  return { notebook: parseNotebook(notebookText(cells), name), base: root.href + "notebooks/" };
}

Deno.test("checkCells, tells notebook, cell, line and column of each error", async () => {
  const problems = await checkCells([
    notebook(
      "a.ipynb",
      "# Title",
      `import { parse, nothing } from "yaml";\nconst n: number = 1;`,
      `const n = "text";\nparse(n);\nn.toFixed(2);`,
      `import { q } from "no-such-package";\nconst deep: { a: { b: number } } = { a: { b: n } };`,
    ),
    notebook("b.ipynb", `import { parse } from "yaml";`, "parse(1);"),
    notebook("c.ipynb", "const a = ;"),
    notebook("d.ipynb", `import { parse } from "yaml";\nawait parse("a: 1");`),
  ], config);
  const texts = problems.map(problemText);
  const expected = [
    /^a\.ipynb cell 2 line 1:17: .*no exported member 'nothing'/,
    /^a\.ipynb cell 3 line 3:3: Property 'toFixed' does not exist on type/,
    /^a\.ipynb cell 4 line 1:19: .*no-such-package/,
    /^a\.ipynb cell 4 line 2:43: Type 'string' is not assignable to type 'number'/,
    /^b\.ipynb cell 2 line 1:7: Argument of type 'number' is not assignable/,
    /^c\.ipynb cell 1 line 1:11: Expression expected/,
  ];
  for (const wording of expected) {
    assertEquals(texts.filter((text) => wording.test(text)).length, 1, `${wording}\n${texts}`);
  }
  assertEquals(texts.length, expected.length, texts.join("\n"));
  assert(texts.every((text) => !text.includes("\n")));
});

Deno.test("checkCells, passes sound notebooks and none at all", async () => {
  assertEquals(await checkCells([], config), []);
  assertEquals(await checkCells([notebook("a.ipynb", "await Promise.resolve(1);")], config), []);
});

Deno.test("checkCells, says so when the check itself fails", async () => {
  await assertRejects(
    () => checkCells([notebook("a.ipynb", "1")], `${config}.none`),
    Error,
    /Cannot type-check the cells: .*status 1/,
  );
});
