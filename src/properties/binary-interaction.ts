import type { Component } from '../model/component.ts';
import { type InteractionRow, interactionRows } from './data/kij.ts';

/** kᵢⱼ(T) of one pair, i < j: value [-] and slope [1/K]; the row it comes from. */
export interface BinaryInteraction {
  readonly i: number;
  readonly j: number;
  readonly row: InteractionRow;
  value(T: number): number;
  slope(T: number): number;
}

/** [K] over which a line in temperature goes over into its constant end */
const ROUNDING_K = 10;

/**
 * The interaction parameters of a list of components that the gas is computed with, everywhere in a
 * flowsheet alike: the first row of use `gas`, else the first of use `vle`; rows of use `liquid` were fitted
 * to gas solubilities in a liquid and never enter. A pair without a row has 0.
 *
 * With the Soave-Redlich-Kwong equation the pairs of hydrogen and helium stay 0: their rows were fitted with
 * other temperature functions than the ones used here, and hydrogen's was published for kᵢⱼ = 0.
 */
export function gasInteractions(
  equation: 'srk' | 'pr',
  components: readonly Component[],
): readonly BinaryInteraction[] {
  const found: BinaryInteraction[] = [];
  for (let i = 0; i < components.length; i++) {
    for (let j = i + 1; j < components.length; j++) {
      const row = gasRow(equation, components[i]!, components[j]!);
      if (row) found.push({ i, j, row, ...roundedLine(row) });
    }
  }
  return found;
}

/** Whether a component is one of the gases whose light molecules call for constants of their own. */
export function isQuantumGas(component: Component): boolean {
  return component.formula === 'H2' || component.formula === 'He';
}

function gasRow(equation: 'srk' | 'pr', first: Component, second: Component): InteractionRow | undefined {
  if (first.custom || second.custom) return undefined;
  if (equation === 'srk' && (isQuantumGas(first) || isQuantumGas(second))) return undefined;
  if (first.id === 'He' || second.id === 'He') return undefined;
  const rows = interactionRows.filter(
    (row) =>
      row.equation === equation &&
      ((row.first === first.id && row.second === second.id) ||
        (row.first === second.id && row.second === first.id)),
  );
  return rows.find((row) => row.use === 'gas') ?? rows.find((row) => row.use === 'vle');
}

/**
 * k = k0 + k1 (T' − 298.15), where T' is T held within the fitted range [fromK, toK], because a line fitted at
 * 200–400 K runs wild at 700 K. The corners are rounded over ROUNDING_K = r,
 *   T' = fromK + r ln((1 + exp((T − fromK)/r)) / (1 + exp((T − toK)/r))),
 * since a corner in k would be a jump in the enthalpy.
 */
function roundedLine(row: InteractionRow): { value(T: number): number; slope(T: number): number } {
  const { k0, k1PerK, fromK, toK } = row;
  if (k1PerK === 0) return { value: () => k0, slope: () => 0 };
  return {
    value: (T) => k0 + k1PerK * (heldWithin(T, fromK, toK) - 298.15),
    slope: (T) => k1PerK * (logistic((T - fromK) / ROUNDING_K) - logistic((T - toK) / ROUNDING_K)),
  };
}

function heldWithin(T: number, fromK: number, toK: number): number {
  return fromK + ROUNDING_K * (softplus((T - fromK) / ROUNDING_K) - softplus((T - toK) / ROUNDING_K));
}

function softplus(z: number): number {
  return Math.max(z, 0) + Math.log1p(Math.exp(-Math.abs(z)));
}

function logistic(z: number): number {
  return 1 / (1 + Math.exp(-z));
}
