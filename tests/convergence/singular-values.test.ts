import fc from 'fast-check';
import { expect, test } from 'vitest';
import { fightingAims, undecided } from '../../src/convergence/fighting-aims.ts';
import { singularValues } from '../../src/convergence/singular-values.ts';

const rows = (...all: number[][]) => all.map((row) => Float64Array.from(row));

test('singular values of a matrix that is known', () => {
  // [[3, 0], [4, 5]]: J Jᵀ = [[9, 12], [12, 41]] has the eigenvalues 45 and 5
  const { sigma } = singularValues(rows([3, 0], [4, 5]));
  expect(sigma[0]).toBeCloseTo(Math.sqrt(45), 12);
  expect(sigma[1]).toBeCloseTo(Math.sqrt(5), 12);
});

test('any matrix is put together again from its singular values', () => {
  const entry = fc.double({ min: -10, max: 10, noNaN: true });
  const matrix = fc
    .tuple(fc.integer({ min: 1, max: 5 }), fc.integer({ min: 1, max: 5 }))
    .chain(([m, n]) =>
      fc.array(fc.array(entry, { minLength: n, maxLength: n }), { minLength: m, maxLength: m }),
    );
  fc.assert(
    fc.property(matrix, (J) => {
      const { sigma, w, v } = singularValues(rows(...J));
      for (let i = 0; i < J.length; i++) {
        for (let j = 0; j < J[0].length; j++) {
          const again = sigma.reduce((sum, s, k) => sum + s * w[k][i] * v[k][j], 0);
          expect(Math.abs(again - J[i][j])).toBeLessThan(1e-12 * Math.max(sigma[0], 1e-300) + 1e-300);
        }
      }
      for (let k = 1; k < sigma.length; k++) expect(sigma[k]).toBeLessThanOrEqual(sigma[k - 1]);
    }),
  );
});

test('of three aims the two that fight are named, of a sum and its parts all three', () => {
  expect(fightingAims(rows([1, 2, 0], [0, 1, 1], [2, 4, 0]))).toEqual([0, 2]);
  expect(fightingAims(rows([1, 0, 2], [0, 1, 0], [1, 1, 2]))).toEqual([0, 1, 2]);
  expect(fightingAims(rows([1, 0, 0], [0, 1, 0], [1, 1, 1]))).toBeNull();
});

test('aims of very different size are told apart by direction alone', () => {
  expect(fightingAims(rows([1, 1], [1e-4, -1e-4]))).toBeNull();
  expect(fightingAims(rows([1, 1], [1e-4, 1.001e-4]))).toEqual([0, 1]);
  expect(fightingAims(rows([1, 1], [1e-8, -1e-8]))).toEqual([1]);
});

test('undecided counts what the noise of closings hides, not what is merely close', () => {
  expect(undecided(rows([1, 1], [2, 2 + 1e-7]))).toBe(1);
  expect(undecided(rows([1, 1], [2, 2.01]))).toBe(0);
});
