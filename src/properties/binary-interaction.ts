import type { Component } from '../model/component.ts';
import { hydrogenAlpha, soaveSlope, squareRootAlpha } from './cubic-alpha.ts';
import { type InteractionRow, interactionRows } from './data/kij.ts';

/** kᵢⱼ(T) of one pair, i < j: value [-], slope [1/K] and curvature [1/K²]; the row it comes from. */
export interface BinaryInteraction {
  readonly i: number;
  readonly j: number;
  readonly row: InteractionRow;
  value(T: number): number;
  slope(T: number): number;
  curvature(T: number): number;
  /** all three, written into place `at` (see AlphaRoot.write) */
  write(T: number, at: number, values: Float64Array, slopes: Float64Array, curvatures: Float64Array): void;
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
  return pairsOf(components, (first, second) => {
    const row = gasRow(equation, first, second);
    return row && { row, ...roundedLine(row) };
  });
}

/**
 * The interaction parameters of `liquid: eos`, for both phases and everywhere in the flowsheet, because one state
 * must have one Gibbs energy: the first row of use `liquid`, else what the gas is computed with.
 *
 * The rows of hydrogen for the Soave-Redlich-Kwong equation were fitted with Soave's temperature function of
 * hydrogen. They are carried over to Graboski and Daubert's with the attraction of the pair left as it was:
 *   1 − k′ = (1 − k) √(α Soave / α Graboski-Daubert).
 */
export function liquidInteractions(
  equation: 'srk' | 'pr',
  components: readonly Component[],
): readonly BinaryInteraction[] {
  return pairsOf(components, (first, second) => {
    const row = liquidRow(equation, first, second);
    if (!row) {
      const gas = gasRow(equation, first, second);
      return gas && { row: gas, ...roundedLine(gas) };
    }
    const hydrogen = equation === 'srk' ? [first, second].find((c) => c.formula === 'H2') : undefined;
    return { row, ...(hydrogen ? carriedOver(roundedLine(row), hydrogen) : roundedLine(row)) };
  });
}

function pairsOf(
  components: readonly Component[],
  find: (first: Component, second: Component) => Omit<BinaryInteraction, 'i' | 'j'> | undefined,
): readonly BinaryInteraction[] {
  const found: BinaryInteraction[] = [];
  for (let i = 0; i < components.length; i++) {
    for (let j = i + 1; j < components.length; j++) {
      const pair = find(components[i], components[j]);
      if (pair) found.push({ i, j, ...pair });
    }
  }
  return found;
}

/** kᵢⱼ(T) and its derivatives. */
type Line = Pick<BinaryInteraction, 'value' | 'slope' | 'curvature' | 'write'>;

function carriedOver(line: Line, hydrogen: Component): Line {
  const { temperatureK, acentricFactor } = hydrogen.critical!;
  const from = squareRootAlpha(temperatureK, soaveSlope(acentricFactor));
  const to = hydrogenAlpha(temperatureK);
  const value = (T: number) => 1 - ((1 - line.value(T)) * from.value(T)) / to.value(T);
  const slope = (T: number) => {
    const ratio = from.value(T) / to.value(T);
    const ratioSlope = (from.slope(T) - ratio * to.slope(T)) / to.value(T);
    return line.slope(T) * ratio - (1 - line.value(T)) * ratioSlope;
  };
  const curvature = (T: number) => {
    const ratio = from.value(T) / to.value(T);
    const ratioSlope = (from.slope(T) - ratio * to.slope(T)) / to.value(T);
    const ratioCurvature =
      (from.curvature(T) - 2 * ratioSlope * to.slope(T) - ratio * to.curvature(T)) / to.value(T);
    return line.curvature(T) * ratio + 2 * line.slope(T) * ratioSlope - (1 - line.value(T)) * ratioCurvature;
  };
  return {
    value,
    slope,
    curvature,
    write(T, at, values, slopes, curvatures) {
      values[at] = value(T);
      slopes[at] = slope(T);
      curvatures[at] = curvature(T);
    },
  };
}

/** Whether a component is one of the gases whose light molecules call for constants of their own. */
export function isQuantumGas(component: Component): boolean {
  return component.formula === 'H2' || component.formula === 'He';
}

function liquidRow(equation: 'srk' | 'pr', first: Component, second: Component): InteractionRow | undefined {
  return rowsOf(equation, first, second).find((row) => row.use === 'liquid');
}

function rowsOf(equation: 'srk' | 'pr', first: Component, second: Component): readonly InteractionRow[] {
  if (first.custom || second.custom || first.id === 'He' || second.id === 'He') return [];
  return interactionRows.filter(
    (row) =>
      row.equation === equation &&
      ((row.first === first.id && row.second === second.id) ||
        (row.first === second.id && row.second === first.id)),
  );
}

function gasRow(equation: 'srk' | 'pr', first: Component, second: Component): InteractionRow | undefined {
  if (equation === 'srk' && (isQuantumGas(first) || isQuantumGas(second))) return undefined;
  const rows = rowsOf(equation, first, second);
  return rows.find((row) => row.use === 'gas') ?? rows.find((row) => row.use === 'vle');
}

/**
 * k = k0 + k1 (T' − 298.15), where T' is T held within the fitted range [fromK, toK], because a line fitted at
 * 200–400 K runs wild at 700 K. The corners are rounded over ROUNDING_K = r,
 *   T' = fromK + r ln((1 + exp((T − fromK)/r)) / (1 + exp((T − toK)/r))),
 * since a corner in k would be a jump in the enthalpy.
 */
function roundedLine(row: InteractionRow): Line {
  const { k0, k1PerK, fromK, toK } = row;
  if (k1PerK === 0) return constantLine(k0);
  return {
    value: (T) => k0 + k1PerK * (heldWithin(T, fromK, toK) - 298.15),
    slope: (T) => k1PerK * (logistic((T - fromK) / ROUNDING_K) - logistic((T - toK) / ROUNDING_K)),
    curvature: (T) => (k1PerK / ROUNDING_K) * (bend((T - fromK) / ROUNDING_K) - bend((T - toK) / ROUNDING_K)),
    write(T, at, values, slopes, curvatures) {
      const low = (T - fromK) / ROUNDING_K;
      const high = (T - toK) / ROUNDING_K;
      // softplus and logistic share their exponential
      const eLow = Math.exp(-Math.abs(low));
      const eHigh = Math.exp(-Math.abs(high));
      const held = Math.max(low, 0) - Math.max(high, 0) + Math.log((1 + eLow) / (1 + eHigh));
      values[at] = k0 + k1PerK * (fromK + ROUNDING_K * held - 298.15);
      slopes[at] = k1PerK * ((low > 0 ? 1 : eLow) / (1 + eLow) - (high > 0 ? 1 : eHigh) / (1 + eHigh));
      curvatures[at] = (k1PerK / ROUNDING_K) * (eLow / (1 + eLow) ** 2 - eHigh / (1 + eHigh) ** 2);
    },
  };
}

function constantLine(k0: number): Line {
  return {
    value: () => k0,
    slope: () => 0,
    curvature: () => 0,
    write(_T, at, values, slopes, curvatures) {
      values[at] = k0;
      slopes[at] = 0;
      curvatures[at] = 0;
    },
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

/** Slope of the logistic function. */
function bend(z: number): number {
  const e = Math.exp(-Math.abs(z));
  return e / (1 + e) ** 2;
}
