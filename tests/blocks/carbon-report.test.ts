import { expect, test } from 'vitest';
import { createCarbonReport } from '../../src/blocks/carbon-report.ts';
import { expectClose, mixtureOf, streamOf } from './helpers.ts';

const mixture = mixtureOf(['CO', 'CO2', 'H2', 'H2O', 'CH4']);
const carbon = createCarbonReport(mixture);
const dry = streamOf(mixture, { celsius: 300, bar: 30, flows: { CO: 18, CO2: 4, H2: 70, CH4: 3, H2O: 5 } });
const wet = streamOf(mixture, {
  celsius: 640,
  bar: 30,
  flows: { CO: 1.5, CO2: 8, H2: 36, CH4: 15, H2O: 39.5 },
});

test('a reactor says its carbon activities and between which temperatures its gases are safe', () => {
  const details = carbon.details(dry, wet) as Record<string, number>;
  expect(details['carbon_activity_inlet']).toBeGreaterThan(1e3);
  expect(details['carbon_activity_outlet']).toBeLessThan(1);
  expect(details['inlet_carbon_free_above_K']).toBeGreaterThan(dry.temperatureK);
  expect(details['outlet_carbon_free_above_K']).toBeLessThan(wet.temperatureK);
  expect(details['outlet_carbon_free_below_K']).toBeGreaterThan(wet.temperatureK);
});

test('brought to its crossing temperature, the gas has the activity 1', () => {
  const { outlet_carbon_free_above_K: crossing } = carbon.details(dry, wet) as Record<string, number>;
  const there = streamOf(mixture, {
    kelvin: crossing!,
    bar: 30,
    flows: { CO: 1.5, CO2: 8, H2: 36, CH4: 15, H2O: 39.5 },
  });
  // a millionth of a kelvin is how close the crossing is sought
  expectClose((carbon.details(there, there) as Record<string, number>)['carbon_activity_inlet']!, 1, 1e-6);
});

test('the warning names up to two places, of more only the worst', () => {
  expect(carbon.warnings([{ name: 'outlet', stream: wet }])).toEqual([]);
  const message = (...names: string[]) =>
    carbon.warnings(names.map((name) => ({ name, stream: dry })))[0]!.message;
  expect(message('inlet')).toMatch(/^carbon activity of \S+ at the inlet: carbon can form at equilibrium/);
  expect(message('inlet', 'outlet')).toMatch(/at the inlet and \S+ at the outlet: /);
  expect(message('a', 'b', 'c')).toMatch(
    /^carbon activity of \S+ at the a, the largest of 3 places above 1: /,
  );
});

test('where nothing holds carbon there is nothing to say', () => {
  const plain = mixtureOf(['H2', 'N2', 'NH3']);
  const stream = streamOf(plain, { celsius: 300, bar: 150, flows: { H2: 3, N2: 1 } });
  const report = createCarbonReport(plain);
  expect(new Set(Object.values(report.details(stream, stream)))).toEqual(new Set([null]));
  expect(report.warnings([{ name: 'inlet', stream }])).toEqual([]);
});
