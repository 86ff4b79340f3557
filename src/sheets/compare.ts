import { toJson } from '../diagnostics/json.ts';
import { type Comparison, type FigureRow, natural, type SettingRow } from '../study/compare.ts';
import type { SettingValue } from '../study/setting-list.ts';
import { nameInFormulas } from '../tally/figure-leaves.ts';
import {
  type FigureDisplay,
  figureDisplay,
  settingDisplay,
  shownStep,
  shownValue,
} from './figure-display.ts';
import { significant, valueText } from './numbers.ts';
import { plainText, wrapped } from './plain.ts';
import { noPaint, type SheetOptions } from './sheet.ts';
import { aligned, letters } from './table.ts';

const WIDTH = 100;

/** Columns side by side: what differs among the settings first, then what that does to the figures. */
export function compareText(found: Comparison, options: SheetOptions = {}): string {
  const paint = options.paint ?? noPaint;
  const section = (title: string, lines: readonly string[]) =>
    lines.length === 0 ? [] : ['', paint.head(title), ...lines];
  const title = plainText(found.columns[0].flowsheet.title) || 'Untitled flowsheet';
  return [
    paint.head(title),
    '='.repeat(Math.min(WIDTH, [...title].length)),
    ...found.columns.flatMap((_, c) => {
      const head = headOf(found, c);
      const lead = head === plainText(found.columns[c].name) ? '' : `${head}  `;
      const lines = wrapped(columnLine(found, c), WIDTH, lead, '   ');
      return found.columns[c].closed ? lines : lines.map(paint.alarm);
    }),
    ...section('Settings that differ', settingLines(found)),
    ...section(`Figures that differ, held against ${headOf(found, 0)}`, figureLines(found)),
    ...section('Warnings that not all have', warningLines(found)),
    '',
  ].join('\n');
}

/** The comparison as `--json` hands it out. */
export function compareJson(found: Comparison): unknown {
  return {
    columns: found.columns.map(({ name, flowsheet, result, closed, diagnosis }) => ({
      name,
      file: flowsheet.file,
      title: flowsheet.title,
      case: flowsheet.caseName,
      closed,
      passes: result?.convergence.passes ?? null,
      aims_reached: closed && Object.values(result!.aims).every((aim) => aim.reached),
      reason: diagnosis === null ? null : toJson(diagnosis),
    })),
    settings: found.settings.map(({ path, values }) => ({
      path,
      unit: unitOf(values),
      values: values.map((value) =>
        value === null ? null : value.kind === 'text' ? value.text : natural(value.setting),
      ),
    })),
    figures: found.figures.map(({ figure, values, differences, relative }) => ({
      figure: nameInFormulas(figure),
      values,
      differences,
      relative,
    })),
    warnings: found.warnings.map(({ warning, columns }) => ({ ...warning, columns })),
  };
}

/** Figures that are not the same in all columns that closed. */
export function differingFigures({ figures, columns }: Comparison): readonly FigureRow[] {
  return figures.filter(({ values, differences }) =>
    differences.some(
      (d, c) => c > 0 && columns[c].closed && (d !== 0 || d === null) && values[c] !== values[0],
    ),
  );
}

/** How the values of a row are shown. */
export function displayOf(found: Comparison, { figure, moved }: FigureRow): FigureDisplay {
  if (moved !== null) return settingDisplay(moved.setting, moved.unit);
  const units = found.columns.flatMap(({ flowsheet }) => flowsheet.figures.map((f) => [f.name, f.unit]));
  return figureDisplay(figure, Object.fromEntries(units));
}

/** A figure as formulas call it behind `figures.`, an aim with the setting that it moves. */
export function figureName({ figure, moved }: FigureRow): string {
  return plainText(
    moved === null ? nameInFormulas(figure) : `${moved.setting} (${figure.replace('aims.', 'aim ')})`,
  );
}

export function cellText(value: SettingValue | null): string {
  if (value === null) return 'not set';
  return value.kind === 'text' ? plainText(value.text) : valueText(value.setting);
}

/** The natural unit of a row of settings; null for text. */
export function unitOf(values: SettingRow['values']): string | null {
  const number = values.find((value) => value?.kind === 'number');
  return number?.kind === 'number' ? number.setting.unit : null;
}

/** e.g. cold condenser: closed in 12 passes */
export function columnLine({ columns }: Comparison, c: number): string {
  const { name, result, closed, diagnosis } = columns[c];
  if (!closed) return `${plainText(name)}: NOT CLOSED: ${plainText(diagnosis?.what ?? 'no reason is known')}`;
  const passes = result!.convergence.passes;
  const missed = Object.entries(result!.aims).flatMap(([aim, { reached }]) => (reached ? [] : [aim]));
  const aims = missed.length === 0 ? '' : `; NOT REACHED: ${missed.map(plainText).join(', ')}`;
  return `${plainText(name)}: closed in ${passes} ${passes === 1 ? 'pass' : 'passes'}${aims}`;
}

/** Names that are too long for the head of a column become letters, which the lines on top explain. */
function headOf({ columns }: Comparison, c: number): string {
  const long = columns.some(({ name }) => [...plainText(name)].length > LONGEST_HEAD);
  return long ? letters(c) : plainText(columns[c].name);
}

const LONGEST_HEAD = 26;

function settingLines(found: Comparison): string[] {
  if (found.settings.length === 0) return ['  none: all columns are settled alike'];
  return inGroups(
    found,
    ['setting'],
    [[], ...found.columns.slice(1).map((_, k) => [headOf(found, k + 1)])],
    found.settings.map(({ path, values }) => ({
      fixed: [plainText(path), cellText(values[0])],
      cells: values
        .slice(1)
        .map((value, k) => [
          cellText(value) === cellText(values[0]) && sameKind(value, values[0])
            ? 'same'
            : cellText(values[k + 1]),
        ]),
    })),
  );
}

/** Are two settings that read alike the same to the last digit? */
export function sameKind(a: SettingValue | null, b: SettingValue | null): boolean {
  return a?.kind !== 'number' || b?.kind !== 'number' || a.setting.value === b.setting.value;
}

function figureLines(found: Comparison): string[] {
  const rows = differingFigures(found);
  const closed = found.columns.filter((column) => column.closed).length;
  const alike = found.figures.length - rows.length;
  const rest = alike > 0 && closed > 1 ? [`  ${alike} other figures are the same in all that closed`] : [];
  if (rows.length === 0) return closed > 1 ? rest : [];
  const lines = inGroups(
    found,
    ['figure', 'unit'],
    [[], ...found.columns.slice(1).map((_, k) => [headOf(found, k + 1), 'change', '%'])],
    rows.map((row) => {
      const display = displayOf(found, row);
      return {
        fixed: [figureName(row), display.unit, shownValue(row.values[0], display)],
        cells: row.values
          .slice(1)
          .map((value, k) => [
            shownValue(value, display),
            shownStep(row.differences[k + 1], display.factor),
            percentStep(row.relative[k + 1]),
          ]),
      };
    }),
  );
  return [...lines, ...rest];
}

/** A relative difference in per cent, with its sign. */
export function percentStep(relative: number | null): string {
  if (relative === null) return '-';
  return relative === 0 ? '0' : `${relative > 0 ? '+' : ''}${significant(100 * relative, 3)}`;
}

interface GroupedRow {
  /** what every group begins with: name, unit, first column */
  readonly fixed: readonly string[];
  /** the cells of each further column */
  readonly cells: readonly (readonly string[])[];
}

/** Tables of as many columns side by side as the width takes; the first column is repeated in each. */
function inGroups(
  found: Comparison,
  heads: readonly string[],
  columnHeads: readonly (readonly string[])[],
  rows: readonly GroupedRow[],
): string[] {
  const left = heads.map((_, i) => i);
  const tableOf = (columns: readonly number[]) =>
    aligned(
      [
        [...heads, headOf(found, 0), ...columns.flatMap((c) => columnHeads[c])],
        ...rows.map(({ fixed, cells }) => [...fixed, ...columns.flatMap((c) => cells[c - 1])]),
      ],
      { left, indent: 2 },
    );
  const lines: string[] = [];
  let group: number[] = [];
  for (let c = 1; c < found.columns.length; c++) {
    if (group.length > 0 && tableOf([...group, c]).some((line) => [...line].length > WIDTH)) {
      lines.push(...tableOf(group), '');
      group = [];
    }
    group.push(c);
  }
  return [...lines, ...tableOf(group)];
}

function warningLines(found: Comparison): string[] {
  return found.warnings.flatMap(({ warning, columns }) => {
    const who = columns.flatMap((has, c) => (has ? [headOf(found, c)] : [])).join(', ');
    const what = `${plainText(warning.where)}: ${plainText(warning.message)} [${plainText(warning.code)}]`;
    return wrapped(`${who}: ${what}`, WIDTH, '  ', '    ');
  });
}
