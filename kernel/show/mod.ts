/** What a cell can show. */
export type {
  ChartAxis,
  ChartBand,
  ChartLimit,
  ChartMark,
  ChartScale,
  ChartSeries,
  DrawingText,
} from "./chart_parts.ts";
export { chart, type ChartOptions } from "./chart.ts";
export { figure } from "./figure.ts";
export { formula, type FormulaOptions } from "./formula.ts";
export type { Figure, Limit, Payload, Stress, Verdict, VerdictState } from "./payload.ts";
export { type SeriesStyle, seriesStyle } from "./palette.ts";
export { progress } from "./progress.ts";
export { quantity, type QuantityOptions } from "./quantity.ts";
export { type Share, shareChart, type ShareChartOptions } from "./share_chart.ts";
export { show } from "./show.ts";
export { type MimeBundle, PayloadShowable, Showable } from "./showable.ts";
export { stress } from "./stress.ts";
export { sweepChart, type SweepChartOptions } from "./sweep_chart.ts";
export type { TableCell, TableColumn } from "./table_parts.ts";
export { table, type TableOptions } from "./table.ts";
export { verdict, type VerdictOptions } from "./verdict.ts";
export { type Trace, waveform, type WaveformOptions } from "./waveform.ts";
