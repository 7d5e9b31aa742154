import { assertEquals } from "../assert.ts";
import { withTree } from "./temporary_tree.ts";

const TOOL = new URL("../../tools/bench_smoke.ts", import.meta.url).href;

/** Lines and status of `tools/bench_smoke.ts` on a tree of files. */
function runBenchmarks(files: Record<string, string>): Promise<{ lines: string[]; code: number }> {
  return withTree(files, async (root) => {
    const { stderr, code } = await new Deno.Command(Deno.execPath(), {
      args: ["run", "-A", "--no-check", TOOL, root],
    }).output();
    const lines = new TextDecoder().decode(stderr).split("\n").filter((line) => line !== "");
    return { lines, code };
  });
}

Deno.test("bench_smoke calls every benchmark, in each form of Deno.bench", async () => {
  const report = `console.error(name)`;
  const { lines, code } = await runBenchmarks({
    "bench/a_bench.ts": `const call = (name: string) => () => ${report};
      Deno.bench("plain", call("1"));
      Deno.bench("with options", { group: "g" }, call("2"));
      Deno.bench({ name: "one object", fn: call("3") });
      Deno.bench("timed", (b) => { b.start(); call("4")(); b.end(); });`,
  });
  assertEquals({ lines, code }, { lines: ["1", "2", "3", "4"], code: 0 });
});

Deno.test("bench_smoke fails on what throws, cannot be loaded or is empty", async () => {
  const { lines, code } = await runBenchmarks({
    "bench/lib/a_bench.ts": `Deno.bench("orbit", () => { throw new RangeError("no period"); });`,
    "bench/lib/b_bench.ts": `throw new TypeError("no module");`,
    "bench/lib/c_bench.ts": `export {};`,
  });
  assertEquals({ lines, code }, {
    lines: [
      "bench/lib/b_bench.ts:1: cannot be loaded: TypeError: no module",
      "bench/lib/c_bench.ts:1: holds no benchmark",
      'bench/lib/a_bench.ts:1: benchmark "orbit" failed: RangeError: no period',
    ],
    code: 1,
  });
});
