/**
 * Charts of a bias sweep, made from what `lib/design/` computes. A point without an orbit is a gap.
 *
 * @module
 */
import type { BiasPoint, BiasSweep } from "../../lib/design/bias.ts";
import { formatQuantity } from "../../lib/quantity/format_quantity.ts";
import type { ChartAxis, ChartBand, ChartMark, ChartSeries } from "./chart_parts.ts";
import { conditionText } from "./condition_text.ts";
import { markup } from "./markup.ts";
import { shareChart } from "./share_chart.ts";
import { Showable } from "./showable.ts";
import { sweepChart } from "./sweep_chart.ts";
import { type Trace, waveform } from "./waveform.ts";

/** The hand line is drawn up to this multiple of the largest computed amplitude. */
const HAND_REACH = 1.4;
/** Slopes beyond this, as where the oscillation sets in, would hide all others. */
const STEEPEST = 4;
/** Points of a waveform over one period. */
const WAVEFORM_POINTS = 200;

/** A hand formula evaluated at every current of a sweep. */
export interface HandCurve {
  /** Name in the key: "(2/pi) I R". */
  readonly name: string;
  /** In the unit of the computed curve, one per point; what is missing leaves a gap. */
  readonly values: readonly (number | null | undefined)[];
}

/** Currents to mark in a chart of a sweep. */
export interface BiasMarks {
  /** Programmed current that the design proposes [A]. */
  readonly proposed?: number | undefined;
  /** The lead's multiple of the knee current [A]. */
  readonly recommended?: number | undefined;
}

/** Options of {@linkcode amplitudeChart}. */
export interface AmplitudeChartOptions extends BiasMarks {
  /** Hand formula of the amplitude [V]. */
  readonly hand?: HandCurve;
}

/** Amplitude over the programmed current with the regimes, the knee and the hand line. */
export function amplitudeChart(
  sweep: BiasSweep,
  { hand, ...marks }: AmplitudeChartOptions = {},
): Showable {
  const amplitude = sweep.points.map(({ figures }) => known(figures?.amplitude));
  const reach = HAND_REACH * Math.max(0, ...amplitude.filter((value) => value !== null));
  const yLabel = "amplitude";
  const drawn = hand && handSeries(hand, { unit: "V", yLabel });
  return sweepChart({
    ...sweepAxis(sweep, marks),
    title: `Amplitude over bias current: ${conditionText(sweep.condition)}`,
    description: "Peak of the fundamental of the differential tank voltage" +
      (hand === undefined
        ? ""
        : `; the hand line ends at ${HAND_REACH} times the largest computed amplitude`),
    series: [
      { name: "computed", y: amplitude, unit: "V", yLabel },
      ...(drawn === undefined ? [] : [{
        ...drawn,
        y: drawn.y.map((value) => value !== null && value <= reach ? value : null),
      }]),
    ],
  });
}

/** Options of {@linkcode noiseChart}. */
export interface NoiseChartOptions extends BiasMarks {
  /** Offset at which the sweep computed the phase noise [Hz]. */
  readonly offset: number;
  /** Hand formula of the white phase noise at the offset [dBc/Hz]. */
  readonly hand?: HandCurve;
  /** Adds a panel with d ln c / d ln I of the white noise-to-carrier ratio. @default false */
  readonly exponent?: boolean;
}

/** White phase noise and figure of merit over the programmed current. */
export function noiseChart(
  sweep: BiasSweep,
  { offset, hand, exponent = false, ...marks }: NoiseChartOptions,
): Showable {
  const { points, quietest } = sweep;
  const unit = "dBc/Hz";
  const yLabel = `white phase noise at ${formatQuantity(offset, "Hz")}`;
  const axis = sweepAxis(sweep, marks);
  const quiet = quietest === undefined ? [] : [{ at: quietest, label: "quietest" }];
  return sweepChart({
    ...axis,
    marks: [...(axis.marks ?? []), ...quiet],
    title: `Phase noise over bias current: ${conditionText(sweep.condition)}`,
    description: "White sources only, each through its own sensitivity over the computed orbit" +
      (exponent ? `; slopes steeper than ${STEEPEST} are not drawn` : ""),
    series: [
      { name: "computed", y: points.map((p) => known(p.figures?.phaseNoise)), unit, yLabel },
      ...(hand === undefined ? [] : [handSeries(hand, { unit, yLabel })]),
      {
        name: "figure of merit",
        y: points.map(({ figures }) => known(figures?.figureOfMerit)),
        unit,
      },
      ...(exponent
        ? [{
          name: "d ln noise / d ln I",
          y: points.map(({ noiseExponent }) =>
            Math.abs(noiseExponent ?? NaN) <= STEEPEST ? known(noiseExponent) : null
          ),
        }]
        : []),
    ],
  });
}

/** Shares of the tank, the pair, the tail and the mirror in the white phase noise over the current. */
export function noiseSharesChart(sweep: BiasSweep, marks: BiasMarks = {}): Showable {
  const title = `Sources of white phase noise: ${conditionText(sweep.condition)}`;
  const alive = sweep.points.flatMap(({ current, figures, oscillator }) =>
    figures === undefined ? [] : [{ current, shares: sharesByPart(figures.shares, oscillator) }]
  );
  if (alive.length < 2) {
    return remark(`${title}: nothing to draw, an orbit exists at ${alive.length} of the currents`);
  }
  const names = [...new Set(alive.flatMap(({ shares }) => [...shares.keys()]))];
  const currents = alive.map(({ current }) => current);
  return shareChart({
    ...sweepAxis(sweep, marks),
    x: currents,
    title,
    description: "Share of each part in the phase diffusion of all white sources" +
      (alive.length < sweep.points.length ? "; only currents with an orbit are drawn" : ""),
    shares: names.map((name) => ({
      name,
      values: alive.map(({ shares }) => shares.get(name) ?? 0),
    })),
  });
}

/** Options of {@linkcode tankWaveform}. */
export interface TankWaveformOptions {
  /** What the chart shows, in one line. @default names the current */
  readonly title?: string;
  /** Nodes to draw. @default both outputs, and the tail node where there is one */
  readonly nodes?: readonly string[];
  /** Transistors whose drain current is drawn. @default the pair and the tail */
  readonly devices?: readonly string[];
}

/** Node voltages and drain currents over one period, from a maximum of the tank's fundamental. */
export function tankWaveform(
  { orbit, oscillator, current, reason }: BiasPoint,
  options: TankWaveformOptions = {},
): Showable {
  const { circuit, tank, parts } = oscillator;
  const { title = `Waveforms over one period at ${formatQuantity(current, "A")}` } = options;
  if (orbit === undefined) {
    return remark(`${title}: there is no orbit${reason === undefined ? "" : ` (${reason})`}`);
  }
  const tail = circuit.indexOf("tail") === undefined ? [] : ["tail"];
  const { nodes = [tank.plus, tank.minus, ...tail] } = options;
  const { devices = [...(parts["pair"] ?? []), ...(parts["tail"] ?? [])] } = options;
  const { re, im } = orbit.phasor((x) => circuit.voltage(tank.plus, tank.minus, x));
  const start = -Math.atan2(im, re) / (2 * Math.PI) * orbit.period;
  const time = Array.from(
    { length: WAVEFORM_POINTS + 1 },
    (_, k) => k / WAVEFORM_POINTS * orbit.period,
  );
  const states = time.map((t) => orbit.at(start + t));
  const voltages = nodes.map((node): Trace => ({
    name: node,
    values: states.map((x) => circuit.potential(node, x)),
    unit: "V",
    yLabel: "node voltage",
  }));
  const currents = devices.map((device): Trace => ({
    name: `drain of ${device}`,
    values: states.map((x) => circuit.deviceCurrents(device, x)[0]!),
    unit: "A",
    yLabel: "drain current, without charging",
  }));
  return waveform({
    time,
    traces: [...voltages, ...currents],
    title,
    description: "From a maximum of the fundamental of the differential tank voltage",
  });
}

/** The axis that the charts of a sweep share: currents, regimes as bands, named currents. */
function sweepAxis(
  { points, knee }: BiasSweep,
  { proposed, recommended }: BiasMarks,
): ChartAxis {
  const marks = [
    { at: knee, label: "knee" },
    { at: recommended, label: "recommended" },
    { at: proposed, label: "proposed" },
  ].filter((mark): mark is ChartMark => mark.at !== undefined);
  return {
    x: points.map(({ current }) => current),
    xLabel: "programmed current",
    xUnit: "A",
    log: true,
    bands: regimeBands(points),
    marks,
  };
}

/** Runs of points in one regime; a border lies midway between two points on the logarithmic axis. */
function regimeBands(points: readonly BiasPoint[]): ChartBand[] {
  const bands: { from?: number; to?: number; label: string }[] = [];
  points.forEach(({ current, regime }, k) => {
    const last = bands[bands.length - 1];
    if (last?.label === regime) return;
    if (last === undefined) bands.push({ label: regime });
    else {
      const border = Math.sqrt(points[k - 1]!.current * current);
      last.to = border;
      bands.push({ from: border, label: regime });
    }
  });
  return bands;
}

function handSeries(
  { name, values }: HandCurve,
  { unit, yLabel }: { readonly unit: string; readonly yLabel: string },
): ChartSeries & { readonly y: (number | null)[] } {
  return { name: `${name} by hand`, y: values.map(known), unit, yLabel };
}

function sharesByPart(
  shares: readonly { readonly device: string; readonly share: number }[],
  { parts }: BiasPoint["oscillator"],
): Map<string, number> {
  const sums = new Map(Object.keys(parts).map((part) => [part, 0]));
  for (const { device, share } of shares) {
    const part = Object.keys(parts).find((name) => parts[name]?.includes(device)) ?? "other";
    sums.set(part, (sums.get(part) ?? 0) + share);
  }
  return sums;
}

function known(value: number | null | undefined): number | null {
  return value !== null && value !== undefined && Number.isFinite(value) ? value : null;
}

function remark(text: string): Showable {
  return new Showable({ "text/plain": text, "text/html": markup`<p>${text}</p>`.text });
}
