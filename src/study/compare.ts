import { type Diagnostic, InputError } from '../diagnostics/diagnostic.ts';
import type { NumericSetting } from '../flowsheet/numeric-settings.ts';
import type { Flowsheet } from '../model/flowsheet.ts';
import type { Result, Warning } from '../model/result.ts';
import { type BalanceOptions, balance } from '../tally/balance.ts';
import { figureLeaves } from '../tally/figure-leaves.ts';
import { type SettingValue, settingList } from './setting-list.ts';

/** One column of a comparison: a flowsheet closed, or the reason why it is not. */
export interface Compared {
  /** what the column is called, e.g. the case */
  readonly name: string;
  readonly flowsheet: Flowsheet;
  /** null where a check before closing refused it */
  readonly result: Result | null;
  readonly closed: boolean;
  /** why it did not close, or which aim was not reached; null where all went well */
  readonly diagnosis: Diagnostic | null;
}

/** A setting that is not the same in all columns; null where a column leaves it to its default or has no such part. */
export interface SettingRow {
  readonly path: string;
  readonly values: readonly (SettingValue | null)[];
}

/** A figure in every column; null where it does not apply or the column did not close. */
export interface FigureRow {
  /** dotted name as in the result; aims as `aims.NAME` */
  readonly figure: string;
  readonly values: readonly (number | null)[];
  /** column minus first column, in the unit of the figure; null for the first column */
  readonly differences: readonly (number | null)[];
  /** the same over the size of the first column's value; null where that is zero */
  readonly relative: readonly (number | null)[];
  /** of an aim: the setting that it moves and the SI unit of the value */
  readonly moved: { readonly setting: string; readonly unit: string } | null;
}

/** Columns side by side, the first being what the others are held against. */
export interface Comparison {
  readonly columns: readonly Compared[];
  readonly settings: readonly SettingRow[];
  readonly figures: readonly FigureRow[];
  /** warnings that not all closed columns have, with the columns that have them */
  readonly warnings: readonly { readonly warning: Warning; readonly columns: readonly boolean[] }[];
}

/** Differences below this share of the value are what closing leaves open, and count as none. */
export const SAME = 1e-8;

/** Close every flowsheet and set the results side by side. The first is what the others are held against. */
export function compare(
  members: readonly { readonly name: string; readonly flowsheet: Flowsheet }[],
  options: BalanceOptions = {},
): Comparison {
  const columns = members.map(({ name, flowsheet }): Compared => {
    try {
      const { result, diagnosis } = balance(flowsheet, { ...options, curves: false });
      return { name, flowsheet, result, closed: result.convergence.converged, diagnosis };
    } catch (error) {
      // One case that cannot be closed must not take the others with it.
      if (!(error instanceof InputError)) throw error;
      return { name, flowsheet, result: null, closed: false, diagnosis: error.diagnostics[0]! };
    }
  });
  return {
    columns,
    settings: settingRows(members.map(({ flowsheet }) => settingList(flowsheet))),
    figures: figureRows(columns),
    warnings: warningRows(columns),
  };
}

function settingRows(lists: readonly Map<string, SettingValue>[]): SettingRow[] {
  const rows = unionOfKeys(lists)
    .map((path) => ({ path, values: lists.map((list) => list.get(path) ?? null) }))
    .filter(({ values }) => values.some((value) => !isSame(value, values[0]!)))
    .filter((row, _, rows) => !onlySaysThatABlockIsThere(row, rows));
  const unmatched = rows.filter(isUnmatchedStream);
  return rows.flatMap((row) => {
    if (!unmatched.includes(row)) return [row];
    return row === unmatched[0] ? [countOfStreams(lists)] : [];
  });
}

/** A stream whose tag not all columns have: mostly one that was numbered otherwise, which one line is enough for. */
function isUnmatchedStream({ path, values }: SettingRow): boolean {
  return path.startsWith(STREAM) && values.includes(null);
}

/** How many streams each column has, and how many of them the first has not and the other way about. */
function countOfStreams(lists: readonly Map<string, SettingValue>[]): SettingRow {
  const [first, ...others] = lists.map((list) => [...list.keys()].filter((path) => path.startsWith(STREAM)));
  const texts = others.map((tags) => {
    const more = tags.filter((tag) => !first.includes(tag)).length;
    const fewer = first.filter((tag) => !tags.includes(tag)).length;
    return more + fewer === 0 ? `${tags.length}` : `${tags.length}: ${more} new, ${fewer} gone`;
  });
  return {
    path: 'streams (by tag)',
    values: [`${first.length}`, ...texts].map((text): SettingValue => ({ kind: 'text', text })),
  };
}

const STREAM = 'streams.';

/** The kind of a block that not all files have says no more than its settings do, where it has any. */
function onlySaysThatABlockIsThere({ path, values }: SettingRow, rows: readonly SettingRow[]): boolean {
  if (!path.endsWith(KIND) || !values.includes(null)) return false;
  const block = path.slice(0, -KIND.length);
  return rows.some((other) => other.path !== path && other.path.startsWith(`${block}.`));
}

const KIND = '.kind';

function isSame(a: SettingValue | null, b: SettingValue | null): boolean {
  if (a === null || b === null) return a === b;
  if (a.kind === 'text') return b.kind === 'text' && a.text === b.text;
  if (b.kind === 'text') return false;
  // Parts of a composition count by their share: 74.2 of 100 is 0.742 of 1, and a part left alone is no cause.
  return (
    a.setting.dimension === b.setting.dimension &&
    (a.setting.value === b.setting.value || Math.abs(natural(a.setting) - natural(b.setting)) < 1e-12)
  );
}

/** A setting in its natural unit. */
export function natural({ value, unitSI }: NumericSetting): number {
  return value / unitSI;
}

function figureRows(columns: readonly Compared[]): FigureRow[] {
  const leaves = columns.map(({ result, closed }) =>
    result === null || !closed ? new Map<string, number>() : allFigures(result),
  );
  return unionOfKeys(leaves).map((figure) => {
    const values = leaves.map((list) => list.get(figure) ?? null);
    const [first] = values as [number | null];
    const differences = values.map((value, c) => (c === 0 ? null : difference(value, first)));
    const relative = differences.map((d) => (d === null || !first ? null : d / Math.abs(first)));
    return { figure, values, differences, relative, moved: movedBy(figure, columns) };
  });
}

function allFigures(result: Result): Map<string, number> {
  const aims = Object.entries(result.aims).map(([name, { value }]) => [`${AIM}${name}`, value] as const);
  return new Map([...figureLeaves(result.figures), ...aims]);
}

const AIM = 'aims.';

function movedBy(figure: string, columns: readonly Compared[]): FigureRow['moved'] {
  if (!figure.startsWith(AIM)) return null;
  const name = figure.slice(AIM.length);
  const aim = columns.map(({ result }) => result?.aims[name]).find((one) => one !== undefined)!;
  return { setting: aim.setting, unit: aim.unit };
}

function difference(value: number | null, first: number | null): number | null {
  if (value === null || first === null) return null;
  const d = value - first;
  return Math.abs(d) <= SAME * Math.max(Math.abs(value), Math.abs(first)) ? 0 : d;
}

function warningRows(columns: readonly Compared[]): Comparison['warnings'] {
  const all = new Map<string, Warning>();
  const lists = columns.map(({ result, closed }) => {
    const warnings = closed ? result!.warnings : [];
    for (const warning of warnings) all.set(keyOf(warning), all.get(keyOf(warning)) ?? warning);
    return new Set(warnings.map(keyOf));
  });
  return [...all]
    .map(([key, warning]) => ({ warning, columns: lists.map((list) => list.has(key)) }))
    .filter((row) => row.columns.some((has, c) => !has && columns[c].closed));
}

/** The message holds numbers that change from case to case; code and place tell whether it is the same warning. */
function keyOf({ code, where }: Warning): string {
  return `${code} ${where}`;
}

/** Keys of all maps in an order that keeps that of each, as far as they agree. */
function unionOfKeys(maps: readonly ReadonlyMap<string, unknown>[]): string[] {
  const order: string[] = [];
  const known = new Set<string>();
  for (const map of maps) {
    let at = 0;
    for (const key of map.keys()) {
      if (known.has(key)) at = order.indexOf(key) + 1;
      else {
        known.add(key);
        order.splice(at++, 0, key);
      }
    }
  }
  return order;
}
