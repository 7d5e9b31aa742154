import * as Plot from "@observablehq/plot";
import { chart } from "../../../kernel/show/chart.ts";
import { seriesStyle } from "../../../kernel/show/palette.ts";
import { assert, assertEquals, assertThrows } from "../../assert.ts";

function spectrum() {
  const points = [[1e3, -60], [1e4, -85], [1e5, -110], [1e6, -130]];
  return chart({
    title: "Phase noise <free running>",
    description: "Falls by 25 dB per decade",
    x: { label: "offset, Hz", type: "log" },
    y: { label: "phase noise, dBc/Hz" },
    marks: [Plot.line(points, { stroke: seriesStyle(0).color, clip: true })],
    key: ["computed"],
  });
}

Deno.test("chart: is a named image in a figure, on the page's own ground", () => {
  const html = String(spectrum().bundle["text/html"]);
  assert(/<svg [^>]*role="img"/.test(html));
  assert(html.includes("<title>Phase noise &lt;free running&gt;</title>"));
  assert(html.includes("<desc>Falls by 25 dB per decade</desc>"));
  assert(html.includes("currentColor"));
  assert(!/<style|background|fill="white"/.test(html));
});

Deno.test("chart: same input, same bytes, whatever was drawn in between", () => {
  const first = String(spectrum().bundle["text/html"]);
  chart({ title: "other", description: "other", marks: [Plot.dot([[1, 2]], { clip: true })] });
  assertEquals(String(spectrum().bundle["text/html"]), first);
  const [, id] = / id="([^"]+)"/.exec(first)!;
  assert(first.includes(`url(#${id})`), "references follow the renamed id");
});

Deno.test("chart: plain text says what it shows and what the axes span", () => {
  assertEquals(
    spectrum().bundle["text/plain"],
    "Phase noise <free running>\nFalls by 25 dB per decade\n" +
      "- offset, Hz: 1000 to 1000000\n- phase noise, dBc/Hz: -130 to -60",
  );
});

Deno.test("chart: a legend of Plot's own is refused with a way out", () => {
  const options = {
    title: "t",
    description: "d",
    color: { legend: true },
    marks: [Plot.dot([["a", 1]], { x: "0", y: "1", fill: "0" })],
  };
  assertThrows(
    () => chart(options as never),
    TypeError,
    /without Plot's own title, caption or legend/,
  );
});
