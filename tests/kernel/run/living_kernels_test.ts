import { forget, watchOver } from "../../../kernel/run/living_kernels.ts";
import { assert, assertEquals } from "../../assert.ts";
import { connectionFileOf, exists, isGoneWithin } from "./processes.ts";

const kernelModule = new URL("../../../kernel/run/kernel.ts", import.meta.url).href;

/** Starts a process that starts a kernel, runs `then` in it, and prints the kernel's id first. */
async function parentOfKernel(then: string): Promise<{ child: Deno.ChildProcess; kernel: number }> {
  const code = `
    import { startKernel } from "${kernelModule}";
    const kernel = await startKernel({ cwd: "." });
    console.log(kernel.pid);
    ${then}`;
  const child = new Deno.Command(Deno.execPath(), {
    args: ["run", "-A", "--no-check", "--ext=ts", "-"],
    stdin: "piped",
    stdout: "piped",
    stderr: "null",
  }).spawn();
  const writer = child.stdin.getWriter();
  await writer.write(new TextEncoder().encode(code));
  await writer.close();
  const reader = child.stdout.getReader();
  const first = await reader.read();
  await reader.cancel();
  return { child, kernel: Number(new TextDecoder().decode(first.value)) };
}

for (const signal of ["SIGTERM", "SIGINT", "SIGHUP"] as const) {
  Deno.test(`watchOver, a parent ended by ${signal} ends by it and leaves no kernel and no file`, async () => {
    const { child, kernel } = await parentOfKernel("await kernel.execute('for (;;);')");
    const file = connectionFileOf(kernel);
    child.kill(signal);
    assertEquals((await child.status).signal, signal);
    assert(await isGoneWithin(kernel, 2));
    assert(!exists(file.slice(0, file.lastIndexOf("/"))));
  });
}

Deno.test("watchOver, a parent that calls Deno.exit leaves no kernel and no file", async () => {
  const { child, kernel } = await parentOfKernel("setTimeout(() => Deno.exit(7), 200)");
  const file = connectionFileOf(kernel);
  assertEquals((await child.status).code, 7);
  assert(await isGoneWithin(kernel, 2));
  assert(!exists(file.slice(0, file.lastIndexOf("/"))));
});

Deno.test("watchOver, a parent that fails leaves no kernel", async () => {
  const { child, kernel } = await parentOfKernel("setTimeout(() => { throw new Error() }, 200)");
  assertEquals((await child.status).code, 1);
  assert(await isGoneWithin(kernel, 2));
});

Deno.test("watchOver, a kernel whose parent was killed ends itself", async () => {
  const { child, kernel } = await parentOfKernel(
    "await kernel.execute('await new Promise(() => {})')",
  );
  const file = connectionFileOf(kernel);
  child.kill("SIGKILL");
  await child.status;
  assert(await isGoneWithin(kernel, 3));
  assert(!exists(file.slice(0, file.lastIndexOf("/"))));
});

Deno.test("forget, the last one forgotten takes the signal listeners away", () => {
  // A listener left behind would be reported as a leak of this test.
  const kernel = { endNow() {} };
  watchOver(kernel);
  watchOver(kernel);
  forget(kernel);
  forget(kernel);
});
