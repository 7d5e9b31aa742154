import { formula } from "../../kernel/show/formula.ts";
import { outputMarkup } from "../../reports/page_output.ts";
import type { CellOutput } from "../../reports/report_data.ts";
import { assert, assertEquals } from "../assert.ts";
import { displayed } from "./_page_data.ts";

const options = { idPrefix: "p-", headingLevel: (level: number) => level };
const shown = (output: CellOutput) => outputMarkup(output, options)?.text;
const display = (data: Record<string, unknown>) => shown({ type: "display", data });

Deno.test("outputMarkup: takes the richest form that needs no script", () => {
  const plain = { "text/plain": "plain" };
  assertEquals(display({ ...plain, "text/html": "<b>rich</b>" }), "<b>rich</b>");
  assertEquals(display({ ...plain, "image/svg+xml": "<svg></svg>" }), "<svg></svg>");
  assertEquals(
    display({ ...plain, "image/png": "AA\nAA" }),
    '<p><img src="data:image/png;base64,AAAA" alt="plain"></p>',
  );
  assert(display({ ...plain, "text/latex": "$$x^2$$" })!.includes("<msup>"));
  assert(display({ ...plain, "text/markdown": "**m**" })!.includes("<strong>m</strong>"));
  assertEquals(display({ "text/plain": ["a <", "b"] }), "<pre>a &lt;b</pre>");
  assertEquals(display({ "application/x-unknown": {} }), undefined);
});

Deno.test("outputMarkup: says what was left out, and falls back to the words if nothing remains", () => {
  assertEquals(
    display({ "text/plain": "a slider at 5", "text/html": "<script>draw()</script>" }),
    '<pre>a slider at 5</pre><p class="note">Left out of the report: &lt;script&gt;.</p>',
  );
});

Deno.test("outputMarkup: prints are text without terminal codes", () => {
  assertEquals(
    shown({ type: "stream", name: "stdout", text: "\x1b[33m<5>\x1b[39m\n" }),
    '<pre class="stream stdout" aria-label="Printed by the cell">&lt;5&gt;</pre>',
  );
});

Deno.test("outputMarkup: an error says where", () => {
  const text = shown({ type: "error", name: "RangeError", message: "no <orbit>", line: 3 })!;
  assert(text.includes("RangeError (line 3 of the cell):"));
  assert(text.includes("no &lt;orbit&gt;"));
});

Deno.test("outputMarkup: a formula comes through whole", () => {
  const whole = formula("\\frac{a}{b}", { where: { a: "top" } });
  // The style's last semicolon is the one thing that cleaning does not write again.
  const before = String(whole.bundle["text/html"]).replaceAll(';"', '"');
  assertEquals(shown(displayed(whole)), before);
});
