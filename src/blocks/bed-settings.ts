import { z } from 'zod';
import { fraction, quantity } from '../units/schema.ts';
import type { SettingsFault } from './block.ts';
import type { ReactionSetting } from './reaction-run.ts';
import { reachedTwice } from './reactor-checks.ts';

/** One adiabatic bed: how its gas is brought to its inlet, and how far equilibrium is reached in it. */
export const bedSettings = z.strictObject({
  inlet_temperature: quantity('temperature', {
    description: 'the gas is cooled or heated to this before the bed',
    examples: ['400 degC'],
  }).optional(),
  duty: quantity('power', {
    description: 'heat added before the bed; negative for cooling',
    examples: ['-8 MW'],
  }).optional(),
  quench: z
    .literal(true)
    .meta({
      description: 'cold gas is mixed in before the bed, from the port shot2, shot3, ... of its number',
    })
    .optional(),
  approach: quantity('temperatureDifference', {
    min: 0,
    description: 'approach of all equilibria in this bed, in place of what the reactions say',
  }).optional(),
  fraction_of_equilibrium: fraction({
    description: 'share of the equilibrium extents in this bed, in place of what the reactions say',
  }).optional(),
  pressure_drop: quantity('pressureDifference', {
    min: 0,
    description: 'pressure lost over the bed and what stands before it, none if left out',
  }).optional(),
});
export type BedSettings = z.infer<typeof bedSettings>;

/** `shot2`: the port of the gas that quenches before a bed, counted from 1. */
export function shotPort(bed: number): string {
  return `shot${bed}`;
}

/** The ports of all beds with a quench, in order. */
export function shotPorts(beds: readonly BedSettings[] | undefined): string[] {
  return (beds ?? []).flatMap((bed, k) => (bed.quench ? [shotPort(k + 1)] : []));
}

/** Faults in the beds of a reactor that the schema alone cannot see. */
export function bedFaults(
  beds: readonly BedSettings[] | undefined,
  pressureDrop: number | undefined,
  reactions: Readonly<Record<string, ReactionSetting>>,
): SettingsFault[] {
  if (beds === undefined) return [];
  if (beds.length === 0) {
    return [
      {
        path: ['beds'],
        code: 'missing-setting',
        what: 'The list of beds is empty.',
        why: 'the gas reacts in the beds',
        mend: 'write at least one bed, e.g. beds: [{inlet_temperature: 400 degC}]',
      },
    ];
  }
  return [
    ...beds.flatMap((bed, k) => oneBed(bed, k)),
    ...dropTwice(beds, pressureDrop),
    ...setConversions(reactions),
  ];
}

function oneBed(bed: BedSettings, k: number): SettingsFault[] {
  const path = ['beds', k];
  const twice = reachedTwice(bed, `Bed ${k + 1}`, path);
  const ways = (['inlet_temperature', 'duty', 'quench'] as const).filter((way) => bed[way] !== undefined);
  if (ways.length > 1) {
    const what = `Bed ${k + 1} has both ${ways[0]} and ${ways[1]}.`;
    const why = 'one of them brings the gas to the inlet of the bed; its temperature follows from the others';
    return [
      ...twice,
      { path: [...path, ways[1]], code: 'too-many-settings', what, why, mend: 'keep one of them' },
    ];
  }
  if (k === 0 && bed.quench) {
    return [
      ...twice,
      {
        path: [...path, 'quench'],
        code: 'idle-setting',
        what: 'The first bed has a quench.',
        why: 'the gas before the first bed is the inlet of the reactor; there is nothing hot to quench',
        mend: 'take quench out, and mix the gas in before the reactor if that is meant',
      },
    ];
  }
  if (k > 0 && ways.length === 0) {
    return [
      ...twice,
      {
        path,
        code: 'missing-setting',
        what: `The gas between bed ${k} and bed ${k + 1} is not described.`,
        why: 'two beds with nothing between them are one bed',
        mend: 'give the bed an inlet_temperature, a quench or a duty (0 kW if the gas is left as it is)',
      },
    ];
  }
  return twice;
}

function dropTwice(beds: readonly BedSettings[], pressureDrop: number | undefined): SettingsFault[] {
  const k = beds.findIndex((bed) => bed.pressure_drop !== undefined);
  if (k < 0 || pressureDrop === undefined) return [];
  return [
    {
      path: ['beds', k, 'pressure_drop'],
      code: 'too-many-settings',
      what: `Both the reactor and its bed ${k + 1} have a pressure drop.`,
      why: 'that of the reactor is shared equally by its beds',
      mend: 'give the pressure drop either to the reactor or to its beds',
    },
  ];
}

function setConversions(reactions: Readonly<Record<string, ReactionSetting>>): SettingsFault[] {
  return Object.keys(reactions)
    .filter((name) => reactions[name].conversion !== undefined)
    .map((name) => ({
      path: ['reactions', name, 'conversion'],
      code: 'too-many-settings',
      what: `Reaction ${name} has a set conversion in a reactor with beds.`,
      why: 'a bed runs to equilibrium or a fraction of it; a set conversion does not say in which bed it happens',
      mend: 'take conversion out, or use one reactor for each bed',
    }));
}
