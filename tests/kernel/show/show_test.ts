import { jupyter } from "../../../kernel/show/_jupyter.ts";
import { progress } from "../../../kernel/show/progress.ts";
import { quantity } from "../../../kernel/show/quantity.ts";
import { show } from "../../../kernel/show/show.ts";
import { Showable } from "../../../kernel/show/showable.ts";
import { assertEquals, assertRejects } from "../../assert.ts";

async function printed(action: () => Promise<void>): Promise<string[]> {
  const lines: string[] = [];
  const original = console.log;
  console.log = (line: string) => lines.push(line);
  try {
    await action();
  } finally {
    console.log = original;
  }
  return lines;
}

interface Sent {
  readonly type: string;
  readonly content: Record<string, unknown>;
}

/** What `action` sends when `Deno.jupyter` is there, as in a kernel. */
async function sent(action: () => Promise<void>): Promise<Sent[]> {
  const messages: Sent[] = [];
  const original = Object.getOwnPropertyDescriptor(globalThis, "Deno")!;
  const broadcast = (type: string, content: Record<string, unknown>) => {
    messages.push({ type, content });
    return Promise.resolve();
  };
  // Deno's own property is fixed, so the name `Deno` is made to mean an object in front of it.
  const inKernel: unknown = Object.create(Deno, { jupyter: { value: { broadcast } } });
  Object.defineProperty(globalThis, "Deno", { value: inKernel, configurable: true });
  try {
    await action();
  } finally {
    Object.defineProperty(globalThis, "Deno", original);
  }
  return messages;
}

Deno.test("show: outside a kernel prints plain texts in order", async () => {
  assertEquals(jupyter(), undefined);
  const lines = await printed(() => show(quantity(1, "V"), "and text"));
  assertEquals(lines, ["1 V", "and text"]);
});

Deno.test("show: in a kernel sends each bundle whole, in order", async () => {
  const item = quantity(1, "V");
  const messages = await sent(() => show(item, "and text"));
  assertEquals(messages.map(({ type }) => type), ["display_data", "display_data"]);
  assertEquals(messages.map(({ content }) => content.data), [
    item.bundle,
    { "text/plain": "and text" },
  ]);
});

Deno.test("show: what cannot be shown is refused before anything is shown", async () => {
  await printed(async () => {
    await assertRejects(() => show("a", 3 as never), TypeError, /item 2: .* got number/);
  });
  assertEquals(await sent(() => show("a", null as never).catch(() => {})), []);
});

Deno.test("Showable: as the last value of a cell the kernel finds its bundle", () => {
  const item = new Showable({ "text/plain": "x" });
  const method = Reflect.get(item, Symbol.for("Jupyter.display")) as () => unknown;
  assertEquals(method.call(item), { "text/plain": "x" });
});

Deno.test("progress: one display, moved in fixed steps, ending at the total", async () => {
  const messages = await sent(async () => {
    for (let done = 0; done <= 1000; done++) await progress("Yield", done, 1000);
  });
  assertEquals(messages[0]!.type, "display_data");
  assertEquals(messages.slice(1).every(({ type }) => type === "update_display_data"), true);
  assertEquals(messages.length, 21);
  const ids = messages.map(({ content }) => JSON.stringify(content.transient));
  assertEquals(new Set(ids).size, 1);
  const last = messages.at(-1)!.content.data as Record<string, unknown>;
  assertEquals(last["text/plain"], "Yield: 1000 of 1000");
});

Deno.test("progress: a second run, also after one that was stopped, has a display of its own", async () => {
  const messages = await sent(async () => {
    await progress("Corners", 10, 27);
    await progress("Corners", 1, 27);
    await progress("Corners", 27, 27);
    await progress("Corners", 27, 27);
  });
  assertEquals(messages.map(({ type }) => type), [
    "display_data",
    "display_data",
    "update_display_data",
    "display_data",
  ]);
  const ids = messages.map(({ content }) => JSON.stringify(content.transient));
  assertEquals(ids[1] === ids[0], false);
  assertEquals(ids[2], ids[1]);
});

Deno.test("progress: counts outside the total are refused", async () => {
  await assertRejects(() => progress("x", 1, 0), RangeError, /total must be > 0, got 0/);
  await assertRejects(() => progress("x", 3, 2), RangeError, /done must be 0 to 2, got 3/);
  await assertRejects(() => progress("x", NaN, 2), RangeError, /done must be 0 to 2, got NaN/);
});
