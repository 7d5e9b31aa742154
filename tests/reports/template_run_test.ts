import { TemplateRun } from "../../reports/template_run.ts";
import { assert, assertEquals } from "../assert.ts";

const FOLDER = new URL("./data/templates/", import.meta.url).pathname;

Deno.test("TemplateRun runs the first code cell, then the rest, in one kernel", async () => {
  const revisionFile = new URL("./data/example.yaml", import.meta.url).pathname;
  const cardFile =
    new URL("../../notebooks/cards/illustrative_65nm.yaml", import.meta.url).pathname;
  const seen: string[] = [];
  await using run = await TemplateRun.open("quality", {
    folder: FOLDER,
    handover: {
      revisionText: Deno.readTextFileSync(revisionFile),
      revisionFile,
      cardText: Deno.readTextFileSync(cardFile),
      cardFile,
    },
    cellTimeout: 60,
    notebookTimeout: 120,
    onProgress: ({ done, of }) => seen.push(`${done}/${of}`),
  });
  assertEquals(run.firstCellError, undefined);
  assertEquals(run.template, "quality");
  assert(run.title.length > 0);
  assertEquals(run.cells.filter(({ type }) => type === "code").length, 1);
  assert(seen.length > 0, "progress was reported");
});
