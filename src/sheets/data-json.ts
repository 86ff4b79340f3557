import type { PublishedConstant } from '../chemistry/published-constants.ts';
import { formatTerms } from '../chemistry/reaction-format.ts';
import type { CatalogueEntry, CatalogueLine } from '../properties/catalogue.ts';

/** The list of `looptally data --json`, units in the key names. */
export function dataListJson(
  components: readonly CatalogueLine[],
  constants: readonly PublishedConstant[],
): unknown {
  return {
    components: components.map(({ id, name, formula, cas, molarMassGPerMol, boilingK, criticalK, note }) => ({
      id,
      name,
      formula,
      cas,
      molar_mass_g_mol: molarMassGPerMol,
      boiling_K: boilingK,
      critical_K: criticalK,
      note,
    })),
    constants: constants.map(constantJson),
  };
}

/** One component of `looptally data NAME --json`. */
export function dataEntryJson(entry: CatalogueEntry): unknown {
  return {
    ...entry,
    rows: entry.rows.map(({ range, ...row }) => ({ ...row, range: rangeJson(range) })),
  };
}

/** One published equilibrium constant. */
export function constantJson(constant: PublishedConstant): unknown {
  const { name, stoichiometry, standardPressurePa, range, source, note } = constant;
  return {
    name,
    equation: formatTerms(stoichiometry),
    standard_pressure_bar: standardPressurePa / 1e5,
    range: rangeJson(range),
    source,
    note,
  };
}

function rangeJson(range: { readonly fromK: number; readonly toK: number } | null): unknown {
  return range === null ? null : { from_K: range.fromK, to_K: range.toK };
}
