import { describe, expect, test } from 'vitest';
import { normalDistribution, normalQuantile } from '../../src/study/normal.ts';

/** From mpmath with 30 digits, p as the double that is written. */
const quantiles = [
  [1e-300, -37.0470962993612],
  [1e-100, -21.273453560965326],
  [1e-20, -9.262340089798407],
  [1e-10, -6.361340902404057],
  [1e-6, -4.753424308822899],
  [0.001, -3.0902323061678136],
  [0.01, -2.326347874040841],
  [0.025, -1.9599639845400543],
  [0.05, -1.6448536269514726],
  [0.07, -1.4757910281791706],
  [0.1, -1.2815515655446004],
  [0.25, -0.6744897501960817],
  [0.5, 0],
  [0.7, 0.5244005127080407],
  [0.9, 1.2815515655446006],
  [0.95, 1.6448536269514722],
  [0.975, 1.9599639845400538],
  [0.999, 3.090232306167813],
];
const shares = [
  [-10, 7.619853024160525e-24],
  [-8, 6.220960574271784e-16],
  [-7.2, 3.0106279811174334e-13],
  [-7, 1.279812543885835e-12],
  [-5, 2.866515718791939e-7],
  [-3, 0.0013498980316300946],
  [-2, 0.02275013194817921],
  [-1, 0.15865525393145705],
  [-0.5, 0.3085375387259869],
  [0, 0.5],
  [0.5, 0.6914624612740131],
  [1, 0.8413447460685429],
  [3, 0.9986501019683699],
];

describe('the normal distribution', () => {
  test.each(quantiles)('the quantile of %s is %s to 1e-15 of it', (p, z) => {
    expect(Math.abs(normalQuantile(p) - z)).toBeLessThanOrEqual(1e-15 * Math.abs(z));
  });

  test("the quantiles are Wichura's test values (AS 241)", () => {
    expect(normalQuantile(0.25)).toBeCloseTo(-0.6744897501960817, 15);
    expect(normalQuantile(0.001)).toBeCloseTo(-3.090232306167814, 14);
    expect(normalQuantile(1e-20)).toBeCloseTo(-9.262340089798409, 14);
  });

  test('the ends are infinite', () => {
    expect([normalQuantile(0), normalQuantile(1)]).toEqual([-Infinity, Infinity]);
  });

  test.each(shares)('the share below %s is %s', (z, p) => {
    expect(Math.abs(normalDistribution(z) - p)).toBeLessThan(2e-16 + 1e-13 * Math.min(p, 1e-3));
    expect(Math.abs(normalDistribution(-z) - (1 - p))).toBeLessThan(3e-16);
  });
});
