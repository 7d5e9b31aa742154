import { type DocumentElement, parseDocument } from "../../kernel/show/_document.ts";
import { renderPage } from "../../reports/page.ts";
import { sectionMarkup } from "../../reports/page_section.ts";
import { pageTable } from "../../reports/page_table.ts";
import { verdictsMarkup } from "../../reports/page_verdicts.ts";
import { assert, assertEquals } from "../assert.ts";
import { PAGE_DATA } from "./_page_data.ts";

const page = renderPage(PAGE_DATA);
const body = parseDocument(page.slice(page.indexOf("<body>"))).body;
const all = (selectors: string): DocumentElement[] => [...body.querySelectorAll(selectors)];

Deno.test("renderPage: same data, same bytes", () => {
  assertEquals(renderPage(structuredClone(PAGE_DATA)), page);
});

Deno.test("renderPage: forbids everything but its own style and images inside the page", () => {
  assert(page.startsWith('<!doctype html><html lang="en"><head><meta charset="utf-8">'));
  const policy = /<meta http-equiv="Content-Security-Policy" content="([^"]+)">/.exec(page)![1]!;
  assert(policy.startsWith("default-src 'none'; style-src 'unsafe-inline'; img-src data:"));
  assert(!policy.includes("script-src"));
  assert(page.indexOf("Content-Security-Policy") < page.indexOf("<style"));
  assert(page.includes('name="viewport"'));
});

Deno.test("renderPage: has no script, handler or outside resource", () => {
  assert(!/<(?:script|iframe|object|embed|link|form)\b/i.test(page));
  assert(!/<[^>]+\son[a-z]+=/i.test(page));
  assert(!/javascript:/i.test(page));
  assert(!/<[^>]+\ssrc="(?!data:)/i.test(page));
});

Deno.test("renderPage: the verdict table comes first, with every verdict, its state in words", () => {
  const [first] = all("main table");
  const rows = [...first!.querySelectorAll("tbody tr")].map((row) => row.textContent ?? "");
  assertEquals(rows.length, 4);
  for (const [i, words] of ["thin", "missed", "waived", "not run"].entries()) {
    assert(rows[i]!.includes(words), words);
  }
  assert(rows[0]!.includes("2.1") && rows[0]!.includes("at least 2") && rows[0]!.includes("0.1"));
  assert(rows[0]!.includes("slow <hot>"), "where it was found, as text");
  assert(rows[2]!.includes("waived by L. Lead until 2026-11-16"));
  assert(rows[3]!.includes("no value") && rows[3]!.includes("one code only"));
});

Deno.test("renderPage: every id is unique and every internal link hits one", () => {
  const ids = all("[id]").map((element) => element.getAttribute("id")!);
  assertEquals(new Set(ids).size, ids.length);
  const links = all("a").map((a) => a.getAttribute("href")).filter((href) => href?.startsWith("#"));
  assert(links.length > 8);
  for (const link of links) assert(ids.includes(link!.slice(1)), link!);
  for (const element of all("[aria-labelledby]")) {
    assert(ids.includes(element.getAttribute("aria-labelledby")!));
  }
});

Deno.test("renderPage: a link to nowhere stays as text", () => {
  const nowhere = all("a").find((a) => a.textContent === "nothing")!;
  assertEquals(nowhere.getAttribute("href"), null);
  const sweep = all("a").find((a) => a.textContent === "the sweep")!;
  assertEquals(sweep.getAttribute("href"), "#template-bias_selection-the-sweep");
});

Deno.test("renderPage: one first-level heading, and no level is skipped on the way down", () => {
  const levels = all("h1, h2, h3, h4, h5, h6").map(({ localName }) => Number(localName[1]));
  assertEquals(levels.filter((level) => level === 1).length, 1);
  assertEquals(levels[0], 1);
  levels.slice(1).forEach((level, i) => assert(level <= levels[i]! + 1, `${levels}`));
  assert(levels.includes(4), "the deep heading is kept one level down");
});

Deno.test("renderPage: has landmarks, a skip link, captions and header scopes", () => {
  for (const landmark of ["header", "nav", "main", "footer"]) {
    assertEquals(all(landmark).length, 1, landmark);
  }
  assertEquals(all("body > a, a.skip")[0]!.getAttribute("href"), "#content");
  for (const table of all("table")) assert(table.querySelector("caption") !== null);
  for (const header of all("th")) assert(header.getAttribute("scope") !== null);
  for (const svg of all("svg")) {
    assert(svg.getAttribute("role") === "img" || svg.getAttribute("aria-hidden") === "true");
  }
});

Deno.test("renderPage: says who, what, when, and on which card", () => {
  const header = all("header")[0]!.textContent!;
  for (const text of ["Buoy <oscillator>, revision b", 'A. "Designer"', "2026-11-16"]) {
    assert(header.includes(text), text);
  }
  assert(header.includes("Illustrative: invented values, not for design"));
  assert(page.includes("<title>Buoy &lt;oscillator&gt;, revision b: design report</title>"));
});

Deno.test("renderPage: waivers and provenance close the page", () => {
  const text = all("main")[0]!.textContent!;
  assert(text.includes("Test chip only") && text.includes("holds"), "the last day still holds");
  assert(text.includes("9f".repeat(32)) && text.includes("ab".repeat(32)));
  assert(text.includes("rev_b.yaml") && text.includes("2.9.6"));
  const later = renderPage({ ...PAGE_DATA, reviewDate: "2026-11-17" });
  assert(later.includes("ended before the review"));
});

Deno.test("sectionMarkup: fields with question, bounds, reason and hand estimate", () => {
  const text = parseDocument(sectionMarkup(PAGE_DATA.sections[0]!).text).body.textContent!;
  for (
    const words of [
      "Which supply?",
      "from 600 mV to 1.4 V",
      "The only <clean> rail",
      "nmos_pair, complementary_pair",
      "fixed by the lead",
      "Holds at every corner",
      "none given",
    ]
  ) assert(text.includes(words), words);
});

Deno.test("sectionMarkup: a field that a section above shows is named with its value, not shown again", () => {
  const [section] = PAGE_DATA.sections;
  const { body } = parseDocument(sectionMarkup(section!, [section!]).text);
  const [first] = section!.fields;
  assert(body.textContent!.includes("Shown above already"));
  assert(body.textContent!.includes(`${first!.name} ${first!.text}`));
  assert(!body.textContent!.includes(first!.question), "the question stands above");
});

Deno.test("sectionMarkup: code is folded; the sheet's own display and progress lines are left out", () => {
  const markup = sectionMarkup(PAGE_DATA.sections[0]!).text;
  assert(/<details class="code"><summary>Code of cell sweep<\/summary>/.test(markup));
  assert(!markup.includes("<details open"));
  assert(!markup.includes("the sheet itself"));
  assert(!markup.includes("Sweep: 3 of 3"));
});

Deno.test("sectionMarkup: the title heads the section once", () => {
  const markup = sectionMarkup(PAGE_DATA.sections[0]!).text;
  assertEquals(markup.match(/>Bias current<\/h/g)?.length, 1);
});

Deno.test("verdictsMarkup: without a verdict says so", () => {
  const sections = PAGE_DATA.sections.map((section) => ({ ...section, verdicts: [] }));
  const text = verdictsMarkup({ ...PAGE_DATA, sections }).text;
  assert(text.includes("No template gave a verdict"));
});

Deno.test("pageTable: escapes cells and marks columns of figures", () => {
  const text = pageTable({
    caption: "<c>",
    columns: ["a", "b"],
    numeric: [1],
    rows: [{ cells: ["<x>", "1"], id: "row" }],
  }).text;
  assert(
    text.includes('<tr id="row"><th scope="row">&lt;x&gt;</th><td class="figure">1</td></tr>'),
  );
});
