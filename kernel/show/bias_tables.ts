/**
 * Tables of a bias sweep and its conditions, made from what `lib/design/` computes. What could not be
 * computed is a dash.
 *
 * @module
 */
import type { Condition } from "../../lib/circuit/topology.ts";
import type { BiasSweep, CornerBias } from "../../lib/design/bias.ts";
import type { HandComparison } from "../../lib/design/hand_values.ts";
import type { DeviceStress } from "../../lib/design/operating_figures.ts";
import type { NamedPole, Startup } from "../../lib/design/startup.ts";
import { formatQuantity } from "../../lib/quantity/format_quantity.ts";
import { conditionText } from "./condition_text.ts";
import { csvLink } from "./_csv_link.ts";
import { markup, raw } from "./markup.ts";
import type { Stress } from "./payload.ts";
import { Showable } from "./showable.ts";
import { table } from "./table.ts";
import type { TableCell, TableColumn } from "./table_parts.ts";

/** Rows of a sweep that are shown, at most about this many. */
const SHOWN_ROWS = 20;

/** Options of {@linkcode biasTable} and {@linkcode cornersTable}. */
export interface CsvOptions {
  /** Name of the file, ".csv" may be left out, that carries all rows in SI units. */
  readonly csv?: string;
}

const POINT_COLUMNS: readonly TableColumn[] = [
  { name: "programmed current", unit: "A" },
  { name: "supply current", unit: "A" },
  { name: "regime" },
  { name: "startup loop gain" },
  { name: "amplitude", unit: "V" },
  { name: "d ln A / d ln I" },
  { name: "white phase noise", unit: "dBc/Hz", digits: 4 },
  { name: "d ln noise / d ln I" },
  { name: "noise factor", digits: 3 },
  { name: "figure of merit", unit: "dBc/Hz", digits: 4 },
  { name: "frequency", unit: "Hz", digits: 5 },
];

/** The points of a sweep: about twenty of them on the page, all of them in the file. */
export function biasTable({ points, condition }: BiasSweep, { csv }: CsvOptions = {}): Showable {
  const rows = points.map(({ current, startup, regime, figures, ...point }): TableCell[] => [
    current,
    known(figures?.supplyCurrent),
    regime,
    known(startup?.loopGain),
    known(figures?.amplitude),
    known(point.amplitudeExponent),
    known(figures?.phaseNoise),
    known(point.noiseExponent),
    known(figures?.noiseFactor),
    known(figures?.figureOfMerit),
    known(figures?.frequency),
  ]);
  const stride = Math.max(1, Math.ceil((points.length - 1) / (SHOWN_ROWS - 1)));
  const slopes = POINT_COLUMNS.map(({ name }) => name.includes(" / d ln I"));
  const shown = rows.filter((_, k) => k % stride === 0 || k === points.length - 1).map((row) =>
    row.map((cell, k) => slopes[k] && typeof cell === "number" ? Number(cell.toFixed(2)) : cell)
  );
  const caption = `Bias sweep: ${conditionText(condition)}` +
    (shown.length < rows.length ? `; ${shown.length} of ${rows.length} currents` : "");
  const file = csv === undefined ? undefined : {
    name: csv,
    columns: [...POINT_COLUMNS, { name: "remark" }],
    rows: rows.map((row, k) => [...row, points[k]?.reason ?? null]),
  };
  return withFile(table({ columns: POINT_COLUMNS, rows: shown, caption }), file);
}

const CONDITION_COLUMNS: readonly TableColumn[] = [
  { name: "corner" },
  { name: "temperature", unit: "°C" },
  { name: "supply", unit: "V" },
];

const CORNER_COLUMNS: readonly TableColumn[] = [
  { name: "worst" },
  { name: "knee", unit: "A", digits: 3 },
  { name: "recommended", unit: "A", digits: 3 },
  { name: "proposed / knee", digits: 3 },
  { name: "regime" },
  { name: "startup loop gain", digits: 3 },
  { name: "amplitude", unit: "V", digits: 3 },
  { name: "white phase noise", unit: "dBc/Hz", digits: 4 },
  { name: "frequency", unit: "Hz", digits: 5 },
  { name: "power", unit: "W", digits: 3 },
];

/** Which end of a figure over the conditions is the worst, and what it is called. */
const WORST: readonly {
  readonly word: string;
  readonly figure: (corner: CornerBias) => number | undefined;
  readonly sign: 1 | -1;
}[] = [
  { word: "highest proposed / knee", figure: ({ distance }) => distance, sign: 1 },
  { word: "lowest loop gain", figure: ({ proposed }) => proposed.startup?.loopGain, sign: -1 },
  { word: "lowest amplitude", figure: ({ proposed }) => proposed.figures?.amplitude, sign: -1 },
  { word: "highest noise", figure: ({ proposed }) => proposed.figures?.phaseNoise, sign: 1 },
  { word: "highest power", figure: ({ proposed }) => proposed.figures?.power, sign: 1 },
];

/** The proposed current in every condition; one column says of what a condition is the worst. */
export function cornersTable(
  corners: readonly CornerBias[],
  { csv }: CsvOptions = {},
): Showable {
  const worst = corners.map(({ proposed }): string[] =>
    proposed.figures === undefined ? ["no orbit"] : []
  );
  for (const { word, figure, sign } of WORST) {
    const values = corners.map((corner) => known(figure(corner)));
    const scored = values.map((value) => value === null ? -Infinity : sign * value);
    const best = Math.max(...scored);
    // With one condition, or none computed, there is nothing to compare.
    if (corners.length > 1 && best > -Infinity) worst[scored.indexOf(best)]?.push(word);
  }
  const rows = corners.map((corner, k): TableCell[] => {
    const { knee, recommended, distance, proposed } = corner;
    const { startup, figures, regime } = proposed;
    return [
      worst[k]?.join(", ") || null,
      known(knee),
      known(recommended),
      known(distance),
      regime,
      known(startup?.loopGain),
      known(figures?.amplitude),
      known(figures?.phaseNoise),
      known(figures?.frequency),
      known(figures?.power),
    ];
  });
  const current = corners[0]?.proposed.current;
  const caption = "The proposed current" +
    (current === undefined ? "" : ` of ${formatQuantity(current, "A")}`) + " in every condition";
  const file = csv === undefined ? undefined : {
    name: csv,
    columns: [...CONDITION_COLUMNS, ...CORNER_COLUMNS],
    rows: rows.map((row, k): TableCell[] => {
      const { corner, temperature, supply } = corners[k]!.condition;
      return [corner, temperature, supply, ...row];
    }),
  };
  const shown = table({
    columns: [{ name: "condition" }, ...CORNER_COLUMNS],
    rows: rows.map((row, k) => [unbrokenUnits(conditionText(corners[k]!.condition)), ...row]),
    caption,
  });
  return withFile(shown, file);
}

const OUTCOME_SYMBOLS: Readonly<Record<HandComparison["outcome"], string>> = {
  "agrees": "\u2713",
  "does not hold here": "\u25c7",
  "disagrees": "\u2717",
};

/** Hand formulas beside the computed figures. */
export function handTable(comparisons: readonly HandComparison[]): Showable {
  return table({
    caption: "By hand and computed",
    columns: [
      "formula",
      "by hand",
      "computed",
      "deviation",
      "allowed",
      "outcome",
      "assumptions that do not hold",
      "source",
    ].map((name) => ({ name })),
    rows: comparisons.map((one): TableCell[] => [
      one.name,
      text(one.hand, one.unit),
      text(one.computed, one.unit),
      deviationText(one.deviation, { unit: one.unit, sign: "+" }),
      deviationText(one.allowance, { unit: one.unit, sign: "\u00b1" }),
      `${OUTCOME_SYMBOLS[one.outcome]} ${one.outcome}`,
      one.broken.join("; ") || null,
      one.source,
    ]),
  });
}

/** Options of {@linkcode startupTable}. */
export interface StartupTableOptions {
  /** Time from thermal noise to 90 % of the amplitude, as `startTime` gives it [s]. */
  readonly startTime?: number | undefined;
}

/** Startup loop gain, growth rate, start time and the poles by name; `startup` as a bias point has it. */
export function startupTable(
  startup: Startup | undefined,
  { startTime }: StartupTableOptions = {},
): Showable {
  const rows: TableCell[][] = startup === undefined
    ? [["starts by itself", null, "there is no equilibrium to start from"]]
    : [
      ["starts by itself", startup.starts ? "yes" : "no", null],
      ["startup loop gain", formatQuantity(startup.loopGain, "1", { digits: 3 }), null],
      ["frequency at the start", text(startup.frequency, "Hz"), null],
      ["growth rate", text(startup.growthRate, "1/s"), null],
      ["start time", startTimeText(startTime), "from thermal noise to 90 % of the amplitude"],
      ...startup.poles.filter(({ im }) => im >= 0).map((pole) => poleRow(pole, startup)),
    ];
  return table({
    caption: "Startup",
    columns: [{ name: "figure" }, { name: "value" }, { name: "note" }],
    rows,
  });
}

function startTimeText(time: number | undefined): string | null {
  if (time === undefined || Number.isNaN(time)) return null;
  return time === Infinity ? "does not start" : formatQuantity(time, "s", { digits: 3 });
}

function poleRow(pole: NamedPole, { otherUnstable }: Startup): TableCell[] {
  const rings = pole.im > 0 ? `rings at ${text(pole.im / (2 * Math.PI), "Hz")}` : "real";
  const fate = pole.re > 0 ? "grows" : "dies out";
  const warning = otherUnstable.some(({ re, im }) => re === pole.re && im === pole.im)
    ? ", unstable besides the tank"
    : "";
  return [`pole of the ${pole.name}`, text(pole.re, "1/s"), `${rings}, ${fate}${warning}`];
}

const STRESS_NAMES: Readonly<Record<DeviceStress["quantity"], string>> = {
  "gate-source": "gate to source voltage, peak",
  "gate-drain": "gate to drain voltage, peak",
  "drain-source": "drain to source voltage, peak",
  "drain-bulk": "drain to bulk voltage, peak",
};

/** Peak voltages of the devices in one condition. */
export interface ConditionStresses {
  /** The condition, or its name. */
  readonly condition: Condition | string;
  readonly stresses: readonly DeviceStress[];
}

/** The worst of each device's stresses over the conditions, as `stress` takes them. */
export function stressRows(entries: readonly ConditionStresses[]): Stress[] {
  const rows = new Map<string, Stress>();
  for (const { condition, stresses } of entries) {
    const at = typeof condition === "string" ? condition : conditionText(condition);
    for (const { device, quantity, peak, limit } of stresses) {
      const key = `${device}\n${quantity}`;
      const worst = rows.get(key);
      if (worst !== undefined && !(peak / limit > worst.value / worst.limit)) continue;
      rows.set(key, {
        device,
        quantity: STRESS_NAMES[quantity],
        value: peak,
        limit,
        unit: "V",
        at,
      });
    }
  }
  return [...rows.values()];
}

/** A narrow column breaks its lines at commas, not between a number and its unit. */
function unbrokenUnits(text: string): string {
  return text.replace(/(\d) /g, "$1\u00a0");
}

function known(value: number | null | undefined): number | null {
  return value !== null && value !== undefined && Number.isFinite(value) ? value : null;
}

function text(value: number, unit: string): string {
  return Number.isFinite(value) ? formatQuantity(value, unit) : "n/a";
}

/** A deviation as `HandComparison` measures it: dB between levels, else relative. */
function deviationText(
  value: number,
  { unit, sign }: { readonly unit: string; readonly sign: "+" | "\u00b1" },
): string {
  if (!Number.isFinite(value)) return "n/a";
  const size = unit === "dBc/Hz"
    ? formatQuantity(value, "dB")
    : formatQuantity(value, "%", { digits: 2 });
  return value < 0 ? size : sign + size;
}

function withFile(
  shown: Showable,
  file: { name: string; columns: readonly TableColumn[]; rows: TableCell[][] } | undefined,
): Showable {
  if (file === undefined) return shown;
  const { bundle } = shown;
  const link = csvLink(file.name, file);
  return new Showable({
    "text/plain": bundle["text/plain"],
    "text/html": markup`${raw(String(bundle["text/html"]))}${link}`.text,
  });
}
