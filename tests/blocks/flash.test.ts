import { expect, test } from 'vitest';
import { blockKinds } from '../../src/blocks/registry.ts';
import {
  components,
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

const mixture = mixtureOf(['H2', 'N2', 'NH3', 'Ar', 'CH4']);
const inlet = streamOf(mixture, { celsius: 60, bar: 190, flows: { H2: 54, N2: 18, NH3: 17, Ar: 4, CH4: 7 } });
const condensate = trial('condenser', { temperature: '-5 degC' }, mixture, [inlet]).outlets[1]!;

test('condensate let down to 20 bar gives off nearly all its dissolved gas', () => {
  const { outlets, report } = trial('flash', { pressure: '20 bar', adiabatic: true }, mixture, [condensate]);
  const [gas, liquid] = outlets;
  expect(flowOf(gas!, mixture, 'H2')).toBeGreaterThan(0.8 * flowOf(condensate, mixture, 'H2'));
  expect(flowOf(gas!, mixture, 'NH3')).toBeLessThan(0.01 * flowOf(condensate, mixture, 'NH3'));
  expect(fractionOf(liquid!, mixture, 'NH3')).toBeGreaterThan(0.995);
  expect(report.dutyW).toBe(0);
  expectClose(
    gas!.enthalpyW + liquid!.enthalpyW,
    condensate.enthalpyW,
    1e-9 * Math.abs(condensate.enthalpyW),
  );
});

test('lower pressure gives off more gas and leaves the vessel colder', () => {
  const at = (bar: number) =>
    trial('flash', { pressure: `${bar} bar`, adiabatic: true }, mixture, [condensate]).outlets;
  const steps = [100, 40, 20, 10, 3, 1.5].map(at);
  const flows = steps.map(([gas]) => mixture.total(gas!));
  const temperatures = steps.map(([gas]) => gas!.temperatureK);
  expect(flows).toEqual(flows.toSorted((a, b) => a - b));
  expect(temperatures.slice(2)).toEqual(temperatures.slice(2).toSorted((a, b) => b - a));
});

test('condensate at the pressure of its condenser is at its bubble point', () => {
  const same = trial('flash', { pressure: '190 bar', adiabatic: true }, mixture, [condensate]).outlets;
  expectClose(mixture.total(same[0]!), 0, 1e-6 * mixture.total(condensate));
  const below = trial('flash', { pressure: '189 bar', temperature: '-5 degC' }, mixture, [
    condensate,
  ]).outlets;
  expect(mixture.total(below[0]!)).toBeGreaterThan(0);
  const squeezed = streamOf(mixture, {
    celsius: -5,
    bar: 191,
    flows: Object.fromEntries(mixture.components.map((c, i) => [c.id, condensate.flowsMolPerS[i]!])),
  });
  expect(squeezed.vapourFraction).toBe(0);
});

test('temperature and duty agree', () => {
  const byTemperature = trial('flash', { pressure: '5 bar', temperature: '10 degC' }, mixture, [condensate]);
  const byDuty = trial('flash', { pressure: '5 bar', duty: `${byTemperature.report.dutyW} W` }, mixture, [
    condensate,
  ]);
  expectClose(byDuty.outlets[0]!.temperatureK, 283.15, 1e-7);
  expect(byTemperature.report.dutyW).toBeGreaterThan(0);
});

test('a pure liquid boils down to the share its own heat pays for', () => {
  const pure = mixtureOf(['NH3']);
  const warm = streamOf(pure, { celsius: 25, bar: 12, flows: { NH3: 1 } });
  const [gas, liquid] = trial('flash', { pressure: '1.01325 bar', adiabatic: true }, pure, [warm]).outlets;
  // Boiling point 239.83 K; liquid from 25 to -33.3 degC gives 4.65 kJ/mol, evaporation takes 23.3 kJ/mol there
  // (Gao et al. 2020, from memory): one part in five. Ours gives 0.213: with the departures of the vapour model the
  // liquid's heat capacity comes out 6 to 11 % too large (see tests/properties/liquid-phase).
  expectClose(gas!.temperatureK, 239.83, 0.02);
  expectClose(pure.total(gas!), 0.2, 0.015);
  expectClose(pure.total(gas!) + pure.total(liquid!), 1, 1e-12);
});

test('it cannot raise the pressure', () => {
  expect(
    troubleOf(() => trial('flash', { pressure: '200 bar', adiabatic: true }, mixture, [condensate])),
  ).toBe('pressure-rise');
});

test('what may leave by which outlet', () => {
  const kind = blockKinds.get('flash')!;
  const [h2] = components('H2');
  expect(kind.ports({})).toEqual({ inlets: ['in'], outlets: ['gas', 'liquid'] });
  const passes = (outlet: string) =>
    (['condensable', 'dissolved', 'gas', 'solid'] as const).map((role) =>
      kind.passes!({}, outlet, h2!, role),
    );
  expect(passes('gas')).toEqual([true, true, true, false]);
  expect(passes('liquid')).toEqual([true, true, false, true]);
});

test('faults: exactly one of adiabatic, temperature and duty; a pressure is needed', () => {
  const codes = (raw: unknown) => faultsOf('flash', raw).map((fault) => fault.code);
  expect(codes({ pressure: '5 bar' })).toEqual(['missing-setting']);
  expect(codes({ pressure: '5 bar', adiabatic: true, temperature: '5 degC' })).toEqual(['too-many-settings']);
  expect(codes({ pressure: '5 bar', duty: '1 kW' })).toEqual([]);
  expect(refusedBySchema('flash', { adiabatic: true })).toBe(true);
});
