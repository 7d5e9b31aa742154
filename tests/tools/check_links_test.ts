import { assertEquals } from "../assert.ts";
import { checkLinks } from "../../tools/check_links.ts";
import { withTree } from "./temporary_tree.ts";

const CONFIG = `{ "tasks": { "report": "x" } }`;

Deno.test("checkLinks() finds nothing in a sound page", async () => {
  const page =
    "# Two words\n\n[a](#two-words), [b](docs/b.md#the-end), [c](https://example.org), " +
    "[d](docs/), `lib/a.ts`, `npx -y deno@2.9.6 task report`";
  const files = {
    "deno.json": CONFIG,
    "README.md": page,
    "docs/b.md": "## The end",
    "lib/a.ts": "",
  };
  assertEquals(await withTree(files, checkLinks), []);
});

for (
  const [text, finding] of [
    ["[a](#nowhere)", "README.md: link to #nowhere: there is no such heading"],
    ["[a](docs/b.md#start)", "README.md: link to docs/b.md#start: there is no such heading"],
    ["[a](docs/c.md)", "README.md: link to docs/c.md: there is no such file"],
    ["![a](picture.png)", "README.md: link to picture.png: there is no such file"],
    ["`lib/b.ts`", "README.md: lib/b.ts does not exist"],
    ["`deno task reprot`", "README.md: deno.json has no task reprot"],
  ] as const
) {
  Deno.test(`checkLinks() finds the fault in ${text}`, async () => {
    const files = { "deno.json": CONFIG, "README.md": text, "docs/b.md": "## The end" };
    assertEquals(await withTree(files, checkLinks), [finding]);
  });
}

Deno.test("checkLinks() reads the Markdown cells of a notebook", async () => {
  const cells = [
    { cell_type: "code", source: ["[x](no.md)"] },
    { cell_type: "markdown", source: ["see ", "[x](no.md)"] },
  ];
  const files = { "deno.json": CONFIG, "notebooks/a.ipynb": JSON.stringify({ cells }) };
  assertEquals(await withTree(files, checkLinks), [
    "notebooks/a.ipynb: link to no.md: there is no such file",
  ]);
});
