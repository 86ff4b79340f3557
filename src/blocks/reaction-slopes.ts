import { type ConversionReaction, conversionSlopes } from '../chemistry/conversion.ts';
import type { EquilibriumSolver } from '../chemistry/equilibrium.ts';
import { type HeldEquilibrium, holdBackSlopes } from '../chemistry/held-equilibria.ts';

/**
 * Derivatives of conversions and the equilibria behind them, at what the solver solved last (ReactionRun.slopes):
 * the conversions are linear in the feed, and the equilibria take what they leave for theirs.
 */
export function createReactionSlopes(
  size: number,
  solver: EquilibriumSolver,
  conversions: readonly ConversionReaction[],
  equilibria: readonly HeldEquilibrium[],
): (T: number, P: number, product: Float64Array) => boolean {
  const columns = size + 2;
  const extents = new Float64Array(equilibria.length * columns);
  const converted = new Float64Array(size * size);
  const conversionExtents = new Float64Array(conversions.length * size);
  const row = new Float64Array(size);

  /** Takes the place of the columns of the equilibria's feed by those of the feed of all. */
  function chain(product: Float64Array): void {
    conversionSlopes(conversions, size, converted, conversionExtents);
    for (let i = 0; i < size; i++) {
      const at = i * columns;
      row.set(product.subarray(at, at + size));
      for (let j = 0; j < size; j++) {
        let sum = 0;
        for (let k = 0; k < size; k++) sum += row[k] * converted[k * size + j];
        product[at + j] = sum;
      }
    }
  }

  return (T, P, product) => {
    if (equilibria.length > 0) {
      if (!solver.slopes(T, P, product, extents)) return false;
      holdBackSlopes(equilibria, columns, product, extents);
    } else {
      product.fill(0);
      for (let i = 0; i < size; i++) product[i * columns + i] = 1;
    }
    if (conversions.length > 0) chain(product);
    return true;
  };
}
