import { createLnK } from '../chemistry/equilibrium-constant.ts';
import { createActivityModel } from '../properties/activity.ts';
import { gasModelSources } from '../properties/gas-models.ts';
import { henryConstant } from '../properties/henry.ts';
import type { Plant } from './plant.ts';

/** Where the numbers of a flowsheet come from, by component and by block. */
export interface Sources {
  readonly components: readonly {
    readonly id: string;
    /** what it does where gas and liquid part: condensable, dissolved, gas, solid */
    readonly role: string;
    /** source by kind of data: critical, ideal gas, vapour pressure, liquid, ... */
    readonly data: Readonly<Record<string, string>>;
  }[];
  readonly blocks: readonly {
    readonly name: string;
    readonly kind: string;
    /** models and constants in plain words */
    readonly models: readonly string[];
  }[];
  /** what every block shares: gas model, liquid model */
  readonly shared: readonly string[];
}

/** List the models, constants and data that a plant is computed with. */
export function sourcesOf(plant: Plant): Sources {
  const { components, roles, spec } = plant.mixture;
  const condensables = components.flatMap((c, i) => (roles[i] === 'condensable' ? [c] : []));
  const activity =
    spec.liquid === 'eos'
      ? null
      : createActivityModel(
          components,
          components.flatMap((_, i) => (roles[i] === 'condensable' ? [i] : [])),
        );
  return {
    components: components.map((c, i) => ({
      id: c.id,
      role: roles[i],
      data: {
        ...c.sources,
        ...henrySources(
          c.id,
          roles[i],
          condensables.map((s) => s.id),
        ),
      },
    })),
    blocks: plant.blocks.map((block, b) => ({
      name: block.name,
      kind: block.kind,
      models: [
        ...(plant.kinds[b].models?.(block.settings) ?? []),
        ...constants(plant, plant.kinds[b].equilibriaIn?.(block.settings) ?? []),
      ],
    })),
    shared: [
      `gas: ${gasModelSources[spec.gas]}`,
      spec.liquid === 'eos'
        ? 'liquid: the same equation of state'
        : 'liquid: vapour pressure by Antoine, gases by Henry, activity coefficients where a pair has parameters',
      ...(activity?.pairs ?? []).map(
        ({ first, second, source }) => `activity coefficients of ${first}-${second}: ${source}`,
      ),
    ],
  };
}

function henrySources(id: string, role: string, solvents: readonly string[]): Record<string, string> {
  if (role !== 'dissolved') return {};
  return Object.fromEntries(
    solvents.flatMap((solvent) => {
      const constant = henryConstant(solvent, id);
      return constant ? [[`Henry constant in ${solvent}`, constant.source]] : [];
    }),
  );
}

function constants(plant: Plant, names: readonly string[]): string[] {
  return plant.flowsheet.reactions
    .filter((reaction) => names.includes(reaction.name))
    .map((reaction) => `K of ${reaction.name}: ${createLnK(reaction, plant.mixture.idealGas).source}`);
}
