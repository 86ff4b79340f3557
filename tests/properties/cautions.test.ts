import { expect, test } from 'vitest';
import { mixtureOf, streamOf } from './mixture-of.ts';

const codes = (ids: readonly string[], T: number, bar: number, flows: readonly number[], options = {}) => {
  const mixture = mixtureOf(ids, options);
  return mixture.cautions(streamOf(mixture, T, bar, flows)).map((caution) => caution.code);
};

test('condensate at ordinary temperatures needs no caution', () => {
  expect(codes(['H2', 'N2', 'NH3'], 268.15, 190, [3, 1, 1])).toEqual([]);
  expect(codes(['H2', 'CO2', 'CH3OH', 'H2O'], 310, 75, [60, 5, 5, 2])).toEqual([]);
});

test('below the freezing point of its liquid it warns', () => {
  const mixture = mixtureOf(['N2', 'H2O']);
  expect(mixture.cautions(streamOf(mixture, 263.15, 20, [1, 1]))).toEqual([
    {
      code: 'below-freezing',
      message:
        '-10.0 degC is below 0.0 degC, where the vapour pressure of H2O ends (freezing point or end of data); it was extrapolated, and H2O may freeze',
    },
  ]);
});

test('above the critical temperature of a part of the liquid it warns', () => {
  // ammonia in hot water
  expect(codes(['NH3', 'H2O'], 430, 80, [1, 10])).toContain('above-critical');
});

test('a gas that is cold and dense enough to condense on its own is named', () => {
  // carbon dioxide at 0 degC condenses at 35 bar
  expect(codes(['CO2', 'N2'], 273.15, 60, [9, 1])).toEqual(['gas-would-condense']);
  expect(codes(['CO2', 'N2'], 273.15, 60, [1, 9])).toEqual([]);
});

test("a liquid that is a quarter dissolved gas is beyond Henry's law", () => {
  // carbon dioxide in methanol at -35 degC and 10 bar
  expect(codes(['CO2', 'CH3OH'], 238.15, 9, [9, 10])).toContain('much-dissolved');
  expect(codes(['CO2', 'CH3OH'], 298.15, 9, [9, 10])).toEqual([]);
});

test('an empty stream needs no caution', () => {
  expect(codes(['NH3', 'CO2'], 200, 60, [0, 0])).toEqual([]);
});

test('with liquid: eos only a freezing point is spoken of', () => {
  expect(codes(['N2', 'H2O'], 263.15, 20, [1, 1], { liquid: 'eos' })).toEqual(['below-freezing']);
  expect(codes(['NH3', 'H2O'], 430, 80, [1, 10], { liquid: 'eos' })).toEqual([]);
});
