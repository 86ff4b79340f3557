import type { BlockReport } from '../blocks/block.ts';
import { createLnK } from '../chemistry/equilibrium-constant.ts';
import { gasModelSources, withoutEquationOfState } from '../properties/gas-models.ts';
import { henryConstant } from '../properties/henry.ts';
import type { Plant } from './plant.ts';

/** What was assumed, in plain sentences, in the order an engineer would ask: models, constants, defaults, blocks. */
export function assumptionsOf(plant: Plant, reports: readonly BlockReport[]): string[] {
  return [
    'Study calculation at steady state: no reaction rates, no heat losses, no equipment limits.',
    ...gasAssumptions(plant),
    ...liquidAssumptions(plant),
    ...constantAssumptions(plant),
    ...plant.flowsheet.assumptions,
    ...reports.flatMap((report, b) => report.assumptions.map((text) => `${plant.blocks[b].name}: ${text}`)),
  ];
}

function gasAssumptions(plant: Plant): string[] {
  const { mixture } = plant;
  const basis =
    mixture.spec.basis === 'atct'
      ? 'formation enthalpies of the Active Thermochemical Tables 1.112'
      : 'formation enthalpies as in the NASA tables (a reacting component has no entry in the Active Thermochemical Tables)';
  const plain = withoutEquationOfState(mixture.components);
  return [
    `Gas: ${gasModelSources[mixture.spec.gas]}.`,
    `Ideal-gas heat capacities and entropies: NASA nine-coefficient polynomials (NASA/TP-2002-211556), ${basis}; elements at 298.15 K are zero.`,
    ...(mixture.spec.gas !== 'ideal' && plain.length > 0
      ? [`Without critical data, taken as ideal in the gas: ${plain.join(', ')}.`]
      : []),
  ];
}

function liquidAssumptions(plant: Plant): string[] {
  const { components, roles } = plant.mixture;
  const ids = (role: string) => components.flatMap((c, i) => (roles[i] === role ? [c.id] : []));
  const condensable = ids('condensable');
  const dissolved = ids('dissolved');
  const dry = ids('gas');
  const solid = ids('solid');
  if (condensable.length === 0) return ['No component condenses.'];
  const pairs = dissolved.map((id) => {
    const solvents = condensable.filter((solvent) => henryConstant(solvent, id));
    return `${id} in ${solvents.join(' and ')}`;
  });
  return [
    `Condensate: ${condensable.join(', ')} by Antoine vapour pressure, saturated-gas fugacity and Poynting factor; activity coefficients are 1.`,
    ...(pairs.length > 0
      ? [
          `Dissolved gases by Henry's law with the Krichevsky-Kasarnovsky pressure correction: ${pairs.join(', ')}.`,
        ]
      : []),
    ...(dry.length > 0
      ? [
          `Kept out of the condensate: ${dry.join(', ')} (${plant.flowsheet.dissolvedGases ? 'no Henry constant in these condensates is at hand' : 'dissolved_gases: false'}).`,
        ]
      : []),
    ...(solid.length > 0 ? [`Solid, leaves with the liquid where phases part: ${solid.join(', ')}.`] : []),
  ];
}

function constantAssumptions(plant: Plant): string[] {
  const running = new Set(
    plant.blocks.flatMap((block, b) => plant.kinds[b].equilibriaIn?.(block.settings) ?? []),
  );
  return plant.flowsheet.reactions
    .filter((reaction) => running.has(reaction.name))
    .map((reaction) => {
      const constant = createLnK(reaction, plant.mixture.idealGas);
      const range = constant.range
        ? ` (${(constant.range.fromK - 273.15).toFixed(0)} to ${(constant.range.toK - 273.15).toFixed(0)} degC)`
        : '';
      return `Equilibrium constant of ${reaction.name}: ${constant.source}${range}.`;
    });
}
