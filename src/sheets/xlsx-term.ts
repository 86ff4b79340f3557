import { address, type Cell, type Page, type Style } from './xlsx-model.ts';

/**
 * A number of a workbook together with the formula that gives it: whatever is put together from terms shows at once what
 * the spreadsheet will work out again. The formulas are made of addresses, names and numbers of ours, never of text.
 */
export interface Term {
  readonly formula: string;
  readonly value: number;
  /** true where the formula needs brackets as an operand */
  readonly loose: boolean;
}

export function constant(value: number): Term {
  return { formula: String(value).toUpperCase(), value, loose: value < 0 };
}

/** A cell, to be used in formulas of any sheet. */
export function cellTerm(page: Page, row: number, column: number): Term {
  const cell = page.rows[row]?.[column];
  if (!cell || !('value' in cell)) throw new Error(`${page.name}!${address(row, column)} holds no number`);
  return { formula: `${page.name}!${address(row, column)}`, value: cell.value, loose: false };
}

export function plus(terms: readonly Term[]): Term {
  if (terms.length === 1) return terms[0]!;
  if (terms.length === 0) return constant(0);
  return {
    formula: terms.map(operand).join('+'),
    value: terms.reduce((sum, term) => sum + term.value, 0),
    loose: true,
  };
}

export function minus(a: Term, b: Term): Term {
  return { formula: `${operand(a)}-${operand(b)}`, value: a.value - b.value, loose: true };
}

export function times(a: Term, b: Term): Term {
  return { formula: `${operand(a)}*${operand(b)}`, value: a.value * b.value, loose: true };
}

export function over(a: Term, b: Term): Term {
  return { formula: `${operand(a)}/${operand(b)}`, value: a.value / b.value, loose: true };
}

/** a/b, and 0 where b is not positive: the share of a flow that does not run. */
export function share(a: Term, b: Term): Term {
  return {
    formula: `IF(${b.formula}>0,${operand(a)}/${operand(b)},0)`,
    value: b.value > 0 ? a.value / b.value : 0,
    loose: false,
  };
}

export function size(term: Term): Term {
  return { formula: `ABS(${term.formula})`, value: Math.abs(term.value), loose: false };
}

/** A block of cells in one row or one column of a page. */
export interface Range {
  readonly page: Page;
  readonly from: readonly [row: number, column: number];
  readonly to: readonly [row: number, column: number];
}

/** SUM of a range; cells without a number count as nothing. */
export function total(range: Range): Term {
  return {
    formula: `SUM(${rangeText(range)})`,
    value: valuesOf(range).reduce((sum, value) => sum + value, 0),
    loose: false,
  };
}

/** The sum of the sizes of a range. */
export function totalSize(range: Range): Term {
  return {
    formula: `SUMPRODUCT(ABS(${rangeText(range)}))`,
    value: valuesOf(range).reduce((sum, value) => sum + Math.abs(value), 0),
    loose: false,
  };
}

/** Σ aᵢ bᵢ of two ranges of one length. */
export function product(a: Range, b: Range): Term {
  const weights = valuesOf(b);
  return {
    formula: `SUMPRODUCT(${rangeText(a)},${rangeText(b)})`,
    value: valuesOf(a).reduce((sum, value, k) => sum + value * weights[k]!, 0),
    loose: false,
  };
}

/** The cell that shows a term. */
export function live(term: Term, style: Style = {}): Cell {
  return { value: term.value, formula: term.formula, style };
}

/**
 * The cell of a term that must give a number of the result.
 *
 * @throws Error where it does not, to 1e-9: a sheet that works out another number than the result is a fault of ours
 */
export function agreed(term: Term, expected: number, style: Style = {}): Cell {
  if (!(Math.abs(term.value - expected) <= 1e-9 * (1 + Math.abs(expected))))
    throw new Error(`the formula ${term.formula} gives ${term.value} where the result has ${expected}`);
  return live(term, style);
}

function operand(term: Term): string {
  return term.loose ? `(${term.formula})` : term.formula;
}

function rangeText({ page, from, to }: Range): string {
  return `${page.name}!${address(...from)}:${address(...to)}`;
}

function valuesOf({ page, from, to }: Range): number[] {
  const values: number[] = [];
  for (let row = from[0]; row <= to[0]; row++) {
    for (let column = from[1]; column <= to[1]; column++) {
      const cell = page.rows[row]?.[column];
      values.push(cell && 'value' in cell ? cell.value : 0);
    }
  }
  return values;
}
