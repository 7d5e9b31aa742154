import { boundsText } from "../kernel/sheet/fill_sheet.ts";
import { type Markup, markup } from "../kernel/show/markup.ts";
import { PAYLOAD_MIME } from "../kernel/show/payload.ts";
import { hasHeading, markdownMarkup } from "./page_markdown.ts";
import { slug } from "./page_markup.ts";
import { outputMarkup } from "./page_output.ts";
import { pageTable } from "./page_table.ts";
import { sectionAnchor, verdictAnchor } from "./page_verdicts.ts";
import type { FilledField, ReportCell, ReportSection } from "./report_data.ts";

/**
 * One template's section: the filled fields, then its cells in order.
 *
 * @param earlier sections above on the page; a field they show is named here and not shown again
 */
export function sectionMarkup(
  section: ReportSection,
  earlier: readonly ReportSection[] = [],
): Markup {
  const { template, title, cells, fields } = section;
  const id = sectionAnchor(template);
  const headingLevel = headingLadder(fields.length > 0 ? 3 : 2);
  const titled = cells.find(({ type, source }) => type === "markdown" && hasHeading(source));
  const body = cells.map((cell) =>
    cell.type === "markdown"
      ? markdownMarkup(cell.source, {
        idPrefix: `${id}-`,
        headingLevel,
        skipFirstHeading: cell === titled,
      })
      : codeMarkup(cell, { section, headingLevel })
  );
  return markup`
    <section aria-labelledby="${id}">
    <h2 id="${id}">${title}</h2>
    <p class="note">Template <code>${template}</code></p>
    ${fields.length > 0 && fieldsMarkup(section, earlier)}
    ${body}
    </section>`;
}

/** Levels 3 and down for what stands under the section's own heading, never skipping one. */
function headingLadder(above: number): (level: number) => number {
  let last = above;
  return (level) => last = Math.min(Math.max(level + 1, 3), last + 1, 6);
}

function fieldsMarkup(
  { template, fields }: ReportSection,
  earlier: readonly ReportSection[],
): Markup {
  const shownIn = (name: string) =>
    earlier.find((section) => section.fields.some((field) => field.name === name));
  const own = fields.filter(({ name }) => shownIn(name) === undefined);
  const shared = fields.filter(({ name }) => shownIn(name) !== undefined);
  return markup`
    <h3 id="${sectionAnchor(template)}-filled-fields">Fields</h3>
    ${own.length > 0 && fieldsTable(own)}
    ${
    shared.length > 0 && markup`
    <p class="note">Shown above already: ${
      shared.map(({ name, text }, k) => markup`${k > 0 && ", "}<code>${name}</code> ${text}`)
    }</p>`
  }`;
}

function fieldsTable(fields: readonly FilledField[]): Markup {
  return pageTable({
    caption: "What the template asked for, and what was filled in",
    columns: ["field", "value", "allowed", "question", "reason", "hand estimate"],
    rows: fields.map((field) => ({
      cells: [
        markup`<code>${field.name}</code>`,
        field.text,
        allowedText(field),
        field.question,
        (field.kind === "fixed" ? field.reason : field.why) ?? "none given",
        field.estimate ?? "\u2013",
      ],
    })),
  });
}

function allowedText(field: FilledField): Markup | string {
  if (field.kind === "fixed") return "fixed by the lead";
  if (field.options !== undefined) return field.options.join(", ");
  return markup`<span class="whole">${boundsText(field) || "any"}</span>`;
}

function codeMarkup(
  { id: cellId, source, outputs }: ReportCell,
  { section: { template }, headingLevel }: {
    readonly section: ReportSection;
    readonly headingLevel: (level: number) => number;
  },
): Markup {
  const shown = outputs.map((output, k) => {
    const verdict = output.type === "display" ? verdictName(output.data[PAYLOAD_MIME]) : undefined;
    const part = outputMarkup(output, {
      idPrefix: `${sectionAnchor(template)}-${slug(cellId)}-${k + 1}-`,
      headingLevel,
    });
    if (part === undefined) return undefined;
    const anchor = verdict !== undefined && markup` id="${verdictAnchor(template, verdict)}"`;
    const scrolls = part.text.includes("<table") &&
      markup` role="region" aria-label="Output ${k + 1} of cell ${cellId}" tabindex="0"`;
    return markup`<div class="output"${anchor}${scrolls}>${part}</div>`;
  });
  return markup`
    <details class="code"><summary>Code of cell ${cellId}</summary>
    <pre><code>${source.trimEnd()}</code></pre></details>
    ${shown}`;
}

function verdictName(payload: unknown): string | undefined {
  const value = typeof payload === "string" ? JSON.parse(payload) as unknown : payload;
  if (typeof value !== "object" || value === null) return undefined;
  const { kind, name } = value as { readonly kind?: unknown; readonly name?: unknown };
  return kind === "verdict" && typeof name === "string" ? name : undefined;
}
