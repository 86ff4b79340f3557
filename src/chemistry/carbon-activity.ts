import type { Component } from '../model/component.ts';
import { builtInComponent } from '../properties/components.ts';
import { R_NASA, STANDARD_PRESSURE_PA } from '../properties/constants.ts';
import type { GasModel } from '../properties/gas-model.ts';
import type { EnthalpyBasis } from '../properties/ideal-gas.ts';
import { createIdealGas } from '../properties/ideal-gas.ts';

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
    for (let i = 0; i < size; i++) if (!components[i]!.solid) total += amounts[i]!;
    for (let i = 0; i < size; i++) y[i] = components[i]!.solid || total <= 0 ? 0 : amounts[i]! / total;
    if (total > 0) gas.lnPhi(T, P, y, lnPhi);
    idealGas.enthalpies(T, h);
    idealGas.entropies(T, s);
    const lnPressure = Math.log(P / STANDARD_PRESSURE_PA);
    const activity = (terms: readonly Term[] | null): number | null => {
      if (terms === null) return null;
      let ln = gibbs(size);
      for (const { index, nu } of terms) {
        if (!(y[index]! > 0)) return null;
        ln += nu * (gibbs(index) - Math.log(y[index]!) - lnPhi[index]! - lnPressure);
      }
      return Math.exp(ln);
    };
    /** −G°/(R T) */
    const gibbs = (i: number): number => (s[i]! - h[i]! / T) / R_NASA;
    const found = {
      boudouard: activity(boudouard),
      methaneCracking: activity(methaneCracking),
      coReduction: activity(coReduction),
    };
    const known = Object.values(found).filter((a) => a !== null);
    return { ...found, largest: known.length > 0 ? Math.max(...known) : null };
  };
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
