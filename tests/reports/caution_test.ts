import { parseDocument } from "../../kernel/show/_document.ts";
import { cautionMarkup } from "../../reports/caution.ts";
import { SERIES_COLORS } from "../../kernel/show/palette.ts";
import { STYLE } from "../../reports/style.ts";
import { assert, assertEquals } from "../assert.ts";
import { PAGE_DATA } from "./_page_data.ts";

const section = parseDocument(cautionMarkup(PAGE_DATA).text).body;
const text = section.textContent!;

Deno.test("cautionMarkup: the worst row of each stress, what is over its limit first and flagged", () => {
  const rows = [...section.querySelectorAll("tbody tr")].map((row) => row.textContent!);
  assertEquals(rows.length, 2);
  assert(rows[0]!.includes("1.31 V") && rows[0]!.includes("✗ over the limit"));
  assert(rows[1]!.includes("coil") && rows[1]!.includes("✓ within"));
  assert(text.includes("1 of 2 over the limit"));
});

Deno.test("cautionMarkup: without stresses it says that nothing was compared", () => {
  const sections = PAGE_DATA.sections.map((one) => ({ ...one, stresses: [] }));
  assert(cautionMarkup({ ...PAGE_DATA, sections }).text.includes("Not computed"));
});

Deno.test("cautionMarkup: the rules that come first, and every kind of caution", () => {
  assert(/foundry's rules, local codes and licensed practice come first/.test(text));
  for (
    const subject of [
      "supply_voltage: 1.0 V (from 600 mV to 1.4 V)",
      "ESD control programme",
      "Radiate only within a licence",
      "Self-heating",
      "electromigration",
      "First-order models",
      "Not for safety-critical",
    ]
  ) assert(text.includes(subject), subject);
});

Deno.test("STYLE: colours the series on light, dark and printed ground, and loads nothing", () => {
  SERIES_COLORS.forEach(({ light, dark }, i) => {
    const count = (color: string) => STYLE.split(`--series-${i + 1}: ${color};`).length - 1;
    assertEquals(count(light), 2, "on the page and in print");
    assertEquals(count(dark), 1, "in the dark");
  });
  assert(!/@import|url\(/.test(STYLE));
  assert(/@media print/.test(STYLE) && /prefers-color-scheme: dark/.test(STYLE));
  assert(!STYLE.includes("</"), "nothing in it can close the style element");
});
