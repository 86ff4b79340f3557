import { describe, expect, test } from 'vitest';
import { createRandom, fromState } from '../../src/study/random.ts';

describe('random numbers', () => {
  test('are those of xoshiro128** (an independent implementation from the state 1, 2, 3, 4)', () => {
    const random = fromState(1, 2, 3, 4);
    const wanted = [11520, 0, 5927040, 70819200, 2031721883, 1637235492, 1287239034, 3734860849];
    expect(wanted.map(() => random.bits())).toEqual(wanted);
  });

  test('one seed gives one row of numbers, another seed or stream another', () => {
    const draw = (seed: number, stream?: number) => {
      const random = createRandom(seed, stream);
      return Array.from({ length: 5 }, () => random.bits());
    };
    expect(draw(7)).toEqual(draw(7));
    expect(draw(7)).not.toEqual(draw(8));
    expect(draw(7, 1)).not.toEqual(draw(7, 2));
  });

  test('are spread evenly', () => {
    const random = createRandom(3);
    const counts = new Array(7).fill(0);
    for (let i = 0; i < 70_000; i++) counts[random.below(7)] += 1;
    // chi-squared with 6 degrees of freedom: below 22.5 in 999 of 1000 seeds
    const chi = counts.reduce((sum, n) => sum + (n - 10_000) ** 2 / 10_000, 0);
    expect(chi).toBeLessThan(22.5);
    const values = Array.from({ length: 10_000 }, () => random.uniform());
    expect(Math.min(...values)).toBeGreaterThan(0);
    expect(Math.max(...values)).toBeLessThan(1);
    expect(values.reduce((a, b) => a + b) / values.length).toBeCloseTo(0.5, 2);
  });
});
