import type { Correlation } from '../model/spread.ts';

/**
 * How independent numbers are made to move together: the lower triangular factor L of the correlation matrix of the normal
 * scores (row by row), or the pair that no such matrix can hold beside the others.
 */
export type CorrelationFactor =
  | { readonly ok: true; readonly factor: Float64Array }
  | { readonly ok: false /** its number in the list */; readonly pair: number };

/**
 * Cholesky factor of the correlations of the normal scores. A correlation is asked for of the ranks; of the normal scores it is
 * 2 sin(π ρ/6) then. The pair that is to blame where the matrix is not positive definite is one of the first spread (in their
 * order) that cannot follow those before it: that with the strongest correlation.
 *
 * @source Gaussian copula: R. L. Iman & W. J. Conover, Commun. Statist. Simul. Comput. 11 (1982) 311 for correlating by normal
 *   scores; K. Pearson (1907) for 2 sin(π ρ/6), as in W. H. Kruskal, J. Am. Statist. Assoc. 53 (1958) 814
 */
export function correlationFactor(
  paths: readonly string[],
  correlations: readonly Correlation[],
): CorrelationFactor {
  const size = paths.length;
  const L = new Float64Array(size * size);
  for (let i = 0; i < size; i++) L[i * size + i] = 1;
  for (const { between, value } of correlations) {
    const [i, j] = between.map((path) => paths.indexOf(path)).sort((a, b) => a - b);
    L[j * size + i] = 2 * Math.sin((Math.PI / 6) * value);
  }
  for (let i = 0; i < size; i++) {
    for (let j = 0; j <= i; j++) {
      let rest = L[i * size + j];
      for (let k = 0; k < j; k++) rest -= L[i * size + k] * L[j * size + k];
      if (j < i) L[i * size + j] = rest / L[j * size + j];
      else if (rest > SINGULAR) L[i * size + i] = Math.sqrt(rest);
      else return { ok: false, pair: strongestOf(paths.slice(0, i + 1), correlations) };
    }
  }
  return { ok: true, factor: L };
}

/** Least variance that must be left to a spread once those before it are known [-]. */
const SINGULAR = 1e-9;

/** The number of the strongest correlation of the last of these paths with one before it. */
function strongestOf(paths: readonly string[], correlations: readonly Correlation[]): number {
  const last = paths.at(-1)!;
  const strength = ({ between, value }: Correlation) =>
    between.includes(last) && between.every((path) => paths.includes(path)) ? Math.abs(value) : -1;
  return correlations.reduce((best, one, n) => (strength(one) > strength(correlations[best]) ? n : best), 0);
}
