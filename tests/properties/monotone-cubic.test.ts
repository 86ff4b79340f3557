import fc from 'fast-check';
import { expect, test } from 'vitest';
import { createMonotoneCubic, interpolate, interpolateSlope } from '../../src/properties/monotone-cubic.ts';
import { expectRelative } from './expect-relative.ts';

const table = fc
  .array(
    fc.tuple(fc.double({ min: 0.1, max: 10, noNaN: true }), fc.double({ min: 0, max: 5, noNaN: true })),
    {
      minLength: 2,
      maxLength: 12,
    },
  )
  .map((steps) => {
    let [x, y] = [0, 0];
    return steps.map(([dx, dy]) => {
      x += dx;
      y += dy;
      return [x, y] as const;
    });
  });

test('the curve passes through every point of its table', () => {
  fc.assert(
    fc.property(table, (points) => {
      const curve = createMonotoneCubic(
        points.map((p) => p[0]),
        points.map((p) => p[1]),
      );
      for (const [x, y] of points) expect(Math.abs(interpolate(curve, x) - y)).toBeLessThan(1e-12 * (1 + y));
    }),
  );
});

test('the curve of a rising table rises, and its slope is its derivative', () => {
  fc.assert(
    fc.property(table, fc.double({ min: 0.01, max: 0.99, noNaN: true }), (points, share) => {
      const x = points.map((p) => p[0]);
      const curve = createMonotoneCubic(
        x,
        points.map((p) => p[1]),
      );
      const at = x[0]! + share * (x.at(-1)! - x[0]!);
      const step = 1e-6;
      const rise = (interpolate(curve, at + step) - interpolate(curve, at - step)) / (2 * step);
      expect(interpolateSlope(curve, at)).toBeGreaterThanOrEqual(-1e-12);
      // curvature is below 1e4 for these tables, and it may jump inside the step
      expect(Math.abs(interpolateSlope(curve, at) - rise)).toBeLessThan(0.02);
    }),
  );
});

test('a straight table gives a straight line', () => {
  const curve = createMonotoneCubic([0, 1, 3, 4], [1, 3, 7, 9]);
  for (const x of [0, 0.3, 2.2, 3.9]) {
    expectRelative(interpolate(curve, x), 1 + 2 * x, 1e-14);
    expectRelative(interpolateSlope(curve, x), 2, 1e-14);
  }
});
