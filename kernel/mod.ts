/**
 * What a cell of a notebook imports as `tankwright/notebook`: the sheet that a template asks for, and
 * everything that can be shown.
 *
 * @module
 */
export type { TechnologyCard } from "../lib/device/technology_card.ts";
export {
  type Choice,
  choice,
  type Field,
  type FieldValues,
  type Fixed,
  fixed,
  type FixedOptions,
  type QuantityChoiceOptions,
  type WordChoiceOptions,
} from "./sheet/field.ts";
export type { FilledField } from "./sheet/fill_sheet.ts";
export type { Revision, RevisionField, Waiver } from "./sheet/revision.ts";
export { type Given, sheet, type SheetOptions } from "./sheet/sheet.ts";
export {
  biasTable,
  type ConditionStresses,
  cornersTable,
  type CsvOptions,
  handTable,
  startupTable,
  type StartupTableOptions,
  stressRows,
} from "./show/bias_tables.ts";
export {
  amplitudeChart,
  type AmplitudeChartOptions,
  type BiasMarks,
  type HandCurve,
  noiseChart,
  type NoiseChartOptions,
  noiseSharesChart,
  tankWaveform,
  type TankWaveformOptions,
} from "./show/bias_views.ts";
export { cornerVerdict, type CornerVerdictOptions } from "./show/corner_verdict.ts";
export type {
  ChartAxis,
  ChartBand,
  ChartLimit,
  ChartMark,
  ChartScale,
  ChartSeries,
  DrawingText,
} from "./show/chart_parts.ts";
export { chart, type ChartOptions } from "./show/chart.ts";
export { conditionText } from "./show/condition_text.ts";
export { figure } from "./show/figure.ts";
export { formula, type FormulaOptions } from "./show/formula.ts";
export {
  amplitudeNoiseChart,
  type ContributorGroup,
  contributorGroups,
  contributorsChart,
  noiseCurveChart,
  type NoiseCurveChartOptions,
} from "./show/noise_views_curve.ts";
export {
  foldingsTable,
  sensitivityChart,
  type SensitivityChartOptions,
  sensitivityTable,
} from "./show/noise_views_sensitivity.ts";
export {
  ceilingTable,
  contributorsTable,
  type ContributorsTableOptions,
  derivativesTable,
  explanationsTable,
  type IntegralRow,
  integralsTable,
  suggestionsTable,
} from "./show/noise_views_tables.ts";
export { noiseVerdict, type NoiseVerdictOptions } from "./show/noise_views_verdict.ts";
export { type SeriesStyle, seriesStyle } from "./show/palette.ts";
export {
  inductanceMap,
  type InductanceMapOptions,
  type InductanceMark,
} from "./show/inductance_views.ts";
export {
  type InductanceLine,
  type InductanceOutcome,
  inductanceTable,
  type InductanceTableOptions,
  inductanceTrendChart,
  inductanceTrendTable,
  inductorFamilyChart,
} from "./show/inductance_views_tables.ts";
export type {
  DeclaredField,
  Figure,
  Limit,
  Payload,
  Stress,
  Verdict,
  VerdictState,
} from "./show/payload.ts";
export { progress } from "./show/progress.ts";
export { quantity, type QuantityOptions } from "./show/quantity.ts";
export { maskChart, type MaskChartOptions, maskTable } from "./show/requirement_views.ts";
export { schematic, type SchematicOptions } from "./show/schematic.ts";
export { type Share, shareChart, type ShareChartOptions } from "./show/share_chart.ts";
export { show } from "./show/show.ts";
export { type MimeBundle, PayloadShowable, Showable } from "./show/showable.ts";
export { stress } from "./show/stress.ts";
export { stressVerdict, type StressVerdictOptions } from "./show/stress_verdict.ts";
export { sweepChart, type SweepChartOptions } from "./show/sweep_chart.ts";
export type { TableCell, TableColumn } from "./show/table_parts.ts";
export { table, type TableOptions } from "./show/table.ts";
export {
  quietest,
  topologyChart,
  type TopologyChartOptions,
  type TopologyEntry,
  topologyTable,
  type TopologyViewOptions,
} from "./show/topology_views.ts";
export { verdict, type VerdictOptions } from "./show/verdict.ts";
export { type Trace, waveform, type WaveformOptions } from "./show/waveform.ts";
