import { expect, test } from 'vitest';
import { closeFixedPoint, type FixedPointProblem } from '../../src/convergence/driver.ts';
import { limitStep } from '../../src/convergence/step-limit.ts';
import { loop1, recycleProblem } from './ammonia-loop.ts';

const emptyRecycle = Float64Array.of(0, 0, 0, 0, 0, 300, 2e7);

// passes computed by us; they guard against a silent loss of speed
test.each([
  ['auto', 17],
  ['newton', 35],
] as const)('%s closes the loop at a purge of 0.01 %% to 1e-9 within %d passes', (method, passes) => {
  const closed = closeFixedPoint(recycleProblem({ ...loop1, purge: 1e-4 }), emptyRecycle, { method });
  expect(closed.reason).toBe('closed');
  expect(closed.passes).toBeLessThanOrEqual(passes);
});

test('newton spends no pass on pressure, which every pass returns as it is', () => {
  const closed = closeFixedPoint(recycleProblem(loop1), emptyRecycle, { method: 'newton' });
  const probes = closed.history.filter((record) => record.note.startsWith('probe'));
  expect(closed.reason).toBe('closed');
  expect(probes.length).toBeLessThanOrEqual(6);
});

/**
 * A component that condenses from a flow of 100 on: below it 0.9995 of what comes goes round again, above it a fifth
 * of what is more. Fixed point where 1 + 0.9995 · 100 + 0.2 (x − 100) = x.
 */
const kink: FixedPointProblem = {
  size: 1,
  lower: Float64Array.of(0),
  scale(x, g, scale) {
    scale[0] = Math.max(x[0], g[0], 1e-12);
  },
  evaluate(x, g) {
    g[0] = 1 + 0.9995 * Math.min(x[0], 100) + 0.2 * Math.max(x[0] - 100, 0);
  },
};

test.each(['auto', 'newton', 'anderson'] as const)(
  '%s closes a loop whose slope changes from 0.9995 to 0.2 at the dew point',
  (method) => {
    const closed = closeFixedPoint(kink, Float64Array.of(3), { method });
    expect(closed.reason).toBe('closed');
    expect(Math.abs(closed.x[0] - (1 + 99.95 - 20) / 0.8)).toBeLessThan(1e-6);
  },
);

test('a step is shortened as a whole, and never below the direct one', () => {
  const x = Float64Array.of(1, 10);
  const g = Float64Array.of(2, 9);
  const next = Float64Array.of(202, 109);
  // from g, the first variable may go to ten times 2: 18 of 200
  expect(limitStep(x, g, g, next, 10)).toBeCloseTo(0.09, 12);
  expect(next[0]).toBeCloseTo(20, 10);
  expect(next[1]).toBeCloseTo(9 + 0.09 * 100, 10);
  expect(limitStep(x, g, g, Float64Array.from(g), 10)).toBe(1);
  const falling = Float64Array.of(0.5, -90);
  expect(limitStep(x, g, g, falling, 10)).toBeLessThan(1);
  expect(falling[1]).toBeCloseTo(0.9, 10);
});
