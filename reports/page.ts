import { type Markup, markup, raw } from "../kernel/show/markup.ts";
import { cautionMarkup } from "./caution.ts";
import { sectionMarkup } from "./page_section.ts";
import { pageTable } from "./page_table.ts";
import { sectionAnchor, verdictsMarkup } from "./page_verdicts.ts";
import type { ReportData } from "./report_data.ts";
import { STYLE } from "./style.ts";

/** Nothing is loaded, run, framed or sent; the page's own style and images inside it are all there is. */
const POLICY =
  "default-src 'none'; style-src 'unsafe-inline'; img-src data:; base-uri 'none'; form-action 'none'";

/**
 * The report as one static HTML page without scripts: what it is about, the verdicts, one section for
 * each template, cautions, waivers, provenance. Same data, same bytes.
 */
export function renderPage(data: ReportData): string {
  const { design, revision } = data;
  const name = `${design}, revision ${revision}`;
  const page = markup`<!doctype html>
<html lang="en"><head><meta charset="utf-8">
    <meta http-equiv="Content-Security-Policy" content="${raw(POLICY)}">
    <meta name="viewport" content="width=device-width, initial-scale=1">
    <meta name="color-scheme" content="light dark">
    <meta name="referrer" content="no-referrer">
    <title>${name}: design report</title>
    <style>${raw(STYLE)}</style></head>
    <body><a class="skip" href="#content">Skip to the verdicts</a>
    ${headerMarkup(data, name)}
    <main id="content" tabindex="-1">
    <section aria-labelledby="verdicts"><h2 id="verdicts">Verdicts</h2>${
    verdictsMarkup(data)
  }</section>
    ${data.sections.map((section, k) => sectionMarkup(section, data.sections.slice(0, k)))}
    ${cautionMarkup(data)}
    ${waiversMarkup(data)}
    ${provenanceMarkup(data)}
    </main>
    <footer><p>Made by Tankwright ${data.provenance.version} from inputs with the hash
    ${" "}<code>${data.provenance.inputHash.slice(0, 16)}</code>. First-order models: not sign-off.
    </p></footer></body></html>`;
  return settleAnchors(page.text) + "\n";
}

function headerMarkup(data: ReportData, name: string): Markup {
  const entries: readonly (readonly [string, string])[] = [
    ["Design", data.design],
    ["Revision", data.revision],
    ["Author", data.author],
    ["Review date", data.reviewDate],
    ["Technology card", data.card.name],
  ];
  const places: readonly (readonly [string, string])[] = [
    ["verdicts", "Verdicts"],
    ...data.sections.map(({ template, title }) => [sectionAnchor(template), title] as const),
    ["cautions", "Cautions"],
    ["waivers", "Waivers"],
    ["provenance", "Provenance"],
  ];
  return markup`
    <header><p class="kicker">Oscillator design report</p><h1>${name}</h1>
    <dl>${entries.map(([term, text]) => markup`<div><dt>${term}</dt><dd>${text}</dd></div>`)}</dl>
    ${
    data.card.note !== "" &&
    markup`<p class="card-note"><strong>Card:</strong> ${data.card.note}</p>`
  }
    <nav aria-label="Contents"><ol>${
    places.map(([id, text]) => markup`<li><a href="#${id}">${text}</a></li>`)
  }</ol></nav></header>`;
}

function waiversMarkup({ waivers, reviewDate }: ReportData): Markup {
  // ISO dates sort as texts.
  const standing = (expires: string) => reviewDate <= expires ? "holds" : "ended before the review";
  return markup`
    <section aria-labelledby="waivers"><h2 id="waivers">Waivers</h2>
    ${
    waivers.length === 0 ? markup`<p>None.</p>` : pageTable({
      caption: `What the lead lets pass, as of the review on ${reviewDate}`,
      columns: ["verdict", "template", "reason", "by", "last day", "standing"],
      rows: waivers.map(({ template, verdict, reason, by, expires }) => ({
        cells: [verdict, markup`<code>${template}</code>`, reason, by, expires, standing(expires)],
      })),
    })
  }</section>`;
}

function provenanceMarkup({ provenance }: ReportData): Markup {
  const { version, inputHash, inputs, settings } = provenance;
  return markup`
    <section aria-labelledby="provenance"><h2 id="provenance">Provenance</h2>
    <p>Input hash (SHA-256): <code class="hash">${inputHash}</code>. The same inputs and versions give
    ${" "}the same report, byte for byte.</p>
    ${
    pageTable({
      caption: "Input files",
      columns: ["file", "SHA-256"],
      rows: inputs.map(({ file, sha256 }) => ({
        cells: [markup`<code>${file}</code>`, markup`<code class="hash">${sha256}</code>`],
      })),
    })
  }${
    pageTable({
      caption: "Versions and settings",
      columns: ["setting", "value"],
      rows: [{ name: "Tankwright", value: version }, ...settings].map(({ name, value }) => ({
        cells: [name, value],
      })),
    })
  }</section>`;
}

/**
 * Makes every id unique (a later bearer gets a number) and unlinks what points nowhere. Text cannot be
 * mistaken for an attribute: its quotes are escaped.
 */
function settleAnchors(page: string): string {
  const taken = new Set<string>();
  const unique = page.replace(/ id="([^"]+)"/g, (_, id: string) => {
    let name = id;
    for (let k = 2; taken.has(name); k++) name = `${id}-${k}`;
    taken.add(name);
    return ` id="${name}"`;
  });
  return unique.replace(
    /<a href="#([^"]*)"/g,
    (link, id: string) => taken.has(id) ? link : "<a",
  );
}
