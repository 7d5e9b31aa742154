/**
 * Charts and tables beside the map of inductance against bias current.
 *
 * @module
 */
import type { InductanceAnswer, NoInductance } from "../../lib/design/inductance.ts";
import type { InductanceCheck } from "../../lib/design/inductance_check.ts";
import type { InductanceTrendPoint } from "../../lib/design/inductance_map.ts";
import type { InductorFamily } from "../../lib/design/inductor_family.ts";
import { localExponents } from "../../lib/design/regime.ts";
import { formatQuantity } from "../../lib/quantity/format_quantity.ts";
import { conditionText } from "./condition_text.ts";
import type { Showable } from "./showable.ts";
import { sweepChart } from "./sweep_chart.ts";
import { table } from "./table.ts";
import type { TableCell } from "./table_parts.ts";

/** Inductances of a chart of families. */
const FAMILY_POINTS = 40;

/** A line of the map: its name and white noise along it. */
export interface InductanceLine {
  /** In a few words: "at 2.1 mA". */
  readonly name: string;
  readonly points: readonly InductanceTrendPoint[];
}

/** Computed white noise over the inductance along lines of the map, beside the closed form. */
export function inductanceTrendChart(
  lines: readonly InductanceLine[],
  { offset, marks = [] }: {
    /** Offset of the phase noise [Hz]. */
    readonly offset: number;
    /** Inductances to mark [H]. @default none */
    readonly marks?: readonly { readonly at: number; readonly label: string }[];
  },
): Showable {
  const x = [...new Set(lines.flatMap(({ points }) => points.map((point) => point.inductance)))]
    .sort((a, b) => a - b);
  const over = (
    points: readonly InductanceTrendPoint[],
    read: (point: InductanceTrendPoint) => number | undefined,
  ) =>
    x.map((inductance) => {
      const point = points.find((one) => one.inductance === inductance);
      return (point && read(point)) ?? null;
    });
  return sweepChart({
    title: `White phase noise at ${formatQuantity(offset, "Hz")} over the inductance`,
    description:
      "Each point trimmed to the frequency and solved at its own current, everything but tank and " +
      "current as it is; the closed form is Leeson's with the noise factor by hand",
    x,
    xLabel: "inductance",
    xUnit: "H",
    log: true,
    marks,
    series: lines.flatMap(({ name, points }) => [
      {
        name: `computed ${name}`,
        y: over(points, ({ computed }) => computed),
        unit: "dBc/Hz",
        yLabel: name,
      },
      {
        name: `closed form ${name}`,
        y: over(points, ({ hand }) => hand),
        unit: "dBc/Hz",
        yLabel: name,
      },
    ]),
  });
}

/** The points of a line with their deviations from the closed form and the local exponents. */
export function inductanceTrendTable({ name, points }: InductanceLine): Showable {
  const alive = points.filter(({ computed }) => computed !== undefined);
  const inductances = alive.map(({ inductance }) => inductance);
  const exponents = (read: (point: InductanceTrendPoint) => number | undefined) =>
    localExponents(inductances, alive.map((point) => 10 ** ((read(point) ?? NaN) / 10)));
  const computed = exponents((point) => point.computed);
  const hand = exponents((point) => point.hand);
  const slope = (value: number | undefined): TableCell =>
    value === undefined || !Number.isFinite(value) ? null : Number(value.toFixed(2));
  return table({
    caption: `White phase noise over the inductance ${name}`,
    columns: [
      { name: "inductance", unit: "H", digits: 3 },
      { name: "current", unit: "A", digits: 3 },
      { name: "computed", unit: "dBc/Hz" },
      { name: "closed form", unit: "dBc/Hz" },
      { name: "computed less closed form", unit: "dB", digits: 2 },
      { name: "d ln noise / d ln L, computed", digits: 3 },
      { name: "closed form's", digits: 3 },
      { name: "its assumptions" },
    ],
    rows: points.map((point): TableCell[] => {
      const k = alive.indexOf(point);
      return [
        point.inductance,
        point.current,
        point.computed ?? null,
        point.hand ?? null,
        point.computed === undefined || point.hand === undefined
          ? null
          : Number((point.computed - point.hand).toFixed(1)),
        slope(computed[k]),
        slope(hand[k]),
        point.computed === undefined ? "no orbit" : assumptions(point.broken.length),
      ];
    }),
  });
}

function assumptions(broken: number): string {
  return broken === 0 ? "hold" : `${broken} broken`;
}

/** An answer of the search, or why there is none; the sensitivity belongs to a search at fixed current. */
export type InductanceOutcome =
  | (Omit<InductanceAnswer, "qualitySensitivity"> & Partial<InductanceAnswer>)
  | NoInductance;

/** What {@linkcode inductanceTable} sets side by side. */
export interface InductanceTableOptions {
  readonly proposed: InductanceCheck;
  /** The smallest at the proposed current. */
  readonly smallest: InductanceOutcome;
  /** The smallest on the line of the recommended current. */
  readonly recommended: InductanceOutcome;
  /** The smallest of a list tried in turn; undefined where none keeps the limits. @default not said */
  readonly byTrial?: {
    readonly found: InductanceCheck | undefined;
    /** How many were tried [1]. */
    readonly count: number;
    /** Ratio of neighbours in the list [1]. */
    readonly step: number;
  };
  /** [Hz] */
  readonly frequency: number;
}

/** The proposed inductance, the smallest that starts at its current, and the recommended point. */
export function inductanceTable(
  { proposed, smallest, recommended, byTrial, frequency }: InductanceTableOptions,
): Showable {
  const checks = [proposed, smallest.check, recommended.check];
  const text = (value: number | undefined, unit: string) =>
    value === undefined || !Number.isFinite(value)
      ? null
      : formatQuantity(value, unit, { digits: 3 });
  const row = (name: string, read: (check: InductanceCheck) => TableCell): TableCell[] => [
    name,
    ...checks.map(read),
  ];
  const ofAnswers = (
    name: string,
    read: (answer: InductanceOutcome) => TableCell,
  ): TableCell[] => [name, null, read(smallest), read(recommended)];
  return table({
    caption: "The inductance and what binds it",
    columns: [
      { name: "figure" },
      { name: "proposed" },
      { name: "smallest at the proposed current" },
      { name: "smallest at the recommended current" },
    ],
    rows: withoutEmpty([
      ofAnswers("found", ({ status }) => status === "found" ? "yes" : "no, nearest shown"),
      row("inductance", ({ inductance }) => text(inductance, "H")),
      row("programmed current", ({ current }) => text(current, "A")),
      row("worst startup loop gain", ({ worstLoopGain }) => text(worstLoopGain, "1")),
      row("at", ({ worstCondition }) => conditionText(worstCondition)),
      row("quality factor of the coil", ({ trimmed }) => text(trimmed.member.quality, "1")),
      row("quality factor of the tank", ({ trimmed }) => text(trimmed.tank.quality, "1")),
      row("coil", ({ trimmed }) => trimmed.member.description ?? null),
      row("capacitance of the coil", ({ trimmed }) => text(trimmed.member.capacitance, "F")),
      row("capacitance left", ({ trimmed }) => text(trimmed.capacitanceLeft, "F")),
      row("self-resonance", ({ trimmed }) => text(trimmed.member.selfResonance, "Hz")),
      row(
        "self-resonance over frequency",
        ({ trimmed }) => text(trimmed.member.selfResonance / frequency, "1"),
      ),
      row("power", ({ power }) => text(power, "W")),
      row("limits not kept", ({ broken }) => broken.join(", ") || "none"),
      ofAnswers("what binds", ({ binding }) => binding),
      ofAnswers("why none", (answer) => answer.status === "none" ? answer.reason : null),
      [
        "d ln L / d ln Q of the coil",
        null,
        smallest.status === "found" ? text(smallest.qualitySensitivity, "1") : null,
        null,
      ],
      ...(byTrial === undefined ? [] : [trialRow(smallest, byTrial)]),
    ]),
  });
}

/** Rows that say something beside their name. */
function withoutEmpty(rows: readonly TableCell[][]): TableCell[][] {
  return rows.filter(([, ...cells]) => cells.some((cell) => cell !== null));
}

function trialRow(
  { status, check }: InductanceOutcome,
  { found, count, step }: NonNullable<InductanceTableOptions["byTrial"]>,
): TableCell[] {
  const name = `by trial of ${count} inductances`;
  if (!found) {
    return [
      name,
      null,
      status === "none" ? "none either" : "none: disagrees with the search",
      null,
    ];
  }
  const value = formatQuantity(found.inductance, "H", { digits: 3 });
  if (status === "none") return [name, null, `${value}: disagrees with the search`, null];
  const ratio = found.inductance / check.inductance;
  const agrees = ratio >= 1 - 1e-3 && ratio <= step * (1 + 1e-3);
  return [
    name,
    null,
    `${value}: ${agrees ? "agrees within its step" : "disagrees with the search"}`,
    null,
  ];
}

/** Quality factor and self-resonance of families over the inductance; a set's points are joined by lines. */
export function inductorFamilyChart(
  families: readonly InductorFamily[],
  { frequency, marks = [] }: {
    /** At which the members are looked at [Hz]. */
    readonly frequency: number;
    /** Inductances to mark [H]. @default none */
    readonly marks?: readonly { readonly at: number; readonly label: string }[];
  },
): Showable {
  const smallest = Math.min(...families.map((family) => family.smallest));
  const largest = Math.max(...families.map((family) => family.largest));
  const grid = Array.from(
    { length: FAMILY_POINTS },
    (_, k) => smallest * (largest / smallest) ** (k / (FAMILY_POINTS - 1)),
  );
  const members = families.flatMap(({ inductances = [] }) => inductances);
  const x = [...new Set([...grid.slice(0, -1), ...members, largest])].sort((a, b) => a - b);
  const over = (
    family: InductorFamily,
    read: (member: ReturnType<InductorFamily["member"]>) => number,
  ) =>
    x.map((inductance) => {
      if (!(inductance >= family.smallest && inductance <= family.largest)) return null;
      const value = familyValue(family, inductance, read);
      return Number.isFinite(value) ? value : null;
    });
  return sweepChart({
    title: "Families of inductors",
    description: `The coil alone, at ${formatQuantity(frequency, "Hz")}`,
    x,
    xLabel: "inductance",
    xUnit: "H",
    log: true,
    marks,
    series: [
      ...families.map((family) => ({
        name: `quality factor: ${family.name}`,
        y: over(family, ({ quality }) => quality),
        yLabel: "quality factor",
      })),
      ...families.map((family) => ({
        name: `self-resonance: ${family.name}`,
        y: over(family, ({ selfResonance }) => selfResonance),
        unit: "Hz",
        yLabel: "self-resonance",
      })),
    ],
  });
}

/** A figure of a member; between the members of a set, linear in ln L to guide the eye. */
function familyValue(
  family: InductorFamily,
  inductance: number,
  read: (member: ReturnType<InductorFamily["member"]>) => number,
): number {
  const { inductances } = family;
  if (!inductances) return read(family.member(inductance));
  const right = inductances.findIndex((one) => one >= inductance);
  const [a, b] = [inductances[right - 1], inductances[right]];
  if (b === undefined) return NaN;
  const value = read(family.member(b));
  if (a === undefined || b === inductance) return value;
  const before = read(family.member(a));
  return before + Math.log(inductance / a) / Math.log(b / a) * (value - before);
}
