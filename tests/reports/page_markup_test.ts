import fc from "fast-check";
import { cleanMarkup, slug } from "../../reports/page_markup.ts";
import { markdownMarkup } from "../../reports/page_markdown.ts";
import { assert, assertEquals } from "../assert.ts";

const options = { idPrefix: "p-", headingLevel: (level: number) => level + 2 };
const clean = (text: string) => cleanMarkup(text, options).markup.text;

Deno.test("cleanMarkup: what runs, loads or asks is dropped with its content, and named", () => {
  const { markup, removed } = cleanMarkup(
    "<p>a<script>x()</script><style>*{}</style><iframe src=x></iframe><object></object><input>b</p>",
    options,
  );
  assertEquals(markup.text, "<p>ab</p>");
  assertEquals(removed, ["<script>", "<style>", "<iframe>", "<object>", "<input>"]);
});

Deno.test("cleanMarkup: handlers and script addresses go, the element stays", () => {
  assertEquals(clean('<p onclick="x()" ONLOAD=y>a</p>'), "<p>a</p>");
  for (
    const address of [
      "javascript:x()",
      "JaVaScRiPt:x()",
      " java\nscript:x()",
      "\x01javascript:x()",
      "&#106;avascript:x()",
      "vbscript:x",
      "data:text/html,<script>x()</script>",
      "file:///etc/passwd",
      "//example.org/x",
      "other.html",
    ]
  ) assertEquals(clean(`<a href="${address}">a</a>`), "<a>a</a>", address);
});

Deno.test("cleanMarkup: links out, downloads of text and images inside the page stay", () => {
  const link = '<a href="https://example.org/x?a=1&amp;b=2">a</a>';
  assertEquals(clean(link), link);
  const csv = '<a download="s.csv" href="data:text/csv;charset=utf-8,a%0D%0A1">CSV</a>';
  assertEquals(clean(csv), csv);
  assertEquals(clean('<a href="data:text/csv,a">CSV</a>'), "<a>CSV</a>");
  const image = '<img src="data:image/png;base64,AAAA" alt="x">';
  assertEquals(clean(image), image);
  assertEquals(clean('<img src="https://example.org/x.png" alt="x">'), '<img alt="x">');
});

Deno.test("cleanMarkup: drawings and formulas stay, their scripts and links do not", () => {
  const svg =
    '<svg viewBox="0 0 1 1" role="img"><title>t</title><path d="M0,0" stroke="currentColor"></path></svg>';
  assertEquals(clean(svg), svg);
  assertEquals(
    clean(
      '<svg onload="x()"><script>x()</script><a href="javascript:x()"><path d="M0,0"/></a>' +
        '<foreignObject><p>x</p></foreignObject><use href="https://example.org/#a"/></svg>',
    ),
    '<svg><path d="M0,0"></path><use></use></svg>',
  );
  const math = "<math><mfrac><mi>a</mi><mn>2</mn></mfrac></math>";
  assertEquals(clean(math), math);
  assertEquals(clean('<math href="javascript:x()"><mi>a</mi></math>'), "<math><mi>a</mi></math>");
});

Deno.test("cleanMarkup: ids get the prefix, and references follow them", () => {
  assertEquals(
    clean('<svg><clipPath id="Clip 1"></clipPath><g clip-path="url(#Clip 1)"></g></svg>'),
    '<svg><clipPath id="p-clip-1"></clipPath><g clip-path="url(#p-clip-1)"></g></svg>',
  );
  assertEquals(
    clean('<p id="a">x</p><p id="a">y</p><a href="#a">z</a>'),
    '<p id="p-a">x</p><p id="p-a-2">y</p><a href="#p-a">z</a>',
  );
});

Deno.test("cleanMarkup: styles that would leave their place or load something are dropped", () => {
  assertEquals(
    clean('<p style="color:red;position:fixed;top:0;background:url(x);margin-top:-99px">a</p>'),
    '<p style="color:red">a</p>',
  );
});

Deno.test("cleanMarkup: headings take the page's levels, unknown elements lose only their tags", () => {
  assertEquals(clean("<h1>a</h1><main><blink>b</blink></main>"), "<h3>a</h3>b");
});

Deno.test("cleanMarkup: whatever the text, no script, handler or script address comes out", () => {
  const piece = fc.constantFrom(
    "<script>",
    "</script>",
    "<svg",
    "<math>",
    "<style>",
    "<img ",
    "<a href=",
    "javascript:x",
    " onerror=",
    "'",
    '"',
    ">",
    "<",
    "/",
    "<!--",
    "-->",
    "<p>",
    "&lt;script&gt;",
    "<title>",
    "<template>",
    "\0",
    " ",
  );
  fc.assert(
    fc.property(fc.array(piece, { maxLength: 20 }), (pieces) => {
      const text = clean(pieces.join(""));
      assert(!/<(?:script|style|iframe|template|!--)/i.test(text), text);
      assert(!/<[^>]*\son[a-z]+\s*=/i.test(text), text);
      assert(!/(?:href|src)="\s*javascript/i.test(text), text);
      // Cleaning what is clean changes nothing but the prefix of ids, of which there are none here.
      assertEquals(clean(text), text);
    }),
    { seed: 1, numRuns: 300 },
  );
});

Deno.test("slug: a text as part of an id", () => {
  assertEquals(slug("The knee, at 85 °C!"), "the-knee-at-85-c");
  assertEquals(slug("???"), "part");
});

Deno.test("markdownMarkup: tables, mathematics and links; raw HTML is shown, not used", () => {
  const text = markdownMarkup(
    "| a | b |\n|---|---|\n| 1 | $x^2$ |\n\n<b>bold</b> costs $5 and $6\n\n$$\nA = I R\n$$\n",
    options,
  ).text;
  assert(/<table>.*<msup>.*<\/table>/s.test(text));
  assert(text.includes("&lt;b&gt;bold&lt;/b&gt; costs $5 and $6"));
  assert(/<math display="block"/.test(text));
});

Deno.test("markdownMarkup: TeX that cannot be read is shown as it was written", () => {
  assert(markdownMarkup("$\\frac{1$", options).text.includes("<code>\\frac{1</code>"));
});

Deno.test("markdownMarkup: headings can be linked to, and the first can be left out", () => {
  const text = markdownMarkup("# Title\n\n## The knee\n", { ...options, skipFirstHeading: true });
  assertEquals(text.text, '<h4 id="p-the-knee">The knee</h4>');
});
