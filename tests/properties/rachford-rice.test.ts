import fc from 'fast-check';
import { expect, test } from 'vitest';
import { vapourFraction } from '../../src/properties/rachford-rice.ts';
import { expectRelative } from './expect-relative.ts';

const INF = Number.POSITIVE_INFINITY;

test('two components have a closed form', () => {
  fc.assert(
    fc.property(
      fc.double({ min: 0.001, max: 0.999, noNaN: true }),
      fc.double({ min: 1.01, max: 1e6, noNaN: true }),
      fc.double({ min: 1e-6, max: 0.99, noNaN: true }),
      fc.double({ min: 0.01, max: 0.99, noNaN: true }),
      (z, light, heavy, start) => {
        const [a, b] = [light - 1, heavy - 1];
        const V = -(z * a + (1 - z) * b) / (a * b);
        const got = vapourFraction(Float64Array.of(z, 1 - z), Float64Array.of(light, heavy), start);
        if (V <= 0) expect(got).toBe(0);
        else if (V >= 1) expect(got).toBe(1);
        else expectRelative(got, V, 1e-9, 1e-3);
      },
    ),
  );
});

test('the liquid fraction from 1/K is what the vapour fraction from K leaves', () => {
  const z = fc.array(fc.double({ min: 1e-6, max: 1, noNaN: true }), { minLength: 2, maxLength: 6 });
  // where every K is 1 the two phases are the same, and any share will do
  const lnK = fc.array(
    fc.double({ min: 0.1, max: 12, noNaN: true }).chain((size) => fc.constantFrom(size, -size)),
    { minLength: 6, maxLength: 6 },
  );
  fc.assert(
    fc.property(z, lnK, (raw, ln) => {
      const total = raw.reduce((sum, part) => sum + part, 0);
      const parts = Float64Array.from(raw, (part) => part / total);
      const K = Float64Array.from(parts, (_, i) => Math.exp(ln[i]!));
      const inverse = K.map((k) => 1 / k);
      expect(Math.abs(vapourFraction(parts, K, 0.5) + vapourFraction(parts, inverse, 0.5) - 1)).toBeLessThan(
        1e-9,
      );
    }),
  );
});

test('what never dissolves makes a gas, however little of it there is', () => {
  const V = vapourFraction(Float64Array.of(1e-9, 1 - 1e-9), Float64Array.of(INF, 0.1), 0.5);
  // z/V = (1 - z) (1 - K) at small V
  expectRelative(V, 1e-9 / 0.9, 1e-8);
});

test('what never evaporates makes a liquid, however little of it there is', () => {
  const L = vapourFraction(Float64Array.of(1e-12, 1 - 1e-12), Float64Array.of(INF, 0.1), 0.5);
  expectRelative(L, 1e-12 / 0.9, 1e-8);
  expect(vapourFraction(Float64Array.of(1e-12, 1 - 1e-12), Float64Array.of(0, 10), 0.5)).toBeLessThan(1);
});

test('all below 1 is liquid, all above 1 is gas, and an absent component has no say', () => {
  expect(vapourFraction(Float64Array.of(0.5, 0.5), Float64Array.of(0.9, 0.1), 0.5)).toBe(0);
  expect(vapourFraction(Float64Array.of(0.5, 0.5), Float64Array.of(1.1, 9), 0.5)).toBe(1);
  expect(vapourFraction(Float64Array.of(0, 1), Float64Array.of(INF, 0.1), 0.5)).toBe(0);
  expect(vapourFraction(Float64Array.of(0, 1), Float64Array.of(0, 10), 0.5)).toBe(1);
});

test('any start gives the same answer', () => {
  const z = Float64Array.of(0.6, 0.2, 0.15, 0.05);
  const K = Float64Array.of(300, 200, 0.05, 40);
  const answers = [-1, 0, 1e-9, 0.3, 0.999, 1, 7].map((start) => vapourFraction(z, K, start));
  for (const answer of answers) expectRelative(answer, answers[0]!, 1e-14);
});
