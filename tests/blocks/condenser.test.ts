import fc from 'fast-check';
import { expect, test } from 'vitest';
import { blockKinds } from '../../src/blocks/registry.ts';
import { saturatedAmmoniaFraction } from '../published/ammonia-vapour-liquid.ts';
import {
  components,
  enthalpySize,
  expectClose,
  faultsOf,
  flowOf,
  fractionOf,
  mixtureOf,
  refusedBySchema,
  streamOf,
  trial,
  troubleOf,
} from './helpers.ts';

const ids = ['H2', 'N2', 'NH3', 'Ar', 'CH4'];
const mixture = mixtureOf(ids);
const fromConverter = streamOf(mixture, {
  celsius: 60,
  bar: 190,
  flows: { H2: 54, N2: 18, NH3: 17, Ar: 4, CH4: 7 },
});

// Tolerance: the correlation holds to 10 % of y, and inerts shift it by less than that.
test.each([
  [-20, 150],
  [-5, 190],
  [0, 200],
  [20, 300],
])('gas leaving a condenser at %d degC and %d bar holds the published share of ammonia', (celsius, bar) => {
  const plain = mixtureOf(['H2', 'N2', 'NH3']);
  const inlet = streamOf(plain, { celsius: 60, bar, flows: { H2: 3, N2: 1, NH3: 1 } });
  const [gas, liquid] = trial('condenser', { temperature: `${celsius} degC` }, plain, [inlet]).outlets;
  const published = saturatedAmmoniaFraction(celsius + 273.15, bar * 1e5);
  expectClose(fractionOf(gas!, plain, 'NH3'), published, 0.1 * published);
  expect(fractionOf(liquid!, plain, 'NH3')).toBeGreaterThan(0.97);
});

test('a condenser set by the duty of a temperature comes to that temperature', () => {
  fc.assert(
    fc.property(fc.double({ min: -35, max: 55, noNaN: true }), (celsius) => {
      const byTemperature = trial('condenser', { temperature: `${celsius} degC` }, mixture, [fromConverter]);
      const { dutyW } = byTemperature.report;
      const byDuty = trial('condenser', { duty: `${dutyW} W` }, mixture, [fromConverter]);
      expectClose(byDuty.outlets[0]!.temperatureK, celsius + 273.15, 1e-7);
      expectClose(byDuty.report.dutyW, dutyW, 1e-12 * enthalpySize([fromConverter], mixture));
      byDuty.outlets[1]!.flowsMolPerS.forEach((flow, i) => {
        expectClose(flow, byTemperature.outlets[1]!.flowsMolPerS[i]!, 1e-8);
      });
    }),
    { numRuns: 40 },
  );
});

test('colder condenses more, and dissolves less hydrogen in it', () => {
  const at = (celsius: number) =>
    trial('condenser', { temperature: `${celsius} degC` }, mixture, [fromConverter]).outlets[1]!;
  const temperatures = [-30, -15, 0, 15, 30];
  const ammonia = temperatures.map((celsius) => flowOf(at(celsius), mixture, 'NH3'));
  const hydrogen = temperatures.map((celsius) => fractionOf(at(celsius), mixture, 'H2'));
  expect(ammonia).toEqual(ammonia.toSorted((a, b) => b - a));
  expect(hydrogen).toEqual(hydrogen.toSorted((a, b) => a - b));
});

test('without dissolved gases the condensate is ammonia alone', () => {
  const dry = mixtureOf(ids, { dissolvedGases: false });
  const [, liquid] = trial('condenser', { temperature: '-5 degC' }, dry, [fromConverter]).outlets;
  expect(fractionOf(liquid!, dry, 'NH3')).toBe(1);
});

test('where nothing condenses the report says so', () => {
  const { outlets, report } = trial('condenser', { temperature: '58 degC' }, mixture, [
    streamOf(mixture, { celsius: 60, bar: 50, flows: { H2: 3, N2: 1, NH3: 0.1 } }),
  ]);
  expect(mixture.total(outlets[1]!)).toBe(0);
  expect(report.warnings).toEqual([
    { code: 'no-condensate', message: 'nothing condenses at this temperature and pressure' },
  ]);
});

test('a condenser that heats says so', () => {
  const cold = streamOf(mixture, { celsius: -20, bar: 190, flows: { H2: 3, N2: 1, NH3: 1 } });
  const { report } = trial('condenser', { temperature: '0 degC' }, mixture, [cold]);
  expect(report.warnings.map((warning) => warning.code)).toEqual(['condenser-heats']);
});

test('below the freezing point of the condensate it warns', () => {
  const water = mixtureOf(['H2', 'CH4', 'H2O']);
  const inlet = streamOf(water, { celsius: 200, bar: 30, flows: { H2: 1, CH4: 5, H2O: 10 } });
  const { report } = trial('condenser', { temperature: '-10 degC' }, water, [inlet]);
  expect(report.warnings.map((warning) => warning.code)).toContain('below-freezing');
});

test('condense names what may condense: water then stays in the gas', () => {
  const both = mixtureOf(['N2', 'NH3', 'H2O']);
  const inlet = streamOf(both, { celsius: 150, bar: 30, flows: { N2: 1, NH3: 1, H2O: 1 } });
  const rule = trial('condenser', { temperature: '10 degC' }, both, [inlet]).outlets[1]!;
  const named = trial('condenser', { temperature: '10 degC', condense: ['NH3'] }, both, [inlet]);
  expect(flowOf(rule, both, 'H2O')).toBeGreaterThan(0.99);
  expect(flowOf(named.outlets[1]!, both, 'H2O')).toBe(0);
  expect(flowOf(named.outlets[1]!, both, 'NH3')).toBeGreaterThan(0.1);
  expect(named.report.warnings.map((warning) => warning.code)).toContain('gas-would-condense');
});

test('the duty is split between water and refrigeration, and the report carries the power', () => {
  const raw = { temperature: '-5 degC', cooling: { water: '25 degC', approach: '10 K' } };
  const { report } = trial('condenser', raw, mixture, [fromConverter]);
  const { water_duty_kW: water, refrigeration_duty_kW: chilled } = report.details as Record<string, number>;
  expectClose(water! + chilled!, report.dutyW / 1e3, 1e-9 * Math.abs(report.dutyW));
  expect(water).toBeLessThan(0);
  expect(chilled).toBeLessThan(0);
  // Carnot between 258.15 K and 308.15 K, half of it reached.
  expectClose(report.refrigerationW, ((-chilled! * 1e3 * 50) / 258.15) * 2, 1e-6 * report.refrigerationW);
});

test('graphite leaves with the liquid, also where nothing condenses', () => {
  const sooty = mixtureOf(['CO', 'H2O', 'C_gr']);
  const inlet = streamOf(sooty, { celsius: 300, bar: 2, flows: { CO: 1, H2O: 0.01, C_gr: 0.1 } });
  const [gas, liquid] = trial('condenser', { temperature: '200 degC' }, sooty, [inlet]).outlets;
  expect(flowOf(liquid!, sooty, 'C_gr')).toBe(0.1);
  expect(flowOf(gas!, sooty, 'C_gr')).toBe(0);
  expect(flowOf(liquid!, sooty, 'H2O')).toBe(0);
});

test('what may leave by which outlet', () => {
  const kind = blockKinds.get('condenser')!;
  const [h2, nh3] = components('H2', 'NH3');
  expect(kind.ports({})).toEqual({ inlets: ['in'], outlets: ['gas', 'liquid'] });
  const passes = (outlet: string, role: 'condensable' | 'dissolved' | 'gas' | 'solid', setting = {}) =>
    kind.passes!(setting, outlet, role === 'condensable' ? nh3! : h2!, role);
  expect(
    (['condensable', 'dissolved', 'gas', 'solid'] as const).map((role) => passes('liquid', role)),
  ).toEqual([true, true, false, true]);
  expect((['condensable', 'dissolved', 'gas', 'solid'] as const).map((role) => passes('gas', role))).toEqual([
    true,
    true,
    true,
    false,
  ]);
  expect(passes('liquid', 'gas', { condense: ['H2'] })).toBe(true);
});

test('faults: temperature and duty, unknown or unfit names under condense', () => {
  const list = components('H2', 'NH3', 'C_gr');
  const codes = (raw: unknown) => faultsOf('condenser', raw, { components: list }).map((fault) => fault.code);
  expect(codes({})).toEqual(['missing-setting']);
  expect(codes({ temperature: '0 degC', duty: '-1 MW' })).toEqual(['too-many-settings']);
  expect(codes({ temperature: '0 degC', condense: ['NH4'] })).toEqual(['unknown-component']);
  expect(
    faultsOf('condenser', { temperature: '0 degC', condense: ['NH3', 'C_gr'] }, { components: list }),
  ).toEqual([
    {
      path: ['condense', 1],
      code: 'no-vapour-pressure',
      what: 'C_gr cannot be named under condense.',
      why: 'a solid is in neither gas nor liquid, and leaves with the liquid anyway',
      mend: 'take it out',
    },
  ]);
  expect(refusedBySchema('condenser', { temperature: '0 degC', condense: [] })).toBe(true);
  expect(refusedBySchema('condenser', { temperature: '0 degC', cooling: { water: '25 degC' } })).toBe(true);
});

test('a pressure drop larger than the pressure is refused', () => {
  const raw = { temperature: '0 degC', pressure_drop: '200 bar' };
  expect(troubleOf(() => trial('condenser', raw, mixture, [fromConverter]))).toBe('pressure-drop');
});

test('chiller levels: faults of their order, of an idle one, and of an outlet too cold for them', () => {
  const of = (temperature: string, levels: string[]) =>
    faultsOf('condenser', { temperature, cooling: { water: '25 degC', approach: '10 K', levels } }).map(
      ({ path, code }) => [path.join('.'), code],
    );
  expect(of('-8 degC', ['13 degC', '0 degC', '-18 degC'])).toEqual([]);
  expect(of('-8 degC', ['0 degC', '13 degC', '-18 degC'])).toEqual([['cooling.levels.1', 'level-order']]);
  expect(of('-8 degC', ['25 degC', '-18 degC'])).toEqual([['cooling.levels.0', 'idle-setting']]);
  expect(of('-20 degC', ['13 degC', '-18 degC'])).toEqual([['temperature', 'colder-than-refrigerant']]);
  const none = { water: '25 degC', approach: '10 K', levels: [] };
  expect(refusedBySchema('condenser', { temperature: '-8 degC', cooling: none })).toBe(true);
});

test('a duty that leads below the coldest level is a fault of the closed plant', () => {
  const cooling = { water: '25 degC', approach: '10 K', levels: ['0 degC'] };
  const { report } = trial('condenser', { duty: '-600 kW', cooling }, mixture, [fromConverter]);
  expect(report.details['temperature_K']).toBeLessThan(283.15);
  expect(report.faults.map((fault) => fault.code)).toEqual(['colder-than-refrigerant']);
});

test('below the reach of any cooling water, refrigeration that is not counted is warned of', () => {
  const codes = (raw: object) =>
    trial('condenser', raw, mixture, [fromConverter]).report.warnings.map((w) => w.code);
  expect(codes({ temperature: '19 degC' })).toEqual(['refrigeration-not-counted']);
  expect(codes({ temperature: '21 degC' })).toEqual([]);
  expect(codes({ temperature: '-5 degC', cooling: { water: '25 degC', approach: '10 K' } })).toEqual([]);
});

test('a condensate below its freezing point is warned of, by name', () => {
  const wet = mixtureOf(['H2', 'N2', 'H2O']);
  const inlet = streamOf(wet, { celsius: 60, bar: 30, flows: { H2: 3, N2: 1, H2O: 0.02 } });
  const cooling = { water: '25 degC', approach: '10 K' };
  const { warnings } = trial('condenser', { temperature: '-10 degC', cooling }, wet, [inlet]).report;
  expect(warnings.map((w) => w.code)).toEqual(['below-freezing']);
  expect(warnings[0]!.message).toMatch(/^-10.0 degC is below 0.0 degC, .* H2O may freeze$/);
});
