import fc from "fast-check";
import { escapeText, markup, raw } from "../../../kernel/show/markup.ts";
import { assert, assertEquals } from "../../assert.ts";

Deno.test("markup: escapes values, keeps markup, joins arrays, leaves out nothing-values", () => {
  assertEquals(
    markup`<p title="${`"a" & 'b'`}">${"<b>"}${raw("<i>x</i>")}${[1, "<", null, false]}</p>`.text,
    '<p title="&quot;a&quot; &amp; &#39;b&#39;">&lt;b&gt;<i>x</i>1&lt;</p>',
  );
});

Deno.test("markup: drops its own line breaks, never those of a value", () => {
  assertEquals(
    markup`
      <pre>${"a\n  b"}</pre>`.text,
    "<pre>a\n  b</pre>",
  );
});

Deno.test("escapeText: no text can open a tag, close an attribute or start an entity", () => {
  fc.assert(fc.property(fc.string(), (text) => {
    const escaped = escapeText(text);
    assert(!/[<>"']/.test(escaped));
    assert(!/&(?!amp;|lt;|gt;|quot;|#39;)/.test(escaped));
  }));
});
