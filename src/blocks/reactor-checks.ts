import { dependentReactions } from '../chemistry/reaction-rows.ts';
import { nearest } from '../diagnostics/nearest.ts';
import type { KnownNames, SettingsFault } from './block.ts';
import type { EquilibriumReach, ReactionSetting } from './reaction-run.ts';

/** Faults in the reactions of a reactor that need the flowsheet's names. */
export function reactionFaults(
  reactions: Readonly<Record<string, ReactionSetting>>,
  known: KnownNames,
): SettingsFault[] {
  const names = Object.keys(reactions);
  if (names.length === 0) {
    return [
      {
        path: ['reactions'],
        code: 'missing-setting',
        what: 'The reactor runs no reaction.',
        why: 'a vessel without reaction changes nothing',
        mend: 'name at least one reaction, e.g. reactions: {synthesis: {approach: 10 K}}',
      },
    ];
  }
  return [...names.flatMap((name) => oneReaction(name, reactions[name], known)), ...sums(reactions, known)];
}

function oneReaction(name: string, setting: ReactionSetting, known: KnownNames): SettingsFault[] {
  const path = ['reactions', name];
  const reaction = known.reactions.find((one) => one.name === name);
  if (!reaction) {
    const all = known.reactions.map((one) => one.name);
    const near = nearest(name, all);
    return [
      {
        path,
        code: 'unknown-reaction',
        what: `There is no reaction "${name}" in this flowsheet.`,
        why: near ? `the nearest reaction is ${near}` : `the reactions are ${all.join(', ') || 'none'}`,
        mend: near ? `write ${near}` : 'add it under reactions',
      },
    ];
  }
  if (setting.conversion !== undefined && setting.approach !== undefined) {
    return [
      {
        path: [...path, 'approach'],
        code: 'too-many-settings',
        what: `Reaction ${name} has both a conversion and an approach.`,
        why: 'a reaction runs either to a set conversion or to equilibrium',
        mend: 'take one of them out',
      },
    ];
  }
  if (setting.fraction_of_equilibrium !== undefined && setting.conversion !== undefined) {
    return [
      {
        path: [...path, 'fraction_of_equilibrium'],
        code: 'too-many-settings',
        what: `Reaction ${name} has both a conversion and a fraction of equilibrium.`,
        why: 'a conversion is a share of the key reactant, a fraction of equilibrium a share of the way there',
        mend: 'take one of them out',
      },
    ];
  }
  const twice = reachedTwice(setting, `Reaction ${name}`, path);
  if (twice.length > 0) return twice;
  if (setting.conversion === undefined) {
    if (setting.of === undefined) return [];
    return [
      {
        path: [...path, 'of'],
        code: 'idle-setting',
        what: `Reaction ${name} names a key reactant but no conversion.`,
        why: '`of` says what a conversion refers to',
        mend: 'add conversion, or take `of` out to run to equilibrium',
      },
    ];
  }
  const reactants = known.components.filter((_, i) => reaction.coefficients[i] < 0).map((c) => c.id);
  if (setting.of !== undefined && reactants.includes(setting.of)) return [];
  return [
    {
      path: setting.of === undefined ? path : [...path, 'of'],
      code: setting.of === undefined ? 'missing-setting' : 'not-a-reactant',
      what:
        setting.of === undefined
          ? `The conversion of ${name} does not say what it refers to.`
          : `${setting.of} is not a reactant of ${name}.`,
      why: `the reactants of ${reaction.equation} are ${reactants.join(' and ')}`,
      mend: `write of: ${reactants[0]}`,
    },
  ];
}

/** A temperature approach and a fraction of equilibrium given together, for a reaction or a bed. */
export function reachedTwice(
  reach: EquilibriumReach,
  whose: string,
  path: readonly (string | number)[],
): SettingsFault[] {
  if (reach.approach === undefined || reach.fraction_of_equilibrium === undefined) return [];
  return [
    {
      path: [...path, 'fraction_of_equilibrium'],
      code: 'too-many-settings',
      what: `${whose} has both an approach and a fraction of equilibrium.`,
      why: 'each of them says how far equilibrium is reached',
      mend: 'take one of them out',
    },
  ];
}

/** Equilibria that are sums of others say nothing new, or contradict them. */
function sums(reactions: Readonly<Record<string, ReactionSetting>>, known: KnownNames): SettingsFault[] {
  const equilibria = known.reactions.filter(
    (one) => reactions[one.name] && reactions[one.name].conversion === undefined,
  );
  return dependentReactions(equilibria.map((one) => one.coefficients)).map(({ index }) => ({
    path: ['reactions', equilibria[index].name],
    code: 'dependent-reaction',
    what: `Equilibrium ${equilibria[index].name} is a sum of the other equilibria of this reactor.`,
    why: 'it follows from them, and with another constant or approach it would contradict them',
    mend: 'take it out; the others already carry it',
  }));
}
