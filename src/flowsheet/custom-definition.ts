import type { z } from 'zod';
import type { CustomDefinition } from '../properties/custom-component.ts';
import type { customSchema } from './schema-components.ts';

type Entry = z.infer<typeof customSchema>;
type Outcome =
  | { readonly definition: CustomDefinition }
  /** keys that must be given together with others, and why */
  | { readonly lacks: string; readonly why: string };

/** The definition of a component from its entry in the file, or what it lacks. */
export function customDefinition(entry: Entry): Outcome {
  const critical = [entry.critical_temperature, entry.critical_pressure, entry.acentric_factor];
  const some = critical.some((value) => value !== undefined);
  if (
    entry.nasa === undefined &&
    (entry.formation_enthalpy === undefined || entry.heat_capacity === undefined)
  ) {
    const why = 'its enthalpy cannot be computed without them';
    return { lacks: 'nasa, or formation_enthalpy, entropy and heat_capacity', why };
  }
  if (some && critical.includes(undefined)) {
    const why = 'an equation of state needs all three of them';
    return { lacks: 'critical_temperature, critical_pressure and acentric_factor (all three)', why };
  }
  const [temperatureK, pressurePa, acentricFactor] = critical;
  return {
    definition: {
      formula: entry.formula,
      source: entry.source,
      name: entry.name,
      cas: entry.cas,
      solid: entry.solid,
      formationEnthalpyJPerMol: entry.formation_enthalpy,
      entropyJPerMolK: entry.entropy,
      heatCapacity: entry.heat_capacity,
      heatCapacityRange: range(entry.heat_capacity_range),
      nasa9: entry.nasa?.map(({ from, to, a, b1, b2 }) => {
        const [a1, a2, a3, a4, a5, a6, a7] = a;
        return { fromK: from, toK: to, a: [a1, a2, a3, a4, a5, a6, a7] as const, b1, b2 };
      }),
      critical:
        temperatureK !== undefined && pressurePa !== undefined && acentricFactor !== undefined
          ? { temperatureK, pressurePa, acentricFactor }
          : undefined,
      boilingK: entry.boiling_temperature,
      antoine: entry.antoine && {
        A: entry.antoine.A,
        B: entry.antoine.B,
        C: entry.antoine.C,
        fromK: entry.antoine.from,
        toK: entry.antoine.to,
      },
      liquidVolumeM3PerMol: entry.liquid_volume,
      vaporisationAtBoilingJPerMol: entry.vaporisation_enthalpy,
    },
  };
}

function range(given: { readonly from: number; readonly to: number } | undefined) {
  return given && { fromK: given.from, toK: given.to };
}
