import { VERSION } from "../../reports/house.ts";
import { assert, assertEquals } from "../assert.ts";
import { run } from "./_run.ts";

const cwd = Deno.cwd();

Deno.test("command shows its usage and its version", async () => {
  for (const words of [["--help"], ["-h"], ["report", "--help"], ["help"]]) {
    const { status, out, err } = await run(words, { cwd });
    assertEquals([status, err], [0, ""]);
    assert(out.includes("deno task report [REVISION] [--out FOLDER]"));
    for (const line of out.split("\n")) assert(line.length <= 106, line);
  }
  assertEquals((await run(["--version"], { cwd })).out, `tankwright ${VERSION}\n`);
});

Deno.test("command says what it does not understand and exits with 2", async () => {
  const cases: [string[], RegExp][] = [
    [[], /^a command is missing: report or begin\n/],
    [["reprot"], /^there is no command "reprot", perhaps "report"\n/],
    [["report", "--otu", "x"], /^unknown option --otu, perhaps "--out"\n/],
    [["report", "a.yaml", "b.yaml"], /^report takes one revision, got 2: a\.yaml, b\.yaml\n/],
    [["report", "--out"], /^--out needs a value/],
    [["report", "--out="], /^--out needs a value/],
    [["report", "--out", "--help-me"], /^--out needs a value/],
    [["report", "--out", "a", "--out", "b"], /^--out is given twice\n/],
    [["begin"], /^begin needs a folder for the design\n/],
    [["begin", "x", "--force"], /^unknown option --force\n/],
    [
      ["begin", "x", "swimg"],
      /^there is no template "swimg", perhaps "swing"; known are quality, swing\n/,
    ],
  ];
  for (const [words, wording] of cases) {
    const { status, out, err } = await run(words, { cwd });
    assertEquals([status, out], [2, ""]);
    assert(wording.test(err), err);
    assert(err.endsWith("See deno task report --help\n"));
  }
});
