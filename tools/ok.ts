/**
 * Runs every check of the project: `deno task ok [--no-test]`. One line a check; the output of a check is
 * shown when it fails. The last line is `N passed, N failed`: each test counts, and each other check once.
 */
import { lastSummary } from "./test_summary.ts";

interface Check {
  readonly name: string;
  /** Arguments to deno. */
  readonly args: readonly string[];
}

const CHECKS: readonly Check[] = [
  // Notebooks are checked with their cells; --ignore takes the place of "exclude" in deno.json.
  { name: "format", args: ["fmt", "--check", "--ignore=tests/**/data/,notebooks/*.ipynb"] },
  { name: "lint", args: ["lint", "--quiet"] },
  { name: "types", args: ["check", "--quiet", "."] },
  { name: "notebook cells", args: ["run", "-A", "tools/check_cells.ts"] },
  { name: "structure", args: ["run", "-A", "tools/check_structure.ts"] },
  { name: "words", args: ["run", "-A", "tools/check_words.ts"] },
  { name: "doc comments", args: ["run", "-A", "tools/check_docs.ts"] },
  { name: "links", args: ["run", "-A", "tools/check_links.ts"] },
  { name: "benchmarks run", args: ["run", "-A", "tools/bench_smoke.ts"] },
];
// Types are checked above, once.
const TESTS: Check = { name: "tests", args: ["run", "-A", "tools/test.ts", "--no-check"] };

const unknown = Deno.args.filter((argument) => argument !== "--no-test");
if (unknown.length > 0) {
  console.error(`Cannot run the checks: the only option is --no-test, got ${unknown.join(" ")}`);
  Deno.exit(2);
}

let passed = 0;
let failed = 0;
let skipped = 0;
for (const check of CHECKS) {
  const { code } = await run(check);
  if (code === 0) passed++;
  else failed++;
}
if (!Deno.args.includes("--no-test")) {
  const { code, stdout } = await run(TESTS);
  const counts = lastSummary(stdout, code);
  passed += counts.passed;
  failed += counts.failed;
  skipped += counts.skipped;
}
console.log(`${passed} passed, ${failed} failed${skipped > 0 ? `, ${skipped} skipped` : ""}`);
Deno.exit(failed > 0 ? 1 : 0);

async function run({ name, args }: Check): Promise<{ code: number; stdout: string }> {
  const start = performance.now();
  const result = await new Deno.Command(Deno.execPath(), {
    args: [...args],
    env: { NO_COLOR: "1" },
    stdin: "null",
  }).output();
  const seconds = ((performance.now() - start) / 1000).toFixed(1);
  const stdout = new TextDecoder().decode(result.stdout);
  const outcome = result.code === 0 ? "ok    " : "FAILED";
  console.log(`${outcome} ${name.padEnd(16)}${seconds.padStart(6)} s`);
  if (result.code !== 0) console.log(stdout + new TextDecoder().decode(result.stderr));
  return { code: result.code, stdout };
}
