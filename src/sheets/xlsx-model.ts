/** How a cell looks; everything left out is plain. */
export interface Style {
  readonly bold?: boolean;
  readonly italic?: boolean;
  /** points */
  readonly size?: number;
  /** RRGGBB */
  readonly colour?: string;
  readonly fill?: string;
  readonly line?: 'below' | 'above';
  readonly side?: 'right';
  /** a step away from the number before it */
  readonly indent?: boolean;
  readonly wrap?: boolean;
  /** number format as the file has it, e.g. #,##0.00 */
  readonly format?: string;
}

/** One cell: text, which is never read as a formula, or a number, live where it has a formula. */
export type Cell =
  | null
  | { readonly text: string; readonly style?: Style }
  | { readonly value: number; readonly formula?: string; readonly style?: Style };

/** One sheet of a workbook while it is written; rows and columns are counted from 0, addresses as in a spreadsheet. */
export interface Page {
  readonly name: string;
  /** width of each column in characters */
  readonly widths: readonly number[];
  readonly rows: Cell[][];
  /** heights in points of the rows that are not of the usual height */
  readonly heights: Map<number, number>;
  /** rows that run over the whole width */
  readonly merged: number[];
  /** rows and columns that stay in sight and are printed on every page */
  frozenRows: number;
  frozenColumns: number;
}

export interface Book {
  readonly pages: readonly Page[];
  /** defined names and the cell each stands for */
  readonly names: ReadonlyMap<string, string>;
}

/** Write a row; gives its index. */
export function put(page: Page, cells: Cell[]): number {
  page.rows.push(cells);
  return page.rows.length - 1;
}

/** e.g. B7; `fixed` writes $B$7. */
export function address(row: number, column: number, fixed = false): string {
  const mark = fixed ? '$' : '';
  return `${mark}${columnName(column)}${mark}${row + 1}`;
}

/** A to XFD */
export function columnName(column: number): string {
  const last = String.fromCharCode(65 + (column % 26));
  return column < 26 ? last : columnName(Math.floor(column / 26) - 1) + last;
}
