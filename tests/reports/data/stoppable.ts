// The command line over the tests' faulty templates, for a test that sends it a signal.
import { fileURLToPath } from "node:url";
import { runProcess } from "../../../reports/run_process.ts";

await runProcess({
  templates: fileURLToPath(new URL("./faulty", import.meta.url)),
  cwd: Deno.cwd(),
  terminal: true,
});
