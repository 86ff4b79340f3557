import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { gasInteractions, liquidInteractions } from '../../src/properties/binary-interaction.ts';
import { builtInComponent, builtInIds } from '../../src/properties/components.ts';
import { hydrogenAlpha, soaveSlope, squareRootAlpha } from '../../src/properties/cubic-alpha.ts';
import { interactionRows } from '../../src/properties/data/kij.ts';

const all = builtInIds.map((id) => builtInComponent(id)!);

test('a parameter fitted to gas solubility in a liquid never enters the gas', () => {
  for (const equation of ['srk', 'pr'] as const) {
    for (const pair of gasInteractions(equation, all)) expect(pair.row.use).not.toBe('liquid');
  }
});

test('the gas value of a pair goes before the vapour-liquid value', () => {
  const [pair] = gasInteractions('srk', [builtInComponent('CH4')!, builtInComponent('CO2')!]);
  expect(pair?.row.use).toBe('gas');
  const [ofKnapp] = gasInteractions('pr', [builtInComponent('NH3')!, builtInComponent('N2')!]);
  expect(ofKnapp?.row.use).toBe('vle');
});

test('with Soave-Redlich-Kwong ammonia, hydrogen and nitrogen do not interact beyond the geometric mean', () => {
  const pairs = gasInteractions(
    'srk',
    ['H2', 'N2', 'NH3'].map((id) => builtInComponent(id)!),
  );
  for (const pair of pairs) expect(pair.value(700)).toBe(0);
});

test('every row names built-in components and a range where it has a slope', () => {
  const known = new Set(builtInIds);
  for (const row of interactionRows) {
    expect(known.has(row.first) && known.has(row.second), `${row.first}-${row.second}`).toBe(true);
    if (row.k1PerK !== 0) expect(row.toK).toBeGreaterThan(row.fromK);
  }
});

describe.each(['srk', 'pr'] as const)('the %s pairs of all built-in components', (equation) => {
  const pairs = gasInteractions(equation, all);

  test('stay within their fitted range however hot or cold it gets', () => {
    fc.assert(
      fc.property(fc.double({ min: 50, max: 3000, noNaN: true }), (T) => {
        for (const { row, value } of pairs) {
          const ends = [row.fromK, row.toK].map((end) => row.k0 + row.k1PerK * (end - 298.15));
          expect(value(T)).toBeGreaterThanOrEqual(Math.min(...ends) - 1e-12);
          expect(value(T)).toBeLessThanOrEqual(Math.max(...ends) + 1e-12);
        }
      }),
    );
  });

  test('follow the fitted line in the middle of the range', () => {
    for (const { row, value } of pairs) {
      const middle = (row.fromK + row.toK) / 2;
      // the corners are rounded over 10 K: at 50 K from either end 0.07 K of the line is left out
      if (row.toK - row.fromK < 100) continue;
      expect(Math.abs(value(middle) - row.k0 - row.k1PerK * (middle - 298.15))).toBeLessThanOrEqual(
        0.2 * Math.abs(row.k1PerK),
      );
    }
  });

  test('have the slope that finite differences give', () => {
    fc.assert(
      fc.property(fc.double({ min: 100, max: 1000, noNaN: true }), (T) => {
        for (const { value, slope } of pairs) {
          const difference = (value(T + 1e-3) - value(T - 1e-3)) / 2e-3;
          expect(Math.abs(difference - slope(T))).toBeLessThan(1e-9);
        }
      }),
    );
  });
});

describe('the parameters of liquid: eos', () => {
  const components = ['H2', 'N2', 'NH3', 'H2O'].map((id) => builtInComponent(id)!);
  const useOf = (equation: 'srk' | 'pr') =>
    Object.fromEntries(
      liquidInteractions(equation, components).map(({ i, j, row }) => [
        `${components[i]!.id}-${components[j]!.id}`,
        row.use,
      ]),
    );

  test('are those of gases in a liquid, else those of the gas', () => {
    expect(useOf('srk')).toEqual({
      'H2-NH3': 'liquid',
      'H2-H2O': 'liquid',
      'N2-NH3': 'liquid',
      'N2-H2O': 'liquid',
      'NH3-H2O': 'vle',
    });
    expect(useOf('pr')['H2-N2']).toBe('gas');
  });

  test('leave the attraction between hydrogen and a liquid as it was fitted with the function of Soave', () => {
    const [hydrogen] = components;
    const { temperatureK, acentricFactor } = hydrogen!.critical!;
    const soave = squareRootAlpha(temperatureK, soaveSlope(acentricFactor));
    const graboski = hydrogenAlpha(temperatureK);
    const pair = liquidInteractions('srk', components).find(({ i, j }) => i === 0 && j === 2)!;
    // in the middle of the fitted range; the row: k = 0.1884 + 0.0006742 (T − 298.15)
    const T = 280;
    const fitted = (1 - 0.1884 - 0.0006742 * (T - 298.15)) * soave.value(T);
    expect(Math.abs((1 - pair.value(T)) * graboski.value(T) - fitted)).toBeLessThan(1e-3 * fitted);
    for (const at of [240, 280, 320, 700]) {
      const difference = (pair.value(at + 1e-3) - pair.value(at - 1e-3)) / 2e-3;
      expect(Math.abs(difference - pair.slope(at))).toBeLessThan(1e-7);
    }
  });
});
