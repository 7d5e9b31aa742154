import { join } from "node:path";
import { OutputError } from "../../reports/exit_status.ts";
import { checkFolder, writeFiles } from "../../reports/write_files.ts";
import { assertEquals, assertRejects } from "../assert.ts";

async function inTemporary(action: (folder: string) => Promise<void>): Promise<void> {
  const folder = await Deno.makeTempDir({ prefix: "tankwright-test-" });
  try {
    await action(folder);
  } finally {
    await Deno.remove(folder, { recursive: true });
  }
}

function listing(folder: string): Record<string, string> {
  return Object.fromEntries(
    [...Deno.readDirSync(folder)].filter(({ isFile }) => isFile).map(({ name }) => name).sort().map(
      (name) => [name, Deno.readTextFileSync(join(folder, name))],
    ),
  );
}

Deno.test("writeFiles makes the folder, replaces its files and leaves others alone", async () => {
  await inTemporary(async (folder) => {
    const out = join(folder, "a", "b");
    await writeFiles(out, [{ name: "x", text: "1" }]);
    Deno.writeTextFileSync(join(out, "other"), "kept");
    await writeFiles(out, [{ name: "x", text: "2" }, { name: "y", text: "3" }]);
    assertEquals(listing(out), { other: "kept", x: "2", y: "3" });
  });
});

Deno.test("writeFiles undoes the files before the one that fails", async () => {
  await inTemporary(async (folder) => {
    Deno.writeTextFileSync(join(folder, "x"), "old");
    Deno.mkdirSync(join(folder, "z"));
    const files = ["x", "new", "z"].map((name) => ({ name, text: "new" }));
    await assertRejects(
      () => writeFiles(folder, files),
      OutputError,
      /^Cannot write to .*: a folder/,
    );
    assertEquals(listing(folder), { x: "old" });
  });
});

Deno.test("checkFolder takes a folder that can be made, and makes nothing", async () => {
  await inTemporary(async (folder) => {
    await checkFolder(join(folder, "a", "b"));
    await checkFolder(folder);
    assertEquals([...Deno.readDirSync(folder)], []);
    Deno.writeTextFileSync(join(folder, "file"), "");
    await assertRejects(() => checkFolder(join(folder, "file")), OutputError, /file is a file$/);
    await assertRejects(
      () => checkFolder(join(folder, "file", "x")),
      OutputError,
      /file is a file$/,
    );
  });
});
