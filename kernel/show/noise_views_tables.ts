/**
 * Tables of a noise budget, its integrals, its ceiling and what would change it.
 *
 * @module
 */
import type { BuiltOscillator } from "../../lib/circuit/topology.ts";
import type { WhatIf } from "../../lib/design/what_if.ts";
import type { NoiseBudget } from "../../lib/noise/budget.ts";
import type { CeilingJudgement } from "../../lib/noise/ceiling.ts";
import type { CurveExplanation } from "../../lib/noise/explain_curve.ts";
import type { IntegratedPhaseNoise } from "../../lib/noise/integrals.ts";
import { formatQuantity } from "../../lib/quantity/format_quantity.ts";
import { type ContributorGroup, contributorGroups } from "./noise_views_curve.ts";
import type { CsvOptions } from "./bias_tables.ts";
import type { Showable } from "./showable.ts";
import { table } from "./table.ts";
import type { TableCell, TableColumn } from "./table_parts.ts";

/** Shares, decibels and relative changes are rounded to these steps [1], [dB], [1]. */
const SHARE_STEP = 1e-4;
const DECIBEL_STEP = 1e-3;
const CHANGE_STEP = 1e-5;

/** Options of {@linkcode contributorsTable}. */
export interface ContributorsTableOptions extends CsvOptions {
  /** The parts of the oscillator. */
  readonly parts: BuiltOscillator["parts"];
  /** Offsets shown, the nearest of the budget's are taken [Hz]. */
  readonly offsets: readonly number[];
}

/** Contributors at stated offsets, as levels and shares; the last row is their sum. */
export function contributorsTable(
  budget: NoiseBudget,
  { parts, offsets, ...csv }: ContributorsTableOptions,
): Showable {
  const places = [...new Set(offsets.map((offset) => nearest(budget.offsets, offset)))];
  const sums = budget.total.map((level) => 10 ** (level / 10));
  const groups = contributorGroups(budget, { parts });
  const largest = ({ phase }: ContributorGroup) =>
    Math.max(...places.map((k) => phase[k]! / sums[k]!));
  const rows = groups
    .toSorted((a, b) => largest(b) - largest(a))
    .map(({ name, phase }): TableCell[] => [
      name,
      ...places.flatMap((k) => [decibel(phase[k]!), rounded(phase[k]! / sums[k]!, SHARE_STEP)]),
    ]);
  return table({
    caption: "Contributors at stated offsets",
    columns: [
      { name: "contributor" },
      ...places.flatMap((k): TableColumn[] => {
        const at = formatQuantity(budget.offsets[k]!, "Hz", { digits: 3 });
        return [
          { name: `at ${at}`, unit: "dBc/Hz", digits: 4 },
          { name: `share at ${at}`, unit: "%", digits: 3 },
        ];
      }),
    ],
    rows: [...rows, ["total", ...places.flatMap((k) => [budget.total[k]!, 1])]],
    ...csv,
  });
}

/** Phase noise integrated in one way. */
export interface IntegralRow {
  /** "free-running", "behind the loop", ... */
  readonly name: string;
  readonly integral: IntegratedPhaseNoise;
}

/** Phase error and jitter, free-running and behind loops. */
export function integralsTable(
  rows: readonly IntegralRow[],
  { caption }: { readonly caption: string },
): Showable {
  return table({
    caption,
    columns: [
      { name: "case" },
      { name: "integrated, one side", unit: "dBc", digits: 3 },
      { name: "phase error, rms", unit: "deg", digits: 3 },
      { name: "jitter, rms", unit: "s", digits: 3 },
    ],
    rows: rows.map(({ name, integral: { level, phaseError, jitter } }): TableCell[] => [
      name,
      level,
      phaseError,
      jitter ?? null,
    ]),
  });
}

/** From the thermodynamic limit down to the figure of merit, each loss in its row. */
export function ceilingTable(
  { limit, losses, figureOfMerit, assumptions }: CeilingJudgement,
): Showable {
  const signed = (value: number) => formatQuantity(value === 0 ? 0 : -value, "dB");
  const about: Readonly<Record<string, string>> = {
    efficiency: "fundamental in the tank's loss over supply power",
    "noise factor": "all white sources over the tank's loss",
    distortion: "harmonics of the tank voltage",
    "not accounted for": "amplitude turned into phase, noise through reactive paths",
  };
  return table({
    caption: "Figure of merit below its thermodynamic limit",
    columns: [{ name: "step" }, { name: "value" }, { name: "what it is" }],
    rows: [
      [
        "limit for the loaded quality factor",
        formatQuantity(limit, "dBc/Hz"),
        assumptions.join("; "),
      ],
      ...losses.map(({ name, decibels }): TableCell[] => [
        name,
        signed(decibels),
        about[name] ?? null,
      ]),
      ["figure of merit", formatQuantity(figureOfMerit, "dBc/Hz"), "as computed, white noise"],
    ],
  });
}

/** Which contributor alone would have to be off by how much to explain a measured or simulated curve. */
export function explanationsTable({ explanations, rms }: CurveExplanation): Showable {
  return table({
    caption: `What would explain the curve, which lies ${
      formatQuantity(rms, "dB")
    } rms from the budget: each contributor taken as the only one that is off`,
    columns: [
      { name: "contributor" },
      { name: "off by", unit: "dB", digits: 3 },
      { name: "rms left", unit: "dB", digits: 2 },
      { name: "can the curve tell it from the best?" },
    ],
    rows: explanations.map(({ name, decibels, rms: left, asGood }, k): TableCell[] => [
      name,
      decibels,
      left,
      k === 0 ? "it is the best" : asGood ? "no" : "yes",
    ]),
  });
}

/** How noise, amplitude, power and frequency follow each parameter; the largest effect on noise first. */
export function derivativesTable({ derivatives }: WhatIf): Showable {
  return table({
    caption: "What moves the noise: change for one per cent more of each parameter",
    columns: [
      { name: "parameter" },
      { name: "now" },
      { name: "noise", unit: "dB", digits: 2 },
      { name: "amplitude", unit: "%", digits: 2 },
      { name: "power", unit: "%", digits: 2 },
      { name: "frequency", unit: "%", digits: 2 },
    ],
    rows: derivatives.map((
      { name, unit, value, noise, amplitude, power, frequency },
    ): TableCell[] => [
      name,
      formatQuantity(value, unit, { digits: 3 }).replaceAll(" ", "\u00a0"),
      perCent(noise, DECIBEL_STEP),
      perCent(amplitude, CHANGE_STEP),
      perCent(power, CHANGE_STEP),
      perCent(frequency, CHANGE_STEP),
    ]),
  });
}

/** Changes that would lower the noise, each solved again; the best first. */
export function suggestionsTable({ suggestions, now }: WhatIf): Showable {
  const from = formatQuantity(now.noise, "dBc/Hz");
  return table({
    caption:
      `What would lower the noise from ${from}, each solved again; a parameter is at most doubled or halved`,
    columns: [
      { name: "change" },
      { name: "noise", unit: "dBc/Hz", digits: 4 },
      { name: "change of noise", unit: "dB", digits: 2 },
      { name: "promised by the derivative", unit: "dB", digits: 2 },
      { name: "power", unit: "W", digits: 3 },
      { name: "amplitude", unit: "V", digits: 3 },
      { name: "startup loop gain", digits: 3 },
      { name: "frequency", unit: "Hz", digits: 4 },
    ],
    rows: suggestions.map(({ name, unit, from: before, to, promised, after }): TableCell[] => {
      const change = `${name} ${formatQuantity(before, unit, { digits: 3 })} to ${
        formatQuantity(to, unit, { digits: 3 })
      }`;
      if (!after) return [`${change}: no orbit`, null, null, promised, null, null, null, null];
      const { power, amplitude, frequency } = after.figures;
      return [
        change,
        after.noise,
        after.noise - now.noise,
        promised,
        power,
        amplitude,
        after.loopGain,
        frequency,
      ];
    }),
  });
}

/** Per e-fold to per one per cent more. */
function perCent(fold: number | undefined, step: number): number | null {
  return fold === undefined ? null : rounded(fold * Math.log(1.01), step);
}

function rounded(value: number, step: number): number {
  // Adding zero takes the sign off minus zero.
  return Math.round(value / step) * step + 0;
}

function decibel(power: number): number | null {
  return power > 0 ? 10 * Math.log10(power) : null;
}

function nearest(offsets: readonly number[], wanted: number): number {
  return offsets.reduce(
    (best, offset, k) =>
      Math.abs(Math.log(offset / wanted)) < Math.abs(Math.log(offsets[best]! / wanted)) ? k : best,
    0,
  );
}
