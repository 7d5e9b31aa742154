/**
 * `bench_smoke.ts [root]` runs each benchmark of bench/ once, so that none rots: every `*_bench.ts` is loaded with a `Deno.bench`
 * that only notes what it is given, then each function is called. A fault names file and benchmark.
 */
import { finish, projectRoot } from "./findings.ts";
import { listFiles } from "./structure/source_tree.ts";

interface Noted {
  readonly file: string;
  readonly name: string;
  readonly run: (context: Deno.BenchContext) => void | Promise<void>;
}

const root = Deno.args[0] ?? projectRoot();
const noted: Noted[] = [];
let file = "";

const note = (...args: readonly unknown[]) => {
  const parts = args.flatMap((part) =>
    typeof part === "object" && part !== null ? [part, ...Object.values(part)] : [part]
  );
  const run = parts.find((part) => typeof part === "function") as Noted["run"] | undefined;
  const name = parts.find((part) => typeof part === "string" && part !== "") ?? run?.name;
  if (run) noted.push({ file, name: String(name), run });
};
Object.defineProperty(Deno, "bench", { value: note });

const findings: string[] = [];
const describe = (error: unknown) =>
  error instanceof Error ? `${error.name}: ${error.message}` : String(error);

for (const path of listFiles(root, "bench").filter((path) => path.endsWith("_bench.ts")).sort()) {
  file = path;
  const before = noted.length;
  try {
    await import(new URL(path, `file://${root}/`).href);
    if (noted.length === before) findings.push(`${path}:1: holds no benchmark`);
  } catch (error) {
    findings.push(`${path}:1: cannot be loaded: ${describe(error)}`);
  }
}
for (const { file, name, run } of noted) {
  try {
    await run({ name, origin: file, start() {}, end() {} });
  } catch (error) {
    findings.push(`${file}:1: benchmark "${name}" failed: ${describe(error)}`);
  }
}
finish(findings);
