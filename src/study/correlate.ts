import { normalDistribution, normalQuantile } from './normal.ts';

/**
 * Make a row of independent numbers between 0 and 1 move together; they stay uniform each by itself.
 *
 * @param factor  of flowsheet/correlation-matrix.ts
 */
export function correlate(row: Float64Array, factor: Float64Array): void {
  const size = row.length;
  for (let i = 0; i < size; i++) row[i] = normalQuantile(row[i]);
  // From the last row up: a row of the factor needs only the scores before it, unchanged.
  for (let i = size - 1; i >= 0; i--) {
    let score = 0;
    for (let k = 0; k <= i; k++) score += factor[i * size + k] * row[k];
    row[i] = normalDistribution(score);
  }
}
