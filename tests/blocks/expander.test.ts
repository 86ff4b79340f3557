import { describe, expect, test } from 'vitest';
import { constantHeatGas } from './constant-heat-gas.ts';
import {
  expectBalances,
  expectClose,
  faultsOf,
  mixtureOf,
  refusedBySchema,
  streamOf,
  trial,
  troubleOf,
} from './helpers.ts';

const mixture = mixtureOf(['H2', 'N2', 'NH3', 'Ar', 'CH4']);
const purge = streamOf(mixture, { celsius: 120, bar: 190, flows: { H2: 4, N2: 3, Ar: 1, CH4: 2 } });
const run = (raw: object, inlet = purge) => trial('expander', raw, mixture, [inlet]);

describe('a gas of constant heat', () => {
  // T₂ = T₁ − η (T₁ − T₁ (P₂/P₁)^((k−1)/k)): 1000 K, 10 to 1 bar, k = 1.4, 85 %: 590.26 K; cp = 3.5 R.
  test('leaves an expander of 85 % at the temperature of the textbook', () => {
    const air = constantHeatGas(1.4, 28.97e-3);
    const inlet = streamOf(air, { kelvin: 1000, bar: 10, flows: { X: 1 } });
    const { outlets, report } = trial('expander', { ratio: 10, efficiency: '85 %' }, air, [inlet]);
    const outletK = 1000 - 0.85 * (1000 - 1000 * 0.1 ** (0.4 / 1.4));
    expectClose(outlets[0]!.temperatureK, outletK, 1e-6);
    expectClose(report.powerW, -3.5 * 8.314462618 * (1000 - outletK), 0.01);
  });
});

test('power is delivered: negative, and what the gas gives is what it loses', () => {
  const t = run({ pressure: '40 bar', efficiency: '80 %' });
  expect(t.report.powerW).toBeLessThan(0);
  expectClose(t.report.powerW, t.outlets[0]!.enthalpyW - purge.enthalpyW, 1e-9 * Math.abs(purge.enthalpyW));
  expectBalances(t, mixture);
});

test('a generator delivers less than the shaft gives, and the energy balance still closes', () => {
  const plain = run({ pressure: '40 bar' }).report;
  const t = run({ pressure: '40 bar', drive_efficiency: '94 %' });
  expectClose(t.report.powerW, 0.94 * plain.powerW, 1e-9 * Math.abs(plain.powerW));
  expect(t.report.driveLossW).toBeGreaterThan(0);
  expectBalances(t, mixture);
});

test('it cools where a valve hardly does', () => {
  const valve = trial('valve', { pressure: '40 bar' }, mixture, [purge]).outlets[0]!;
  expect(run({ pressure: '40 bar' }).outlets[0]!.temperatureK).toBeLessThan(valve.temperatureK - 60);
});

test('pressure and ratio say the same', () => {
  const power = run({ pressure: '95 bar' }).report.powerW;
  expectClose(run({ ratio: 2 }).report.powerW, power, 1e-9 * Math.abs(power));
});

test('liquid in the discharge is worth a word, and the balances hold', () => {
  const wet = streamOf(mixture, { celsius: 40, bar: 190, flows: { H2: 3, N2: 1, NH3: 0.3 } });
  const t = run({ pressure: '30 bar' }, wet);
  expectBalances(t, mixture);
  expect(t.outlets[0]!.vapourFraction).toBeLessThan(1);
  const [warning] = t.report.warnings;
  expect(warning!.code).toBe('liquid-at-discharge');
  expect(warning!.message).toMatch(/^\d+\.\d mol % of the discharge is liquid/);
});

test('an efficiency not given is 80 %, and the report says so', () => {
  expect(run({ ratio: 2 }).report.assumptions).toEqual([
    'Isentropic efficiency 80 % (common practice; none given).',
  ]);
  expectClose(run({ ratio: 2 }).report.powerW, run({ ratio: 2, efficiency: '80 %' }).report.powerW, 1e-9);
});

test('it cannot raise the pressure; a discharge has to be given, once', () => {
  expect(troubleOf(() => run({ pressure: '300 bar' }))).toBe('pressure-rise');
  expect(refusedBySchema('expander', { ratio: 0.5 })).toBe(true);
  expect(faultsOf('expander', {}).map((f) => f.code)).toEqual(['missing-setting']);
  expect(faultsOf('expander', { ratio: 2, pressure: '3 bar' }).map((f) => f.code)).toEqual([
    'too-many-settings',
  ]);
});
