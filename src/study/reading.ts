import type { StudyBlank, StudySpec } from '../model/flowsheet.ts';
import type { PathTable } from './sweep.ts';

/** Fills the blanks of a study's sentences from its table, row after row; what is kept does not grow with the table. */
export interface StudyReading {
  add(table: PathTable): void;
  /** the sentences; a blank whose column has no value anywhere is a dash */
  lines(): string[];
}

/** @param columns  name and unit of the settings and recorded expressions, in the order of the table */
export function createReading(
  note: StudySpec['note'],
  columns: readonly { readonly name: string; readonly unit: string }[],
): StudyReading {
  const width = columns.length;
  const indexOf = (name: string) => columns.findIndex((column) => column.name === name);
  let first: Float64Array | null = null;
  let last: Float64Array | null = null;
  /** the rows where each column is least and most */
  const least = new Array<Float64Array | null>(width).fill(null);
  const most = new Array<Float64Array | null>(width).fill(null);

  function takeRow(row: Float64Array): void {
    first ??= row.slice();
    last = row;
    for (let c = 0; c < width; c++) {
      const value = row[c]!;
      if (Number.isNaN(value)) continue;
      if (!(least[c] && least[c]![c]! <= value)) least[c] = row.slice();
      if (!(most[c] && most[c]![c]! >= value)) most[c] = row.slice();
    }
  }

  function numberOf({ which, column, of }: StudyBlank): number {
    const c = indexOf(column);
    const at = indexOf(of);
    switch (which) {
      case 'first':
        return first?.[c] ?? Number.NaN;
      case 'last':
        return last?.[c] ?? Number.NaN;
      case 'least':
      case 'at least':
        return least[at]?.[c] ?? Number.NaN;
      case 'most':
      case 'at most':
        return most[at]?.[c] ?? Number.NaN;
      case 'ratio':
        return (last?.[c] ?? Number.NaN) / (first?.[c] ?? Number.NaN);
    }
  }

  function shown(blank: StudyBlank): string {
    const value = numberOf(blank);
    if (!Number.isFinite(value)) return '-';
    const unit = blank.unit || (blank.which === 'ratio' ? '' : columns[indexOf(blank.column)]!.unit);
    const scaled = blank.unit === '%' && columns[indexOf(blank.column)]!.unit !== '%' ? 100 * value : value;
    return `${Number(scaled.toPrecision(3))}${unit === '' ? '' : ` ${unit}`}`;
  }

  return {
    add({ cells, rows, converged }) {
      for (let row = 0; row < rows; row++) {
        if (converged[row] === 1) takeRow(cells.slice(row * width, (row + 1) * width));
      }
    },
    lines: () =>
      note.map((line) => line.map((piece) => (typeof piece === 'string' ? piece : shown(piece))).join('')),
  };
}
