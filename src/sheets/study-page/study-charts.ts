import { numericSettings } from '../../flowsheet/numeric-settings.ts';
import type { Flowsheet } from '../../model/flowsheet.ts';
import type { Axis } from '../../study/axis.ts';
import { cellOf, limitMargins, type SweptTable } from '../../study/swept-table.ts';
import type { ChartAxis } from '../charts/axis-scale.ts';
import { contourChart } from '../charts/contour-chart.ts';
import { lineChart } from '../charts/line-chart.ts';
import { decimalsOfDigits, pointText } from '../charts/number-text.ts';
import type { LimitLine, Stretch } from '../charts/stretches.ts';
import type { FigureDisplay } from '../figure-display.ts';
import { formulaDisplay } from '../formula-display.ts';

/** A chart and what is to be said of it. */
export interface StudyChart {
  readonly svg: string;
  /** what it shows, as written in the file or on the command line */
  readonly name: string;
  /** '' where the chart says all */
  readonly note: string;
}

/** The charts of a sweep, and what they leave out. */
export interface StudyCharts {
  readonly charts: readonly StudyChart[];
  /** null where the charts show all of the sweep */
  readonly slice: string | null;
}

/** Limits are broken by more than closing leaves open. */
const BROKEN = -1e-9;

/**
 * Curves of everything recorded over the one setting that is swept, contours over two. Of more settings the first two
 * that take several values are drawn, the others held at the middle of their values; `slice` says so.
 *
 * @param prefix  begins the ids of the charts: small letters, digits, hyphens
 */
export function studyCharts(flowsheet: Flowsheet, swept: SweptTable, prefix: string): StudyCharts {
  const drawn = swept.axes.flatMap(({ numbers }, a) => (new Set(numbers).size > 1 ? [a] : [])).slice(0, 2);
  const held = swept.axes.map(({ numbers }) => Math.floor((numbers.length - 1) / 2));
  const margins = limitMargins(flowsheet, swept);
  const [first = 0, second] = drawn;
  const view = { flowsheet, swept, held, margins, prefix };
  return {
    charts: swept.record.map((_, column) =>
      second === undefined ? curveOver(view, column, first) : contoursOver(view, column, first, second),
    ),
    slice: sliceText(swept, drawn, held),
  };
}

interface View {
  readonly flowsheet: Flowsheet;
  readonly swept: SweptTable;
  /** place of the value of each axis that is not drawn */
  readonly held: readonly number[];
  readonly margins: Float64Array | null;
  readonly prefix: string;
}

function curveOver(view: View, column: number, a: number): StudyChart {
  const { flowsheet, swept, held, margins, prefix } = view;
  const axis = swept.axes[a]!;
  const name = swept.record[column]!;
  const { display, title } = figureAxis(flowsheet, name);
  const order = Array.from(axis.numbers.keys()).sort((i, j) => axis.numbers[i]! - axis.numbers[j]!);
  const rows = order.map((i) => rowOf(swept, held.with(a, i)));
  const x = order.map((i) => axis.numbers[i]!);
  const y = rows.map((row) => shown(cellOf(swept, row, column), display));
  const own = (flowsheet.objective?.limits ?? []).filter(({ formula }) => formula.text.trim() === name);
  const here = inFile(flowsheet, axis);
  const limits: LimitLine[] = [
    ...own.map(({ bound, text }) => ({ axis: 'y' as const, value: shown(bound, display), label: text })),
    ...(here === null ? [] : [{ axis: 'x' as const, value: here, label: 'as in the file', light: true }]),
  ];
  const broken =
    margins === null
      ? []
      : brokenStretches(
          x,
          rows.map((row) => margins[row]!),
        );
  const svg = lineChart({
    id: `${prefix}-${column + 1}`,
    title: `${name} over ${axis.path}`,
    x: settingAxis(axis),
    y: title,
    series: [{ name: '', x, y }],
    limits,
    stretches: broken,
  });
  const gaps = rows.filter((row) => swept.converged[row] === 0).length;
  const sentences = [
    ...(gaps === 0 ? [] : [`No value at ${gaps} of ${rows.length} points: the case failed.`]),
    ...(broken.length === 0 ? [] : ['Hatched: a limit of the objective does not hold.']),
  ];
  return { svg, name, note: sentences.join(' ') };
}

/** From half way to the last point where all holds to half way to the next one. */
function brokenStretches(x: readonly number[], margins: readonly number[]): Stretch[] {
  const found: Stretch[] = [];
  const isBroken = (k: number) => margins[k]! < BROKEN;
  for (let k = 0; k < x.length; k++) {
    if (!isBroken(k) || (k > 0 && isBroken(k - 1))) continue;
    let end = k;
    while (end + 1 < x.length && isBroken(end + 1)) end++;
    const from = k === 0 ? x[0]! : crossing(x, margins, k - 1);
    const to = end === x.length - 1 ? x[end]! : crossing(x, margins, end);
    found.push({ from, to, label: '' });
    k = end;
  }
  return found;
}

/** Where the margin goes through zero between two points, in a straight line; half way where one has no value. */
function crossing(x: readonly number[], margins: readonly number[], k: number): number {
  const [a, b] = [margins[k]!, margins[k + 1]!];
  const share = Number.isFinite(a) && Number.isFinite(b) && a !== b ? a / (a - b) : 0.5;
  return x[k]! + Math.min(Math.max(share, 0), 1) * (x[k + 1]! - x[k]!);
}

function contoursOver(view: View, column: number, a: number, b: number): StudyChart {
  const { flowsheet, swept, held, margins, prefix } = view;
  const [up, across] = [swept.axes[a]!, swept.axes[b]!];
  const name = swept.record[column]!;
  const { display, title } = figureAxis(flowsheet, name);
  const rows = Array.from(up.numbers.keys()).flatMap((i) =>
    Array.from(across.numbers.keys(), (j) => rowOf(swept, held.with(a, i).with(b, j))),
  );
  const here = [inFile(flowsheet, across), inFile(flowsheet, up)] as const;
  const isHere = here[0] !== null && here[1] !== null;
  const svg = contourChart({
    id: `${prefix}-${column + 1}`,
    title: `${name} over ${across.path} and ${up.path}`,
    x: { ...settingAxis(across), values: across.numbers },
    y: { ...settingAxis(up), values: up.numbers },
    figure: title,
    values: rows.map((row) => shown(cellOf(swept, row, column), display)),
    feasible: margins === null ? null : rows.map((row) => margins[row]!),
    failed: rows.map((row) => swept.converged[row] === 0),
    marked: isHere ? [{ x: here[0]!, y: here[1]!, label: 'as in the file' }] : [],
  });
  return { svg, name, note: '' };
}

/** Row of the table where each axis stands at a place. */
function rowOf({ axes }: SweptTable, places: readonly number[]): number {
  return places.reduce((row, place, a) => row * axes[a]!.numbers.length + place, 0);
}

function sliceText({ axes }: SweptTable, drawn: readonly number[], held: readonly number[]): string | null {
  const others = axes.flatMap((axis, a) => {
    if (drawn.includes(a) || (drawn.length === 0 && a === 0)) return [];
    const value = `${axis.path} = ${numberText(axis.numbers[held[a]!]!)} ${axis.unit}`.trimEnd();
    return [{ value, several: axis.numbers.length > 1 }];
  });
  if (!others.some(({ several }) => several)) return null;
  const names = drawn.map((a) => axes[a]!.path).join(' and ');
  return `The charts show one slice of the sweep: ${names}, with ${others.map(({ value }) => value).join(' and ')}, the middle of the values taken. All cases are in the table.`;
}

export function numberText(value: number): string {
  return pointText(value, Math.min(9, decimalsOfDigits(value, 5)))
    .replace(/(\.\d*?)0+$/, '$1')
    .replace(/\.$/, '');
}

/** A figure as it is shown: its title and unit, and how its number becomes the one shown. */
export function figureAxis(flowsheet: Flowsheet, name: string): { display: FigureDisplay; title: ChartAxis } {
  const display = formulaDisplay(name, flowsheet);
  return { display, title: { title: name, unit: display.unit } };
}

export function shown(value: number, { factor, offset }: FigureDisplay): number {
  return value * factor + offset;
}

function settingAxis(axis: Axis): ChartAxis {
  return { title: axis.path, unit: axis.unit, log: isLog(axis) };
}

/** Three values or more in equal ratios over a wide range were meant to be: `a..b:n log`. */
function isLog({ numbers }: Axis): boolean {
  if (numbers.length < 3 || !(numbers[0]! > 0)) return false;
  const ratio = numbers[1]! / numbers[0]!;
  const isEven = numbers.every((value, k) => k === 0 || Math.abs(value / numbers[k - 1]! / ratio - 1) < 1e-6);
  return isEven && Math.abs(Math.log(ratio) * (numbers.length - 1)) > Math.LN2;
}

/** The setting of the file in the unit of the axis, where it lies within the sweep; null otherwise. */
function inFile(flowsheet: Flowsheet, { path, numbers, values }: Axis): number | null {
  const setting = numericSettings(flowsheet).find((one) => one.path === path);
  if (setting === undefined) return null;
  const [low, high] = [Math.min(...values), Math.max(...values)];
  if (low === high || setting.value < low || setting.value > high) return null;
  // Units of an axis are linear in SI: two of its points give the scale.
  const k = values.indexOf(low);
  const l = values.indexOf(high);
  const number = numbers[k]! + ((setting.value - low) * (numbers[l]! - numbers[k]!)) / (high - low);
  return Number(number.toPrecision(12));
}
