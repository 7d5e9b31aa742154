import { KernelProcess } from "../../../kernel/run/kernel_process.ts";
import { assert, assertEquals, assertThrows } from "../../assert.ts";
import { exists, isRunning } from "./processes.ts";

Deno.test("KernelProcess, end leaves neither process nor connection file, and may be repeated", async () => {
  const process = new KernelProcess({ cwd: ".", env: {} });
  assert(isRunning(process.pid));
  await process.end();
  await process.end();
  assert(!isRunning(process.pid));
  assert(!exists(process.connection.file));
  assertEquals((await process.death).signal, "SIGKILL");
});

Deno.test("KernelProcess, keeps the last words of a process that ends by itself", async () => {
  const process = new KernelProcess({ cwd: ".", env: { DENO_V8_FLAGS: "--no-such-flag" } });
  const { exitCode, signal, lastWords } = await process.death;
  assertEquals([exitCode, signal], [1, null]);
  assert(lastWords.includes("--no-such-flag"), lastWords);
  await process.end();
});

Deno.test("KernelProcess, leaves no connection file when it cannot start", () => {
  const before = Deno.env.get("TMPDIR");
  const folder = Deno.makeTempDirSync();
  Deno.env.set("TMPDIR", folder);
  try {
    assertThrows(
      () => new KernelProcess({ cwd: `${folder}/none`, env: {} }),
      Deno.errors.NotFound,
      /none/,
    );
    assertEquals([...Deno.readDirSync(folder)], []);
  } finally {
    if (before === undefined) Deno.env.delete("TMPDIR");
    else Deno.env.set("TMPDIR", before);
    Deno.removeSync(folder);
  }
});
