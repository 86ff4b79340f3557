import { solveInPlace } from '../convergence/linear-solve.ts';
import type { Correlation } from '../model/spread.ts';
import { correlationOfRanks } from './statistics.ts';

/** The spreads that vary together, directly or by way of others, as lists of their numbers; one alone is a list of one. */
export function groupsOf(
  paths: readonly string[],
  correlations: readonly Correlation[],
): readonly number[][] {
  const groupOf = paths.map((_, d) => d);
  for (const { between, value } of correlations) {
    if (value === 0) continue;
    const [one, other] = between.map((path) => groupOf[paths.indexOf(path)]!);
    for (let d = 0; d < groupOf.length; d++) if (groupOf[d] === other) groupOf[d] = one!;
  }
  const groups = [...new Set(groupOf)];
  return groups.map((group) => groupOf.flatMap((own, d) => (own === group ? [d] : [])));
}

/** What a group of spreads has to do with a figure. */
export interface GroupShare {
  /** correlation of the ranks of each with those of the figure (Spearman), in the order of the group */
  readonly correlations: readonly number[];
  /**
   * Share of the variance of the figure's ranks that the ranks of the group explain, r' R⁻¹ r: of one spread the square of its
   * correlation. Shares of groups that do not vary together add up to that of all of them; squares within a group would count
   * twice what its members have in common. NaN where it cannot be told.
   *
   * @source multiple correlation, as in N. R. Draper & H. Smith, Applied Regression Analysis, 3rd ed., Wiley 1998 (from memory)
   */
  readonly share: number;
}

/** @param columns  ranks of each spread of the group @param figure  ranks of the figure, as many */
export function groupShare(columns: readonly Float64Array[], figure: Float64Array): GroupShare {
  const correlations = columns.map((column) => correlationOfRanks(column, figure));
  const matrix = columns.map((one) =>
    Float64Array.from(columns, (other) => (other === one ? 1 : correlationOfRanks(one, other))),
  );
  const weights = Float64Array.from(correlations);
  const share = solveInPlace(matrix, weights)
    ? correlations.reduce((sum, r, d) => sum + r * weights[d]!, 0)
    : Number.NaN;
  return { correlations, share };
}
