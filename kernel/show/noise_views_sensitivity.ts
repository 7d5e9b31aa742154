/**
 * Where in the cycle each source's noise is spent, and around which harmonic it comes from.
 *
 * @module
 */
import type { BuiltOscillator } from "../../lib/circuit/topology.ts";
import type { SensitivityView } from "../../lib/noise/sensitivity_view.ts";
import type { Orbit } from "../../lib/orbit/orbit.ts";
import type { ChartSeries } from "./chart_parts.ts";
import type { Showable } from "./showable.ts";
import { sweepChart } from "./sweep_chart.ts";
import { table } from "./table.ts";
import type { TableCell } from "./table_parts.ts";

/** Highest harmonic with a column of its own. */
const SHOWN_HARMONICS = 4;
/** A mean this small against the rms is zero. */
const ROUNDING = 1e-6;

/** What {@linkcode sensitivityChart} draws. */
export interface SensitivityChartOptions {
  readonly orbit: Orbit;
  readonly oscillator: BuiltOscillator;
  /** Views of sources of that orbit; each gets a panel. */
  readonly views: readonly SensitivityView[];
}

/** The tank voltage over one period, and under it the plain and the effective sensitivity of each source. */
export function sensitivityChart(
  { orbit, oscillator: { circuit, tank }, views }: SensitivityChartOptions,
): Showable {
  const { times, states, count } = orbit.quadrature;
  const n = orbit.system.dimension;
  const scale = views[0]?.scale ?? "s/C";
  const voltage = Float64Array.from(
    { length: count },
    (_, k) => circuit.voltage(tank.plus, tank.minus, states.subarray(k * n, (k + 1) * n)),
  );
  return sweepChart({
    x: times,
    xLabel: "time",
    xUnit: "s",
    title: "Where in the cycle the noise counts",
    description:
      `Impulse sensitivity in ${scale}, plain and effective: times the noise modulating function, ` +
      "which is 1 where the source is loudest",
    series: [
      { name: "tank voltage", y: voltage, unit: "V" },
      ...views.flatMap((view): ChartSeries[] => {
        const yLabel = `${view.device}, ${view.label}`;
        return [
          { name: `${view.device}, plain`, y: view.sensitivity, yLabel },
          { name: `${view.device}, effective`, y: view.effective, yLabel },
        ];
      }),
    ],
  });
}

/** rms and mean of the plain and the effective sensitivity of each source. */
export function sensitivityTable(views: readonly SensitivityView[]): Showable {
  return table({
    caption: `Sensitivities over one period, in ${
      views[0]?.scale ?? "s/C"
    }; 1/f noise counts by the mean, white by the rms; 1/f sources at 1 Hz`,
    columns: [
      { name: "source" },
      { name: "loudest, per root hertz", unit: "A", digits: 3 },
      { name: "plain rms", digits: 3 },
      { name: "effective rms", digits: 3 },
      { name: "effective over plain", digits: 3 },
      { name: "effective mean", digits: 3 },
    ],
    rows: views.map((view): TableCell[] => [
      `${view.device}, ${view.label}`,
      view.largest,
      view.rms.sensitivity,
      view.rms.effective,
      view.rms.sensitivity > 0 ? view.rms.effective / view.rms.sensitivity : null,
      // Below this the mean is rounding.
      Math.abs(view.mean.effective) > ROUNDING * view.rms.effective ? view.mean.effective : 0,
    ]),
  });
}

/**
 * Parts of each source's effective sensitivity by the harmonic around which the noise comes from: noise at
 * dc and at the second harmonic of a tail are different things to filter.
 */
export function foldingsTable(views: readonly SensitivityView[]): Showable {
  const shown = Array.from({ length: SHOWN_HARMONICS + 1 }, (_, k) => k);
  const names = shown.map((k) => k === 0 ? "dc" : k === 1 ? "carrier" : `${k} f0`);
  return table({
    caption:
      "Where white noise comes from: share of the source's phase noise by the band it starts in",
    columns: [
      { name: "source" },
      ...names.map((name) => ({ name, unit: "%", digits: 3 })),
      { name: "higher", unit: "%", digits: 3 },
    ],
    rows: views.map((view): TableCell[] => {
      const parts = shown.map((k) => percentOf(view.foldings[k] ?? 0));
      const rest = 1 - shown.reduce((sum, k) => sum + (view.foldings[k] ?? 0), 0);
      return [`${view.device}, ${view.label}`, ...parts, percentOf(rest)];
    }),
  });
}

/** To a tenth of a percent: smaller shares are rounding. */
function percentOf(share: number): number {
  return Math.max(0, Math.round(share * 1000) / 1000);
}
