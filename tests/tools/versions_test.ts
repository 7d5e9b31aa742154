import { assert, assertEquals } from "../assert.ts";

const read = (path: string) => Deno.readTextFile(new URL(`../../${path}`, import.meta.url));

Deno.test("the version of Deno is the same in .ci/run, README.md and DEVELOPERS.md", async () => {
  const [stated] = [...(await read(".ci/run")).matchAll(/^deno_version=([\d.]+)$/gm)];
  assert(stated, ".ci/run states no deno_version");
  for (const path of [".ci/run", "README.md", "DEVELOPERS.md"]) {
    const named = [...(await read(path)).matchAll(/\bdeno@(\d[\d.]*\d)/g)].map((match) => match[1]);
    for (const version of named) assertEquals(version, stated[1], path);
    if (path === "README.md") assert(named.length > 0, "README.md names no version");
  }
});

Deno.test("the version of Tankwright in deno.json heads CHANGELOG.md", async () => {
  const { version }: { version: string } = JSON.parse(await read("deno.json"));
  const [heading] = [...(await read("CHANGELOG.md")).matchAll(/^## (\S+)/gm)];
  assertEquals(heading?.[1], version);
});
