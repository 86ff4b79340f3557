import { expect, test } from 'vitest';
import { diagnose } from '../../src/convergence/diagnosis.ts';
import { closeFixedPoint } from '../../src/convergence/driver.ts';

function passes(f: (x: number) => number, start: number, maxPasses: number) {
  const problem = {
    size: 1,
    lower: Float64Array.of(-Infinity),
    evaluate(x: Float64Array, g: Float64Array): void {
      g[0] = f(x[0]);
    },
  };
  return closeFixedPoint(problem, Float64Array.of(start), { method: 'direct', maxPasses });
}

test('a component without a way out accumulates by what enters with every pass', () => {
  const found = diagnose(
    passes((x) => x + 2, 5, 30),
    1e-9,
  );
  expect(found).toMatchObject({ worst: 0, gain: 2, trend: 'accumulating', passesToGo: null });
});

test('a purge of 2 % converges, and the passes to go are told right', () => {
  const map = (x: number): number => 1 + 0.98 * x;
  const found = diagnose(passes(map, 1, 200), 1e-9);
  expect(found.trend).toBe('converging');
  // the scale still grows a little at pass 200, hence 1e-3
  expect(Math.abs((found.rate as number) - 0.98)).toBeLessThan(1e-3);
  const needed = passes(map, 1, 5000).passes - 200;
  expect(Math.abs((found.passesToGo as number) - needed)).toBeLessThan(0.1 * needed);
});

test('a map that swings between two values oscillates', () => {
  expect(
    diagnose(
      passes((x) => 10 / x, 1, 20),
      1e-9,
    ),
  ).toMatchObject({ trend: 'oscillating', passesToGo: null });
});

test('a map that runs away diverges', () => {
  expect(
    diagnose(
      passes((x) => -0.5 - 0.5 * x ** 2, -2.1, 12),
      1e-9,
    ).trend,
  ).not.toBe('converging');
  const found = diagnose(
    passes((x) => x + 0.001 * x ** 2, 1, 60),
    1e-9,
  );
  expect(found.trend).toBe('diverging');
  expect(found.rate).toBeGreaterThan(1);
});

test('too few passes, or none, tell nothing', () => {
  expect(
    diagnose(
      passes((x) => 0.5 * x + 1, 0, 3),
      1e-9,
    ),
  ).toMatchObject({ trend: 'unknown', rate: null });
  expect(diagnose({ history: [] }, 1e-9)).toMatchObject({ worst: -1, trend: 'unknown' });
});
