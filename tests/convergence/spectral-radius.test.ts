import { expect, test } from 'vitest';
import { spectralRadius } from '../../src/convergence/spectral-radius.ts';

/** A linear pass g = A x. */
const linear = (rows: readonly (readonly number[])[]) => ({
  size: rows.length,
  lower: new Float64Array(rows.length).fill(-Infinity),
  evaluate(x: Float64Array, g: Float64Array): void {
    rows.forEach((row, i) => {
      g[i] = row.reduce((sum, a, j) => sum + a * x[j], 0);
    });
  },
});
const radiusOf = (rows: readonly (readonly number[])[]) =>
  spectralRadius(linear(rows), new Float64Array(rows.length).fill(3), new Float64Array(rows.length).fill(2));

test('is the largest eigenvalue by size, whatever its sign', () => {
  expect(
    radiusOf([
      [0.999, 1],
      [0, 0.2],
    ]),
  ).toBeCloseTo(0.999, 9);
  expect(
    radiusOf([
      [-1.25, 0],
      [7, 0.5],
    ]),
  ).toBeCloseTo(1.25, 9);
});

test('holds for a pair that turns about', () => {
  expect(
    radiusOf([
      [0.3, -0.4],
      [0.4, 0.3],
    ]),
  ).toBeCloseTo(0.5, 9);
});

test('is nil where nothing comes back, at once or after some passes', () => {
  expect(radiusOf([[0]])).toBe(0);
  expect(
    radiusOf([
      [0, 1],
      [0, 0],
    ]),
  ).toBeLessThan(1e-5);
});
