import { describe, expect, test } from 'vitest';
import { createRandom } from '../../src/study/random.ts';
import { createSobol, SOBOL_DIMENSIONS } from '../../src/study/sobol-sequence.ts';

function rows(dimensions: number, count: number, seed: number | null = null): number[][] {
  const sobol = createSobol(dimensions, seed === null ? null : createRandom(seed));
  const row = new Uint32Array(dimensions);
  return Array.from({ length: count }, () => {
    sobol.next(row);
    return Array.from(row, (x) => x / 2 ** 32);
  });
}

describe('Sobol sequence', () => {
  test('begins with the published points (Joe & Kuo, notes on generating Sobol sequences, 2008: N = 10, D = 3)', () => {
    expect(rows(3, 10)).toEqual([
      [0, 0, 0],
      [0.5, 0.5, 0.5],
      [0.75, 0.25, 0.25],
      [0.25, 0.75, 0.75],
      [0.375, 0.375, 0.625],
      [0.875, 0.875, 0.125],
      [0.625, 0.125, 0.875],
      [0.125, 0.625, 0.375],
      [0.1875, 0.3125, 0.9375],
      [0.6875, 0.8125, 0.4375],
    ]);
  });

  test('has the 1000th point that scipy 1.17 gives from the same table, in all dimensions', () => {
    const point = rows(SOBOL_DIMENSIONS, 1000)
      .at(-1)!
      .map((x) => x * 1024);
    expect(point).toEqual(scipyPoint);
  });

  test.each([null, 1, 2])(
    'one number of each dimension lies in each of 256 equal parts (seed %s)',
    (seed) => {
      const points = rows(SOBOL_DIMENSIONS, 256, seed);
      for (let d = 0; d < SOBOL_DIMENSIONS; d++) {
        expect(new Set(points.map((row) => Math.floor(row[d] * 256))).size).toBe(256);
      }
    },
  );

  test.each([null, 5])('the first two dimensions fill every box of 1/256 once (seed %s)', (seed) => {
    const points = rows(2, 256, seed);
    for (let p = 0; p <= 8; p++) {
      const boxes = points.map(([x, y]) => `${Math.floor(x * 2 ** p)} ${Math.floor(y * 2 ** (8 - p))}`);
      expect(new Set(boxes).size).toBe(256);
    }
  });

  test('scrambled points are another set for each seed, and the same for the same', () => {
    expect(rows(5, 20, 4)).toEqual(rows(5, 20, 4));
    expect(rows(5, 20, 4)).not.toEqual(rows(5, 20, 5));
    expect(rows(1, 1, 4)).not.toEqual([[0]]);
  });

  test('refuses more dimensions than have direction numbers', () => {
    expect(() => createSobol(SOBOL_DIMENSIONS + 1, null)).toThrow(RangeError);
  });
});

const scipyPoint = [
  161, 931, 83, 1013, 991, 865, 879, 729, 833, 647, 23, 453, 485, 969, 851, 571, 289, 673, 695, 39, 343, 371,
  397, 361, 789, 353, 233, 171, 381, 797, 983, 85, 495, 799, 757, 341, 549, 147, 763, 811, 359, 709, 791, 655,
  285, 671, 957, 365, 959, 299, 169, 849, 579, 129, 577, 721, 145, 657, 329, 393, 9, 681, 585, 649, 581, 829,
  893, 893, 133, 45, 221, 453, 613, 565, 509, 85, 223, 611, 931, 187, 303, 51, 759, 191, 287, 687, 3, 299,
  407, 659, 211, 739, 199, 935, 823, 183,
];
