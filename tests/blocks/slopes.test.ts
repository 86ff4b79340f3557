import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import * as anyBlock from './block-cases.ts';
import { components, mixtureOf, reaction, streamOf, trial } from './helpers.ts';
import { compareWithDifferences, slopesOf } from './slope-checks.ts';

const KELVIN_SIZE = 100;
const PASCAL_SIZE = 1e7;

/** Blocks whose derivatives are taken by differences of their passes. */
const without = [
  'adiabatic kinetic bed',
  'cooled kinetic bed',
  'compressor with knock-out',
  'exchanger by cold temperature',
  'exchanger by approach',
];

describe.each(anyBlock.cases)(
  '$name',
  ({ name, kind, raw, inlets = 1, step = 11, meantFor = (value) => value }) => {
    test('has slopes that agree with differences of its passes, or none', () => {
      const { mixture, reactions, feed, feedsOf, scaledTo10 } = anyBlock;
      let columns = 0;
      fc.assert(
        fc.property(feed, (value) => {
          // The heat of liquid water has a kink just above 0 degC, where its data begin: slopes there are a mean of both sides.
          fc.pre(Math.abs(value.celsius) > 1);
          const from = feedsOf(mixture, inlets, meantFor(scaledTo10(value)), step);
          const t = trial(kind, raw, mixture, from, reactions);
          const slopes = slopesOf(t, mixture);
          const flow = Math.min(...from.map(mixture.total));
          const sizes = { flow, kelvin: KELVIN_SIZE, pascal: PASCAL_SIZE };
          if (slopes) columns += compareWithDifferences(t, mixture, slopes, sizes).columns;
        }),
        { numRuns: 25 },
      );
      // a column or more at every point, most of them
      if (!without.includes(name)) expect(columns).toBeGreaterThan(25);
    });
  },
);

function expectSlopes(
  raw: Record<string, unknown>,
  ids: readonly string[],
  equations: Readonly<Record<string, string>>,
  ...streams: Parameters<typeof streamOf>[1][]
) {
  const list = components(...ids);
  const reactions = Object.entries(equations).map(([name, equation]) => reaction(name, equation, list));
  const mixture = mixtureOf(ids, { reactions });
  const feeds = streams.map((stream) => streamOf(mixture, stream));
  const t = trial('reactor', raw, mixture, feeds, reactions);
  const slopes = slopesOf(t, mixture);
  expect(slopes).not.toBeNull();
  const { columns } = compareWithDifferences(t, mixture, slopes!, {
    flow: mixture.total(feeds[0]!),
    kelvin: KELVIN_SIZE,
    pascal: PASCAL_SIZE,
  });
  expect(columns).toBeGreaterThan(ids.length);
}

const ammonia = { synthesis: 'N2 + 3 H2 <=> 2 NH3' };
const loopGas = { celsius: 300, bar: 200, flows: { H2: 60, N2: 20, NH3: 3, Ar: 5 } };
const methanol = { fromCO: 'CO + 2 H2 <=> CH3OH', fromCO2: 'CO2 + 3 H2 <=> CH3OH + H2O' };
const methanolGas = {
  celsius: 220,
  bar: 80,
  flows: { H2: 70, CO: 8, CO2: 6, CH3OH: 0.4, H2O: 0.1, CH4: 6, N2: 4 },
};
const methanolIds = ['H2', 'CO', 'CO2', 'CH3OH', 'H2O', 'CH4', 'N2'];

describe('the slopes of a reactor agree with differences of its passes', () => {
  test('ammonia at 450 degC and 200 bar', () => {
    expectSlopes(
      { reactions: { synthesis: { approach: '10 K' } }, temperature: '450 degC', pressure_drop: '2 bar' },
      ['H2', 'N2', 'NH3', 'Ar'],
      ammonia,
      loopGas,
    );
  });

  test.each([
    ['adiabatic', { adiabatic: true, pressure_drop: '2 bar' }],
    ['cooled', { duty: '-300 kW' }],
    ['of beds with coolers', { beds: [{}, { inlet_temperature: '400 degC' }, { duty: '-50 kW' }] }],
  ])('ammonia, %s', (_, way) => {
    expectSlopes({ reactions: { synthesis: {} }, ...way }, ['H2', 'N2', 'NH3', 'Ar'], ammonia, loopGas);
  });

  test.each([190, 199, 205])('ammonia, quenched with gas of %d bar', (bar) => {
    expectSlopes(
      {
        reactions: { synthesis: {} },
        beds: [{ pressure_drop: '1 bar' }, { quench: true }, { quench: true }],
      },
      ['H2', 'N2', 'NH3', 'Ar'],
      ammonia,
      { ...loopGas, celsius: 370 },
      { celsius: 160, bar, flows: { H2: 12, N2: 4, NH3: 0.6, Ar: 1 } },
      { celsius: 140, bar: 198, flows: { H2: 6, N2: 2, NH3: 0.3, Ar: 0.6 } },
    );
  });

  test('a quench at the very pressure of the gas has half a say in the pressure', () => {
    const list = ['H2', 'N2', 'NH3', 'Ar'];
    const reactions = [reaction('synthesis', ammonia.synthesis, components(...list))];
    const mixture = mixtureOf(list, { reactions });
    const feeds = [loopGas, { ...loopGas, celsius: 150 }].map((stream) => streamOf(mixture, stream));
    const raw = { reactions: { synthesis: {} }, beds: [{}, { quench: true }] };
    const slopes = slopesOf(trial('reactor', raw, mixture, feeds, reactions), mixture)!;
    expect(slopes.of[0]!.map((matrix) => matrix.at(-1))).toEqual([0.5, 0.5]);
  });

  test('methanol, two reactions at once', () => {
    expectSlopes(
      { reactions: { fromCO: { approach: '5 K' }, fromCO2: {} }, temperature: '250 degC' },
      methanolIds,
      methanol,
      methanolGas,
    );
  });

  test('methanol short of equilibrium behind a set conversion', () => {
    expectSlopes(
      {
        reactions: {
          fromCO2: { conversion: '20 %', of: 'CO2' },
          fromCO: { fraction_of_equilibrium: '70 %' },
        },
        temperature: '250 degC',
      },
      methanolIds,
      methanol,
      methanolGas,
    );
  });

  test('methanation down to traces', () => {
    expectSlopes(
      { reactions: { methanation: {}, shift: {} }, temperature: '320 degC' },
      ['H2', 'N2', 'CO', 'CO2', 'CH4', 'H2O', 'Ar'],
      { methanation: 'CO + 3 H2 <=> CH4 + H2O', shift: 'CO + H2O <=> CO2 + H2' },
      { celsius: 300, bar: 30, flows: { H2: 74, N2: 24, CO: 0.4, CO2: 0.1, CH4: 0.3, H2O: 0.2, Ar: 0.3 } },
    );
  });

  test.each([
    ['carbon present', 40],
    ['carbon used up', 4],
  ])('gasification with %s', (_, carbon) => {
    expectSlopes(
      { reactions: { boudouard: {}, steam: {} }, temperature: '900 degC' },
      ['C_gr', 'CO', 'CO2', 'H2', 'H2O', 'N2'],
      { boudouard: 'C_gr + CO2 <=> 2 CO', steam: 'C_gr + H2O <=> CO + H2' },
      { celsius: 800, bar: 5, flows: { C_gr: carbon, CO: 3, CO2: 4, H2: 2, H2O: 9, N2: 2 } },
    );
  });

  test('conversions in a row', () => {
    expectSlopes(
      {
        reactions: { first: { conversion: '60 %', of: 'CO2' }, second: { conversion: '30 %', of: 'CO' } },
        temperature: '400 degC',
      },
      ['CO', 'CO2', 'H2', 'H2O', 'CH4'],
      { first: 'CO2 + H2 -> CO + H2O', second: 'CO + 3 H2 -> CH4 + H2O' },
      { celsius: 300, bar: 20, flows: { CO: 1, CO2: 4, H2: 40, H2O: 0.2, CH4: 2 } },
    );
  });
});
