import { formatQuantity } from "../lib/quantity/format_quantity.ts";
import { type Markup, markup } from "../kernel/show/markup.ts";
import type { Stress } from "../kernel/show/payload.ts";
import { stressJudgement } from "../kernel/show/stress.ts";
import { boundsText } from "../kernel/sheet/fill_sheet.ts";
import { pageTable } from "./page_table.ts";
import type { FilledField, ReportData } from "./report_data.ts";

/** What must be read before the design is built on: one heading and its points. */
interface Caution {
  readonly heading: string;
  readonly points: readonly string[];
}

const BEFORE_ALL =
  "The foundry's rules, local codes and licensed practice come first. Nothing in this report overrides them.";

const CAUTIONS: readonly Caution[] = [
  {
    heading: "Supply",
    points: [
      "In an oscillator drains and gates swing beyond the supply: the voltages to hold against the " +
      "limits are the peaks between terminals, not the supply.",
      "Peaks are largest at the fast corner, cold, at the highest supply and the largest amplitude " +
      "setting, and start-up may overshoot the steady state, which alone is computed here.",
      "Power a first sample from a supply with a current limit, and never plug it in live.",
    ],
  },
  {
    heading: "Heat and metal current",
    points: [
      "The tank's circulating current is the quality factor times the drive. Hold its average, rms " +
      "and peak in the coil, its vias, its taps and the capacitor bank against the foundry's " +
      "electromigration rules at the highest temperature.",
      "Self-heating raises channel and metal temperatures above the ambient used here.",
    ],
  },
  {
    heading: "Handling and electrostatic discharge",
    points: [
      "Handle parts under an ESD control programme, grounded, in protective packaging.",
      "A withstand class is the result of tests on packaged parts (human body model: " +
      "ANSI/ESDA/JEDEC JS-001; charged device model: JS-002). A capacitance set aside for " +
      "protection on a pin is not a class, and swings beyond the supply may turn clamps on.",
    ],
  },
  {
    heading: "Radiated power",
    points: [
      "An oscillator radiates, also unlocked and on the bench. Radiate only within a licence or an " +
      "exemption for the band and power, or work in a shielded room or into a matched load.",
    ],
  },
  {
    heading: "What these figures are",
    points: [
      "First-order models: the large-signal periodic steady state of the circuit as drawn, with the " +
      "card's device equations. This is not sign-off and replaces neither the foundry's models nor " +
      "layout extraction nor measurement.",
      "Not in the models unless a template says so: substrate eddy currents, metal fill, coupling to " +
      "other coils, package and bond wires, ageing, noise of what drives and loads the oscillator.",
      "Measured phase noise is often set by supply and bias noise, buffer loading and flicker noise " +
      "converted by asymmetry; a difference of 3 dB from these figures is common (common practice).",
      "Not for safety-critical or life-supporting use without independent verification.",
    ],
  },
];

/** The caution section: computed stresses against the card's limits, then what no computation covers. */
export function cautionMarkup(data: ReportData): Markup {
  return markup`
    <section aria-labelledby="cautions" class="cautions">
    <h2 id="cautions">Cautions</h2>
    <p><strong>${BEFORE_ALL}</strong></p>
    <h3 id="stress">Stress against the card's limits</h3>
    ${stressMarkup(data)}
    ${
    CAUTIONS.map(({ heading, points }) =>
      markup`
      <h3>${heading}</h3>${heading === "Supply" && supplyMarkup(data)}
      <ul>${points.map((point) => markup`<li>${point}</li>`)}</ul>`
    )
  }
    </section>`;
}

function stressMarkup({ sections, card }: ReportData): Markup {
  const rows = worstFirst(sections.flatMap(({ stresses }) => stresses));
  if (rows.length === 0) {
    return markup`
      <p class="state not-run"><strong>\u2013 Not computed:</strong> no template of this revision
      ${" "}compared device voltages or currents with the card's limits.</p>`;
  }
  const over = rows.filter(({ value, limit }) => value > limit).length;
  const sum = over === 0
    ? markup`<p class="state met">\u2713 All ${rows.length} stresses are within their limits.</p>`
    : markup`
      <p class="state missed"><strong>\u2717 ${over} of ${rows.length} over the limit.</strong>
      ${" "}Do not build before this is resolved.</p>`;
  return markup`${sum}${
    pageTable({
      caption: `Worst computed stresses against the limits of the card ${card.name}, worst first`,
      columns: ["device", "stress", "worst", "limit", "share of limit", "at", "judgement"],
      numeric: [2, 3, 4],
      rows: rows.map((row) => ({
        class: row.value > row.limit ? "state missed" : "state met",
        cells: [
          row.device,
          row.quantity,
          formatQuantity(row.value, row.unit),
          formatQuantity(row.limit, row.unit),
          formatQuantity(row.value / row.limit, "%", { digits: 3 }),
          row.at,
          markup`<span class="word">${stressJudgement(row)}</span>`,
        ],
      })),
    })
  }`;
}

/** For each device and quantity its worst row, the largest share of its limit first. */
function worstFirst(rows: readonly Stress[]): Stress[] {
  const worst = new Map<string, Stress>();
  for (const row of rows) {
    const key = JSON.stringify([row.device, row.quantity, row.unit]);
    const before = worst.get(key);
    if (before === undefined || share(row) > share(before)) worst.set(key, row);
  }
  return [...worst.values()].sort((a, b) => share(b) - share(a));
}

function share({ value, limit }: Stress): number {
  return value / limit;
}

/** What the revision says of supplies: the filled value and the range its template allows. */
function supplyMarkup({ sections }: ReportData): Markup | false {
  const fields = new Map<string, FilledField>();
  for (const field of sections.flatMap((section) => section.fields)) {
    if (field.unit === "V" && field.name.includes("supply")) fields.set(field.name, field);
  }
  return fields.size > 0 && markup`
    <p>This revision:</p><ul>${
    [...fields.values()].map((field) => {
      const range = field.kind === "fixed" ? "fixed by the lead" : boundsText(field);
      return markup`
        <li><code>${field.name}</code>: <strong>${field.text}</strong>${
        range && ` (${range})`
      }</li>`;
    })
  }</ul>`;
}
