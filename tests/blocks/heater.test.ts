import fc from 'fast-check';
import { expect, test } from 'vitest';
import { lnVapourPressure } from '../../src/properties/vapour-pressure.ts';
import { enthalpySize, expectClose, faultsOf, mixtureOf, streamOf, trial, troubleOf } from './helpers.ts';

const mixture = mixtureOf(['H2', 'N2', 'NH3']);
const loopGas = streamOf(mixture, { celsius: 20, bar: 150, flows: { H2: 3, N2: 1, NH3: 1 } });

test('a duty equals the duty of the temperature it leads to', () => {
  fc.assert(
    fc.property(fc.double({ min: -30, max: 500, noNaN: true }), (celsius) => {
      const byTemperature = trial('heater', { temperature: `${celsius} degC` }, mixture, [loopGas]);
      const byDuty = trial('heater', { duty: `${byTemperature.report.dutyW} W` }, mixture, [loopGas]);
      expectClose(byDuty.outlets[0]!.temperatureK, celsius + 273.15, 1e-7);
      expectClose(byDuty.report.dutyW, byTemperature.report.dutyW, 1e-12 * enthalpySize([loopGas], mixture));
    }),
    { numRuns: 50 },
  );
});

test('hydrogen and nitrogen heated by 100 K take up what their heat capacities say', () => {
  const gas = mixtureOf(['H2', 'N2'], { gas: 'ideal' });
  const inlet = streamOf(gas, { kelvin: 300, bar: 50, flows: { H2: 3, N2: 1 } });
  const { report } = trial('heater', { temperature: '400 K' }, gas, [inlet]);
  // NIST-JANAF, 4th ed. (1998): H(400) - H(300) = 2.959 - 0.053 kJ/mol for H2 and 2.971 - 0.054 for N2.
  expectClose(report.dutyW, 3 * 2906 + 2917, 6);
});

test.each([
  ['NH3', 10],
  ['NH3', 2],
  ['CH3OH', 1.5],
  ['H2O', 30],
])('pure %s at %d bar boils at its boiling point, whatever share is asked for', (id, bar) => {
  const pure = mixtureOf([id]);
  const inlet = streamOf(pure, { kelvin: 300, bar, flows: { [id]: 2 } });
  const at = (share: string) => trial('heater', { vapour_fraction: share }, pure, [inlet]);
  const [bubble, half, dew] = [at('0 %'), at('50 %'), at('100 %')];
  for (const { outlets } of [bubble, half, dew]) {
    expectClose(lnVapourPressure(pure.components[0]!, outlets[0]!.temperatureK), Math.log(bar * 1e5), 1e-10);
  }
  expectClose(half.outlets[0]!.vapourFraction, 0.5, 1e-12);
  expectClose(half.outlets[0]!.liquidMolPerS[0]!, 1, 1e-12);
  expect(bubble.outlets[0]!.vapourFraction).toBe(0);
  expect(dew.outlets[0]!.vapourFraction).toBe(1);
  // Half the heat of vaporisation lies on either side.
  expectClose(
    half.report.dutyW - bubble.report.dutyW,
    dew.report.dutyW - half.report.dutyW,
    1e-6 * Math.abs(dew.report.dutyW),
  );
});

test('a mixture boils over a range, from its bubble point to its dew point', () => {
  const both = mixtureOf(['CH3OH', 'H2O']);
  const inlet = streamOf(both, { celsius: 20, bar: 1.01325, flows: { CH3OH: 1, H2O: 1 } });
  const at = (share: string) => trial('heater', { vapour_fraction: share }, both, [inlet]).outlets[0]!;
  const [bubble, half, dew] = [at('0 %'), at('50 %'), at('100 %')];
  expect(bubble.temperatureK).toBeLessThan(half.temperatureK - 1);
  expect(half.temperatureK).toBeLessThan(dew.temperatureK - 1);
  expectClose(half.vapourFraction, 0.5, 1e-9);
  expect(bubble.vapourFraction).toBe(0);
  expect(dew.vapourFraction).toBe(1);
});

test('just above its dew point a gas holds no liquid, just below it does', () => {
  const [dew] = trial('heater', { vapour_fraction: '100 %' }, mixture, [loopGas]).outlets;
  const near = (by: number) =>
    trial('heater', { temperature: `${dew!.temperatureK + by} K` }, mixture, [loopGas]).outlets[0]!
      .vapourFraction;
  expect(near(0.001)).toBe(1);
  expect(near(-0.001)).toBeLessThan(1);
});

test('a share of vapour that does not exist is refused', () => {
  // Hydrogen does not condense, so all cannot be liquid.
  const none = mixtureOf(['H2', 'NH3'], { dissolvedGases: false });
  const wet = streamOf(none, { celsius: -20, bar: 100, flows: { H2: 1, NH3: 1 } });
  expect(troubleOf(() => trial('heater', { vapour_fraction: '0 %' }, none, [wet]))).toBe('vapour-fraction');
  // Above its critical pressure of 113 bar ammonia does not boil.
  const pure = mixtureOf(['NH3']);
  const dense = streamOf(pure, { celsius: 20, bar: 150, flows: { NH3: 1 } });
  expect(troubleOf(() => trial('heater', { vapour_fraction: '50 %' }, pure, [dense]))).toBe(
    'vapour-fraction',
  );
});

test('exactly one of temperature, duty and vapour fraction is set', () => {
  expect(faultsOf('heater', {})).toEqual([
    {
      path: [],
      code: 'missing-setting',
      what: 'None of temperature, duty and vapour_fraction is given.',
      why: 'one of them fixes what this block does',
      mend: 'add one, e.g. temperature: 280 degC',
    },
  ]);
  expect(faultsOf('heater', { temperature: '280 degC', duty: '1 MW' })).toEqual([
    {
      path: ['duty'],
      code: 'too-many-settings',
      what: 'temperature and duty are given together.',
      why: 'only one of temperature, duty and vapour_fraction can be free to choose; the others follow from the balance',
      mend: 'keep one and take out the rest',
    },
  ]);
});

test('a pressure drop larger than the pressure is refused', () => {
  const raw = { temperature: '50 degC', pressure_drop: '160 bar' };
  expect(troubleOf(() => trial('heater', raw, mixture, [loopGas]))).toBe('pressure-drop');
});
