/**
 * Looptally as a library: text of a flowsheet in, closed balance out. Nothing here reads a file or the clock,
 * so the same code runs in a terminal, in a worker and in a browser.
 *
 *   const { flowsheet, diagnostics } = await readFlowsheet(text, { file: 'loop.yaml' });
 *   if (flowsheet) {
 *     const { result, diagnosis } = balance(flowsheet);
 *     console.log(textSheet(result));
 *   }
 */

export { type PublishedConstant, publishedConstants } from './chemistry/published-constants.ts';
export { type Diagnostic, InputError } from './diagnostics/diagnostic.ts';
export { type FormatOptions, formatDiagnostic, formatDiagnostics } from './diagnostics/format.ts';
export { flowsheetJsonSchema } from './flowsheet/json-schema.ts';
export { type NumericSetting, numericSettings } from './flowsheet/numeric-settings.ts';
export type { ReadOptions, ReadResult } from './flowsheet/read.ts';
export { readFlowsheet } from './flowsheet/read.ts';
export type { Component } from './model/component.ts';
export type {
  Aim,
  BlockSpec,
  Feed,
  Flowsheet,
  Formula,
  GasModelName,
  Handle,
  LedgerSpec,
  LiquidModelName,
  MethodName,
  Objective,
  Prices,
  SolveSpec,
  StreamSpec,
  StudySpec,
  UserFigure,
} from './model/flowsheet.ts';
export type { Place } from './model/place.ts';
export type { Reaction } from './model/reaction.ts';
export type {
  AimResult,
  BlockResult,
  Figures,
  LedgerEntry,
  Result,
  StreamResult,
  TraceEntry,
  Warning,
} from './model/result.ts';
export type { Correlation, Spread } from './model/spread.ts';
export type { Phase } from './model/stream.ts';
export type { CatalogueRow } from './properties/catalogue.ts';
export {
  type CatalogueEntry,
  type CatalogueLine,
  catalogueEntry,
  catalogueList,
} from './properties/catalogue.ts';
export { compareText } from './sheets/compare.ts';
export { type CsvTableName, csvSheet } from './sheets/csv.ts';
export { type Drawing, type DrawingOptions, drawingOf } from './sheets/drawing/drawing.ts';
export type { TitleBlock } from './sheets/drawing/title-block.ts';
export { leversText } from './sheets/levers.ts';
export { markdownSheet } from './sheets/markdown.ts';
export { optimiseText } from './sheets/optimise.ts';
export type { LivePage } from './sheets/page/sheet-page.ts';
export { type Rendered, type Renderer, type RenderOptions, renderers } from './sheets/renderers.ts';
export type { SheetOptions } from './sheets/sheet.ts';
export { textSheet } from './sheets/text.ts';
export { uncertaintyText } from './sheets/uncertainty.ts';
export { type Axis, type AxisFault, readAxis } from './study/axis.ts';
export {
  type CaseOutcome,
  type CaseRunner,
  type CaseRunnerOptions,
  createCaseRunner,
} from './study/case-runner.ts';
export type { Chosen } from './study/chosen.ts';
export type { FigureRow, SettingRow } from './study/compare.ts';
export { type Compared, type Comparison, compare } from './study/compare.ts';
export type { CurveRow } from './study/curve.ts';
export type { FailureCount } from './study/failures.ts';
export { createGrid, type Grid } from './study/grid.ts';
export { keyFigureFormulas } from './study/key-figures.ts';
export type { StartEnd } from './study/optimise.ts';
export { type Optimised, type OptimiseOptions, optimise } from './study/optimise.ts';
export type { SampleTable } from './study/sample-cases.ts';
export type { SamplingMethod } from './study/sampling.ts';
export { createSweeper, type PathTable, type SweepPlan, sweepHeads } from './study/sweep.ts';
export { type SweepOptions, type SweptCase, sweepCases } from './study/sweep-cases.ts';
export type { DrawnSpread, FigureSpread } from './study/uncertainty.ts';
export { type Uncertainty, type UncertaintyOptions, uncertainty } from './study/uncertainty.ts';
export type { LimitReach } from './study/unmet-limits.ts';
export { type Balance, type BalanceOptions, balance } from './tally/balance.ts';
export type { LeversOptions } from './tally/levers.ts';
export { type Lever, type Levers, levers } from './tally/levers.ts';
export { type Plan, planFlowsheet } from './tally/plan.ts';
export type { Sources } from './tally/sources.ts';
export type { Dimension } from './units/dimension.ts';
