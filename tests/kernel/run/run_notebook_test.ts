import { runNotebook } from "../../../kernel/run/run_notebook.ts";
import { TemplateError } from "../../../kernel/run/template_error.ts";
import { assertEquals, assertRejects } from "../../assert.ts";
import { withNotebook } from "./sample_notebook.ts";

Deno.test("runNotebook, runs every cell with what was handed over", () =>
  withNotebook(["# Title", `globalThis[Symbol.for("tankwright.handover")].a`], async (path) => {
    assertEquals(await runNotebook(path, { handover: { a: 7 } }), [
      { id: "cell-1", type: "markdown", source: "# Title", outputs: [] },
      {
        id: "cell-2",
        type: "code",
        source: `globalThis[Symbol.for("tankwright.handover")].a`,
        outputs: [{ type: "display", data: { "text/plain": "7" }, metadata: {} }],
      },
    ]);
  }));

Deno.test("runNotebook, throws at the first cell that fails", () =>
  withNotebook(["1", "throw new Error('a')", "throw new Error('b')"], async (path) => {
    await assertRejects(() => runNotebook(path), TemplateError, /^sample\.ipynb cell 2 line 1: a$/);
  }));
