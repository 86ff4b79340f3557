/** Cells row by row, heads included; every row as long as the first. */
export type Rows = readonly (readonly string[])[];

export interface TableOptions {
  /** columns that stand to the left; all others stand to the right */
  readonly left?: readonly number[];
  /** blanks between two columns */
  readonly gap?: number;
  /** blanks before the first column */
  readonly indent?: number;
}

/** A table as aligned lines without trailing blanks. */
export function aligned(rows: Rows, options: TableOptions = {}): string[] {
  const { left = [0], gap = 2, indent = 0 } = options;
  const widths = columnWidths(rows);
  return rows.map((row) =>
    (
      ' '.repeat(indent) +
      row
        .map((cell, column) => {
          const blanks = ' '.repeat(widths[column]! - length(cell));
          return left.includes(column) ? cell + blanks : blanks + cell;
        })
        .join(' '.repeat(gap))
    ).trimEnd(),
  );
}

/**
 * Column numbers in groups whose tables fit a width: the first `fixedColumns` columns are repeated in every
 * group, and a group holds at least one other column.
 */
export function columnGroups(rows: Rows, width: number, fixedColumns = 1, gap = 2): number[][] {
  const widths = columnWidths(rows);
  const head = Array.from({ length: fixedColumns }, (_, column) => column);
  const headWidth = head.reduce((sum, column) => sum + widths[column]! + gap, -gap);
  const groups: number[][] = [];
  let group: number[] = [];
  let used = headWidth;
  for (let column = fixedColumns; column < widths.length; column++) {
    if (group.length > 0 && used + gap + widths[column]! > width) {
      groups.push([...head, ...group]);
      group = [];
      used = headWidth;
    }
    group.push(column);
    used += gap + widths[column]!;
  }
  if (group.length > 0) groups.push([...head, ...group]);
  return groups;
}

/** Short heads of columns: A to Z, then AA, AB, ... */
export function letters(c: number): string {
  return (c < 26 ? '' : letters(Math.floor(c / 26) - 1)) + String.fromCharCode(65 + (c % 26));
}

/** Some columns of a table, in the order asked for. */
export function pickColumns(rows: Rows, columns: readonly number[]): string[][] {
  return rows.map((row) => columns.map((column) => row[column] ?? ''));
}

function columnWidths(rows: Rows): number[] {
  const widths: number[] = [];
  for (const row of rows) {
    row.forEach((cell, column) => {
      widths[column] = Math.max(widths[column] ?? 0, length(cell));
    });
  }
  return widths;
}

function length(text: string): number {
  return [...text].length;
}
