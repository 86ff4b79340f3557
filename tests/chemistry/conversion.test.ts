import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { ConversionReaction } from '../../src/chemistry/conversion.ts';
import { applyConversions } from '../../src/chemistry/conversion.ts';
import { PassTrouble } from '../../src/diagnostics/diagnostic.ts';
import { expectWithin } from './helpers.ts';
import { coefficients, loopGas } from './stubs.ts';

const at = (id: string): number => loopGas.findIndex((c) => c.id === id);

function conversion(
  name: string,
  parts: Record<string, number>,
  of: string,
  share: number,
): ConversionReaction {
  return { name, coefficients: coefficients(parts), conversion: share, of: at(of) };
}

function react(reactions: ConversionReaction[], feed: Record<string, number>) {
  const product = new Float64Array(loopGas.length);
  const extents = new Float64Array(reactions.length);
  applyConversions(reactions, loopGas, coefficients(feed), product, extents);
  return { n: (id: string) => product[at(id)]!, extents };
}

const methanol = (share: number) => conversion('methanol', { CO: -1, H2: -2, CH3OH: 1 }, 'CO', share);
const methane = (share: number) => conversion('methane', { CO: -1, H2: -3, CH4: 1, H2O: 1 }, 'CO', share);

test('the shares of one key reactant are shares of the feed, in whichever order they are written', () => {
  const feed = { CO: 10, H2: 100 };
  for (const reactions of [
    [methanol(0.6), methane(0.05)],
    [methane(0.05), methanol(0.6)],
  ]) {
    const { n } = react(reactions, feed);
    expectWithin(n('CO'), 3.5, 1e-12);
    expectWithin(n('CH3OH'), 6, 1e-12);
    expectWithin(n('CH4'), 0.5, 1e-12);
  }
});

test('a consecutive reaction takes its share of what the earlier one formed', () => {
  const burn = conversion('reforming', { CH3OH: -1, H2O: -1, CO2: 1, H2: 3 }, 'CH3OH', 0.5);
  const { n } = react([methanol(0.6), burn], { CO: 10, H2: 100, H2O: 20 });
  expectWithin(n('CH3OH'), 3, 1e-12);
  expectWithin(n('CO2'), 3, 1e-12);
});

test('full conversion leaves exactly nothing', () => {
  const { n } = react([methanol(0.7), methane(0.3)], { CO: 0.3, H2: 100 });
  expect(n('CO')).toBe(0);
});

test('a co-reactant that runs out is named with the conversion that would be possible', () => {
  let trouble: unknown;
  try {
    react([methanol(0.8)], { CO: 10, H2: 12 });
  } catch (error) {
    trouble = error;
  }
  expect(trouble).toBeInstanceOf(PassTrouble);
  expect(trouble).toMatchObject({
    code: 'reactant-used-up',
    message: 'Reaction methanol runs out of H2.',
    why: '80 % conversion of CO takes 16.0000 mol/s of H2, and 12.0000 mol/s are left for it',
    mend: 'lower the conversion of methanol to 60.00 % or less, or feed more H2',
  });
});

test('conversions of one reactant above 100 % are refused', () => {
  expect(() => react([methanol(0.8), methane(0.3)], { CO: 10, H2: 100 })).toThrow(
    'Reaction methane runs out of CO.',
  );
});

test('atoms are kept at any conversion', () => {
  fc.assert(
    fc.property(
      fc.double({ min: 0, max: 0.5, noNaN: true }),
      fc.double({ min: 0, max: 0.5, noNaN: true }),
      fc.double({ min: 0, max: 1e4, noNaN: true }),
      (a, b, CO) => {
        const feed = coefficients({ CO, H2: 4 * CO, Ar: 1 });
        const product = new Float64Array(loopGas.length);
        applyConversions([methanol(a), methane(b)], loopGas, feed, product, new Float64Array(2));
        for (const element of ['C', 'H', 'O', 'Ar']) {
          const count = (x: Float64Array) =>
            loopGas.reduce((sum, c, i) => sum + (c.elements[element] ?? 0) * x[i]!, 0);
          expectWithin(count(product), count(feed), 1e-13 * (1 + count(feed)));
        }
      },
    ),
  );
});
