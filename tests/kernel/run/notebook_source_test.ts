import { madeUpIds, notebookSource } from "../../../kernel/run/notebook_source.ts";
import { parseNotebook } from "../../../kernel/run/notebook.ts";
import { assertEquals } from "../../assert.ts";

const used = JSON.stringify({
  nbformat_minor: 5,
  nbformat: 4,
  metadata: { vscode: {}, kernelspec: { name: "tankwright", language: "typescript" } },
  cells: [
    { source: "# Ω\ntext\n", id: "title", cell_type: "markdown", metadata: { scrolled: true } },
    {
      cell_type: "code",
      source: "1",
      id: "one",
      execution_count: 3,
      metadata: {},
      outputs: [{ output_type: "stream", name: "stdout", text: "x" }],
    },
  ],
});

Deno.test("notebookSource, takes away what a run left, sorts keys, splits lines", () => {
  assertEquals(
    notebookSource(used),
    `{
 "cells": [
  {
   "cell_type": "markdown",
   "id": "title",
   "metadata": {},
   "source": [
    "# Ω\\n",
    "text\\n"
   ]
  },
  {
   "cell_type": "code",
   "execution_count": null,
   "id": "one",
   "metadata": {},
   "outputs": [],
   "source": [
    "1"
   ]
  }
 ],
 "metadata": {
  "kernelspec": {
   "language": "typescript",
   "name": "tankwright"
  }
 },
 "nbformat": 4,
 "nbformat_minor": 5
}
`,
  );
});

Deno.test("notebookSource, changes neither its own result nor the cells", () => {
  const source = notebookSource(used);
  assertEquals(notebookSource(source), source);
  assertEquals(parseNotebook(source, "a.ipynb"), parseNotebook(used, "a.ipynb"));
});

Deno.test("madeUpIds, names the ids an editor made up", () => {
  const ids = ["sheet", "3f2a9c01", "1b9d6bcd-bbfd-4b2d-9b5d-ab8dfbbd4bed", "knee-current"];
  assertEquals(madeUpIds(ids.map((id) => ({ id }))), ids.slice(1, 3));
});
