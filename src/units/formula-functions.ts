/** A function of a formula, and how many values it takes. */
export interface FormulaFunction {
  readonly apply: (...values: number[]) => number;
  readonly least: number;
  readonly most: number;
}

/** The functions of a formula and how many values they take; log is the natural logarithm, as is ln. */
export const formulaFunctions: ReadonlyMap<string, FormulaFunction> = new Map([
  ['abs', { apply: Math.abs, least: 1, most: 1 }],
  ['min', { apply: Math.min, least: 1, most: 20 }],
  ['max', { apply: Math.max, least: 1, most: 20 }],
  ['sqrt', { apply: Math.sqrt, least: 1, most: 1 }],
  ['exp', { apply: Math.exp, least: 1, most: 1 }],
  ['log', { apply: Math.log, least: 1, most: 1 }],
  ['ln', { apply: Math.log, least: 1, most: 1 }],
  ['log10', { apply: Math.log10, least: 1, most: 1 }],
  ['pow', { apply: Math.pow, least: 2, most: 2 }],
  ['round', { apply: roundTo, least: 1, most: 2 }],
]);

function roundTo(value: number, digits = 0): number {
  const scale = 10 ** Math.round(digits);
  return Math.round(value * scale) / scale;
}
