import { entries, readYaml } from "../../../kernel/sheet/yaml_source.ts";
import { assertEquals } from "../../assert.ts";

const TEXT = `first: &shared
  inner: [10, 20]
second: *shared
`;

Deno.test("readYaml places a problem at key or value, through lists and aliases", () => {
  const source = readYaml(TEXT, "a.yaml");
  const place = (path: (string | number)[], at?: "key" | "value") => {
    const { line, column } = source.problemAt(path, "x", at);
    return [line, column];
  };
  assertEquals(place(["first", "inner", 1]), [2, 15]);
  assertEquals(place(["first", "inner"], "key"), [2, 3]);
  assertEquals(place(["second", "inner", 0]), [2, 11]);
  assertEquals(place(["second"], "key"), [3, 1]);
});

Deno.test("readYaml places a problem at the deepest part of the path that exists", () => {
  const { line, column } = readYaml(TEXT, "a.yaml").problemAt(["first", "outer", 3], "x");
  assertEquals([line, column], [2, 3]);
  assertEquals(readYaml("", "a.yaml").problemAt(["a"], "x"), {
    file: "a.yaml",
    line: 1,
    column: 1,
    message: "x",
  });
});

Deno.test("entries gives the entries of a map and of nothing else", () => {
  const source = readYaml(TEXT, "a.yaml");
  assertEquals(entries(source.root).map(({ name }) => name), ["first", "second"]);
  assertEquals(entries(undefined), []);
});
