import type { NumericSetting } from '../flowsheet/numeric-settings.ts';
import { holdsOn, leadFigure } from '../tally/lever-ranking.ts';
import type { Lever, Levers } from '../tally/levers.ts';
import { sideOf } from '../tally/probe.ts';
import { holdLines, holdsByFigure } from './lever-holds.ts';
import { significant, valueText } from './numbers.ts';
import { plainText, wrapped } from './plain.ts';
import { noPaint, type SheetOptions } from './sheet.ts';
import { aligned, columnGroups, pickColumns } from './table.ts';
import { closingLine } from './text.ts';

const WIDTH = 100;

/** The levers of a closed loop: the table, the same in words, which setting holds the loop most, and the notes. */
export function leversText(found: Levers, options: SheetOptions = {}): string {
  const paint = options.paint ?? noPaint;
  const { result } = found;
  const name = plainText(result.title) || 'Untitled flowsheet';
  const columns = columnsOf(found);
  const section = (title: string, lines: readonly string[]) =>
    lines.length === 0 ? [] : ['', paint.head(title), ...lines];
  return [
    paint.head(name),
    '='.repeat(Math.min(WIDTH, [...name].length)),
    `case: ${result.case === null ? 'as in the file' : plainText(result.case)}`,
    closingLine(result),
    ...section('What one unit more of a setting does, the loop closed again', tableLines(found, columns)),
    ...section('In words', wordLines(found, columns)),
    ...section('What holds the loop most', holdLines(found, WIDTH)),
    ...section('Notes', noteLines(found, columns)),
    '',
  ].join('\n');
}

/**
 * The levers as the result contract hands them out: per natural unit, nested figures by dotted name; `holds` has the
 * settings of every figure by how strongly they hold it.
 */
export function leversJson(found: Levers): unknown {
  const { result, levers, figures } = found;
  return {
    title: result.title,
    case: result.case,
    converged: result.convergence.converged,
    settings: Object.fromEntries(
      levers.map(({ setting, figures: slopes, sides, note }) => [
        setting.path,
        {
          unit: setting.unit,
          value: setting.value / setting.unitSI,
          figures: slopes,
          more: sides?.more ?? null,
          less: sides?.less ?? null,
          note,
        },
      ]),
    ),
    figures,
    holds: holdsByFigure(found),
  };
}

interface Column {
  readonly figure: string;
  /** heads of the table, line by line */
  readonly head: readonly [string, string];
  /** what stands behind the number in a sentence */
  readonly words: string;
  readonly factor: number;
}

/** The figures an engineer asks for first, those of them that the loop has. */
function columnsOf({ result, figures }: Levers): readonly Column[] {
  const reactant = result.figures.overall_yield?.reactant;
  const points = (figure: string, head: string, words: string): Column => ({
    figure,
    head: [head, 'points'],
    words,
    factor: 100,
  });
  const all: Column[] = [
    points('overall_yield', 'yield', 'points of yield'),
    { figure: 'production_t_d', head: ['made', 't/d'], words: 't/d', factor: 1 },
    { figure: 'recycle_ratio', head: ['recycle', 'ratio'], words: 'recycle ratio', factor: 1 },
    ...Object.keys(result.figures.inerts).map((block) =>
      points(
        `inerts.${block}`,
        Object.keys(result.figures.inerts).length === 1 ? 'inerts' : `inerts ${plainText(block)}`,
        'points of inerts',
      ),
    ),
    ...(reactant === undefined
      ? []
      : [points(`purge.lost_fraction.${reactant}`, `${reactant} lost`, `points of ${reactant} lost`)]),
    { figure: 'power_kW.total', head: ['power', 'kW'], words: 'kW power', factor: 1 },
    {
      figure: 'power_kW.refrigeration',
      head: ['refrig.', 'kW'],
      words: 'kW refrigeration',
      factor: 1,
    },
  ];
  return all.filter(({ figure }) => figures[figure]);
}

function tableLines(found: Levers, columns: readonly Column[]): string[] {
  const rows = [
    ['setting', 'now', 'per', ...columns.map(({ head }) => head[0])],
    ['', '', '', ...columns.map(({ head }) => head[1])],
    ...found.levers.map(({ setting, figures }) => [
      plainText(setting.path),
      valueText(setting),
      `1 ${setting.unit === '1' ? 'unit' : setting.unit}`,
      ...columns.map((column) => signed(figures[column.figure], column, found)),
    ]),
  ];
  return columnGroups(rows, WIDTH - 2, 3).flatMap((group, index) => [
    ...(index === 0 ? [] : ['']),
    ...aligned(pickColumns(rows, group), { indent: 2 }),
  ]);
}

/** Each setting moved to the side that raises the lead figure, by a step that reads well. */
function wordLines(found: Levers, columns: readonly Column[]): string[] {
  const lead = leadFigure(found.figures);
  if (lead === null) return [];
  const blocks = Object.keys(found.result.blocks);
  return holdsOn(lead, found.levers, found.figures, blocks).flatMap(({ setting: path }) => {
    const lever = found.levers.find(({ setting }) => setting.path === path)!;
    const side = raisingSide(lever, lead);
    if (side === null) return [];
    return wrapped(`${plainText(path)}, ${moveText(lever, side, columns, found)}`, WIDTH, '  ', '    ');
  });
}

/** e.g. 1 K colder: +0.0515 points of yield, +0.554 t/d */
function moveText(
  { setting, figures, sides }: Lever,
  side: 'more' | 'less',
  columns: readonly Column[],
  found: Levers,
): string {
  const step = readableStep(setting);
  const slopes = sides?.[side] ?? figures;
  const parts = columns.flatMap((column) => {
    const text = signed((slopes[column.figure] ?? 0) * (side === 'more' ? step : -step), column, found);
    return text === '0' ? [] : [`${text} ${column.words}`.replaceAll(' ', '\u00a0')];
  });
  const what = parts.length === 0 ? 'moves none of these' : parts.join(', ');
  return `${stepText(setting, step)} ${sideWord(setting, side)}: ${what}`;
}

function noteLines(found: Levers, columns: readonly Column[]): string[] {
  const { levers, figures, result } = found;
  const notes = [
    ...levers.flatMap((lever) => {
      if (lever.note === null) return [];
      const both = lever.sides === null ? [] : (['more', 'less'] as const);
      const moves = both.map((side) => moveText(lever, side, columns, found));
      return [[`${plainText(lever.setting.path)}: ${lever.note}`, ...moves].join('; ')];
    }),
    ...Object.entries(result.aims).map(
      ([name, { setting }]) =>
        `aim ${plainText(name)}: ${plainText(setting)} stays where the aim put it, the aim is not held`,
    ),
    'slopes at this point: right for small changes, a guide for large ones',
    '1 % of a composition is a hundredth of all its parts, the other parts kept',
    `--json has all ${Object.keys(figures).length} figures`,
  ];
  return notes.flatMap((note) => wrapped(note, WIDTH, '  - ', '    '));
}

/** The side on which the figure rises, or the only one that a setting at its bound has; null where it does nothing. */
function raisingSide({ setting, figures, sides }: Lever, lead: string): 'more' | 'less' | null {
  const only = sideOf(setting);
  if (only !== 'both') return (figures[lead] ?? 0) === 0 ? null : only === 'up' ? 'more' : 'less';
  const more = (sides?.more ?? figures)[lead] ?? 0;
  const less = -((sides?.less ?? figures)[lead] ?? 0);
  if (more <= 0 && less <= 0) return null;
  return more >= less ? 'more' : 'less';
}

/** A power of ten in natural units: 1 K, 1 bar or 1 point, less where that is more than a tenth of the setting. */
function readableStep(setting: NumericSetting): number {
  const tenth = Math.abs(setting.value / setting.unitSI) / 10;
  const power = tenth > 0 ? 10 ** Math.floor(Math.log10(tenth)) : 1;
  return ['K', 'bar', '%'].includes(setting.unit) ? Math.min(power, 1) : power;
}

function stepText({ unit }: NumericSetting, step: number): string {
  const size = Number(step.toPrecision(1));
  if (unit === '%') return `${size} ${size === 1 ? 'point' : 'points'}`;
  return unit === '1' ? `${size}` : `${size} ${unit}`;
}

function sideWord({ dimension }: NumericSetting, side: 'more' | 'less'): string {
  if (dimension === 'temperature') return side === 'more' ? 'hotter' : 'colder';
  if (dimension === 'pressure') return side === 'more' ? 'higher' : 'lower';
  return side;
}

/** With its sign; what changes the figure by no more than rounding is 0. */
function signed(slope: number | undefined, { figure, factor }: Column, { figures }: Levers): string {
  if (slope === undefined) return '-';
  if (Math.abs(slope) <= ROUNDING * Math.abs(figures[figure] ?? 0)) return '0';
  return `${slope > 0 ? '+' : ''}${significant(slope * factor, 3)}`;
}

const ROUNDING = 1e-8;
