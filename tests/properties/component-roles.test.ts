import { expect, test } from 'vitest';
import { componentRoles, equationOfStateRoles } from '../../src/properties/component-roles.ts';
import { componentsOf } from './mixture-of.ts';

const rolesOf = (ids: readonly string[], dissolvedGases = true, condense: readonly string[] | null = null) =>
  Object.fromEntries(
    componentRoles(componentsOf(...ids), dissolvedGases, condense).map((role, i) => [ids[i], role]),
  );

test('in an ammonia loop ammonia condenses and the gases with a Henry constant dissolve in it', () => {
  expect(rolesOf(['H2', 'N2', 'NH3', 'Ar', 'CH4', 'He'])).toEqual({
    H2: 'dissolved',
    N2: 'dissolved',
    NH3: 'condensable',
    Ar: 'dissolved',
    CH4: 'dissolved',
    He: 'gas',
  });
});

test('in a methanol loop methanol and water condense', () => {
  expect(rolesOf(['H2', 'CO', 'CO2', 'CH3OH', 'H2O', 'N2'])).toMatchObject({
    CH3OH: 'condensable',
    H2O: 'condensable',
    CO2: 'dissolved',
    N2: 'dissolved',
  });
});

test('ammonia beside water condenses with it', () => {
  expect(rolesOf(['NH3', 'H2O'])).toEqual({ NH3: 'condensable', H2O: 'condensable' });
});

test('hydrogen sulphide dissolves in water, and condenses where there is none', () => {
  expect(rolesOf(['H2S', 'H2O'])['H2S']).toBe('dissolved');
  expect(rolesOf(['H2S', 'N2'])['H2S']).toBe('condensable');
});

test('with dissolved gases switched off every gas stays out of the liquid', () => {
  expect(rolesOf(['H2', 'NH3', 'Ar'], false)).toEqual({ H2: 'gas', NH3: 'condensable', Ar: 'gas' });
});

test('without a solvent there is nothing to dissolve in', () => {
  expect(rolesOf(['H2', 'N2', 'CO'])).toEqual({ H2: 'gas', N2: 'gas', CO: 'gas' });
});

test('graphite is a solid whatever is said', () => {
  expect(rolesOf(['CO', 'C_gr'], true, ['C_gr'])['C_gr']).toBe('solid');
});

test('condense names the condensables outright; the others dissolve in them or stay gas', () => {
  expect(rolesOf(['CO2', 'H2O', 'NH3', 'H2'], true, ['CO2', 'NH3'])).toEqual({
    CO2: 'condensable',
    H2O: 'gas',
    NH3: 'condensable',
    H2: 'dissolved',
  });
});

test('with liquid: eos everything the equation knows is in both phases', () => {
  const components = componentsOf('H2', 'NH3', 'H2S', 'H2O', 'C_gr');
  expect(equationOfStateRoles(components, true, null)).toEqual([
    'dissolved',
    'condensable',
    'condensable',
    'condensable',
    'solid',
  ]);
  expect(equationOfStateRoles(components, true, ['H2O'])).toEqual([
    'dissolved',
    'dissolved',
    'dissolved',
    'condensable',
    'solid',
  ]);
  expect(equationOfStateRoles(components, false, ['H2O'])).toEqual([
    'gas',
    'gas',
    'gas',
    'condensable',
    'solid',
  ]);
});
