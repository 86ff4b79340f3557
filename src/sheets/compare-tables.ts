import type { Comparison } from '../study/compare.ts';
import { natural } from '../study/compare.ts';
import { nameInFormulas } from '../tally/figure-leaves.ts';
import { caution } from './cautions.ts';
import { cellText, columnLine, differingFigures, displayOf, figureName, unitOf } from './compare.ts';
import { csvCell, FRACTION } from './csv.ts';
import { shownStep, shownValue } from './figure-display.ts';
import { escaped, list, table } from './markdown.ts';
import { percent } from './numbers.ts';

/** Forms of a written comparison by the extension of the file. */
export const compareRenderers: ReadonlyMap<string, (found: Comparison) => string> = new Map([
  ['.csv', compareCsv],
  ['.md', compareMarkdown],
]);

/**
 * One rectangle: a line per setting that differs and per figure, with value, difference and relative difference of
 * every column, numbers of the result in full. The line `closed` tells which columns hold an answer.
 */
export function compareCsv(found: Comparison): string {
  const { columns, settings, figures } = found;
  const others = columns.slice(1);
  const rows = [
    [
      'row',
      'name',
      'unit',
      ...columns.map(({ name }) => name),
      ...others.map(({ name }) => `${name}: difference`),
      ...others.map(({ name }) => `${name}: relative difference`),
    ],
    ['closed', '', '', ...columns.map(({ closed }) => (closed ? 'yes' : 'no')), ...blanks(2 * others.length)],
    [
      'reason',
      '',
      '',
      ...columns.map(({ diagnosis }) => diagnosis?.what ?? ''),
      ...blanks(2 * others.length),
    ],
    ...settings.map(({ path, values }) => [
      'setting',
      path,
      unitOf(values) ?? '',
      ...values.map((value) =>
        value === null ? '' : value.kind === 'text' ? value.text : natural(value.setting),
      ),
      ...blanks(2 * others.length),
    ]),
    ...figures.map((row) => [
      'figure',
      nameInFormulas(row.figure),
      row.moved === null ? csvUnit(displayOf(found, row).unit) : row.moved.unit,
      ...row.values,
      ...row.differences.slice(1),
      ...row.relative.slice(1),
    ]),
  ];
  return rows.map((row) => `${row.map(csvCell).join(',')}\r\n`).join('');
}

/** Numbers of a CSV file are those of the result, where a fraction is 0 to 1. */
function csvUnit(unit: string): string {
  return unit === '%' ? FRACTION : unit;
}

function blanks(count: number): string[] {
  return Array<string>(count).fill('');
}

/** The comparison as Markdown, in the order of the text. */
export function compareMarkdown(found: Comparison): string {
  const { columns, settings } = found;
  const names = columns.map(({ name }) => name);
  const settingTable = table([
    ['setting', ...names],
    ...settings.map(({ path, values }) => [path, ...values.map(cellText)]),
  ]);
  const figureRows = differingFigures(found).map((row) => {
    const display = displayOf(found, row);
    return [
      figureName(row),
      display.unit,
      shownValue(row.values[0], display),
      ...row.values.slice(1).flatMap((value, k) => {
        const share = row.relative[k + 1];
        const relative = share === null ? '' : ` (${share > 0 ? '+' : ''}${percent(share)})`;
        const step = row.differences[k + 1];
        return [shownValue(value, display), `${shownStep(step, display.factor)}${relative}`];
      }),
    ];
  });
  const head = ['figure', 'unit', names[0], ...names.slice(1).flatMap((name) => [name, 'change'])];
  return [
    `# ${escaped(columns[0].flowsheet.title) || 'Untitled flowsheet'}: comparison`,
    list(columns.map((_, c) => columnLine(found, c))),
    `## Settings that differ\n\n${settings.length === 0 ? 'None.' : settingTable}`,
    `## Figures that differ\n\n${figureRows.length === 0 ? 'None.' : table([head, ...figureRows], 2)}`,
    `---\n\n${caution}`,
  ]
    .join('\n\n')
    .concat('\n');
}
