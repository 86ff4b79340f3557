import type { Component } from '../model/component.ts';
import { builtInComponent } from '../properties/components.ts';
import { R_NASA, STANDARD_PRESSURE_PA } from '../properties/constants.ts';
import type { GasModel } from '../properties/gas-model.ts';
import type { EnthalpyBasis } from '../properties/ideal-gas.ts';
import { createIdealGas } from '../properties/ideal-gas.ts';

/** Where a trace of hydrogen or of CO2 is all that holds carbon back, its activity passes every bound: kept a number. */
const LARGEST_LN = 700;

/** Activity of carbon against graphite; above 1 carbon can form. Null where the gas lacks a species of it. */
export interface CarbonActivity {
  /** by 2 CO = C + CO2 */
  readonly boudouard: number | null;
  /** by CH4 = C + 2 H2 */
  readonly methaneCracking: number | null;
  /** by CO + H2 = C + H2O */
  readonly coReduction: number | null;
  /** null where all are */
  readonly largest: number | null;
}

/** Carbon activity of a gas at T [K], P [Pa], amounts of the components in any unit (solids do not count). */
export type CarbonActivityOf = (T: number, P: number, amounts: Float64Array) => CarbonActivity;

const routes = {
  boudouard: { CO: -2, CO2: 1 },
  methaneCracking: { CH4: -1, H2: 2 },
  coReduction: { CO: -1, H2: -1, H2O: 1 },
} as const;

/**
 * a_C = K Π f^(-ν) over the gas of a carbon-forming reaction, f = y φ P/(1 bar), K from Gibbs energies with
 * graphite as carbon. At equilibrium of the gas the three agree; before it the largest tells the danger.
 */
export function createCarbonActivity(
  components: readonly Component[],
  gas: GasModel,
  basis: EnthalpyBasis = 'atct',
): CarbonActivityOf {
  const size = components.length;
  const graphite = builtInComponent('C_gr');
  if (graphite === undefined) throw new Error('graphite is missing from the built-in components');
  const idealGas = createIdealGas([...components, graphite], basis);
  const h = new Float64Array(size + 1);
  const s = new Float64Array(size + 1);
  const y = new Float64Array(size);
  const lnPhi = new Float64Array(size);
  const boudouard = termsOf(routes.boudouard, components);
  const methaneCracking = termsOf(routes.methaneCracking, components);
  const coReduction = termsOf(routes.coReduction, components);

  return (T, P, amounts) => {
    let total = 0;
    for (let i = 0; i < size; i++) if (!components[i].solid) total += amounts[i];
    for (let i = 0; i < size; i++) y[i] = components[i].solid || total <= 0 ? 0 : amounts[i] / total;
    if (total > 0) gas.lnPhi(T, P, y, lnPhi);
    idealGas.enthalpies(T, h);
    idealGas.entropies(T, s);
    const lnPressure = Math.log(P / STANDARD_PRESSURE_PA);
    const activity = (terms: readonly Term[] | null): number | null => {
      if (terms === null) return null;
      let ln = gibbs(size);
      for (const { index, nu } of terms) {
        if (!(y[index] > 0)) return null;
        ln += nu * (gibbs(index) - Math.log(y[index]) - lnPhi[index] - lnPressure);
      }
      return Math.exp(Math.min(ln, LARGEST_LN));
    };
    /** −G°/(R T) */
    const gibbs = (i: number): number => (s[i] - h[i] / T) / R_NASA;
    const found = {
      boudouard: activity(boudouard),
      methaneCracking: activity(methaneCracking),
      coReduction: activity(coReduction),
    };
    const known = Object.values(found).filter((a) => a !== null);
    return { ...found, largest: known.length > 0 ? Math.max(...known) : null };
  };
}

/** Temperatures between which a gas of fixed composition is safe from carbon: its activity is below 1. */
export interface CarbonFreeWindow {
  /** the activity falls through 1 here as the gas gets hotter (CO lays carbon down in the cold) [K] */
  readonly aboveK: number | null;
  /** the activity rises through 1 here as the gas gets hotter (CH4 cracks in the heat) [K] */
  readonly belowK: number | null;
}

/** Crossings are looked for between 200 and 1200 degC. */
const COLDEST_K = 473.15;
const HOTTEST_K = 1473.15;
const SEARCH_STEP_K = 25;
const CROSSING_WITHIN_K = 1e-6;

/**
 * Where the largest activity of a gas crosses 1 at unchanged composition. Two routes fall with temperature and
 * one rises, so the gas is below 1 between at most one crossing down and one crossing up.
 *
 * @param P  pressure [Pa] @param amounts  of the components in any unit
 * @returns null for a crossing that does not lie between 200 and 1200 degC
 */
export function carbonFreeWindow(
  activityOf: CarbonActivityOf,
  P: number,
  amounts: Float64Array,
): CarbonFreeWindow {
  const excess = (T: number) => Math.log(activityOf(T, P, amounts).largest ?? Number.NaN);
  let aboveK: number | null = null;
  let belowK: number | null = null;
  let low = COLDEST_K;
  let excessLow = excess(low);
  if (Number.isNaN(excessLow)) return { aboveK, belowK };
  while (low < HOTTEST_K) {
    const high = Math.min(low + SEARCH_STEP_K, HOTTEST_K);
    const excessHigh = excess(high);
    if (excessLow > 0 && excessHigh <= 0) aboveK = crossing(excess, high, low);
    if (excessLow <= 0 && excessHigh > 0) belowK ??= crossing(excess, low, high);
    low = high;
    excessLow = excessHigh;
  }
  return { aboveK, belowK };
}

/** By halving, between a temperature that is safe and one that is not. */
function crossing(excess: (T: number) => number, safeK: number, unsafeK: number): number {
  let safe = safeK;
  let unsafe = unsafeK;
  while (Math.abs(unsafe - safe) > CROSSING_WITHIN_K) {
    const T = 0.5 * (safe + unsafe);
    if (excess(T) > 0) unsafe = T;
    else safe = T;
  }
  return 0.5 * (safe + unsafe);
}

interface Term {
  readonly index: number;
  readonly nu: number;
}

/** The gas species of a route by index; null where the list lacks one. */
function termsOf(route: Readonly<Record<string, number>>, components: readonly Component[]): Term[] | null {
  const terms = Object.entries(route).map(([id, nu]) => ({
    index: components.findIndex((c) => c.id === id),
    nu,
  }));
  return terms.some((t) => t.index < 0) ? null : terms;
}
