import type { Figures } from '../model/result.ts';

/**
 * Every number among the figures by its dotted name, e.g. `purge.lost_fraction.H2`, `user.hydrogen_slip`; the
 * yield is `overall_yield`. Figures that do not apply are left out.
 */
export function figureLeaves(figures: Figures): Map<string, number> {
  const leaves = new Map<string, number>();
  collect('', figures, leaves);
  const overallYield = leaves.get('overall_yield.value');
  if (overallYield === undefined) return leaves;
  return new Map(
    [...leaves].map(([name, value]) => [name === 'overall_yield.value' ? 'overall_yield' : name, value]),
  );
}

/** The same name as formulas call it behind `figures.`: there the yield has parts, of which one is a number. */
export function nameInFormulas(leaf: string): string {
  return leaf === 'overall_yield' ? 'overall_yield.value' : leaf;
}

function collect(name: string, value: unknown, leaves: Map<string, number>): void {
  if (typeof value === 'number') {
    if (Number.isFinite(value)) leaves.set(name, value);
    return;
  }
  if (typeof value !== 'object' || value === null) return;
  for (const [key, part] of Object.entries(value))
    collect(name === '' ? key : `${name}.${key}`, part, leaves);
}
