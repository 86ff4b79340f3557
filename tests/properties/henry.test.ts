import fc from 'fast-check';
import { expect, test } from 'vitest';
import { henryConstants } from '../../src/properties/data/henry-constants.ts';
import {
  henryConstant,
  lnHenry,
  lnHenrySlope,
  partialVolume,
  partialVolumeSlope,
} from '../../src/properties/henry.ts';
import { expectRelative } from './expect-relative.ts';

const constants = henryConstants.map(({ solvent, solute }) => henryConstant(solvent, solute)!);

// bar at 298.15 K, five figures, of the table the coefficients were fitted for
test.each([
  ['NH3', 'H2', 11835],
  ['NH3', 'N2', 8260.6],
  ['NH3', 'Ar', 4658.5],
  ['NH3', 'CH4', 1747.1],
  ['NH3', 'CO', 4058.8],
  ['CH3OH', 'H2', 6293.5],
  ['CH3OH', 'N2', 3689.6],
  ['CH3OH', 'He', 17029],
  ['CH3OH', 'CO2', 144.06],
  ['H2O', 'H2', 70925],
  ['H2O', 'N2', 85578],
  ['H2O', 'CO2', 1656.1],
  ['H2O', 'H2S', 539.72],
])('in %s the Henry constant of %s at 25 degC is %d bar', (solvent, solute, bar) => {
  // the fits round to 0.02 % of the value
  expectRelative(Math.exp(lnHenry(henryConstant(solvent, solute)!, 298.15)) / 1e5, bar, 2e-4);
});

/**
 * Original equation for gases in water: ln(H/Psat) = A/Tr + B (1 − Tr)^0.355/Tr + C Tr^−0.41 exp(1 − Tr),
 * IAPWS Guideline G7-04; the saturation pressure by IAPWS R7-97(2012): 0.353658941e-2 and 2.63889776 MPa.
 */
test.each([
  ['H2', -4.73284, 6.08954, 6.06066],
  ['N2', -9.67578, 4.72162, 11.70585],
  ['CH4', -10.44708, 4.66491, 12.12986],
  ['CO2', -8.55445, 4.01195, 9.52345],
])('in water the Henry constant of %s follows the IAPWS equation', (solute, A, B, C) => {
  const T = 300;
  const reduced = T / 647.096;
  const ln =
    Math.log(0.353658941e4) +
    A / reduced +
    (B * (1 - reduced) ** 0.355) / reduced +
    C * reduced ** -0.41 * Math.exp(1 - reduced);
  // the table's form was fitted to it within 0.16 %
  expect(Math.abs(lnHenry(henryConstant('H2O', solute)!, T) - ln)).toBeLessThan(0.002);
});

test('hydrogen dissolves in ammonia as Wiebe and Tremearne measured', () => {
  // R. Wiebe & T. H. Tremearne, J. Am. Chem. Soc. 56, 2357 (1934), from memory: 4.47, 10.15, 20.95 and 41.1
  // normal cm3 per g of ammonia at 25 degC and 50, 100, 200, 400 atm of total pressure. Fugacity of hydrogen
  // by its own virial of 14.8 cm3/mol (from memory); ammonia vapour taken out at 10.03 bar with the Poynting
  // correction: a rough closure, good to 12 %.
  const h = henryConstant('NH3', 'H2')!;
  const RT = 8.314462618 * 298.15;
  for (const [atm, measured] of [
    [50, 4.47],
    [100, 10.15],
    [200, 20.95],
    [400, 41.1],
  ] as const) {
    const P = atm * 101325;
    const ammonia = 10.03e5 * Math.exp((28.2e-6 * (P - 10.03e5)) / RT);
    const fugacity = (P - ammonia) * Math.exp((14.8e-6 * P) / RT);
    const x = fugacity / Math.exp(lnHenry(h, 298.15) + (partialVolume(h, 298.15) * (P - 10.03e5)) / RT);
    expectRelative(((x / (1 - x)) * 22414) / 17.031, measured, 0.12);
  }
});

const anyPair = fc.constantFrom(...constants);
const anyTemperature = fc.double({ min: 180, max: 600, noNaN: true });

test('the slopes are the derivatives, inside and outside the range', () => {
  fc.assert(
    fc.property(anyPair, anyTemperature, (h, T) => {
      const step = 1e-3;
      const rise = (lnHenry(h, T + step) - lnHenry(h, T - step)) / (2 * step);
      expect(Math.abs(lnHenrySlope(h, T) - rise)).toBeLessThan(2e-7);
      const growth = (partialVolume(h, T + step) - partialVolume(h, T - step)) / (2 * step);
      expect(Math.abs(partialVolumeSlope(h, T) - growth)).toBeLessThan(2e-12);
    }),
    { numRuns: 500 },
  );
});

test('Henry constant, volume and both slopes run on without step at the ends of the range', () => {
  for (const h of constants.filter((each) => each.fromK < each.toK)) {
    for (const T of [h.fromK, h.toK]) {
      for (const of of [lnHenry, lnHenrySlope, partialVolume, partialVolumeSlope]) {
        expect(Math.abs(of(h, T * (1 + 1e-12)) - of(h, T * (1 - 1e-12)))).toBeLessThan(1e-9);
      }
    }
  }
});

test('a constant known at one temperature stays what it is', () => {
  const helium = henryConstant('CH3OH', 'He')!;
  expect(lnHenry(helium, 250)).toBe(lnHenry(helium, 298.15));
  expect(lnHenrySlope(helium, 350)).toBeCloseTo(0, 15);
  expect(partialVolume(helium, 300)).toBe(0);
});

test('an unknown pair has no Henry constant', () => {
  expect(henryConstant('NH3', 'CO2')).toBeUndefined();
  expect(henryConstant('N2', 'H2')).toBeUndefined();
});
