import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { Component } from '../model/component.ts';

/** An equilibrium that the catalyst does not quite reach. */
export interface HeldEquilibrium {
  readonly name: string;
  /** in component order, products positive */
  readonly coefficients: Float64Array;
  /** share of the equilibrium extent that is run, 0–1 */
  readonly fraction: number;
}

/** Shortfall taken for rounding, as a share of what was taken back. */
const rounding = 1e-12;

/**
 * Take back what reactions do not run of their way to equilibrium:
 *   ξ_r = fraction_r × ξ_r,eq,  n_i = n_i,eq − Σ_r ν_ir (1 − fraction_r) ξ_r,eq
 * Of several equilibria each runs its own fraction of its extent at the equilibrium of all of them.
 *
 * @param amounts  at equilibrium; rewritten
 * @param extents  at equilibrium, one per reaction; rewritten
 * @throws PassTrouble `reactant-used-up` where unequal fractions leave less than nothing of a component
 */
export function holdBackEquilibria(
  reactions: readonly HeldEquilibrium[],
  components: readonly Component[],
  amounts: Float64Array,
  extents: Float64Array,
): void {
  let moved = 0;
  for (let r = 0; r < reactions.length; r++) {
    const { coefficients, fraction } = reactions[r];
    if (fraction === 1) continue;
    const back = (1 - fraction) * extents[r];
    extents[r] = fraction * extents[r];
    for (let i = 0; i < amounts.length; i++) {
      const change = coefficients[i] * back;
      amounts[i] = amounts[i] - change;
      moved = Math.max(moved, Math.abs(change));
    }
  }
  if (moved === 0) return;
  for (let i = 0; i < amounts.length; i++) {
    if (amounts[i] >= 0) continue;
    if (amounts[i] < -rounding * moved) throw lessThanNothing(reactions, components[i].id, i);
    amounts[i] = 0;
  }
}

/**
 * The same of derivatives: of the amounts and extents at equilibrium, one row of `columns` for each.
 * @param amounts  rewritten
 */
export function holdBackSlopes(
  reactions: readonly HeldEquilibrium[],
  columns: number,
  amounts: Float64Array,
  extents: Float64Array,
): void {
  for (let r = 0; r < reactions.length; r++) {
    const { coefficients, fraction } = reactions[r];
    if (fraction === 1) continue;
    for (let i = 0; i < coefficients.length; i++) {
      const share = coefficients[i] * (1 - fraction);
      if (share === 0) continue;
      for (let k = 0; k < columns; k++) amounts[i * columns + k] -= share * extents[r * columns + k];
    }
  }
}

function lessThanNothing(reactions: readonly HeldEquilibrium[], id: string, i: number): PassTrouble {
  const names = reactions.filter((one) => one.coefficients[i] !== 0).map((one) => one.name);
  return new PassTrouble(
    'reactant-used-up',
    `The fractions of equilibrium of ${names.join(', ')} leave less than nothing of ${id}.`,
    `one of them takes ${id} that another, held back, has not made`,
    `give the reactions in which ${id} takes part the same fraction_of_equilibrium`,
  );
}
