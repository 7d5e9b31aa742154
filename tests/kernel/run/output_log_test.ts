import { errorOf, OutputLog } from "../../../kernel/run/output_log.ts";
import { assertEquals } from "../../assert.ts";

function message(type: string, content: Record<string, unknown>) {
  return { type, parentId: "", metadata: {}, content };
}

Deno.test("OutputLog, merges adjacent text of one stream only", () => {
  const log = new OutputLog();
  const outputs = log.begin();
  for (const [name, text] of [["stdout", "a"], ["stdout", "b"], ["stderr", "c"], ["stdout", "d"]]) {
    log.take(message("stream", { name, text }));
  }
  assertEquals(outputs, [
    { type: "stream", name: "stdout", text: "ab" },
    { type: "stream", name: "stderr", text: "c" },
    { type: "stream", name: "stdout", text: "d" },
  ]);
});

Deno.test("OutputLog, clear_output empties the list at once or before the next output", () => {
  const log = new OutputLog();
  const outputs = log.begin();
  log.take(message("stream", { name: "stdout", text: "a" }));
  log.take(message("clear_output", { wait: true }));
  assertEquals(outputs.length, 1);
  log.take(message("stream", { name: "stdout", text: "b" }));
  assertEquals(outputs, [{ type: "stream", name: "stdout", text: "b" }]);
  log.take(message("clear_output", {}));
  assertEquals(outputs, []);
});

Deno.test("OutputLog, an update changes every showing of its display and nothing else", () => {
  const log = new OutputLog();
  const show = (type: string, id: string, text: string) =>
    log.take(message(type, { data: { "text/plain": text }, transient: { display_id: id } }));
  const earlier = log.begin();
  show("display_data", "x", "1");
  show("display_data", "y", "2");
  const later = log.begin();
  show("display_data", "x", "3");
  show("update_display_data", "x", "4");
  show("update_display_data", "unknown", "5");
  const texts = (outputs: typeof earlier) =>
    outputs.map((output) => output.type === "display" && output.data["text/plain"]);
  assertEquals([texts(earlier), texts(later)], [["4", "2"], ["4"]]);
});

Deno.test("OutputLog, an update after the display was cleared away is dropped", () => {
  const log = new OutputLog();
  const outputs = log.begin();
  const content = { data: { "text/plain": "1" }, transient: { display_id: "x" } };
  log.take(message("display_data", content));
  log.take(message("clear_output", {}));
  log.take(message("stream", { name: "stdout", text: "a" }));
  log.take(message("update_display_data", content));
  assertEquals(outputs, [{ type: "stream", name: "stdout", text: "a" }]);
});

Deno.test("OutputLog.firstError, gives its line to the first error of the cell", () => {
  const log = new OutputLog();
  const outputs = log.begin();
  log.take(message("error", { ename: "RangeError", evalue: "low", traceback: ["a", "b"] }));
  log.take(message("error", { ename: "TypeError", evalue: "odd", traceback: ["a", "b"] }));
  const first = { type: "error" as const, name: "RangeError", message: "low", line: 3 };
  assertEquals(log.firstError(3), first);
  assertEquals(outputs, [first, { type: "error", name: "TypeError", message: "odd" }]);
  log.begin();
  assertEquals(log.firstError(3), undefined);
});

Deno.test("errorOf, never shows the stack", () => {
  const { message } = errorOf({
    ename: "Error",
    evalue: "no",
    traceback: ["Error: no", " at x:1"],
  });
  assertEquals(message, "no");
});
