import { describe, expect, test } from 'vitest';
import { unitPoints } from '../../src/study/sampling.ts';
import { saltelliPlan, sobolIndices } from '../../src/study/sobol-indices.ts';

/** sin x1 + a sin² x2 + b x3⁴ sin x1 for x from −π to π. @source T. Ishigami & T. Homma, ISUMA 1990, 398 */
function ishigami(u: ArrayLike<number>): number {
  const [x1, x2, x3] = [u[0], u[1], u[2]].map((v) => Math.PI * (2 * v - 1));
  return Math.sin(x1) + 7 * Math.sin(x2) ** 2 + 0.1 * x3 ** 4 * Math.sin(x1);
}

function figures(method: 'sobol' | 'latin', count: number, seed: number): Float64Array {
  const plan = saltelliPlan(unitPoints(method, count, 6, seed), 3);
  return Float64Array.from({ length: plan.length / 3 }, (_, r) => ishigami(plan.subarray(3 * r, 3 * r + 3)));
}

describe('Sobol indices', () => {
  const first = [0.3139, 0.4424, 0];
  const total = [0.5576, 0.4424, 0.2437];

  test.each([
    ['sobol', 1],
    ['sobol', 2],
    ['latin', 3],
  ] as const)(
    'of the Ishigami function are the published ones within their ranges (%s, seed %i)',
    (method, seed) => {
      const found = sobolIndices(figures(method, 4096, seed), 3)!;
      for (const [d, index] of found.entries()) {
        expect(index.rows).toBe(4096);
        expect(Math.abs(index.first - first[d])).toBeLessThan(index.firstError);
        expect(Math.abs(index.total - total[d])).toBeLessThan(index.totalError);
        expect(index.firstError).toBeLessThan(0.04);
        expect(index.totalError).toBeLessThan(0.05);
      }
    },
  );

  test('a row with a case that did not close is left out, and the rows are counted', () => {
    const f = figures('sobol', 1024, 4);
    f[5] = Number.NaN; // in A: every dimension loses the row
    f[3 * 1024 + 9] = Number.NaN; // in the matrix of the second dimension
    const found = sobolIndices(f, 3)!;
    expect(found.map(({ rows }) => rows)).toEqual([1023, 1022, 1023]);
    expect(Math.abs(found[1].first - 0.4424)).toBeLessThan(0.06);
  });

  test('a figure that does not vary has none', () => {
    expect(sobolIndices(new Float64Array(40).fill(3), 2)).toBeNull();
    expect(sobolIndices(new Float64Array(40).fill(Number.NaN), 2)).toBeNull();
  });
});
