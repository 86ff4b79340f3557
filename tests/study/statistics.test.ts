import { describe, expect, test } from 'vitest';
import { createRandom } from '../../src/study/random.ts';
import { rankCorrelation, summarise } from '../../src/study/statistics.ts';

describe('what a sample says', () => {
  test('mean, standard deviation and percentiles of a small one', () => {
    const summary = summarise(Float64Array.of(2, 4, 4, 4, 5, 5, 7, 9), [0, 25, 50, 100]);
    expect(summary.mean).toBe(5);
    expect(summary.sd).toBeCloseTo(Math.sqrt(32 / 7), 14);
    expect(summary.meanError).toBeCloseTo(Math.sqrt(32 / 7 / 8), 14);
    // positions 0, 1.75, 3.5 and 7 in the order
    expect(summary.percentiles.map((p) => p.value)).toEqual([2, 4, 4.5, 9]);
  });

  test('a single value stands for itself; too small a sample has no range', () => {
    const { sd, percentiles } = summarise(Float64Array.of(3), [50]);
    expect(sd).toBe(0);
    expect(percentiles).toEqual([{ percent: 50, value: 3, low: null, high: null }]);
  });

  test('ranges of percentiles are those of the binomial tables (n = 100: median 40th to 61st value)', () => {
    const values = Float64Array.from({ length: 100 }, (_, i) => i + 1);
    expect(summarise(values, [50]).percentiles[0]).toMatchObject({ low: 40, high: 61 });
  });

  test('the range of a percentile holds the true one in 95 of 100 samples', () => {
    const random = createRandom(17);
    let holds = 0;
    for (let trial = 0; trial < 2000; trial++) {
      const [p] = summarise(
        Float64Array.from({ length: 200 }, () => random.uniform()),
        [90],
      ).percentiles;
      if (p.low! <= 0.9 && 0.9 <= p.high!) holds += 1;
    }
    // not less than 95 %, and little more: the ranks are whole numbers
    expect(holds / 2000).toBeGreaterThan(0.94);
    expect(holds / 2000).toBeLessThan(0.985);
  });

  test('rank correlation: any rising function gives 1, a falling one −1, ties share their ranks', () => {
    const x = Float64Array.of(1, 2, 3, 4, 5);
    expect(rankCorrelation(x, x.map(Math.exp))).toBeCloseTo(1, 14);
    expect(
      rankCorrelation(
        x,
        x.map((v) => -(v ** 3)),
      ),
    ).toBeCloseTo(-1, 14);
    // ranks 1, 2.5, 2.5, 4, 5: r = 9.5 / √(10 × 9.5)
    expect(rankCorrelation(x, Float64Array.of(1, 2, 2, 3, 4))).toBeCloseTo(9.5 / Math.sqrt(95), 14);
    expect(rankCorrelation(x, new Float64Array(5))).toBeNaN();
  });
});
