import { sweepChart } from "./sweep_chart.ts";
import type { Showable } from "./showable.ts";

/** One trace of a {@linkcode waveform}. */
export interface Trace {
  /** Name in the key. */
  readonly name: string;
  /** In SI, one per time. */
  readonly values: ArrayLike<number>;
  /** "V", "A", ... */
  readonly unit: string;
  /** Label of the vertical axis that traces of one unit share. @default "voltage", "current" or the unit */
  readonly yLabel?: string;
}

/** Options of {@linkcode waveform}. */
export interface WaveformOptions {
  /** In seconds, ascending: one period. */
  readonly time: ArrayLike<number>;
  /** The traces. */
  readonly traces: readonly Trace[];
  /** What the chart shows, in one line. */
  readonly title: string;
  /** What there is to see, for those who do not see it. */
  readonly description: string;
  /** Instants to mark, in seconds. */
  readonly marks?: readonly { readonly at: number; readonly label: string }[];
}

const AXIS_NAMES: Readonly<Record<string, string>> = { V: "voltage", A: "current" };

/** Waveforms over one period: a panel for each unit, time from zero in the unit that fits. */
export function waveform(
  { time, traces, title, description, marks = [] }: WaveformOptions,
): Showable {
  const start = time[0] ?? 0;
  return sweepChart({
    title,
    description,
    x: Array.from(time, (t) => t - start),
    xLabel: "time",
    xUnit: "s",
    marks: marks.map((mark) => ({ ...mark, at: mark.at - start })),
    series: traces.map(({ name, values, unit, yLabel }) => ({
      name,
      y: values,
      unit,
      yLabel: yLabel ?? AXIS_NAMES[unit] ?? name,
    })),
  });
}
