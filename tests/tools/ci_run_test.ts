import { assertEquals } from "../assert.ts";
import { withTree } from "./temporary_tree.ts";

const SCRIPT = decodeURIComponent(new URL("../../.ci/run", import.meta.url).pathname);

/** Runs `.ci/run` with stand-ins for the package manager and for npx; gives last line and status. */
function runScript(
  { apt = "exit 0", report = "exit 0", ok }: { apt?: string; report?: string; ok: string },
): Promise<{ line: string; code: number }> {
  const files = {
    "apt-get": `#!/bin/bash\n${apt}\n`,
    "sleep": "#!/bin/bash\n",
    "npx": `#!/bin/bash\ncase "$*" in *"task report") ${report} ;; *"task ok") ${ok} ;; ` +
      `*) exit 9 ;; esac\n`,
  };
  return withTree(files, async (folder) => {
    for (const name of Object.keys(files)) await Deno.chmod(`${folder}/${name}`, 0o755);
    const { stdout, code } = await new Deno.Command("bash", {
      args: [SCRIPT],
      env: { PATH: `${folder}:${Deno.env.get("PATH")}` },
      stderr: "null",
    }).output();
    return { line: new TextDecoder().decode(stdout).trimEnd().split("\n").at(-1) ?? "", code };
  });
}

Deno.test(".ci/run counts the report and every check", async () => {
  const result = await runScript({ ok: `echo "41 passed, 0 failed, 2 skipped"` });
  assertEquals(result, { line: "42 passed, 0 failed", code: 0 });
});

Deno.test(".ci/run fails with a failed check", async () => {
  const result = await runScript({ ok: `echo "40 passed, 1 failed"; exit 1` });
  assertEquals(result, { line: "41 passed, 1 failed", code: 1 });
});

Deno.test(".ci/run fails with the report, and still runs the checks", async () => {
  const result = await runScript({ report: "exit 1", ok: `echo "41 passed, 0 failed"` });
  assertEquals(result, { line: "41 passed, 1 failed", code: 1 });
});

Deno.test(".ci/run fails when the checks end without counts", async () => {
  const result = await runScript({ ok: `echo "killed"; exit 137` });
  assertEquals(result, { line: "1 passed, 1 failed", code: 1 });
});

Deno.test(".ci/run fails when the checks say nothing and claim success", async () => {
  assertEquals(await runScript({ ok: "exit 0" }), { line: "1 passed, 1 failed", code: 1 });
});

Deno.test(".ci/run tries the packages twice and then fails", async () => {
  const once = `mark="\${0%/*}/tried"; if [ -e "$mark" ]; then exit 0; fi; touch "$mark"; exit 100`;
  const ok = `echo "1 passed, 0 failed"`;
  assertEquals(await runScript({ apt: once, ok }), { line: "2 passed, 0 failed", code: 0 });
  assertEquals(await runScript({ apt: "exit 100", ok }), { line: "0 passed, 1 failed", code: 1 });
});
