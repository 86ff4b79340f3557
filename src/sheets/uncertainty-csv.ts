import type { Uncertainty } from '../study/uncertainty.ts';
import { csvCell } from './csv.ts';
import { settingColumn } from './written-unit.ts';

/**
 * Every case as one line: number, what was drawn in the units of the file, what was recorded, and how closing went. The cases behind
 * the samples asked for are those of the Sobol indices.
 */
export function uncertaintyCsv({ spreads, figures, table }: Uncertainty): string {
  const columns = spreads.map(({ setting, spread }) => settingColumn(setting, spread.written));
  const heads = [
    'sample',
    ...columns.map(({ head }) => head),
    ...figures.map(({ expression }) => expression),
    'converged',
    'passes',
    'note',
  ];
  const lines = [heads.map(csvCell).join(',')];
  for (let row = 0; row < table.rows; row++) {
    lines.push(
      [
        row + 1,
        ...columns.map(({ number }, d) => number(table.drawn[row * spreads.length + d])),
        ...figures.map((_, r) => table.found[row * figures.length + r]),
        table.converged[row] === 1 ? 'true' : 'false',
        table.passes[row],
        table.notes[row],
      ]
        .map(csvCell)
        .join(','),
    );
  }
  return `${lines.join('\r\n')}\r\n`;
}
