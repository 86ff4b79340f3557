import { describe, expect, test } from 'vitest';
import { correlationFactor } from '../../src/flowsheet/correlation-matrix.ts';
import { createDistribution } from '../../src/study/distribution.ts';
import { unitPoints, valuesAt } from '../../src/study/sampling.ts';
import { rankCorrelation } from '../../src/study/statistics.ts';

const column = (values: Float64Array, size: number, d: number) =>
  Float64Array.from({ length: values.length / size }, (_, r) => values[r * size + d]);
const free = { low: Number.NEGATIVE_INFINITY, high: Number.POSITIVE_INFINITY };

describe('samples', () => {
  test('a Latin hypercube has one number of each dimension in each part', () => {
    const points = unitPoints('latin', 500, 4, 9);
    for (let d = 0; d < 4; d++) {
      expect(new Set(column(points, 4, d).map((x) => Math.floor(x * 500))).size).toBe(500);
    }
    expect(Math.abs(rankCorrelation(column(points, 4, 0), column(points, 4, 1)))).toBeLessThan(0.15);
  });

  test.each(['sobol', 'latin'] as const)('%s: one seed, one sample; never 0 or 1', (method) => {
    const points = unitPoints(method, 300, 3, 1);
    expect(unitPoints(method, 300, 3, 1)).toEqual(points);
    expect(unitPoints(method, 300, 3, 2)).not.toEqual(points);
    expect(points.every((x) => x > 0 && x < 1)).toBe(true);
  });

  test.each(['sobol', 'latin'] as const)('%s: ranks are correlated as asked, margins kept', (method) => {
    const made = correlationFactor(
      ['a', 'b', 'c'],
      [
        { between: ['c', 'a'], value: -0.7 },
        { between: ['b', 'c'], value: 0.5 },
      ],
    );
    if (!made.ok) throw new Error('not positive definite');
    const distributions = [
      createDistribution({ kind: 'uniform', low: 0, high: 1 }, free),
      createDistribution({ kind: 'log-normal', median: 1, factor: 2 }, free),
      createDistribution({ kind: 'triangular', low: 0, mode: 1, high: 1 }, free),
    ];
    const count = 4096;
    const values = valuesAt(unitPoints(method, count, 3, 11), distributions, made.factor);
    const [a, b, c] = [0, 1, 2].map((d) => column(values, 3, d));
    // the standard error of a rank correlation is about 1/√n = 0.016
    expect(rankCorrelation(a, c)).toBeCloseTo(-0.7, 1);
    expect(Math.abs(rankCorrelation(a, c) + 0.7)).toBeLessThan(0.035);
    expect(Math.abs(rankCorrelation(b, c) - 0.5)).toBeLessThan(0.04);
    expect(Math.abs(rankCorrelation(a, b))).toBeLessThan(0.05);
    const shareBelow = (x: Float64Array, limit: number) => x.filter((v) => v < limit).length / count;
    expect(shareBelow(a, 0.3)).toBeCloseTo(0.3, 1);
    expect(Math.abs(shareBelow(b, 1) - 0.5)).toBeLessThan(0.03);
    expect(Math.abs(shareBelow(c, 0.5) - 0.25)).toBeLessThan(0.03);
  });

  test('correlations that cannot hold together are told with the pair', () => {
    const made = correlationFactor(
      ['a', 'b', 'c'],
      [
        { between: ['a', 'b'], value: 0.9 },
        { between: ['b', 'c'], value: 0.9 },
        { between: ['a', 'c'], value: -0.95 },
      ],
    );
    expect(made).toEqual({ ok: false, pair: 2 });
  });
});
