import { describe, expect, test } from 'vitest';
import { carbonFreeWindow, createCarbonActivity } from '../../src/chemistry/carbon-activity.ts';
import { builtInComponent } from '../../src/properties/components.ts';
import { createGasModel } from '../../src/properties/gas-models.ts';

const activityOf = (...ids: string[]) => {
  const components = ids.map((id) => builtInComponent(id)!);
  return createCarbonActivity(components, createGasModel('ideal', components), 'nasa');
};

// NASA TM-4513 (McBride, Gordon & Reno 1993), graphite, 1 bar: C + CO2 = 2 CO has K = 1 at 700 degC and C + H2O = CO + H2
// near 673 degC; CH4 = C + 2 H2 has K = 1.074 at 550 degC and 0.4735 at 500 degC. 1.5 K: the table has steps of 50 K,
// and the later polynomials used here differ in the last digits of the enthalpy of graphite.
describe('between which temperatures a gas lays down no carbon', () => {
  test('carbon monoxide and dioxide of equal fugacity 1 bar: above 700 degC', () => {
    const gas = activityOf('CO', 'CO2');
    const { aboveK, belowK } = carbonFreeWindow(gas, 2e5, Float64Array.of(1, 1));
    expect(Math.abs(aboveK! - 973.15)).toBeLessThan(1.5);
    expect(belowK).toBeNull();
  });

  test('carbon monoxide, hydrogen and steam of 1 bar each: above 673 degC', () => {
    const gas = activityOf('CO', 'H2', 'H2O');
    const { aboveK, belowK } = carbonFreeWindow(gas, 3e5, Float64Array.of(1, 1, 1));
    expect(Math.abs(aboveK! - 946.15)).toBeLessThan(1.5);
    expect(belowK).toBeNull();
  });

  test('methane and hydrogen of 1 bar each: below the temperature where cracking has K = 1, between 500 and 550 degC', () => {
    const gas = activityOf('CH4', 'H2');
    const { aboveK, belowK } = carbonFreeWindow(gas, 2e5, Float64Array.of(1, 1));
    expect(aboveK).toBeNull();
    expect(belowK!).toBeGreaterThan(773.15);
    expect(belowK!).toBeLessThan(823.15);
  });

  test('a gas with both has a window, outside of which its activity is above 1', () => {
    const gas = activityOf('CO', 'CO2', 'H2', 'H2O', 'CH4');
    const amounts = Float64Array.of(5, 7, 34, 31, 22);
    const { aboveK, belowK } = carbonFreeWindow(gas, 29.8e5, amounts);
    expect(belowK!).toBeGreaterThan(aboveK!);
    const at = (T: number) => gas(T, 29.8e5, amounts).largest!;
    expect(at(aboveK! - 1)).toBeGreaterThan(1);
    expect(at(aboveK! + 1)).toBeLessThan(1);
    expect(at(belowK! - 1)).toBeLessThan(1);
    expect(at(belowK! + 1)).toBeGreaterThan(1);
  });

  test('a gas without carbon, or always on one side, crosses nowhere', () => {
    expect(carbonFreeWindow(activityOf('H2', 'N2'), 1e5, Float64Array.of(1, 1))).toEqual({
      aboveK: null,
      belowK: null,
    });
    const steamy = Float64Array.of(1e-9, 1, 1, 100);
    expect(carbonFreeWindow(activityOf('CO', 'CO2', 'H2', 'H2O'), 1e5, steamy)).toEqual({
      aboveK: null,
      belowK: null,
    });
  });
});
