import { expect, test } from 'vitest';
import {
  HIGHEST_STEAM_PA,
  liquidWaterEnthalpy,
  saturationPressurePa,
  saturationTemperatureK,
  steamEnthalpy,
} from '../../src/properties/steam.ts';
import * as published from '../published/steam.ts';
import { expectRelative } from './expect-relative.ts';

// Nine digits are printed: hence 1e-8, five of the last of them.
test.each(published.saturationPressureMPa)('water boils at %d K under %d MPa', (kelvin, MPa) => {
  expectRelative(saturationPressurePa(kelvin) / 1e6, MPa, 5e-9);
});

test.each(published.saturationTemperatureK)('water under %d MPa boils at %d K', (MPa, kelvin) => {
  expectRelative(saturationTemperatureK(MPa * 1e6), kelvin, 5e-9);
});

test.each(published.liquidEnthalpy)('water at %d K and %d MPa holds %d kJ/kg', (kelvin, MPa, h) => {
  expectRelative(liquidWaterEnthalpy(kelvin, MPa * 1e6) / 1e3, h, 5e-9);
});

test.each(published.steamEnthalpy)('steam at %d K and %d MPa holds %d kJ/kg', (kelvin, MPa, h) => {
  expectRelative(steamEnthalpy(kelvin, MPa * 1e6) / 1e3, h, 5e-9);
});

// The slope over 0.02 K is good to 1e-6 of itself: rounding of h over the step.
test.each(published.liquidHeatCapacity)(
  'water at %d K and %d MPa has a cp of %d kJ/(kg K)',
  (kelvin, MPa, cp) => {
    const slope =
      (liquidWaterEnthalpy(kelvin + 0.01, MPa * 1e6) - liquidWaterEnthalpy(kelvin - 0.01, MPa * 1e6)) / 20;
    expectRelative(slope, cp, 1e-6);
  },
);

test.each(published.steamHeatCapacity)(
  'steam at %d K and %d MPa has a cp of %d kJ/(kg K)',
  (kelvin, MPa, cp) => {
    const slope = (steamEnthalpy(kelvin + 0.01, MPa * 1e6) - steamEnthalpy(kelvin - 0.01, MPa * 1e6)) / 20;
    expectRelative(slope, cp, 1e-6);
  },
);

// Two decimals are printed, three of the temperature.
test.each(published.saturationTable)(
  'at %d bar water boils at %d degC, from %d to %d kJ/kg',
  (bar, celsius, liquid, vapour) => {
    const P = bar * 1e5;
    const T = saturationTemperatureK(P);
    expect(Math.abs(T - 273.15 - celsius)).toBeLessThan(0.0006);
    expect(Math.abs(liquidWaterEnthalpy(T, P) / 1e3 - liquid)).toBeLessThan(0.006);
    expect(Math.abs(steamEnthalpy(T, P) / 1e3 - vapour)).toBeLessThan(0.006);
  },
);

test('the two forms of the saturation line are one another turned round', () => {
  for (let P = 1e3; P < HIGHEST_STEAM_PA; P *= 1.2) {
    // The release states agreement of the two within its own rounding; they solve one and the same quadratic.
    expectRelative(saturationPressurePa(saturationTemperatureK(P)), P, 1e-10);
  }
});

test('the saturated vapour holds most at about 31 bar', () => {
  const at = (bar: number) => steamEnthalpy(saturationTemperatureK(bar * 1e5), bar * 1e5);
  expect(at(31)).toBeGreaterThan(at(25));
  expect(at(31)).toBeGreaterThan(at(37));
});
