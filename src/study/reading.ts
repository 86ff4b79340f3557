import type { StudyBlank, StudySpec } from '../model/flowsheet.ts';
import type { PathTable } from './sweep.ts';

/** Fills the blanks of a study's sentences from its table, row after row; what is kept does not grow with the table. */
export interface StudyReading {
  add(table: PathTable): void;
  /** the sentences; a blank whose column has no value anywhere is a dash */
  lines(): string[];
}

export interface ReadingColumn {
  readonly name: string;
  readonly unit: string;
  /** a setting that the grid takes through its values, not something recorded */
  readonly swept: boolean;
}

/** @param columns  the settings and recorded expressions, in the order of the table */
export function createReading(note: StudySpec['note'], columns: readonly ReadingColumn[]): StudyReading {
  const width = columns.length;
  const indexOf = (name: string) => columns.findIndex((column) => column.name === name);
  let first: Float64Array | null = null;
  let last: Float64Array | null = null;
  /** the rows where each column is least and most */
  const least = new Array<Float64Array | null>(width).fill(null);
  const most = new Array<Float64Array | null>(width).fill(null);

  /** ends of what each column goes through, cases that do not close among them */
  const low = new Float64Array(width).fill(Number.POSITIVE_INFINITY);
  const high = new Float64Array(width).fill(Number.NEGATIVE_INFINITY);

  function takeEnds(row: Float64Array): void {
    for (let c = 0; c < width; c++) {
      if (row[c]! < low[c]!) low[c] = row[c]!;
      if (row[c]! > high[c]!) high[c] = row[c]!;
    }
  }

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
    const text = `${Number(scaled.toPrecision(3))}${unit === '' ? '' : ` ${unit}`}`;
    const c = indexOf(blank.column);
    if (!blank.which.startsWith('at ') || !columns[c]!.swept) return text;
    // Between two values of the grid nothing was calculated, and beyond its ends nothing is known.
    return value === low[c] || value === high[c] ? `${text} (an end of the range)` : `about ${text}`;
  }

  return {
    add({ cells, rows, converged }) {
      for (let row = 0; row < rows; row++) {
        const values = cells.slice(row * width, (row + 1) * width);
        takeEnds(values);
        if (converged[row] === 1) takeRow(values);
      }
    },
    lines: () =>
      note.map((line) => line.map((piece) => (typeof piece === 'string' ? piece : shown(piece))).join('')),
  };
}
