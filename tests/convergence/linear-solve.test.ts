import { expect, test } from 'vitest';
import { solveInPlace } from '../../src/convergence/linear-solve.ts';

test('three equations are solved, with a zero in the first pivot', () => {
  const b = Float64Array.of(7, 6, 13);
  const rows = [Float64Array.of(0, 2, 1), Float64Array.of(1, 1, 1), Float64Array.of(2, 1, 3)];
  expect(solveInPlace(rows, b)).toBe(true);
  // x = 1, y = 2, z = 3: small whole numbers, exact
  expect(Array.from(b)).toEqual([1, 2, 3]);
});

test('a matrix with dependent rows is refused', () => {
  expect(solveInPlace([Float64Array.of(1, 2), Float64Array.of(2, 4)], Float64Array.of(1, 1))).toBe(false);
});
