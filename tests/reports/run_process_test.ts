import { fileURLToPath } from "node:url";
import { assert, assertEquals } from "../assert.ts";
import { faultyRevision, inFolder, previousIntact, writePrevious } from "./_run.ts";

const script = fileURLToPath(new URL("./data/stoppable.ts", import.meta.url));
const main = fileURLToPath(new URL("../../reports/main.ts", import.meta.url));

/** Process ids of a process's children (Linux). */
function childrenOf(pid: number): number[] {
  const text = Deno.readTextFileSync(`/proc/${pid}/task/${pid}/children`);
  return text.split(" ").filter((part) => part !== "").map(Number);
}

function lives(pid: number): boolean {
  try {
    // A process that has ended but was not waited for is a zombie, state Z.
    return !/^State:\s+Z/m.test(Deno.readTextFileSync(`/proc/${pid}/status`));
  } catch {
    return false;
  }
}

Deno.test({
  name: "runProcess ends its kernel and exits with 130 on Ctrl-C",
  // The kernel is found through /proc, and Windows has no such signals.
  ignore: Deno.build.os !== "linux",
  fn: async () => {
    await inFolder(faultyRevision("waits"), async (folder) => {
      await writePrevious(folder);
      const process = new Deno.Command(Deno.execPath(), {
        args: ["run", "-A", "--no-check", script, "report", "rev.yaml", "--out", "out"],
        cwd: folder,
        stdout: "null",
        stderr: "piped",
      }).spawn();
      let words = "";
      let kernels: number[] = [];
      for await (const part of process.stderr.pipeThrough(new TextDecoderStream())) {
        words += part;
        if (kernels.length > 0 || !words.includes("cell 2 of 2")) continue;
        kernels = childrenOf(process.pid);
        process.kill("SIGINT");
      }
      const { code } = await process.status;
      assertEquals(code, 130, words);
      assert(
        words.endsWith("Stopped. No report was written; a previous one is as it was\n"),
        words,
      );
      assertEquals(kernels.length, 1, "the kernel was a child of the process");
      assertEquals(kernels.filter(lives), []);
      assert(await previousIntact(folder));
    });
  },
});

Deno.test("runProcess counts relative paths from the folder that the person is in", async () => {
  await inFolder("design: [", async (folder) => {
    const { code, stderr } = await new Deno.Command(Deno.execPath(), {
      args: ["run", "-A", "--no-check", main, "report", "rev.yaml"],
      env: { INIT_CWD: folder, NO_COLOR: "1" },
    }).output();
    const text = new TextDecoder().decode(stderr);
    assertEquals(code, 2, text);
    assert(/^rev\.yaml:\d+:\d+: cannot read as YAML/.test(text), text);
  });
});
