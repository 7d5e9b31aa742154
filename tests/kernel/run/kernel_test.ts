import { type Kernel, KernelError, startKernel } from "../../../kernel/run/kernel.ts";
import { assert, assertEquals, assertRejects } from "../../assert.ts";
import { connectionFileOf, exists, isRunning } from "./processes.ts";

const cwd = decodeURIComponent(new URL("../../../notebooks", import.meta.url).pathname);

async function withKernel(use: (kernel: Kernel) => Promise<void>): Promise<void> {
  await using kernel = await startKernel({ cwd });
  await use(kernel);
}

Deno.test("Kernel, all outputs of a cell stand under it and in order, time after time", () =>
  withKernel(async (kernel) => {
    const numbers = Array.from({ length: 300 }, (_, i) => `${i}\n`).join("");
    for (let round = 0; round < 20; round++) {
      const long = await kernel.execute(`for (let i = 0; i < 300; i++) console.log(i); ${round}`);
      assertEquals(long, {
        status: "ok",
        outputs: [
          { type: "stream", name: "stdout", text: numbers },
          { type: "display", data: { "text/plain": `${round}` }, metadata: {} },
        ],
      });
      const short = await kernel.execute(`"after ${round}"`);
      assertEquals(short.outputs.length, 1);
    }
  }));

Deno.test("Kernel, keeps standard output, errors and displays in the order they were made", () =>
  withKernel(async (kernel) => {
    const { outputs } = await kernel.execute(
      `console.log("a"); console.log("b"); console.error("c");
       await Deno.jupyter.display(Deno.jupyter.md\`*d*\`); console.log("e");`,
    );
    assertEquals(outputs, [
      { type: "stream", name: "stdout", text: "a\nb\n" },
      { type: "stream", name: "stderr", text: "c\n" },
      { type: "display", data: { "text/markdown": "*d*" }, metadata: {} },
      { type: "stream", name: "stdout", text: "e\n" },
    ]);
  }));

Deno.test("Kernel, a display of 3 MB arrives whole", () =>
  withKernel(async (kernel) => {
    const { outputs } = await kernel.execute(`"x".repeat(10), Deno.jupyter.display(
      { [Symbol.for("Jupyter.display")]: () => ({ "text/plain": "ä".repeat(1.5e6) }) })`);
    const first = outputs[0];
    assert(first?.type === "display");
    assertEquals(first.data["text/plain"], "ä".repeat(1.5e6));
  }));

Deno.test("Kernel, an update replaces a display where it stands, in an earlier cell too", () =>
  withKernel(async (kernel) => {
    const show = (text: string, update: boolean) =>
      `await Deno.jupyter.display(Deno.jupyter.md\`${text}\`, { display_id: "bar", update: ${update} });`;
    const cell = await kernel.execute(
      show("0 %", false) + show("50 %", true) + `console.log("end")`,
    );
    const later = await kernel.execute(show("100 %", true));
    assertEquals(later.outputs, []);
    assertEquals(cell.outputs.map((output) => output.type), ["display", "stream"]);
    const [bar] = cell.outputs;
    assert(bar?.type === "display");
    assertEquals(bar.data, { "text/markdown": "100 %" });
  }));

Deno.test("Kernel, tells every kind of failure", () =>
  withKernel(async (kernel) => {
    const failures: [code: string, name: string, message: RegExp][] = [
      [`throw new RangeError("too low")`, "RangeError", /^too low$/],
      [`await Promise.reject(new Error("refused"))`, "Error", /^refused$/],
      [`throw "word"`, "Error", /not an Error was thrown: word$/],
      [`Promise.reject(new Error("lost")); 1`, "Error", /^lost \(in a promise that no/],
      [`setTimeout(() => { throw new Error("late"); }, 0); 1`, "Error", /^late \(in a timer/],
      [
        `({ [Symbol.for("Jupyter.display")]() { throw new TypeError("undrawable"); } })`,
        "TypeError",
        /^undrawable$/,
      ],
      [
        `({ async [Symbol.for("Jupyter.display")]() { throw new TypeError("later"); } })`,
        "TypeError",
        /^later$/,
      ],
      [`let = ;`, "Error", /could not run this cell and gives no reason/],
    ];
    for (const [code, name, message] of failures) {
      const { status, error, outputs } = await kernel.execute(code);
      assertEquals(status, "error", code);
      assertEquals(error?.name, name, code);
      assert(message.test(error?.message ?? ""), `${code}: ${error?.message}`);
      assertEquals(outputs.filter((output) => output.type === "error").length, 1, code);
    }
    assertEquals((await kernel.execute("6 * 7")).status, "ok");
  }));

Deno.test("Kernel, a silent request shows no value but is carried out", () =>
  withKernel(async (kernel) => {
    assertEquals(await kernel.execute("globalThis.seen = 3", { silent: true }), {
      status: "ok",
      outputs: [],
    });
    assertEquals((await kernel.execute("globalThis.seen")).outputs, [
      { type: "display", data: { "text/plain": "3" }, metadata: {} },
    ]);
  }));

Deno.test("Kernel, interrupts a loop at its time limit and goes on", () =>
  withKernel(async (kernel) => {
    const loop = await kernel.execute(`console.log("begun"); for (;;);`, { timeout: 0.3 });
    assertEquals(loop, {
      status: "timeout",
      outputs: [{ type: "stream", name: "stdout", text: "begun\n" }],
    });
    assertEquals((await kernel.execute("1")).outputs.length, 1);
  }));

Deno.test("Kernel, kills a cell that waits for ever a second after its time limit", () =>
  withKernel(async (kernel) => {
    const begin = performance.now();
    const { status, outputs, death } = await kernel.execute(
      `console.log("begun"); await new Promise(() => {});`,
      { timeout: 0.3 },
    );
    const took = performance.now() - begin;
    assertEquals(status, "timeout");
    assertEquals(death?.signal, "SIGKILL");
    assertEquals(outputs, [{ type: "stream", name: "stdout", text: "begun\n" }]);
    assert(took >= 1300, `took ${took} ms`);
    assert(!isRunning(kernel.pid));
    assertEquals((await kernel.execute("1")).status, "died");
  }));

Deno.test("Kernel, notices that its process was killed while a cell runs", () =>
  withKernel(async (kernel) => {
    const cell = kernel.execute(`console.log("begun"); await new Promise(() => {});`);
    await new Promise((resolve) => setTimeout(resolve, 100));
    Deno.kill(kernel.pid, "SIGKILL");
    const { status, death, outputs } = await cell;
    assertEquals(status, "died");
    assertEquals(death?.signal, "SIGKILL");
    assertEquals(outputs, [{ type: "stream", name: "stdout", text: "begun\n" }]);
  }));

Deno.test("Kernel, notices Deno.exit in a cell", () =>
  withKernel(async (kernel) => {
    const { status, death } = await kernel.execute("Deno.exit(5)");
    assertEquals(status, "died");
    assertEquals([death?.exitCode, death?.signal], [5, null]);
  }));

Deno.test("Kernel, an abort ends the running cell with the reason given, and the process", async () => {
  const controller = new AbortController();
  const kernel = await startKernel({ cwd, signal: controller.signal });
  const cell = kernel.execute("for (;;);");
  setTimeout(() => controller.abort(new RangeError("the user changed their mind")), 100);
  await assertRejects(() => cell, RangeError, /changed their mind/);
  await assertRejects(() => kernel.execute("1"), RangeError, /changed their mind/);
  assert(!isRunning(kernel.pid));
  await kernel.close();
});

Deno.test("Kernel, close leaves no process and no connection file, idle or busy, and may be repeated", async () => {
  for (const code of ["1", "await new Promise(() => {})"]) {
    const kernel = await startKernel({ cwd });
    const file = connectionFileOf(kernel.pid);
    const cell = kernel.execute(code);
    if (code === "1") await cell;
    else await new Promise((resolve) => setTimeout(resolve, 50)); // so that it has begun
    await Promise.all([kernel.close(), kernel.close()]);
    assert(!isRunning(kernel.pid));
    assert(!exists(file.slice(0, file.lastIndexOf("/"))));
    if (code !== "1") assertEquals((await cell).status, "died");
    await assertRejects(() => kernel.execute("1"), KernelError, /has been closed/);
  }
});

Deno.test("startKernel, an abort before or during the start throws its reason", async () => {
  const reason = new RangeError("not wanted");
  await assertRejects(
    () => startKernel({ cwd, signal: AbortSignal.abort(reason) }),
    RangeError,
    /not wanted/,
  );
  const controller = new AbortController();
  setTimeout(() => controller.abort(reason), 20);
  await assertRejects(
    () => startKernel({ cwd, signal: controller.signal }),
    RangeError,
    /not wanted/,
  );
});

Deno.test("startKernel, says what is wrong when the kernel does not come up", async () => {
  await assertRejects(() => startKernel({ cwd: `${cwd}/none` }), KernelError, /no folder .*none/);
  await assertRejects(
    () => startKernel({ cwd, startTimeout: 0.005 }),
    KernelError,
    /not ready within 0.005 s/,
  );
  await assertRejects(
    () => startKernel({ cwd, env: { DENO_V8_FLAGS: "--no-such-flag" } }),
    KernelError,
    /ended with status 1: .*--no-such-flag/,
  );
});

Deno.test("startKernel, several kernels run side by side without hearing one another", async () => {
  const kernels = await Promise.all([1, 2, 3].map(() => startKernel({ cwd })));
  const outcomes = await Promise.all(
    kernels.map((kernel, i) => kernel.execute(`globalThis.mine = ${i}; console.log(mine)`)),
  );
  await Promise.all(kernels.map((kernel) => kernel.close()));
  outcomes.forEach(({ outputs }, i) =>
    assertEquals(outputs, [{ type: "stream", name: "stdout", text: `${i}\n` }])
  );
});
