import fc from 'fast-check';
import { expect, test } from 'vitest';
import { createCoolingSplit } from '../../src/blocks/cooling.ts';
import { expectClose, mixtureOf, streamOf } from './helpers.ts';

const mixture = mixtureOf(['H2', 'N2', 'NH3']);
const split = createCoolingSplit(mixture);
const at = (celsius: number) => streamOf(mixture, { celsius, bar: 190, flows: { H2: 3, N2: 1, NH3: 1 } });
const cool = (from: number, to: number, setting: Parameters<typeof split>[3]) => {
  const [inlet, outlet] = [at(from), at(to)];
  return split(inlet, outlet, outlet.enthalpyW - inlet.enthalpyW, setting);
};
const setting = { water: 298.15, approach: 10 };

test('water and refrigeration together take the whole duty', () => {
  const celsius = fc.double({ min: -40, max: 150, noNaN: true });
  fc.assert(
    fc.property(celsius, celsius, fc.double({ min: 273, max: 310, noNaN: true }), (a, b, water) => {
      const [from, to] = [Math.max(a, b), Math.min(a, b)];
      const { details } = cool(from, to, { water, approach: 8 });
      const duty = (at(to).enthalpyW - at(from).enthalpyW) / 1e3;
      expectClose(details['water_duty_kW']! + details['refrigeration_duty_kW']!, duty, 1e-9);
      expect(details['water_duty_kW']).toBeLessThanOrEqual(1e-9);
      expect(details['refrigeration_duty_kW']).toBeLessThanOrEqual(0);
    }),
    { numRuns: 50 },
  );
});

test('water takes the heat down to its own temperature plus the approach', () => {
  const { details } = cool(60, -5, setting);
  expectClose(details['water_duty_kW']!, (at(35).enthalpyW - at(60).enthalpyW) / 1e3, 1e-9);
});

test('the power is heat times lift over evaporator temperature, by the Carnot factor and its share reached', () => {
  // 1 W at an evaporator of 258.15 K against a condenser of 308.15 K: 50/258.15 = 0.19369 W ideal.
  const { powerW, details, assumptions } = cool(60, -5, { ...setting, second_law_efficiency: 0.6 });
  expectClose(powerW / (-1e3 * details['refrigeration_duty_kW']!), 0.193686 / 0.6, 1e-6);
  expect(details['evaporator_K']).toBe(258.15);
  expect(assumptions).toEqual([
    'Refrigeration: evaporator 10 K below the condensate, condenser 10 K above the cooling water, 60 % of the Carnot performance.',
  ]);
});

test('half the Carnot performance is taken where nothing is said', () => {
  const { powerW, assumptions } = cool(60, -5, setting);
  expectClose(powerW, cool(60, -5, { ...setting, second_law_efficiency: 0.5 }).powerW, 1e-12);
  expect(assumptions[0]).toMatch(/50 % of the Carnot performance \(common practice\)/);
});

test('above the reach of water no refrigeration runs', () => {
  const { powerW, details, assumptions } = cool(60, 36, setting);
  expect(powerW).toBe(0);
  expect(details['refrigeration_duty_kW']).toBe(0);
  expect(assumptions).toEqual([]);
});

test('a stream that comes in below the reach of water is all refrigeration', () => {
  const { details } = cool(20, -5, setting);
  expectClose(details['water_duty_kW']!, 0, 1e-9);
});

test('colder costs more power for each watt', () => {
  const perWatt = [20, 0, -20, -33].map((celsius) => {
    const { powerW, details } = cool(60, celsius, setting);
    return powerW / -details['refrigeration_duty_kW']!;
  });
  expect(perWatt).toEqual(perWatt.toSorted((a, b) => a - b));
});

const levels = [286.15, 273.15, 255.15];
/** All levels of the setting: duty and power in kW. */
const levelsOf = (from: number, to: number) => cool(from, to, { ...setting, levels });

test('levels in series: each takes the heat between the one before it and its evaporator plus the approach', () => {
  const { details, powerW } = levelsOf(60, -8);
  const limits = [35, 23, 10, -8];
  details.levels.forEach((level, k) => {
    const duty = (at(limits[k + 1]!).enthalpyW - at(limits[k]!).enthalpyW) / 1e3;
    expectClose(level.duty_kW, duty, 1e-9);
    expect(level.evaporator_K).toBe(levels[k]);
    expectClose(level.power_kW, ((-duty * (308.15 - levels[k]!)) / levels[k]!) * 2, 1e-9);
  });
  expectClose(powerW, 1e3 * details.levels.reduce((sum, level) => sum + level.power_kW, 0), 1e-9);
  expect(details.evaporator_K).toBe(255.15);
});

test('levels take no more and no less than one evaporator, for less power', () => {
  const celsius = fc.double({ min: -8, max: 150, noNaN: true });
  fc.assert(
    fc.property(celsius, celsius, (a, b) => {
      const [from, to] = [Math.max(a, b), Math.min(a, b)];
      const series = levelsOf(from, to);
      const coldest = cool(from, to, { ...setting, levels: [255.15] });
      const { refrigeration_duty_kW: all } = series.details;
      expectClose(all, coldest.details.refrigeration_duty_kW, 1e-9);
      expectClose(
        series.details.levels.reduce((sum, { duty_kW }) => sum + duty_kW, 0),
        all,
        1e-9,
      );
      expect(series.powerW).toBeLessThanOrEqual(coldest.powerW + 1e-9);
    }),
    { numRuns: 50 },
  );
});

test('a level colder than needed is idle, and the one that gets there runs at its own temperature', () => {
  const { details } = levelsOf(60, 12);
  expect(details.levels[2]).toEqual({ evaporator_K: 255.15, duty_kW: 0, power_kW: 0 });
  expect(details.levels[1]!.duty_kW).toBeLessThan(0);
  expect(details.evaporator_K).toBe(273.15);
});

test('where water is enough every level is idle', () => {
  const { details, powerW, assumptions } = levelsOf(60, 36);
  expect(details.levels.every(({ duty_kW, power_kW }) => duty_kW === 0 && power_kW === 0)).toBe(true);
  expect([powerW, details.evaporator_K, assumptions]).toEqual([0, 0, []]);
});

test('the levels are said among the assumptions', () => {
  expect(levelsOf(60, -8).assumptions).toEqual([
    'Refrigeration: chiller levels in series at 13.0 degC, 0.0 degC, -18.0 degC, each cooling to 10 K above its evaporator, condenser 10 K above the cooling water, 50 % of the Carnot performance (common practice).',
  ]);
});

test('an outlet that no level reaches is a fault', () => {
  expect(levelsOf(60, -8).faults).toEqual([]);
  expect(levelsOf(60, -9).faults).toEqual([
    {
      code: 'colder-than-refrigerant',
      what: 'The outlet of -9.0 degC is colder than the coldest chiller level can make it.',
      why: 'that level evaporates at -18.0 degC and comes within 10.0 K of the stream, which is -8.0 degC',
      mend: 'add a level at -19.0 degC or below, or let the outlet be -8.0 degC or warmer',
    },
  ]);
});
