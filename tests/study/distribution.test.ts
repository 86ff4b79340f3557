import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { Shape } from '../../src/model/spread.ts';
import { createDistribution } from '../../src/study/distribution.ts';

const free = { low: Number.NEGATIVE_INFINITY, high: Number.POSITIVE_INFINITY };
const quantile = (shape: Shape, u: number, bounds = free) => createDistribution(shape, bounds).quantile(u);

describe('distributions', () => {
  test('normal: 1.6449 standard deviations on each side hold 90 %', () => {
    const shape: Shape = { kind: 'normal', mean: 268.15, sd: 2 };
    expect(quantile(shape, 0.5)).toBe(268.15);
    expect(quantile(shape, 0.95)).toBeCloseTo(268.15 + 2 * 1.6448536269514722, 12);
    expect(quantile(shape, 0.05)).toBeCloseTo(268.15 - 2 * 1.6448536269514722, 12);
  });

  test('log-normal: the median, and the factor to the power of the normal score', () => {
    const shape: Shape = { kind: 'log-normal', median: 3, factor: 1.2 };
    expect(quantile(shape, 0.5)).toBe(3);
    expect(quantile(shape, 0.9)).toBeCloseTo(3 * 1.2 ** 1.2815515655446004, 12);
  });

  test('uniform: straight from low to high', () => {
    const shape: Shape = { kind: 'uniform', low: -2, high: 6 };
    expect([0.25, 0.5, 0.75].map((u) => quantile(shape, u))).toEqual([0, 2, 4]);
  });

  test('triangular: the square root on each side of the mode', () => {
    const shape: Shape = { kind: 'triangular', low: 0, mode: 1, high: 4 };
    // F(1) = 1/4; F(x) = x²/4 below; 1 − (4 − x)²/12 above
    expect(quantile(shape, 0.25)).toBeCloseTo(1, 14);
    expect(quantile(shape, 0.0625)).toBeCloseTo(0.5, 14);
    expect(quantile(shape, 1 - 1 / 12)).toBeCloseTo(3, 14);
    expect(quantile({ kind: 'triangular', low: 1, mode: 1, high: 2 }, 0.19)).toBeCloseTo(1.1, 14);
    expect(quantile({ kind: 'triangular', low: 1, mode: 2, high: 2 }, 0.81)).toBeCloseTo(1.9, 14);
  });

  test('a normal spread cut off at a bound tells how much was cut, and its rest is scaled up', () => {
    const cut = createDistribution({ kind: 'normal', mean: 0, sd: 1 }, { low: 0, high: 1 });
    expect(cut.cutBelow).toBeCloseTo(0.5, 14);
    expect(cut.cutAbove).toBeCloseTo(0.15865525393145707, 14);
    // half of what is left: F = 0.5 + 0.3413447460685429 / 2
    expect(cut.quantile(0.5)).toBeCloseTo(0.4417705466865811, 10);
  });

  test('a bound so far away that no sample would ever meet it cuts nothing off', () => {
    const far = createDistribution({ kind: 'normal', mean: 300, sd: 2 }, { low: 200, high: 400 });
    expect([far.cutBelow, far.cutAbove]).toEqual([0, 0]);
    expect(far.quantile(0.5)).toBeCloseTo(300, 10);
    const near = createDistribution({ kind: 'normal', mean: 0, sd: 1 }, { low: -6, high: 6 });
    expect(near.cutBelow).toBeCloseTo(9.866e-10, 13);
  });

  const shapes = fc.oneof(
    fc.record({
      kind: fc.constant('normal' as const),
      mean: fc.double({ min: -5, max: 5, noNaN: true }),
      sd: fc.double({ min: 0.1, max: 5, noNaN: true }),
    }),
    fc.record({
      kind: fc.constant('log-normal' as const),
      median: fc.double({ min: 0.1, max: 5, noNaN: true }),
      factor: fc.double({ min: 1.01, max: 3, noNaN: true }),
    }),
    fc
      .tuple(
        fc.double({ min: -5, max: 5, noNaN: true }),
        fc.double({ min: 0.1, max: 5, noNaN: true }),
        fc.double({ min: 0, max: 1, noNaN: true }),
      )
      .map(([low, width, share]) => ({
        kind: 'triangular' as const,
        low,
        mode: low + share * width,
        high: low + width,
      })),
  );

  test('cut off at x, a shape puts the rest of its values below its own quantile there', () => {
    fc.assert(
      fc.property(
        shapes,
        fc.double({ min: 0.05, max: 0.95, noNaN: true }),
        fc.double({ min: 0.05, max: 0.95, noNaN: true }),
        (shape, at, u) => {
          const whole = createDistribution(shape, free);
          const bound = whole.quantile(at);
          const cut = createDistribution(shape, { low: Number.NEGATIVE_INFINITY, high: bound });
          expect(cut.cutAbove).toBeCloseTo(1 - at, 9);
          expect(cut.quantile(u)).toBeCloseTo(whole.quantile(u * at), 8);
          expect(cut.quantile(1 - 1e-10)).toBeLessThanOrEqual(bound);
        },
      ),
    );
  });
});
