import { expect, test } from 'vitest';
import { blockKinds } from '../../src/blocks/registry.ts';
import {
  components,
  expectClose,
  faultsOf,
  flowOf,
  mixtureOf,
  refusedBySchema,
  streamOf,
  trial,
  troubleOf,
} from './helpers.ts';

const ids = ['H2', 'N2', 'CH4', 'H2O'];
const mixture = mixtureOf(ids);
const purge = streamOf(mixture, { celsius: 40, bar: 100, flows: { H2: 60, N2: 20, CH4: 15, H2O: 0.05 } });
const membrane = { recover: { permeate: { H2: '90 %', N2: '5 %' } }, pressures: { permeate: '25 bar' } };

test('a membrane recovers what it is said to and leaves the rest', () => {
  const { outlets } = trial('separator', membrane, mixture, [purge]);
  const [permeate, rest] = outlets;
  expectClose(flowOf(permeate!, mixture, 'H2'), 54, 1e-12);
  expectClose(flowOf(permeate!, mixture, 'N2'), 1, 1e-12);
  expect(flowOf(permeate!, mixture, 'CH4')).toBe(0);
  expectClose(flowOf(rest!, mixture, 'H2'), 6, 1e-12);
  expect(flowOf(rest!, mixture, 'CH4')).toBe(15);
});

test('outlets leave at the temperature of the inlet and at their own pressure; the duty pays for it', () => {
  const { outlets, report } = trial('separator', membrane, mixture, [purge]);
  expect(outlets.map((out) => out.pressurePa)).toEqual([25e5, 100e5]);
  expect(outlets.map((out) => out.temperatureK)).toEqual([purge.temperatureK, purge.temperatureK]);
  const added = outlets.reduce((sum, out) => sum + out.enthalpyW, -purge.enthalpyW);
  expectClose(report.dutyW, added, 1e-9);
  expect(report.assumptions).toEqual(['Its outlets leave at the temperature of its inlet.']);
});

test('a drier that takes all water leaves none, though it is taken in two parts', () => {
  const raw = { recover: { a: { H2O: '90 %' }, b: { H2O: '10 %' } } };
  const { outlets } = trial('separator', raw, mixture, [purge]);
  expectClose(flowOf(outlets[2]!, mixture, 'H2O'), 0, 1e-17);
});

test('recoveries above 100 % in sum are refused', () => {
  expect(
    faultsOf(
      'separator',
      { recover: { a: { H2: '70 %' }, b: { H2: '40 %' } } },
      { components: components(...ids) },
    ),
  ).toEqual([
    {
      path: ['recover'],
      code: 'split-above-one',
      what: 'The recoveries of H2 add up to 110 %.',
      why: 'a separator cannot give out more than it takes in',
      mend: 'lower them until H2 adds up to 100 % or less; what is left leaves by the outlet rest',
    },
  ]);
  expect(refusedBySchema('separator', { recover: { a: { H2: '120 %' } } })).toBe(true);
});

test('a component or an outlet nobody knows is named with its place', () => {
  const faults = faultsOf(
    'separator',
    { recover: { permeate: { H3: '90 %' } }, pressures: { permeat: '5 bar' } },
    { components: components(...ids) },
  );
  expect(faults.map(({ path, code, mend }) => ({ path, code, mend }))).toEqual([
    { path: ['recover', 'permeate', 'H3'], code: 'unknown-component', mend: 'write H2' },
    { path: ['pressures', 'permeat'], code: 'unknown-port', mend: 'name one of them' },
  ]);
});

test('it cannot raise a pressure', () => {
  const raw = { recover: { permeate: { H2: '90 %' } }, pressures: { rest: '120 bar' } };
  expect(troubleOf(() => trial('separator', raw, mixture, [purge]))).toBe('pressure-rise');
});

test('an outlet passes what it recovers, the rest what is not wholly recovered', () => {
  const kind = blockKinds.get('separator')!;
  const setting = { recover: { permeate: { H2: 1, N2: 0.05 } } };
  const passes = (outlet: string) => components(...ids).map((c) => kind.passes!(setting, outlet, c, 'gas'));
  expect(passes('permeate')).toEqual([true, true, false, false]);
  expect(passes('rest')).toEqual([false, true, true, true]);
});
