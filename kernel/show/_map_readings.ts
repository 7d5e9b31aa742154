import type { FamilyLimit, InductanceColumn } from "../../lib/design/inductance_map.ts";
import { formatQuantity } from "../../lib/quantity/format_quantity.ts";
import type { MapFrame } from "./_map_frame.ts";

/** A named point of the map. */
export interface InductanceMark {
  readonly label: string;
  /** Programmed current [A]. */
  readonly current: number;
  /** [H] */
  readonly inductance: number;
}

/** A named point with the noise read off the map. */
export function pointReading(
  { label, sign, current, inductance }: InductanceMark & { readonly sign: string },
  { frame, columns }: { readonly frame: MapFrame; readonly columns: readonly InductanceColumn[] },
): string {
  const where = `${sign} ${label}: ${formatQuantity(inductance, "H", { digits: 3 })} at ${
    formatQuantity(current, "A", { digits: 3 })
  }`;
  if (!frame.holds({ current, inductance })) return `${where}, outside the map`;
  const noise = noiseAt(columns, { current, inductance });
  return noise === undefined
    ? `${where}, no orbit beside it`
    : `${where}, read off about ${formatQuantity(noise, "dBc/Hz")}`;
}

const LIMIT_TEXTS: Readonly<Record<FamilyLimit["forbids"], string>> = {
  above: "no larger than",
  below: "no smaller than",
};

/** Where a limit lies. */
export function limitReading({ limit, forbids, inductance }: FamilyLimit): string {
  return `${limit}: ${LIMIT_TEXTS[forbids]} ${formatQuantity(inductance, "H", { digits: 3 })}`;
}

/** White noise of a column at a current between its points; undefined beside a gap. */
function columnNoise(
  { sweep: { points } }: InductanceColumn,
  current: number,
): number | undefined {
  const right = points.findIndex((point) => point.current >= current);
  const [a, b] = [points[Math.max(right, 1) - 1], points[Math.max(right, 1)]];
  if (right < 0 || !a?.figures || !b?.figures) return undefined;
  const part = Math.log(current / a.current) / Math.log(b.current / a.current);
  return a.figures.phaseNoise + part * (b.figures.phaseNoise - a.figures.phaseNoise);
}

function noiseAt(
  columns: readonly InductanceColumn[],
  { current, inductance }: { readonly current: number; readonly inductance: number },
): number | undefined {
  const right = Math.max(1, columns.findIndex((column) => column.inductance >= inductance));
  const [a, b] = [columns[right - 1]!, columns[right]!];
  const [low, high] = [columnNoise(a, current), columnNoise(b, current)];
  if (low === undefined || high === undefined) return undefined;
  return low + Math.log(inductance / a.inductance) / Math.log(b.inductance / a.inductance) *
      (high - low);
}

/** What moving along the two natural lines of the map does to the noise. */
export function truths(
  columns: readonly InductanceColumn[],
  { kneeMultiple, fixed, frame }: {
    readonly kneeMultiple: number;
    readonly fixed: number | undefined;
    readonly frame: MapFrame;
  },
): string[] {
  const henry = (value: number) => formatQuantity(value, "H", { digits: 3 });
  const change = (from: number, to: number) =>
    `${to < from ? "falls" : "rises"} by ${formatQuantity(Math.abs(to - from), "dB")}`;
  const onLine = columns.flatMap((column) => {
    const { inductance, sweep: { knee } } = column;
    const current = kneeMultiple * (knee ?? NaN);
    const noise = frame.holds({ current, inductance }) ? columnNoise(column, current) : undefined;
    return noise === undefined ? [] : [{ inductance, noise }];
  });
  const [small, large] = [onLine[0], onLine[onLine.length - 1]];
  const along = !small || !large || small === large ? [] : [
    `along the recommended current the noise ${change(large.noise, small.noise)} from ${
      henry(large.inductance)
    } down to ${henry(small.inductance)}`,
  ];
  if (fixed === undefined) return along;
  const atFixed = columns.flatMap((column) => {
    const noise = columnNoise(column, fixed);
    return noise === undefined
      ? []
      : [{ inductance: column.inductance, noise, knee: column.sweep.knee }];
  });
  const [first] = atFixed;
  if (!first) return along;
  const quietest = atFixed.reduce((best, next) => next.noise < best.noise ? next : best);
  const place = quietest.knee === undefined
    ? ""
    : `, where it is ${
      formatQuantity(fixed / quietest.knee, "1", { digits: 2 })
    } of the knee current`;
  return quietest === first ? along : [
    ...along,
    `at ${formatQuantity(fixed, "A", { digits: 3 })} the noise ${
      change(first.noise, quietest.noise)
    } from ${henry(first.inductance)} up to ${henry(quietest.inductance)}${place}`,
  ];
}
