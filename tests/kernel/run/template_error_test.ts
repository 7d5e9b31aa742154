import { placeOf, reasonOfDeath, TemplateError } from "../../../kernel/run/template_error.ts";
import { assertEquals } from "../../assert.ts";

Deno.test("placeOf, tells as much of the place as is known", () => {
  assertEquals(placeOf({ file: "a.ipynb", cell: 4 }), "a.ipynb cell 4");
  assertEquals(placeOf({ file: "a.ipynb", cell: 4, line: 3 }), "a.ipynb cell 4 line 3");
  assertEquals(
    placeOf({ file: "a.ipynb", cell: 4, line: 3, column: 7 }),
    "a.ipynb cell 4 line 3:7",
  );
});

Deno.test("TemplateError, carries the place as data beside its message", () => {
  const cell = { id: "knee", type: "code" as const, source: "1", number: 4 };
  const error = new TemplateError({ file: "a.ipynb", cell, kind: "error", reason: "no", line: 3 });
  assertEquals(error.message, "a.ipynb cell 4 line 3: no");
  const { file, cell: number, cellId, line, kind, reason } = error;
  assertEquals([file, number, cellId, line, kind, reason], [
    "a.ipynb",
    4,
    "knee",
    3,
    "error",
    "no",
  ]);
});

Deno.test("reasonOfDeath, tells an exit, a signal and a full memory apart", () => {
  const of = (exitCode: number, signal: string | null, lastWords = "") =>
    reasonOfDeath({ exitCode, signal, lastWords }).split(" ").slice(2, 5).join(" ");
  assertEquals(of(5, null), "ended by itself");
  assertEquals(of(137, "SIGKILL"), "was ended by");
  assertEquals(of(133, "SIGTRAP", "Fatal JavaScript out of memory: Reached"), "ran out of");
});
