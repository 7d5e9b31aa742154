import { type CellEvent, NotebookRun, openNotebook } from "../../../kernel/run/notebook_run.ts";
import { NotebookError } from "../../../kernel/run/notebook.ts";
import { TemplateError } from "../../../kernel/run/template_error.ts";
import type { ReportCell } from "../../../reports/report_data.ts";
import { assert, assertEquals, assertRejects } from "../../assert.ts";
import { isRunning } from "./processes.ts";
import { withNotebook } from "./sample_notebook.ts";

/** Runs a notebook to its failure; answers the error and the run's cells. */
async function failure(sources: readonly string[], options: Parameters<typeof openNotebook>[1]) {
  return await withNotebook(sources, async (path) => {
    await using run = await openNotebook(path, options);
    try {
      await run.runCells();
    } catch (error) {
      assert(error instanceof TemplateError, String(error));
      await assertRejects(() => run.runCells(), RangeError, /an earlier cell has failed/);
      return { error, cells: run.cells };
    }
    throw new Error("nothing failed");
  });
}

Deno.test("NotebookRun, first code cell, a look at its outputs, then the rest in the same kernel", () =>
  withNotebook(
    [
      "# Title",
      `const given = globalThis[Symbol.for("tankwright.handover")]; given.revision`,
      "# More",
      "given.revision + 1",
      "# End",
    ],
    async (path) => {
      const events: string[] = [];
      const onCell = ({ phase, codeCell, codeCells, cell }: CellEvent) =>
        events.push(`${phase} ${codeCell}/${codeCells} ${cell.id}`);
      await using run = await openNotebook(path, { onCell });
      await run.handOver({ revision: 41, text: 'a "quote"\u2028' });
      const shown = (cells: readonly ReportCell[]) =>
        cells.map((
          { id, outputs },
        ) => [
          id,
          ...outputs.map((output) => output.type === "display" && output.data["text/plain"]),
        ]);
      assertEquals(shown(await run.next()), [["cell-1"], ["cell-2", "41"]]);
      await assertRejects(() => run.handOver({}), RangeError, /before the first cell/);
      assertEquals(shown(await run.runCells()), [["cell-3"], ["cell-4", "42"], ["cell-5"]]);
      assertEquals(await run.next(), []);
      assertEquals(
        run.cells.map(({ type }) => type).join(),
        "markdown,code,markdown,code,markdown",
      );
      assertEquals(events, [
        "begin 1/2 cell-2",
        "end 1/2 cell-2",
        "begin 2/2 cell-4",
        "end 2/2 cell-4",
      ]);
      await assertRejects(() => run.runCells(0, 1), RangeError, /stands at 5 of 5/);
    },
  ));

Deno.test("NotebookRun, an error carries notebook, cell and line, past types, blanks and comments", async () => {
  const { error, cells } = await failure(
    [
      "# Title",
      "interface A { a: number }\n\nlet a: A = { a: 1 };",
      "// the bias\n\ntype B = A;\n\nconst b = a.a;\nawait Promise.resolve();\n" +
      "if (b > 0) {\n  throw new RangeError('bias current must be > 0 A, got -1 A');\n}\nb",
    ],
    {},
  );
  assertEquals(
    error.message,
    "sample.ipynb cell 3 line 7: bias current must be > 0 A, got -1 A",
  );
  assertEquals([error.kind, error.cell, error.cellId, error.line], ["error", 3, "cell-3", 7]);
  assertEquals(cells.at(-1)?.outputs, [{
    type: "error",
    name: "RangeError",
    message: "bias current must be > 0 A, got -1 A",
    line: 7,
  }]);
});

Deno.test("NotebookRun, an import that does not exist fails on its line", async () => {
  const { error } = await failure([`const a = 1;\n\nimport { b } from "no-such-package";`], {});
  assert(/^sample\.ipynb cell 1 line 3: .*no-such-package/.test(error.message), error.message);
});

Deno.test("NotebookRun, a line number does not hang over into the next cell", async () => {
  const { error } = await failure(["1;\n2;\n3;", "function f() {}\n{ throw new Error('x') }"], {});
  assertEquals(error.message, "sample.ipynb cell 2: x");
});

Deno.test("NotebookRun, a rejection that nothing awaits fails the cell", async () => {
  const { error } = await failure([`Promise.reject(new Error("lost"));\n1`], {});
  assert(/^sample\.ipynb cell 1: lost \(in a promise/.test(error.message), error.message);
});

Deno.test("NotebookRun, time limits of a cell and of the notebook are told apart", async () => {
  const loop = await failure(["1", "2;\nfor (;;);"], { cellTimeout: 0.3 });
  assertEquals(
    loop.error.message,
    "sample.ipynb cell 2 line 2: the cell took longer than its time limit of 0.3 s",
  );
  const wait = await failure(["await new Promise((resolve) => {})"], { cellTimeout: 0.2 });
  assertEquals(
    wait.error.message,
    "sample.ipynb cell 1: the cell took longer than its time limit of 0.2 s",
  );
  const pause = "await new Promise((resolve) => setTimeout(resolve, 300));";
  const whole = await failure([pause, pause, "for (;;);"], { notebookTimeout: 1 });
  assertEquals(
    whole.error.message,
    "sample.ipynb cell 3 line 1: the notebook took longer than its time limit of 1 s, in this cell",
  );
  assertEquals(whole.error.kind, "timeout");
});

Deno.test("NotebookRun, says that a cell has ended the kernel, or something else has", async () => {
  const exit = await failure(["Deno.exit(3)"], {});
  assertEquals(
    exit.error.message,
    "sample.ipynb cell 1: the kernel ended by itself with status 3 while this cell ran; " +
      "a cell must not call Deno.exit",
  );
  const killed = await failure(["1", "Deno.kill(Deno.pid, 'SIGKILL'); for (;;);"], {});
  assertEquals(
    killed.error.message,
    "sample.ipynb cell 2: the kernel was ended by SIGKILL while this cell ran",
  );
  const memory = await failure(["const a = []; for (;;) a.push(new Array(1000).fill(a.length));"], {
    env: { DENO_V8_FLAGS: "--max-old-space-size=200" },
  });
  assertEquals(
    memory.error.message,
    "sample.ipynb cell 1: the kernel ran out of memory in this cell",
  );
});

Deno.test("NotebookRun, an abort stops the run and its kernel", () =>
  withNotebook(["1", "await new Promise(() => {})"], async (path) => {
    const controller = new AbortController();
    const run = await openNotebook(path, { signal: controller.signal });
    await run.next();
    setTimeout(() => controller.abort(new RangeError("stopped by hand")), 50);
    await assertRejects(() => run.next(), RangeError, /stopped by hand/);
    assert(!isRunning(run.pid));
    await run.close();
  }));

Deno.test("openNotebook, cells run in the notebook's folder unless told otherwise", () =>
  withNotebook(["Deno.cwd()"], async (path) => {
    const other = await Deno.makeTempDir();
    for (const [options, folder] of [[{}, path.replace(/\/[^/]*$/, "")], [{ cwd: other }, other]]) {
      await using run = await openNotebook(path, options as { cwd?: string });
      const [cell] = await run.next();
      const output = cell?.outputs[0];
      assert(output?.type === "display");
      assertEquals(output.data["text/plain"], `"${await Deno.realPath(folder as string)}"`);
    }
    await Deno.remove(other);
  }));

Deno.test("openNotebook, refuses a syntax error in any cell before running one", () =>
  withNotebook(["# Title", "console.log(1)", "const a = 1;\nconst b = a +;"], async (path) => {
    await assertRejects(
      () => openNotebook(path),
      TemplateError,
      /^sample\.ipynb cell 3 line 2:14: syntax error: Expression expected/,
    );
  }));

Deno.test("openNotebook, refuses a file that is no notebook", async () => {
  await assertRejects(() => openNotebook("none.ipynb"), NotebookError, /there is no such file/);
  assert(NotebookRun.length > 0);
});
