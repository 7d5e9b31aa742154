/**
 * Runs the tests: `deno task test [option...] [path...]`, all of tests/ when no path is given; options go
 * to `deno test`. The last line is `N passed, N failed`, with `, N skipped` where any were. A file that
 * cannot be loaded, and a run without any test, count as failed.
 */
import { lastSummary } from "./test_summary.ts";

const decoder = new TextDecoder();
const options = Deno.args.filter((argument) => argument.startsWith("-"));
const paths = Deno.args.filter((argument) => !argument.startsWith("-"));
const child = new Deno.Command(Deno.execPath(), {
  args: ["test", "-A", ...options, ...(paths.length > 0 ? paths : ["tests/"])],
  env: { NO_COLOR: "1" },
  stdin: "null",
  stdout: "piped",
}).spawn();

let output = "";
for await (const chunk of child.stdout) {
  await writeAll(chunk);
  output += decoder.decode(chunk, { stream: true });
}
const { code } = await child.status;
const counts = lastSummary(output, code);
await writeAll(new TextEncoder().encode(`${counts.line}\n`));
Deno.exit(counts.status);

async function writeAll(bytes: Uint8Array): Promise<void> {
  for (let rest = bytes; rest.length > 0;) {
    rest = rest.subarray(await Deno.stdout.write(rest));
  }
}
