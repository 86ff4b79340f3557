import type { RateLaw } from '../chemistry/rate-laws/rate-law.ts';
import { rateLaws } from '../chemistry/rate-laws/rate-laws.ts';
import { dependentReactions } from '../chemistry/reaction-rows.ts';
import { nearest } from '../diagnostics/nearest.ts';
import type { Reaction } from '../model/reaction.ts';
import type { KnownNames, SettingsFault } from './block.ts';
import { exactlyOne, listed } from './checks.ts';
import { lawShares } from './kinetic-bed-chemistry.ts';
import type { KineticBedSettings } from './kinetic-bed-settings.ts';

/** Faults of a kinetic bed that need more than its schema. */
export function kineticBedFaults(setting: KineticBedSettings, known: KnownNames): SettingsFault[] {
  const law = rateLaws.get(setting.rate_law)!;
  return [
    ...exactlyOne(setting, {
      adiabatic: 'adiabatic: true',
      cooling: 'cooling: {temperature: 240 degC, heat_transfer: 50 kW/(m3 K)}',
      temperature: 'temperature: 450 degC',
    }),
    ...exactlyOne(setting, { volume: 'volume: 60 m3', catalyst_mass: 'catalyst_mass: 40 t' }),
    ...amountFaults(setting, law),
    ...effectivenessFaults(setting, law),
    ...reactionFaults(setting, law, known),
  ];
}

/** A law per mass needs the mass, one per volume the volume, a coolant the volume. */
function amountFaults(setting: KineticBedSettings, law: RateLaw): SettingsFault[] {
  const { volume, catalyst_mass: mass, bulk_density: density, cooling } = setting;
  if ((volume === undefined) === (mass === undefined)) return [];
  const wanted =
    volume === undefined
      ? law.per === 'volume'
        ? `${law.name} counts per volume of bed`
        : cooling && 'heat is transferred per volume of bed'
      : law.per === 'mass' && `${law.name} counts per mass of catalyst`;
  if (!wanted && density !== undefined) {
    return [
      {
        path: ['bulk_density'],
        code: 'idle-setting',
        what: 'A bulk density is given that nothing asks for.',
        why: `${law.name} counts per ${law.per}, which is given`,
        mend: 'take it out',
      },
    ];
  }
  if (!wanted || density !== undefined) return [];
  return [
    {
      path: [],
      code: 'missing-setting',
      what: `The ${volume === undefined ? 'volume of the bed' : 'mass of the catalyst'} is not known.`,
      why: `${wanted}, and a ${volume === undefined ? 'mass' : 'volume'} is given`,
      mend: `add bulk_density: 1100 kg/m3, or give ${volume === undefined ? 'volume' : 'catalyst_mass'} instead`,
    },
  ];
}

function effectivenessFaults(setting: KineticBedSettings, law: RateLaw): SettingsFault[] {
  const published = setting.effectiveness === 'published';
  if (published && law.effectiveness === null) {
    const others = [...rateLaws.values()].filter((one) => one.effectiveness).map((one) => one.name);
    return [
      {
        path: ['effectiveness'],
        code: 'wrong-value',
        what: `There is no published effectiveness for ${law.name}.`,
        why: `only ${listed(others)} comes with one`,
        mend: 'write it as a fraction, e.g. effectiveness: 70 %',
      },
    ];
  }
  if (!published && setting.conversion_before !== undefined) {
    return [
      {
        path: ['conversion_before'],
        code: 'idle-setting',
        what: 'The conversion before the bed has no effect.',
        why: 'only a published effectiveness depends on it',
        mend: 'add effectiveness: published, or take conversion_before out',
      },
    ];
  }
  return [];
}

function reactionFaults(setting: KineticBedSettings, law: RateLaw, known: KnownNames): SettingsFault[] {
  const names = known.reactions.map((one) => one.name);
  const unknown = setting.reactions.flatMap((name, index): SettingsFault[] => {
    const path = ['reactions', index];
    if (setting.reactions.indexOf(name) < index) {
      return [
        {
          path,
          code: 'duplicate-name',
          what: `Reaction ${name} stands twice.`,
          why: 'it runs once',
          mend: 'take one of them out',
        },
      ];
    }
    if (names.includes(name)) return [];
    const near = nearest(name, names);
    return [
      {
        path,
        code: 'unknown-reaction',
        what: `There is no reaction "${name}" in this flowsheet.`,
        why: near ? `the nearest reaction is ${near}` : `the reactions are ${names.join(', ') || 'none'}`,
        mend: near ? `write ${near}` : 'add it under reactions',
      },
    ];
  });
  const missing = missingSpecies(law, known);
  if (unknown.length > 0 || missing.length > 0) return [...unknown, ...missing];
  const named = setting.reactions.map((name) => known.reactions.find((one) => one.name === name)!);
  const dependent = dependentReactions(named.map((one) => one.coefficients)).map(({ index }) => ({
    path: ['reactions', index],
    code: 'dependent-reaction',
    what: `Reaction ${named[index].name} is a sum of the others.`,
    why: 'the rate law runs it already by way of them',
    mend: 'take it out here',
  }));
  return dependent.length > 0 ? dependent : matchFaults(law, named, known);
}

function missingSpecies(law: RateLaw, known: KnownNames): SettingsFault[] {
  const ids = known.components.map((c) => c.id);
  const missing = law.species.filter((id) => !ids.includes(id));
  if (missing.length === 0) return [];
  return [
    {
      path: ['rate_law'],
      code: 'unknown-component',
      what: `${law.name} needs ${listed(missing)}, which this flowsheet does not have.`,
      why: `it is a law for ${listed(law.species)}`,
      mend: `add ${missing.join(', ')} to components`,
    },
  ];
}

/** Every reaction of the law is a sum of those named, and every one named has a part in it. */
function matchFaults(law: RateLaw, named: readonly Reaction[], known: KnownNames): SettingsFault[] {
  const shares = law.reactions.map((own) => lawShares(own.stoichiometry, named, known.components));
  const lacking = law.reactions.filter((_, l) => shares[l] === null);
  const fits = (reaction: Reaction, own: (typeof law.reactions)[number]) =>
    lawShares(own.stoichiometry, [reaction], known.components) !== null;
  const faults = lacking.map((own): SettingsFault => {
    const there = known.reactions.find((reaction) => fits(reaction, own));
    return {
      path: ['reactions'],
      code: 'missing-setting',
      what: `The reactions named leave out ${own.equation}.`,
      why: `${law.name} runs ${listed(law.reactions.map((one) => one.equation))}`,
      mend: there
        ? `add ${there.name} to the list`
        : `add it to the reactions of the flowsheet, e.g. side: ${own.equation}, and name it here`,
    };
  });
  if (faults.length > 0) return faults;
  return named.flatMap((reaction, k) =>
    shares.some((share) => share![k] !== 0)
      ? []
      : [
          {
            path: ['reactions', k],
            code: 'idle-setting',
            what: `Reaction ${reaction.name} does not run in this bed.`,
            why: `${law.name} runs ${listed(law.reactions.map((one) => one.equation))}`,
            mend: 'take it out here',
          },
        ],
  );
}
