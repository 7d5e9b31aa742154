import { assert, assertEquals } from "../assert.ts";
import { checkStructure } from "../../tools/check_structure.ts";
import { withTree } from "./temporary_tree.ts";

/** A small tree without a fault: two floors, a notebook side, a command, and a test for each file. */
const SOUND: Readonly<Record<string, string>> = {
  "deno.json": `{ "imports": { "tankwright": "./lib/mod.ts", "yaml": "npm:yaml@2.9.1" } }`,
  "lib/mod.ts": `export { gain } from "./orbit/mod.ts";`,
  "lib/numeric/mod.ts": `export { solve } from "./solve.ts";`,
  "lib/numeric/solve.ts": `export const solve = (window: number) => window;`,
  "lib/orbit/mod.ts": `export { gain } from "./gain.ts";`,
  "lib/orbit/gain.ts":
    `import { solve } from "../numeric/solve.ts";\nexport const gain = solve(2);`,
  "lib/device/mod.ts": `export {} from "./_drain.ts";`,
  "lib/device/_drain.ts": `export interface Drain { readonly document: string }`,
  "kernel/mod.ts": `export { show } from "./show/show.ts";`,
  "kernel/show/show.ts":
    `import { gain } from "../../lib/orbit/gain.ts";\nexport const show = gain;`,
  "reports/page.ts":
    `import { show } from "../kernel/show/show.ts";\nexport const page = [show, Date];`,
  "tests/lib/numeric/solve_test.ts": `import "../../../lib/numeric/solve.ts";`,
  "tests/lib/orbit/gain_test.ts": `import "../../../lib/orbit/gain.ts"; import "tankwright";`,
  "tests/kernel/all_test.ts": `import "../../kernel/show/show.ts"; import "../../reports/page.ts";`,
};

/** Findings in the sound tree with some files added or replaced. */
function findWith(changes: Readonly<Record<string, string>>): Promise<string[]> {
  return withTree({ ...SOUND, ...changes }, (root) => checkStructure(root, { longFiles: {} }));
}

Deno.test("checkStructure() finds nothing in a sound tree", async () => {
  assertEquals(await findWith({}), []);
});

Deno.test("checkStructure() fails on an empty tree", async () => {
  const findings = await withTree({ "deno.json": "{}" }, checkStructure);
  assertEquals(findings.length, 1);
});

const tested = (path: string) => ({ [`tests/${path.replace(".ts", "_test.ts")}`]: "" });

/** One planted fault each: the files that carry it, and the one finding it must give. */
const PLANTED: readonly {
  readonly fault: string;
  readonly files: Readonly<Record<string, string>>;
  readonly finding: RegExp;
}[] = [
  {
    fault: "lib imports kernel",
    files: {
      "lib/orbit/gain.ts": `import "../../kernel/show/draw.ts";\nexport const gain = 1;`,
      "kernel/show/draw.ts": `export type Draw = 1;`,
    },
    finding: /^lib\/orbit\/gain\.ts:1: imports "\.\.\/\.\.\/kernel\/show\/draw\.ts"/,
  },
  {
    fault: "lib imports a type of reports",
    files: {
      "lib/orbit/gain.ts": `export const gain = 1;\nexport let x: import("../../reports/p.ts").P;`,
      "lib/orbit/mod.ts": `export { gain, x } from "./gain.ts";`,
      "lib/mod.ts": `export { gain, x } from "./orbit/mod.ts";`,
      "reports/p.ts": `export type P = 1;`,
    },
    finding: /^lib\/orbit\/gain\.ts:2: imports .*, but lib\/orbit may import lib\/quantity/,
  },
  {
    fault: "numeric knows orbit",
    files: {
      "lib/numeric/solve.ts":
        `export type { Gain } from "../orbit/_gain.ts";\nexport const solve = (n: number) => n;`,
      "lib/numeric/mod.ts": `export { solve, type Gain } from "./solve.ts";`,
      "lib/orbit/_gain.ts": `export type Gain = number;`,
    },
    finding: /^lib\/numeric\/solve\.ts:1: .* but lib\/numeric may import only itself/,
  },
  {
    fault: "orbit knows device",
    files: {
      "lib/orbit/gain.ts": `import type {} from "../device/_drain.ts";\nexport const gain = 1;`,
    },
    finding: /^lib\/orbit\/gain\.ts:1: imports "\.\.\/device\/_drain\.ts"/,
  },
  {
    fault: "device knows circuit",
    files: {
      "lib/device/_drain.ts": `import type { Node } from "../circuit/_node.ts";`,
      "lib/circuit/_node.ts": `export type Node = 1;`,
    },
    finding: /^lib\/device\/_drain\.ts:1: imports "\.\.\/circuit\/_node\.ts"/,
  },
  {
    fault: "kernel imports reports",
    files: { "kernel/show/show.ts": `export const show = () => import("../../reports/p.ts");` },
    finding: /^kernel\/show\/show\.ts:1: imports "\.\.\/\.\.\/reports\/p\.ts"/,
  },
  {
    fault: "reports imports a test",
    files: { "reports/page.ts": `import "../tests/kernel/all.ts";` },
    finding: /^reports\/page\.ts:1: imports "\.\.\/tests\/kernel\/all\.ts"/,
  },
  {
    fault: "kernel starts a worker of tools",
    files: {
      "kernel/show/show.ts":
        `export const show = new URL("../../tools/worker.ts", import.meta.url);`,
    },
    finding: /^kernel\/show\/show\.ts:1: imports "\.\.\/\.\.\/tools\/worker\.ts"/,
  },
  {
    fault: "an unknown floor of lib",
    files: {
      "lib/layout/_via.ts": `export type Via = 1;`,
    },
    finding: /lib\/layout is not a floor of the house/,
  },
  {
    fault: "lib imports a drawing package",
    files: { "lib/orbit/gain.ts": `import "@observablehq/plot";\nexport const gain = 1;` },
    finding: /^lib\/orbit\/gain\.ts:1: imports "@observablehq\/plot", but @observablehq\/plot/,
  },
  {
    fault: "a package imported past deno.json",
    files: { "reports/page.ts": `import "npm:yaml@2.9.1";` },
    finding: /^reports\/page\.ts:1: imports "npm:yaml@2\.9\.1", but packages are imported by/,
  },
  {
    fault: "lib imports a module of the machine",
    files: { "lib/orbit/gain.ts": `import "node:fs";\nexport const gain = 1;` },
    finding: /^lib\/orbit\/gain\.ts:1: imports "node:fs", but lib must not touch the machine/,
  },
  {
    fault: "a test with assertions of its own",
    files: {
      "tests/kernel/all_test.ts": `import "../../kernel/show/show.ts"; import "node:assert";
      import "../../reports/page.ts";`,
    },
    finding: /^tests\/kernel\/all_test\.ts:1: imports "node:assert"/,
  },
  {
    fault: "a cycle of types",
    files: {
      "lib/device/_drain.ts": `import type { Gate } from "./_gate.ts"; export type Drain = Gate;`,
      "lib/device/_gate.ts": `import type { Drain } from "./_drain.ts"; export type Gate = Drain;`,
    },
    finding: /import cycle: lib\/device\/_drain\.ts -> lib\/device\/_gate\.ts -> lib\/device\/_dra/,
  },
  {
    fault: "a cycle of three files",
    files: {
      "kernel/a.ts": `import "./b.ts";`,
      "kernel/b.ts": `export * from "./c.ts";`,
      "kernel/c.ts": `await import("./a.ts");`,
      ...tested("kernel/a.ts"),
      ...tested("kernel/b.ts"),
      ...tested("kernel/c.ts"),
    },
    finding: /import cycle: kernel\/a\.ts -> kernel\/b\.ts -> kernel\/c\.ts -> kernel\/a\.ts$/,
  },
  ...["Deno.cwd()", "Date.now()", "performance.now()", "Math.random()", "console", "document"].map(
    (use) => ({
      fault: `lib uses ${use}`,
      files: { "lib/orbit/gain.ts": `\nexport const gain = () => ${use};` },
      finding: new RegExp(
        `^lib/orbit/gain\\.ts:2: uses ${use.replace(/(\.(cwd|now))?\(\)$/, "")},`,
      ),
    }),
  ),
  {
    fault: "lib uses window as a shorthand property",
    files: { "lib/orbit/gain.ts": `export const gain = { window };` },
    finding: /^lib\/orbit\/gain\.ts:1: uses window,/,
  },
  {
    fault: "internal code imports a mod.ts",
    files: {
      "kernel/show/show.ts": `import { gain } from "tankwright";\nexport const show = gain;`,
    },
    finding: /^kernel\/show\/show\.ts:1: imports "tankwright", but internal code imports the file/,
  },
  {
    fault: "lib imports a mod.ts of a floor below",
    files: { "lib/orbit/gain.ts": `import "../numeric/mod.ts";\nexport const gain = 1;` },
    finding: /^lib\/orbit\/gain\.ts:1: imports "\.\.\/numeric\/mod\.ts", but internal code/,
  },
  {
    fault: "a mod.ts that declares something",
    files: { "kernel/mod.ts": `export const show = 1;` },
    finding: /^kernel\/mod\.ts:1: a mod\.ts holds only lists of named re-exports/,
  },
  {
    fault: "a mod.ts that exports everything",
    files: { "kernel/mod.ts": `export * from "./show/show.ts";` },
    finding: /^kernel\/mod\.ts:1: a mod\.ts holds only lists of named re-exports/,
  },
  {
    fault: "a mod.ts that misses a symbol",
    files: { "lib/numeric/solve.ts": `export const solve = Number;\nexport function invert() {}` },
    finding:
      /^lib\/numeric\/solve\.ts:2: exports invert, which lib\/numeric\/mod\.ts does not list/,
  },
  {
    fault: "a mod.ts that lists an internal symbol",
    files: { "lib/numeric/solve.ts": `/** @internal */\nexport const solve = Number;` },
    finding: /^lib\/numeric\/solve\.ts:2: solve is @internal, yet lib\/numeric\/mod\.ts lists it/,
  },
  {
    fault: "a lib/mod.ts that misses a symbol of a floor",
    files: {
      "lib/orbit/period.ts": `export const period = 1;`,
      "lib/orbit/mod.ts":
        `export { gain } from "./gain.ts";\nexport { period } from "./period.ts";`,
      ...tested("lib/orbit/period.ts"),
    },
    finding: /^lib\/orbit\/mod\.ts:2: exports period, which lib\/mod\.ts does not list/,
  },
  {
    fault: "a folder of lib without mod.ts",
    files: { "lib/quantity/unit.ts": `export type Unit = string;` },
    finding: /^lib\/quantity\/mod\.ts:1: missing/,
  },
  {
    fault: "a file without a test",
    files: { "kernel/show/draw.ts": `export const draw = 1;` },
    finding: /^kernel\/show\/draw\.ts:1: has no test; write tests\/kernel\/show\/draw_test\.ts/,
  },
  {
    fault: "a private file that no tested file uses",
    files: { "kernel/show/_draw.ts": `export const draw = 1;` },
    finding: /^kernel\/show\/_draw\.ts:1: has no test/,
  },
  {
    fault: "a thrown text",
    files: { "reports/page.ts": "export const page = () => { throw `no page`; };" },
    finding: /^reports\/page\.ts:1: throws a text/,
  },
  {
    fault: "a plain Error in lib",
    files: { "lib/orbit/gain.ts": `export const gain = new Error("no gain");` },
    finding: /^lib\/orbit\/gain\.ts:1: makes a plain Error/,
  },
  {
    fault: "an error message with a final period",
    files: {
      "lib/orbit/gain.ts":
        'export const gain = new RangeError("gain must be > 0, " + `got ${1}.`);',
    },
    finding: /^lib\/orbit\/gain\.ts:1: the message has a final period/,
  },
  {
    fault: "a file of more than 400 lines",
    files: { "reports/page.ts": `export const page = 1;\n`.padEnd(430, "\n") },
    finding: /^reports\/page\.ts:1: has 408 lines, more than 400/,
  },
];

for (const { fault, files, finding } of PLANTED) {
  Deno.test(`checkStructure() finds ${fault}`, async () => {
    const findings = await findWith(files);
    assertEquals(findings.length, 1, `one finding expected: ${findings.join(" | ")}`);
    assert(finding.test(findings[0]!), `${findings[0]} does not match ${finding}`);
  });
}

Deno.test("checkStructure() lets an internal symbol and a private file stay out of mod.ts", async () => {
  const findings = await findWith({
    "lib/numeric/solve.ts":
      `import "./_pivot.ts";\nexport const solve = Number;\n/** @internal */\nexport const lu = 1;`,
    "lib/numeric/_pivot.ts": `import "./_swap.ts";\nexport const pivot = 1;`,
    "lib/numeric/_swap.ts": `export const swap = 1;`,
  });
  assertEquals(findings, []);
});
