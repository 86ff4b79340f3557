import fc from 'fast-check';
import { expect, test } from 'vitest';
import { blockKinds } from '../../src/blocks/registry.ts';
import {
  components,
  expectClose,
  faultsOf,
  mixtureOf,
  refusedBySchema,
  streamOf,
  trial,
  troubleOf,
} from './helpers.ts';

const mixture = mixtureOf(['H2', 'N2', 'NH3', 'Ar']);
const recycle = streamOf(mixture, { celsius: -5, bar: 190, flows: { H2: 60, N2: 20, NH3: 5, Ar: 10 } });

test('a purge of 3 % takes 3 % of every component and the same state', () => {
  const { outlets, report } = trial('splitter', { fractions: { bleed: '3 %' } }, mixture, [recycle]);
  const [bleed, rest] = outlets;
  recycle.flowsMolPerS.forEach((flow, i) => {
    expectClose(bleed!.flowsMolPerS[i]!, 0.03 * flow, 1e-12);
    expectClose(rest!.flowsMolPerS[i]!, 0.97 * flow, 1e-12);
  });
  for (const out of outlets) {
    expect(out.temperatureK).toBe(recycle.temperatureK);
    expect(out.pressurePa).toBe(recycle.pressurePa);
    expect(out.vapourFraction).toBe(recycle.vapourFraction);
  }
  expect(report.details).toEqual({
    fractions: { bleed: expect.closeTo(0.03, 12), rest: expect.closeTo(0.97, 12) },
  });
});

test('what goes in comes out again to the last digit, however many outlets', () => {
  const parts = fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { minLength: 1, maxLength: 6 });
  fc.assert(
    fc.property(parts, (raw) => {
      const scale =
        Math.max(
          1,
          raw.reduce((sum, part) => sum + part, 0),
        ) *
        (1 + 1e-12);
      const fractions = Object.fromEntries(raw.map((part, k) => [`o${k}`, part / scale]));
      const { outlets } = trial('splitter', { fractions }, mixture, [recycle]);
      recycle.flowsMolPerS.forEach((flow, i) => {
        const sum = outlets.reduce((total, out) => total + out.flowsMolPerS[i]!, 0);
        expectClose(sum, flow, 4e-15 * flow);
        for (const out of outlets) expect(out.liquidMolPerS[i]).toBeLessThanOrEqual(out.flowsMolPerS[i]!);
      });
    }),
  );
});

test.each([
  ['36 kmol/h', 10],
  // 0.05 kg/s over the mean molar mass of the stream
  ['180 kg/h', (0.05 / mixture.mass(recycle)) * 95],
  // DIN 1343: 22.413970 m3/kmol at 0 degC and 1.01325 bar
  ['22.41397 Nm3/h', 1 / 3.6],
])('a flow of %s is that many moles', (text, molPerS) => {
  const { outlets } = trial('splitter', { flows: { bleed: text } }, mixture, [recycle]);
  expectClose(mixture.total(outlets[0]!), molPerS, 1e-7 * molPerS);
  expectClose(mixture.total(outlets[1]!), 95 - molPerS, 1e-7 * 95);
});

test('more than there is cannot be taken', () => {
  const run = () => trial('splitter', { flows: { a: '200 kmol/h', b: '200 kmol/h' } }, mixture, [recycle]);
  expect(troubleOf(run)).toBe('split-above-one');
  expect(faultsOf('splitter', { fractions: { a: '60 %', b: '50 %' } })).toEqual([
    {
      path: ['fractions'],
      code: 'split-above-one',
      what: 'The fractions add up to 110 %.',
      why: 'a splitter cannot give out more than it takes in',
      mend: 'lower them until they add up to 100 % or less; what is left leaves by the outlet rest',
    },
  ]);
});

test('either fractions or flows, not both and not neither', () => {
  expect(faultsOf('splitter', {}).map((fault) => fault.code)).toEqual(['missing-setting']);
  const both = { fractions: { a: '1 %' }, flows: { a: '1 kmol/h' } };
  expect(faultsOf('splitter', both).map((fault) => fault.code)).toEqual(['too-many-settings']);
});

test('the outlets are those named, then the rest; rest cannot be named', () => {
  const kind = blockKinds.get('splitter')!;
  expect(kind.ports({ fractions: { bleed: 0.03, side: 0.1 } })).toEqual({
    inlets: ['in'],
    outlets: ['bleed', 'side', 'rest'],
  });
  expect(refusedBySchema('splitter', { fractions: { rest: '3 %' } })).toBe(true);
  expect(refusedBySchema('splitter', { fractions: { bleed: '130 %' } })).toBe(true);
});

test('nothing passes an outlet of 0 %, and no rest is left of 100 %', () => {
  const kind = blockKinds.get('splitter')!;
  const [argon] = components('Ar');
  const passes = (fractions: Record<string, number>, outlet: string) =>
    kind.passes!({ fractions }, outlet, argon!, 'gas');
  expect(passes({ bleed: 0 }, 'bleed')).toBe(false);
  expect(passes({ bleed: 0 }, 'rest')).toBe(true);
  expect(passes({ bleed: 1 }, 'rest')).toBe(false);
  expect(kind.passes!({ flows: { bleed: { value: 1, per: 'molar' } } }, 'bleed', argon!, 'gas')).toBe(true);
});
