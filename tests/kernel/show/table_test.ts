import { table } from "../../../kernel/show/table.ts";
import { assert, assertEquals, assertThrows } from "../../assert.ts";

const corners = table({
  caption: "Corners",
  columns: [
    { name: "corner" },
    { name: "temperature", unit: "°C" },
    { name: "current", unit: "A" },
    { name: "phase noise", unit: "dBc/Hz" },
  ],
  rows: [["slow", 398.15, 2.91e-3, -117.34], ["fast, cold", 233.15, 11e-3, NaN], [
    "no orbit",
    300.15,
    null,
    null,
  ]],
  csv: "corners.csv",
});

Deno.test("table: plain text is aligned, with units in the header", () => {
  assertEquals(
    corners.bundle["text/plain"],
    [
      "Corners",
      "corner      temperature, °C  current, mA  phase noise, dBc/Hz",
      "----------  ---------------  -----------  -------------------",
      "slow                  125.0         2.91               -117.3",
      "fast, cold            -40.0        11.00                  n/a",
      "no orbit               27.0            -                    -",
    ].join("\n"),
  );
});

Deno.test("table: HTML has a caption and says what each header belongs to", () => {
  const html = String(corners.bundle["text/html"]);
  assert(html.includes("<caption>Corners</caption>"));
  assertEquals(html.match(/<th scope="col"/g)?.length, 4);
  assertEquals(html.match(/<th scope="row"/g)?.length, 3);
});

Deno.test("table: rows can be taken away as CSV in SI and full precision", () => {
  const html = String(corners.bundle["text/html"]);
  const [, name, address] = /<a download="([^"]+)" href="data:text\/csv;charset=utf-8,([^"]+)"/
    .exec(html)!;
  assertEquals(name, "corners.csv");
  assertEquals(
    decodeURIComponent(address!),
    "corner,temperature [K],current [A],phase noise [dBc/Hz]\r\n" +
      "slow,398.15,0.00291,-117.34\r\n" +
      '"fast, cold",233.15,0.011,\r\n' +
      "no orbit,300.15,,\r\n",
  );
});

Deno.test("table: CSV keeps a text from being taken for a formula and doubles its quotes", () => {
  const html = String(
    table({ caption: "c", columns: [{ name: "a" }], rows: [["=1+1"], ['say "x"']], csv: "a.csv" })
      .bundle["text/html"],
  );
  const text = decodeURIComponent(/utf-8,([^"]+)"/.exec(html)![1]!.replaceAll("&#39;", "'"));
  assertEquals(text, 'a\r\n\'=1+1\r\n"say ""x"""\r\n');
});

Deno.test("table: without a CSV name there is no link", () => {
  const html = String(
    table({ caption: "c", columns: [{ name: "a" }], rows: [["x"]] }).bundle["text/html"],
  );
  assert(!html.includes("<a "));
});

Deno.test("table: cells and captions are escaped", () => {
  const html = String(
    table({ caption: "<b>", columns: [{ name: "<i>" }], rows: [["<script>"]] }).bundle["text/html"],
  );
  assert(!/<(?:b|i|script)>/.test(html));
  assert(html.includes("&lt;script&gt;"));
});

Deno.test("table: numbers over many decades keep their digits", () => {
  const { bundle } = table({
    caption: "c",
    columns: [{ name: "offset", unit: "Hz" }],
    rows: [[1e3], [1.234e6]],
  });
  assertEquals(bundle["text/plain"].split("\n").slice(3), ["      0.001", "      1.234"]);
});

Deno.test("table: a row of the wrong length is refused by number", () => {
  assertThrows(
    () => table({ caption: "c", columns: [{ name: "a" }], rows: [["x"], ["y", "z"]] }),
    TypeError,
    /row 2 must have 1 cells, got 2/,
  );
});
