import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { EquilibriumReaction } from '../../src/chemistry/equilibrium.ts';
import { createEquilibriumSolver } from '../../src/chemistry/equilibrium.ts';
import { dependentReactions } from '../../src/chemistry/reaction-rows.ts';
import { coefficients, idealGasModel, loopGas } from './stubs.ts';

const size = loopGas.length;
const gas = idealGasModel(size);
const elements = ['H', 'N', 'C', 'O', 'Ar'];
const P = 5e5;

const bank = [
  { N2: -1, H2: -3, NH3: 2 },
  { N2: -0.5, H2: -1.5, NH3: 1 },
  { CO: -1, H2O: -1, CO2: 1, H2: 1 },
  { CO: -1, H2: -2, CH3OH: 1 },
  { CO2: -1, H2: -3, CH3OH: 1, H2O: 1 },
  { CO: -1, H2: -3, CH4: 1, H2O: 1 },
  { CO2: -1, H2: -4, CH4: 1, H2O: 2 },
  { H2: -2, O2: -1, H2O: 2 },
  { CO: -2, O2: -1, CO2: 2 },
  { CH4: -1, CO2: -1, CO: 2, H2: 2 },
  { CH4: -2, O2: -1, CH3OH: 2 },
  { NH3: -4, O2: -3, N2: 2, H2O: 6 },
].map((parts) => coefficients(parts));

const withCarbon = [
  { CO: -2, C_gr: 1, CO2: 1 },
  { CH4: -1, C_gr: 1, H2: 2 },
  { CO: -1, H2: -1, C_gr: 1, H2O: 1 },
].map((parts) => coefficients(parts));

const amount = fc.oneof(
  { weight: 3, arbitrary: fc.double({ min: 0.01, max: 10, noNaN: true }) },
  { weight: 2, arbitrary: fc.constant(0) },
  { weight: 1, arbitrary: fc.constant(1e-12) },
  { weight: 1, arbitrary: fc.integer({ min: 1, max: 4 }) },
  { weight: 1, arbitrary: fc.double({ min: -20, max: 0, noNaN: true }).map((x) => 10 ** x) },
);
const feeds = fc.array(amount, { minLength: size, maxLength: size }).map((x) => Float64Array.from(x));
const lnKs = fc.double({ min: -69, max: 69, noNaN: true });

function reactionsOf(choice: readonly { row: Float64Array; lnK: number }[]): EquilibriumReaction[] {
  const rows = choice.map((c) => c.row);
  const left = new Set(dependentReactions(rows).map((d) => d.index));
  return choice
    .filter((_, r) => !left.has(r))
    .map(({ row, lnK }) => ({ coefficients: row, lnK: () => lnK, standardPressurePa: 1e5, approachK: 0 }));
}

function setsFrom(rows: readonly Float64Array[], maxLength: number) {
  return fc
    .array(fc.record({ row: fc.constantFrom(...rows), lnK: lnKs }), { minLength: 1, maxLength })
    .map(reactionsOf);
}

/** ln Q − ln K of a reaction; NaN when the gas lacks species on both sides. */
function affinity(reaction: EquilibriumReaction, n: Float64Array): { value: number; blur: number } {
  let total = 0;
  loopGas.forEach((c, i) => {
    if (!c.solid) total += n[i]!;
  });
  let value = -reaction.lnK(500);
  let blur = 0;
  loopGas.forEach((c, i) => {
    const v = reaction.coefficients[i]!;
    if (v === 0 || c.solid) return;
    value += v * Math.log((n[i]! / total) * (P / 1e5));
    // what one rounding of the total does to a trace
    blur += (Math.abs(v) * 1e-15 * total) / n[i]!;
  });
  return { value, blur };
}

function expectAtomsKept(feed: Float64Array, product: Float64Array): void {
  for (const element of elements) {
    let gained = 0;
    let held = 0;
    loopGas.forEach((c, i) => {
      const atoms = c.elements[element] ?? 0;
      gained += atoms * (product[i]! - feed[i]!);
      held += atoms * feed[i]!;
    });
    const all = feed.reduce((a, b) => a + b, 0);
    expect(Math.abs(gained)).toBeLessThanOrEqual(1e-13 * Math.max(held, 1e-2 * all));
  }
}

test('gas reactions reach equilibrium from any feed, at any constant, atoms kept and nothing negative', () => {
  fc.assert(
    fc.property(setsFrom(bank, 4), feeds, (reactions, feed) => {
      const solver = createEquilibriumSolver(reactions, gas, loopGas);
      const product = new Float64Array(size);
      solver.solve(500, P, feed, product);
      expectAtomsKept(feed, product);
      for (const n of product) expect(n).toBeGreaterThanOrEqual(0);
      for (const reaction of reactions) {
        const { value, blur } = affinity(reaction, product);
        if (!Number.isFinite(value)) continue; // a species of it cannot be made from this feed
        expect(Math.abs(value)).toBeLessThanOrEqual(1e-10 + blur);
      }
    }),
    { numRuns: 3000 },
  );
});

test('solid carbon is there at unit activity, or it is gone and its activity is below one', () => {
  fc.assert(
    fc.property(setsFrom([...withCarbon, ...bank.slice(2, 7)], 3), feeds, (reactions, feed) => {
      const solver = createEquilibriumSolver(reactions, gas, loopGas);
      const product = new Float64Array(size);
      solver.solve(500, P, feed, product);
      expectAtomsKept(feed, product);
      for (const n of product) expect(n).toBeGreaterThanOrEqual(0);
      const carbon = loopGas.findIndex((c) => c.id === 'C_gr');
      for (const reaction of reactions) {
        const { value, blur } = affinity(reaction, product);
        if (!Number.isFinite(value)) continue;
        const inCarbon = reaction.coefficients[carbon]!;
        if (inCarbon === 0 || product[carbon]! > 0) {
          expect(Math.abs(value)).toBeLessThanOrEqual(1e-8 + blur);
        }
      }
      const forming = reactions.filter((r) => r.coefficients[carbon] !== 0);
      if (forming.length === 1 && product[carbon] === 0) {
        const { value, blur } = affinity(forming[0]!, product);
        // products in excess: no carbon forms (all reactions here form it)
        if (Number.isFinite(value)) expect(value).toBeGreaterThanOrEqual(-1e-8 - blur);
      }
    }),
    { numRuns: 2000 },
  );
});

test('a solve that starts from the last answer gives what a fresh one gives', () => {
  fc.assert(
    fc.property(setsFrom(bank, 3), feeds, feeds, (reactions, first, second) => {
      const used = createEquilibriumSolver(reactions, gas, loopGas);
      const fresh = createEquilibriumSolver(reactions, gas, loopGas);
      const a = new Float64Array(size);
      const b = new Float64Array(size);
      used.solve(500, P, first, a);
      used.solve(500, P, second, a);
      fresh.solve(500, P, second, b);
      const total = second.reduce((x, y) => x + y, 0);
      for (let i = 0; i < size; i++) expect(Math.abs(a[i]! - b[i]!)).toBeLessThanOrEqual(1e-11 * total);
    }),
    { numRuns: 1000 },
  );
});

test('extents account for every change of amount', () => {
  fc.assert(
    fc.property(setsFrom([...bank, ...withCarbon], 4), feeds, (reactions, feed) => {
      const solver = createEquilibriumSolver(reactions, gas, loopGas);
      const product = new Float64Array(size);
      solver.solve(500, P, feed, product);
      const total = feed.reduce((x, y) => x + y, 0);
      for (let i = 0; i < size; i++) {
        const change = reactions.reduce((sum, r, k) => sum + r.coefficients[i]! * solver.extents[k]!, 0);
        expect(Math.abs(product[i]! - feed[i]! - change)).toBeLessThanOrEqual(1e-13 * total);
      }
    }),
    { numRuns: 500 },
  );
});

test('derivatives keep the atoms and grow with the feed, whatever is missing or used up', () => {
  const columns = size + 2;
  const slopes = new Float64Array(size * columns);
  let able = 0;
  fc.assert(
    fc.property(setsFrom([...bank, ...withCarbon], 4), feeds, (reactions, feed) => {
      const solver = createEquilibriumSolver(reactions, gas, loopGas);
      const product = new Float64Array(size);
      solver.solve(500, P, feed, product);
      if (!solver.slopes(500, P, slopes, new Float64Array(reactions.length * columns))) return;
      able++;
      const total = feed.reduce((x, y) => x + y, 0);
      for (const element of elements) {
        const atoms = loopGas.map((c) => c.elements[element] ?? 0);
        for (let k = 0; k < columns; k++) {
          const held = atoms.reduce((sum, one, i) => sum + one * slopes[i * columns + k]!, 0);
          expect(Math.abs(held - (atoms[k] ?? 0))).toBeLessThanOrEqual(1e-9);
        }
      }
      // twice the feed is twice the product
      for (let i = 0; i < size; i++) {
        const grown = feed.reduce((sum, one, k) => sum + one * slopes[i * columns + k]!, 0);
        expect(Math.abs(grown - product[i]!)).toBeLessThanOrEqual(1e-9 * total);
      }
    }),
    { numRuns: 1000 },
  );
  expect(able).toBeGreaterThan(500);
});

// found by random search: the affinity of a large amount, all rounding, outweighed that of an amount of 1e-93
test('an amount far below the rounding of the others is still brought to its equilibrium', () => {
  const reactions = [
    [{ CH4: -2, O2: -1, CH3OH: 2 }, 3.55095436796546],
    [{ CO: -1, H2: -3, CH4: 1, H2O: 1 }, -5.362325418740511],
    [{ CO: -1, H2: -2, CH3OH: 1 }, -51.515469800680876],
    [{ CO2: -1, H2: -3, CH3OH: 1, H2O: 1 }, 41.65129426494241],
  ] as const;
  const solver = createEquilibriumSolver(
    reactions.map(([parts, lnK]) => ({
      coefficients: coefficients(parts),
      lnK: () => lnK,
      standardPressurePa: 1e5,
      approachK: 0,
    })),
    gas,
    loopGas,
  );
  const feed = coefficients({ H2: 3, CO: 1.14e-19, CO2: 3.83, H2O: 1, Ar: 2.06, O2: 0.203 });
  const product = new Float64Array(size);
  expect(solver.solve(500, P, feed, product)).toBeLessThan(30);
  const methane = product[loopGas.findIndex((c) => c.id === 'CH4')]!;
  expect(methane).toBeGreaterThan(0);
  expect(methane).toBeLessThan(1e-50);
});

// found by random search: two amounts below 1e-280, where the logarithm of a double ends
test('an amount too small for a number is left at next to nothing', () => {
  const reactions = [
    [{ CO2: -1, H2: -3, CH3OH: 1, H2O: 1 }, -55.38123260624707],
    [{ NH3: -4, O2: -3, N2: 2, H2O: 6 }, 66.38388015003875],
    [{ CH4: -1, CO2: -1, CO: 2, H2: 2 }, 9.205233627464622],
    [{ CH4: -2, O2: -1, CH3OH: 2 }, 38.538314499892294],
  ] as const;
  const solver = createEquilibriumSolver(
    reactions.map(([parts, lnK]) => ({
      coefficients: coefficients(parts),
      lnK: () => lnK,
      standardPressurePa: 1e5,
      approachK: 0,
    })),
    gas,
    loopGas,
  );
  const feed = coefficients({
    NH3: 4.248526417650282,
    CO: 1e-12,
    H2O: 1.5825130662415177,
    CH4: 3,
    CH3OH: 1e-12,
    Ar: 1,
    O2: 1.2956152294638692e-17,
  });
  const product = new Float64Array(size);
  solver.solve(500, P, feed, product);
  expectAtomsKept(feed, product);
  expect(product[loopGas.findIndex((c) => c.id === 'O2')]!).toBeLessThan(1e-230);
});
