import { describe, expect, test } from 'vitest';
import { bedFaults, shotPorts } from '../../src/blocks/bed-settings.ts';
import { blockKinds } from '../../src/blocks/registry.ts';
import { components, faultsOf, reaction, refusedBySchema } from './helpers.ts';

const list = components('SO2', 'O2', 'SO3');
const known = { components: list, reactions: [reaction('oxidation', '2 SO2 + O2 <=> 2 SO3', list)] };
const faults = (raw: object, reactions: object = { oxidation: {} }) =>
  faultsOf('reactor', { reactions, ...raw }, known).map(({ code, path }) => [code, path.join('.')]);

test('a quench asks for a port of the number of its bed', () => {
  expect(shotPorts(undefined)).toEqual([]);
  expect(shotPorts([{}, { inlet_temperature: 700 }])).toEqual([]);
  expect(shotPorts([{}, { quench: true }, { duty: 0 }, { quench: true }])).toEqual(['shot2', 'shot4']);
  const ports = blockKinds.get('reactor')!.ports({ reactions: {}, beds: [{}, { quench: true }] });
  expect(ports).toEqual({ inlets: ['in', 'shot2'], outlets: ['out'] });
});

describe('the beds of a reactor', () => {
  test('are sound when each says how its gas is brought to it', () => {
    expect(
      faults({ beds: [{}, { quench: true }, { inlet_temperature: '430 degC', approach: '5 K' }] }),
    ).toEqual([]);
    expect(faults({ beds: [{ inlet_temperature: '420 degC' }, { duty: '0 kW' }] })).toEqual([]);
  });

  test('stand in place of a temperature, adiabatic or a duty', () => {
    expect(faults({ beds: [{}], temperature: '450 degC' })).toEqual([['too-many-settings', 'beds']]);
    expect(faults({})).toEqual([['missing-setting', '']]);
  });

  test('are at least one', () => {
    expect(faults({ beds: [] })).toEqual([['missing-setting', 'beds']]);
  });

  test('have something between them', () => {
    expect(bedFaults([{}, { approach: 5 }], undefined, {})).toEqual([
      {
        path: ['beds', 1],
        code: 'missing-setting',
        what: 'The gas between bed 1 and bed 2 is not described.',
        why: 'two beds with nothing between them are one bed',
        mend: 'give the bed an inlet_temperature, a quench or a duty (0 kW if the gas is left as it is)',
      },
    ]);
  });

  test('have one thing between them only, and no quench before the first', () => {
    const both = { quench: true, inlet_temperature: '430 degC' };
    expect(faults({ beds: [{}, both] })).toEqual([['too-many-settings', 'beds.1.quench']]);
    expect(faults({ beds: [{ quench: true }] })).toEqual([['idle-setting', 'beds.0.quench']]);
  });

  test('stop short of equilibrium in one way', () => {
    expect(faults({ beds: [{ approach: '5 K', fraction_of_equilibrium: '90 %' }] })).toEqual([
      ['too-many-settings', 'beds.0.fraction_of_equilibrium'],
    ]);
  });

  test('have their pressure drop from the reactor or of their own', () => {
    expect(faults({ beds: [{}, { duty: '0 kW', pressure_drop: '1 bar' }], pressure_drop: '2 bar' })).toEqual([
      ['too-many-settings', 'beds.1.pressure_drop'],
    ]);
  });

  test('run to equilibrium and not to a set conversion', () => {
    const set = { oxidation: { conversion: '90 %', of: 'SO2' } };
    expect(faults({ beds: [{}] }, set)).toEqual([['too-many-settings', 'reactions.oxidation.conversion']]);
  });

  test('take no settings that nothing knows', () => {
    expect(
      refusedBySchema('reactor', { reactions: { oxidation: {} }, beds: [{ temperature: '400 degC' }] }),
    ).toBe(true);
    expect(refusedBySchema('reactor', { reactions: { oxidation: {} }, beds: [{ quench: false }] })).toBe(
      true,
    );
  });
});

test('a fraction of equilibrium excludes an approach and a conversion', () => {
  const reaction = (setting: object) => faults({ adiabatic: true }, { oxidation: setting });
  expect(reaction({ fraction_of_equilibrium: '90 %' })).toEqual([]);
  const at = 'reactions.oxidation.fraction_of_equilibrium';
  expect(reaction({ fraction_of_equilibrium: '90 %', approach: '5 K' })).toEqual([['too-many-settings', at]]);
  expect(reaction({ fraction_of_equilibrium: '90 %', conversion: '5 %', of: 'SO2' })).toEqual([
    ['too-many-settings', at],
  ]);
});
