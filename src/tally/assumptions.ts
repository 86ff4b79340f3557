import type { BlockReport } from '../blocks/block.ts';
import { createLnK } from '../chemistry/equilibrium-constant.ts';
import type { Component } from '../model/component.ts';
import { createActivityModel } from '../properties/activity.ts';
import { liquidInteractions } from '../properties/binary-interaction.ts';
import type { Role } from '../properties/component-roles.ts';
import { gasModelSources, withoutEquationOfState } from '../properties/gas-models.ts';
import { henryConstant } from '../properties/henry.ts';
import type { Plant } from './plant.ts';

/** What was assumed, in plain sentences, in the order an engineer would ask: models, constants, defaults, blocks. */
export function assumptionsOf(plant: Plant, reports: readonly BlockReport[]): string[] {
  return [
    plant.blocks.some((block) => block.kind === 'kinetic_bed')
      ? 'Study calculation at steady state: reaction rates in the kinetic beds only, no heat losses, no equipment limits.'
      : 'Study calculation at steady state: no reaction rates, no heat losses, no equipment limits.',
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
    `Gas: ${gasModelSources[mixture.spec.gas]}${mixture.spec.liquid === 'eos' ? '; the liquid is computed with it too' : ''}.`,
    `Ideal-gas heat capacities and entropies: NASA nine-coefficient polynomials (NASA/TP-2002-211556), ${basis}; elements at 298.15 K are zero.`,
    ...(mixture.spec.gas !== 'ideal' && plain.length > 0
      ? [`Without critical data, taken as ideal in the gas: ${plain.join(', ')}.`]
      : []),
  ];
}

function liquidAssumptions(plant: Plant): string[] {
  if (plant.flowsheet.liquid === 'eos') return equationLiquid(plant);
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
    plant.flowsheet.gas === 'ideal'
      ? `Condensate: ${condensable.join(', ')} by Antoine vapour pressure (Raoult's law, no Poynting factor).`
      : `Condensate: ${condensable.join(', ')} by Antoine vapour pressure, saturated-gas fugacity and Poynting factor.`,
    ...activityAssumptions(components, roles, condensable),
    ...(pairs.length > 0
      ? [
          `Dissolved gases by Henry's law with the Krichevsky-Kasarnovsky pressure correction: ${pairs.join(', ')}${condensable.length > 1 ? "; in a mixed condensate ln H is the mean over the mole fractions of the solvents (O'Connell and Prausnitz 1964, without the excess term)" : ''}.`,
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

function activityAssumptions(
  components: readonly Component[],
  roles: readonly Role[],
  condensable: readonly string[],
): string[] {
  if (condensable.length < 2) return [];
  const indices = components.flatMap((_, i) => (roles[i] === 'condensable' ? [i] : []));
  const model = createActivityModel(components, indices);
  if (!model)
    return [`The condensate is an ideal solution: no activity parameters for ${condensable.join(', ')}.`];
  const named = model.pairs.map(({ first, second, source }) => `${first}-${second} (${source})`);
  const all = (condensable.length * (condensable.length - 1)) / 2;
  return [
    `Activity coefficients in the condensate: ${named.join('; ')}${all > model.pairs.length ? '; every other pair is ideal' : ''}.`,
  ];
}

/** Gas and liquid by one equation of state: what is in both, and which pairs it has been told of. */
function equationLiquid(plant: Plant): string[] {
  const { components, roles, spec } = plant.mixture;
  const both = components.filter((_, i) => roles[i] === 'condensable' || roles[i] === 'dissolved');
  const dry = components.filter((_, i) => roles[i] === 'gas').map((c) => c.id);
  const known = spec.gas === 'ideal' ? [] : liquidInteractions(spec.gas, components);
  const pairs = known.map(({ i, j, row }) => `${components[i].id}-${components[j].id} (${row.use})`);
  const untold = both.flatMap((first, k) =>
    both
      .slice(k + 1)
      .filter((second) => !known.some(({ i, j }) => isPair(components[i], components[j], first, second)))
      .map((second) => `${first.id}-${second.id}`),
  );
  return [
    `Condensate: ${both.map((c) => c.id).join(', ')} by the equation of state in both phases, with one set of binary parameters everywhere in the flowsheet, those of gases in a liquid before those of the hot gas.`,
    ...(pairs.length > 0 ? [`Binary parameters of the equation of state: ${pairs.join(', ')}.`] : []),
    ...(untold.length > 0
      ? [`Pairs whose binary parameter is 0, for none is at hand: ${untold.join(', ')}.`]
      : []),
    ...(dry.length > 0 ? [`Kept out of the condensate: ${dry.join(', ')}.`] : []),
  ];
}

function isPair(a: Component, b: Component, first: Component, second: Component): boolean {
  return (a === first && b === second) || (a === second && b === first);
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
