import { NotebookError, parseNotebook, readNotebook } from "../../../kernel/run/notebook.ts";
import { assertEquals, assertRejects, assertThrows } from "../../assert.ts";
import { notebookText } from "./sample_notebook.ts";

Deno.test("parseNotebook, reads cells with their number and joins lines", () => {
  const text = JSON.stringify({
    nbformat: 4,
    nbformat_minor: 5,
    metadata: {},
    cells: [
      { id: "title", cell_type: "markdown", metadata: {}, source: ["# A\n", "b"] },
      { id: "code", cell_type: "code", metadata: {}, outputs: [], source: "1" },
    ],
  });
  assertEquals(parseNotebook(text, "some/where/a.ipynb"), {
    name: "a.ipynb",
    cells: [
      { id: "title", type: "markdown", source: "# A\nb", number: 1 },
      { id: "code", type: "code", source: "1", number: 2 },
    ],
  });
});

Deno.test("parseNotebook, says in one line what is wrong and where", () => {
  const sound = JSON.parse(notebookText([{ id: "a", source: "1" }, { id: "b", source: "2" }]));
  const [first, second] = sound.cells;
  const faults: [json: unknown, message: RegExp][] = [
    [[], /^Cannot read notebook a\.ipynb: it must be a JSON object$/],
    [{ ...sound, nbformat_minor: 4 }, /format must be 4\.5 or a later 4, got 4\.4$/],
    [{ ...sound, nbformat: undefined }, /got none\.5$/],
    [{ ...sound, cells: undefined }, /cells must be a list$/],
    [{ ...sound, metadata: { language_info: { name: "python" } } }, /typescript, got python$/],
    [{ ...sound, cells: [first, 3] }, /cell 2: it must be a JSON object$/],
    [{ ...sound, cells: [{ ...first, cell_type: "text" }] }, /cell 1: cell_type .* got "text"$/],
    [{ ...sound, cells: [{ ...first, id: undefined }] }, /cell 1: id must be .* got none$/],
    [{ ...sound, cells: [{ ...first, id: "a b" }] }, /cell 1: id must be .* got "a b"$/],
    [{ ...sound, cells: [first, { ...second, id: "a" }] }, /cell 2: id "a" is also .* cell 1$/],
    [{ ...sound, cells: [{ ...first, source: [1] }] }, /cell 1: source must be a text or a list/],
  ];
  for (const [json, message] of faults) {
    assertThrows(() => parseNotebook(JSON.stringify(json), "a.ipynb"), NotebookError, message);
  }
  assertThrows(() => parseNotebook(`{"cells": [`, "a.ipynb"), NotebookError, /is not JSON \(/);
});

Deno.test("readNotebook, says when there is no file, or a folder", async () => {
  const folder = await Deno.makeTempDir();
  await assertRejects(
    () => readNotebook(`${folder}/none.ipynb`),
    NotebookError,
    /none\.ipynb: there is no such file$/,
  );
  await assertRejects(() => readNotebook(folder), NotebookError, /folder|directory/);
  await Deno.remove(folder);
});
