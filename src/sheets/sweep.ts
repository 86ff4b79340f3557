import type { PathTable } from '../study/sweep.ts';
import { csvCell } from './csv.ts';
import { plainText } from './plain.ts';

/** How a table of a sweep is written as text, piece by piece: no piece needs the others. */
export interface SweepFormat {
  readonly head: (heads: readonly string[]) => string;
  readonly rows: (table: PathTable, heads: readonly string[]) => string;
}

/** Comma-separated, lines ending with CR LF; no value is an empty cell (RFC 4180). */
export const sweepCsv: SweepFormat = {
  head: (heads) => csvLine(heads),
  rows: (table) => {
    const width = table.cells.length / table.rows;
    let text = '';
    for (let row = 0; row < table.rows; row++) {
      // They have no more digits than are to be shown.
      for (let c = row * width; c < (row + 1) * width; c++) {
        const value = table.cells[c]!;
        text += `${Number.isNaN(value) ? '' : value === 0 ? '0' : value},`;
      }
      text += `${closedOf(table, row)},${table.passes[row]!},${csvCell(table.notes[row]!)}\r\n`;
    }
    return text;
  },
};

/** One JSON object a line, its keys the heads of the table; no value is null. */
export const sweepNdjson: SweepFormat = {
  head: () => '',
  rows: (table, heads) => {
    const keys = heads.map((head) => JSON.stringify(head));
    let text = '';
    for (let row = 0; row < table.rows; row++) {
      const cells = jsonCells(table, row);
      text += `{${cells.map((cell, c) => `${keys[c]}:${cell}`).join(',')}}\n`;
    }
    return text;
  },
};

/** The rows of `--json`: arrays in the order of the columns, with a comma between them and a line each. */
export const sweepJsonRows = (table: PathTable): string[] =>
  Array.from({ length: table.rows }, (_, row) => `[${jsonCells(table, row).join(', ')}]`);

function csvLine(cells: readonly (string | number)[]): string {
  return `${cells.map(csvCell).join(',')}\r\n`;
}

export function numbersOf({ cells, rows }: PathTable, row: number): number[] {
  const width = cells.length / rows;
  return Array.from(cells.subarray(row * width, (row + 1) * width));
}

function closedOf({ converged }: PathTable, row: number): string {
  return converged[row] === 1 ? 'true' : 'false';
}

function jsonCells(table: PathTable, row: number): string[] {
  return [
    ...numbersOf(table, row).map((value) => JSON.stringify(value === 0 ? 0 : value)),
    closedOf(table, row),
    String(table.passes[row]),
    JSON.stringify(plainText(table.notes[row]!)),
  ];
}
