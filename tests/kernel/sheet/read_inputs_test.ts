import { join } from "node:path";
import { InputError } from "../../../kernel/sheet/problem.ts";
import { readInputs } from "../../../kernel/sheet/read_inputs.ts";
import { assertEquals, assertRejects } from "../../assert.ts";

Deno.test("readInputs finds the card relative to the revision, or by an absolute path", async () => {
  const folder = await Deno.makeTempDir({ prefix: "tankwright-test-" });
  try {
    await Deno.mkdir(join(folder, "designs"));
    await Deno.writeTextFile(join(folder, "card.yaml"), "a card");
    for (const card of ["../card.yaml", join(folder, "card.yaml")]) {
      const revision = join(folder, "designs", "rev.yaml");
      await Deno.writeTextFile(revision, `card: ${card}\n`);
      const inputs = await readInputs(revision, { name: "designs/rev.yaml" });
      assertEquals([inputs.revisionText, inputs.revisionFile, inputs.cardText], [
        `card: ${card}\n`,
        "designs/rev.yaml",
        "a card",
      ]);
    }
    await Deno.writeTextFile(join(folder, "rev.yaml"), "card: designs\n");
    await assertRejects(
      () => readInputs(join(folder, "rev.yaml"), { name: "rev.yaml" }),
      InputError,
      /^rev\.yaml:1:7: cannot read .*designs: it is a folder$/,
    );
  } finally {
    await Deno.remove(folder, { recursive: true });
  }
});

Deno.test("readInputs lists all that is wrong with a revision that names no card", async () => {
  const file = await Deno.makeTempFile({ prefix: "tankwright-test-" });
  try {
    await Deno.writeTextFile(file, "design: d\n");
    await assertRejects(
      () => readInputs(file, { name: "rev.yaml" }),
      InputError,
      /^(rev\.yaml:1:1: \w+ is missing: .*\n?){6}$/,
    );
  } finally {
    await Deno.remove(file);
  }
});
