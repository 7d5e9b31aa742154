import ts from "typescript";
import { cellsAsModule } from "../../../kernel/run/cells_as_module.ts";
import { assert, assertEquals } from "../../assert.ts";

function moduleOf(...sources: string[]) {
  const cells = sources.map((source, i) => ({
    id: `c${i}`,
    type: source.startsWith("#") ? "markdown" as const : "code" as const,
    source,
    number: i + 1,
  }));
  const module = cellsAsModule(cells, "file:///h/notebooks/");
  const problems = ts.transpileModule(module.text, { reportDiagnostics: true }).diagnostics;
  assertEquals(problems?.length, 0, module.text);
  return module;
}

/** Where the n-th occurrence of `word` in the module comes from. */
function originOf(module: ReturnType<typeof moduleOf>, word: string, occurrence = 0) {
  const at = module.text.split(word).slice(0, occurrence + 1).join(word).length;
  const before = module.text.slice(0, at).split("\n");
  return module.placeOf(before.length, before.at(-1)!.length + 1); // split gives at least one
}

Deno.test("cellsAsModule, merges the imports of all cells and keeps where each name stood", () => {
  const module = moduleOf(
    `import { alpha, beta as other } from "m";\nalpha;`,
    "# text",
    `import whole, { type gamma,\n  alpha } from "m";\nimport "side";\nimport * as star from "m";`,
    `import type { delta } from "m"; import { gamma } from "m";\nimport "side";`,
  );
  const head = module.text.split("\n{\n")[0];
  assertEquals(
    head,
    [
      "export {};",
      `import * as star from "m";`,
      "import {",
      "  alpha,",
      "  beta as other,",
      "  default as whole,",
      "  gamma,",
      "  type delta,",
      `} from "m";`,
      `import "side";`,
    ].join("\n"),
  );
  assertEquals(originOf(module, "alpha"), { cell: 1, line: 1, column: 10 });
  assertEquals(originOf(module, "beta"), { cell: 1, line: 1, column: 17 });
  assertEquals(originOf(module, "gamma"), { cell: 3, line: 1, column: 22 });
  assertEquals(originOf(module, "delta"), { cell: 4, line: 1, column: 15 });
  assertEquals(originOf(module, `"side"`)?.cell, 3);
});

Deno.test("cellsAsModule, keeps lines and columns of the cells", () => {
  const module = moduleOf(
    "const x = 1;",
    `import { a } from "m"; first(a);\n  second();`,
    "export const y = 2; third();\nexport default fourth;",
  );
  assertEquals(originOf(module, "first"), { cell: 2, line: 1, column: 24 });
  assertEquals(originOf(module, "second"), { cell: 2, line: 2, column: 3 });
  assertEquals(originOf(module, "third"), { cell: 3, line: 1, column: 21 });
  assertEquals(originOf(module, "fourth"), { cell: 3, line: 2, column: 16 });
  assertEquals(module.placeOf(1, 1), undefined);
});

Deno.test("cellsAsModule, a name declared again in a later cell shadows the earlier one", () => {
  const { text } = moduleOf("const x = 1;", "const x = 'a'; // end", "x");
  assert(/\{\nconst x = 1;\n\{\nconst x = 'a'; \/\/ end\n\{\nx\n\}\}\}/.test(text), text);
});

Deno.test("cellsAsModule, makes relative imports absolute and keeps attributes", () => {
  const { text } = moduleOf(
    `import data from "../cards/a.json" with { type: "json" };\nimport { b } from "./b.ts";`,
  );
  assert(text.includes(`} from "file:///h/cards/a.json" with { type: "json" };`), text);
  assert(text.includes(`} from "file:///h/notebooks/b.ts";`), text);
});
