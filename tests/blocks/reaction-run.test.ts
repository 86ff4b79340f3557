import { describe, expect, test } from 'vitest';
import { createReactionRun } from '../../src/blocks/reaction-run.ts';
import { components, expectClose, mixtureOf, reaction } from './helpers.ts';

const ids = ['CO', 'CO2', 'H2', 'H2O', 'CH3OH'];
const list = components(...ids);
const reactions = [
  reaction('methanol', 'CO + 2 H2 <=> CH3OH', list),
  reaction('shift', 'CO + H2O <=> CO2 + H2', list),
];
const context = { name: 'converter', mixture: mixtureOf(ids, { reactions }), reactions };
const feed = Float64Array.of(10, 5, 60, 1, 0);

test('two equilibria are met at once, whichever is named first', () => {
  const product = new Float64Array(5);
  const swapped = new Float64Array(5);
  createReactionRun({ methanol: {}, shift: {} }, context).react(523.15, 80e5, feed, product);
  createReactionRun({ shift: {}, methanol: {} }, context).react(523.15, 80e5, feed, swapped);
  product.forEach((flow, i) => {
    expectClose(swapped[i]!, flow, 1e-8);
  });
  expect(product[4]).toBeGreaterThan(1);
});

test('a conversion moved between two runs takes effect', () => {
  const settings = { methanol: { conversion: 0.2, of: 'CO' } };
  const run = createReactionRun(settings, context);
  const product = new Float64Array(5);
  run.react(523.15, 80e5, feed, product);
  expectClose(product[4]!, 2, 1e-12);
  settings.methanol.conversion = 0.4;
  run.react(523.15, 80e5, feed, product);
  expectClose(product[4]!, 4, 1e-12);
});

test('only the reactions named run', () => {
  const product = new Float64Array(5);
  createReactionRun({ shift: {} }, context).react(523.15, 80e5, feed, product);
  expect(product[4]).toBe(0);
  expect(product[1]).not.toBe(5);
});

test('a fraction of equilibrium is that share of the extent at equilibrium, and can be moved', () => {
  const product = new Float64Array(5);
  const whole = createReactionRun({ methanol: {} }, context);
  whole.react(523.15, 80e5, feed, product);
  const atEquilibrium = whole.extents()['methanol']!;
  const settings = { methanol: { fraction_of_equilibrium: 0.9 } };
  const held = createReactionRun(settings, context);
  held.react(523.15, 80e5, feed, product);
  expectClose(held.extents()['methanol']!, 0.9 * atEquilibrium, 1e-9);
  expectClose(product[4]!, 0.9 * atEquilibrium, 1e-9);
  settings.methanol.fraction_of_equilibrium = 0.5;
  held.react(523.15, 80e5, feed, product);
  expectClose(product[4]!, 0.5 * atEquilibrium, 1e-9);
  expect(held.report(523.15).details).toMatchObject({
    approach_K: {},
    fraction_of_equilibrium: { methanol: 0.5 },
    selectivity: {},
  });
});

describe('where the catalyst decides which reaction runs', () => {
  const names = ['NH3', 'O2', 'NO', 'N2', 'H2O'];
  const gases = components(...names);
  const burning = [
    reaction('to_nitric_oxide', '4 NH3 + 5 O2 -> 4 NO + 6 H2O', gases),
    reaction('to_nitrogen', '4 NH3 + 3 O2 -> 2 N2 + 6 H2O', gases),
    reaction('reduction', '4 NH3 + 6 NO -> 5 N2 + 6 H2O', gases),
  ];
  const burner = { name: 'burner', mixture: mixtureOf(names, { reactions: burning }), reactions: burning };
  const air = Float64Array.of(10, 19, 0, 71, 1);
  const product = new Float64Array(5);

  test('the selectivity is the share of the converted ammonia that each reaction took', () => {
    const run = createReactionRun(
      { to_nitric_oxide: { conversion: 0.95, of: 'NH3' }, to_nitrogen: { conversion: 0.03, of: 'NH3' } },
      burner,
    );
    run.react(1150, 5e5, air, product);
    const { selectivity } = run.report(1150).details as {
      selectivity: Record<string, Record<string, number>>;
    };
    expectClose(selectivity['NH3']!['to_nitric_oxide']!, 0.95 / 0.98, 1e-12);
    expectClose(selectivity['NH3']!['to_nitrogen']!, 0.03 / 0.98, 1e-12);
    expectClose(product[2]!, 9.5, 1e-12);
    expectClose(product[0]!, 0.2, 1e-12);
  });

  test('all of it can go either way, and the rest of it is nothing, not a rounding', () => {
    const run = createReactionRun(
      { to_nitric_oxide: { conversion: 0.963, of: 'NH3' }, to_nitrogen: { conversion: 0.037, of: 'NH3' } },
      burner,
    );
    run.react(1150, 5e5, air, product);
    expect(Math.abs(product[0]!)).toBeLessThan(1e-14);
    expect(product[0]).toBeGreaterThanOrEqual(0);
  });

  test('a reaction that takes the key along with another key counts too', () => {
    const run = createReactionRun(
      { to_nitric_oxide: { conversion: 0.9, of: 'NH3' }, reduction: { conversion: 0.1, of: 'NO' } },
      burner,
    );
    run.react(1150, 5e5, air, product);
    const { selectivity } = run.report(1150).details as {
      selectivity: Record<string, Record<string, number>>;
    };
    // 9 NH3 to 9 NO, a tenth of which takes 0.6 NH3 with it
    expectClose(selectivity['NH3']!['reduction']!, 0.6 / 9.6, 1e-12);
    expect(selectivity['NO']).toEqual({ reduction: 1 });
  });

  test('where nothing is converted there is no selectivity', () => {
    const run = createReactionRun({ to_nitrogen: { conversion: 0, of: 'NH3' } }, burner);
    run.react(1150, 5e5, air, product);
    expect(run.report(1150).details['selectivity']).toEqual({});
  });
});
