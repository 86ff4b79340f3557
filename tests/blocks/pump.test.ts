import { expect, test } from 'vitest';
import { expectClose, mixtureOf, streamOf, trial, troubleOf } from './helpers.ts';

const mixture = mixtureOf(['NH3', 'H2']);
const liquid = streamOf(mixture, { celsius: -33, bar: 1.5, flows: { NH3: 100 } });

test('the power of a pump is volume flow times pressure rise over efficiency', () => {
  const { report } = trial('pump', { pressure: '25 bar', efficiency: '60 %' }, mixture, [liquid]);
  // Liquid ammonia at -33 degC weighs 681.6 kg/m3 (Gao et al. 2020, from memory): 25.0 cm3/mol.
  const volume = 100 * (17.031e-3 / 681.6);
  expectClose(report.powerW, (volume * 23.5e5) / 0.6, 0.003 * report.powerW);
  expect(report.assumptions).toEqual([]);
});

test('an efficiency not given is 70 %, and the report says so', () => {
  const given = trial('pump', { pressure: '25 bar', efficiency: '70 %' }, mixture, [liquid]).report;
  const left = trial('pump', { pressure: '25 bar' }, mixture, [liquid]).report;
  expectClose(left.powerW, given.powerW, 1e-12 * given.powerW);
  expect(left.assumptions).toEqual(['Pump efficiency 70 % (common practice; none given).']);
});

test('liquid stays liquid at any discharge pressure, and warms by little', () => {
  for (const pressure of ['5 bar', '25 bar', '100 bar', '200 bar', '400 bar']) {
    const [out] = trial('pump', { pressure }, mixture, [liquid]).outlets;
    expect(out!.vapourFraction).toBe(0);
    expect(out!.temperatureK - liquid.temperatureK).toBeGreaterThan(0);
    expect(out!.temperatureK - liquid.temperatureK).toBeLessThan(12);
  }
});

test('gas at its suction is worth a word', () => {
  const gassy = streamOf(mixture, { celsius: -20, bar: 30, flows: { NH3: 100, H2: 2 } });
  const { report } = trial('pump', { pressure: '60 bar' }, mixture, [gassy]);
  expect(report.warnings.map((warning) => warning.code)).toEqual(['gas-at-suction']);
  expect(trial('pump', { pressure: '60 bar' }, mixture, [liquid]).report.warnings).toEqual([]);
});

test('it cannot lower the pressure', () => {
  expect(troubleOf(() => trial('pump', { pressure: '1 bar' }, mixture, [liquid]))).toBe('pressure-fall');
});
