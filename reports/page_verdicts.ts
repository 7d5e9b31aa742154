import { formatQuantity } from "../lib/quantity/format_quantity.ts";
import { type Markup, markup } from "../kernel/show/markup.ts";
import type { Verdict, VerdictState } from "../kernel/show/payload.ts";
import { differenceText, limitText, STATE_SYMBOLS } from "../kernel/show/verdict_text.ts";
import { pageTable } from "./page_table.ts";
import { slug } from "./page_markup.ts";
import type { ReportData } from "./report_data.ts";

const STATES: readonly VerdictState[] = ["missed", "not run", "thin", "waived", "met"];

/** Id of a template's section. */
export function sectionAnchor(template: string): string {
  return `template-${slug(template)}`;
}

/** Id of the place in a template's section where a verdict was shown. */
export function verdictAnchor(template: string, name: string): string {
  return `${sectionAnchor(template)}-verdict-${slug(name)}`;
}

/** The table that a reviewer reads first, with a count of the states above it. */
export function verdictsMarkup({ sections, waivers }: ReportData): Markup {
  const all = sections.flatMap((section) =>
    section.verdicts.map((verdict) => ({ section, verdict }))
  );
  if (all.length === 0) return markup`<p><strong>No template gave a verdict.</strong></p>`;
  const counts = STATES.map((state) => ({
    state,
    count: all.filter(({ verdict }) => verdict.state === state).length,
  })).filter(({ count }) => count > 0);
  const rows = all.map(({ section: { template, title }, verdict }) => {
    const waiver = waivers.find((w) => w.template === template && w.verdict === verdict.name);
    const waived = waiver !== undefined && verdict.state === "waived" &&
      markup`<a href="#waivers">waived by ${waiver.by} until ${waiver.expires}</a>`;
    const where = [verdict.note, waived].filter((part) => part !== undefined && part !== false);
    return {
      class: stateClass(verdict.state),
      cells: [
        stateMarkup(verdict.state),
        markup`<a href="#${verdictAnchor(template, verdict.name)}">${verdict.name}</a>`,
        valueText(verdict),
        markup`<span class="whole">${limitText(verdict)}</span>`,
        verdict.margin === null ? "\u2013" : differenceText(verdict.margin, verdict.unit),
        where.map((part, i) => [i > 0 && "; ", part]),
        markup`<a href="#${sectionAnchor(template)}">${title}</a>`,
      ],
    };
  });
  return markup`
    <p class="tally">${
    counts.map(({ state, count }) =>
      markup`<span class="${stateClass(state)}">${stateSymbol(state)} ${count} ${state}</span>`
    )
  }</p>
    ${
    pageTable({
      caption: "Verdicts: each figure against its limit",
      columns: ["state", "verdict", "value", "limit", "margin", "where it was found", "template"],
      numeric: [2, 4],
      rowHeader: 1,
      rows,
    })
  }`;
}

function valueText({ value, unit }: Verdict): string {
  return value === null ? "no value" : formatQuantity(value, unit);
}

/** A state as a class name of the style sheet. */
export function stateClass(state: VerdictState): string {
  return `state ${state.replace(" ", "-")}`;
}

function stateMarkup(state: VerdictState): Markup {
  return markup`<span class="word">${stateSymbol(state)} ${state}</span>`;
}

/** The word beside it says the same; a screen reader need not spell the symbol. */
function stateSymbol(state: VerdictState): Markup {
  return markup`<span aria-hidden="true">${STATE_SYMBOLS[state]}</span>`;
}
