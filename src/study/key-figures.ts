import { formulaRoots } from '../flowsheet/formula-scope.ts';
import type { Formula } from '../model/flowsheet.ts';
import type { Figures } from '../model/result.ts';
import { figureLeaves, nameInFormulas } from '../tally/figure-leaves.ts';
import { compileFormula } from '../units/formula.ts';

/** What is recorded where nothing is asked for: the figures an engineer asks for first, and all of the user's own. */
const WANTED: readonly RegExp[] = [
  /^overall_yield$/,
  /^production_t_d$/,
  /^recycle_ratio$/,
  /^inerts\./,
  /^purge\.flow_kmol_h$/,
  /^purge\.lost_fraction\./,
  /^power_kW\.total$/,
  /^specific_power_kWh_t$/,
  /^user\./,
];

/**
 * The key figures that a closed flowsheet has, as formulas: of what the purge loses that of the key reactant, and none that is
 * nothing, as the power of a loop without machines.
 */
export function keyFigureFormulas(figures: Figures): Formula[] {
  const reactant = figures.overall_yield?.reactant ?? null;
  const names = [...figureLeaves(figures)]
    .filter(([name, value]) => value !== 0 || name.startsWith('user.'))
    .map(([name]) => name)
    .filter((name) => !name.startsWith('purge.lost_fraction.') || name === `purge.lost_fraction.${reactant}`);
  return WANTED.flatMap((pattern) => names.filter((name) => pattern.test(name))).map((name) => {
    const text = `figures.${nameInFormulas(name)}`;
    const compiled = compileFormula(text, formulaRoots);
    if (!compiled.ok) throw new Error(`${text}: ${compiled.what}`);
    return { text, evaluate: compiled.evaluate };
  });
}
