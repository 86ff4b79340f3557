import fc from 'fast-check';
import { expect, test } from 'vitest';
import { reachAims } from '../../src/convergence/aims.ts';
import { PassTrouble } from '../../src/diagnostics/diagnostic.ts';

const one = (f: (x: number) => number, start: number, low: number, high: number, tolerance = 1e-9) =>
  reachAims(
    (settings) => Float64Array.of(f(settings[0])),
    Float64Array.of(start),
    Float64Array.of(low),
    Float64Array.of(high),
    Float64Array.of(tolerance),
  );

const several = (
  f: (x: Float64Array) => readonly number[],
  start: readonly number[],
  low: readonly number[],
  high: readonly number[],
  tolerance = 1e-9,
) =>
  reachAims(
    (settings) => Float64Array.from(f(settings)),
    Float64Array.from(start),
    Float64Array.from(low),
    Float64Array.from(high),
    new Float64Array(start.length).fill(tolerance),
  );

// inert level at the converter inlet over the purge fraction p: fresh inert 1 in 100, so about 1/(1 + p · rest)
const inertLevel = (purge: number): number => 0.01 / (0.01 + 0.9 * purge ** 0.9);

test('a purge for 12 % inert is found within ten evaluations of the loop', () => {
  const found = one((p) => inertLevel(p) / 0.12 - 1, 0.02, 0.002, 0.2, 1e-8);
  expect(found.reached).toBe(true);
  expect(Math.abs(inertLevel(found.values[0]) / 0.12 - 1)).toBeLessThanOrEqual(1e-8);
  expect(found.evaluations).toBeLessThanOrEqual(10);
  expect(found).toMatchObject({ limit: -1, limitSide: null, singular: null, trouble: null });
});

test('an aim that is met at the start costs one evaluation', () => {
  expect(one((x) => x - 3, 3, 0, 10)).toMatchObject({ reached: true, evaluations: 1 });
});

test('an aim beyond a bound names the bound and stays at it', () => {
  expect(one((x) => x - 30, 3, 0, 10)).toMatchObject({ reached: false, limit: 0, limitSide: 'high' });
  const low = one((x) => x + 5, 3, 0, 10);
  expect(low).toMatchObject({ reached: false, limit: 0, limitSide: 'low' });
  expect(Array.from(low.values)).toEqual([0]);
  expect(one((x) => x + 5, 0, 0, 10)).toMatchObject({ reached: false, limit: 0, limitSide: 'low' });
});

test('an aim behind a hump is found', () => {
  // rises to -2 at 3, falls again, then rises through the target at 9
  const found = one((x) => x - 9 + 4 * Math.exp(-((x - 3) ** 2)), 2, 0, 10);
  expect(found.reached).toBe(true);
  expect(Math.abs(found.values[0] - 9)).toBeLessThan(1e-6);
});

test('an aim that nothing reaches is given up within the evaluations allowed', () => {
  const found = one((x) => 1 + (x - 5) ** 2, 2, 0, 10);
  expect(found.reached).toBe(false);
  expect(found.evaluations).toBeLessThanOrEqual(60);
});

test('settings at which the loop does not close are avoided, at the start as well', () => {
  const failing = (x: number): number => {
    if (x < 4) throw new PassTrouble('dry', 'Nothing condenses.', 'Too warm.', 'Cool.');
    return Math.log(x) - Math.log(7);
  };
  const found = one(failing, 1, 0, 10);
  expect(found.reached).toBe(true);
  expect(found.trouble?.code).toBe('dry');
  expect(one((x) => (x > 8 ? NaN : x - 7.9), 2, 0, 10).reached).toBe(true);
  expect(one(() => NaN, 2, 0, 10)).toMatchObject({ reached: false, limit: -1 });
});

test('any rising or falling figure is brought to any value it takes between the bounds', () => {
  const numbers = fc.record({
    power: fc.double({ min: 0.3, max: 4, noNaN: true }),
    at: fc.double({ min: 0.01, max: 0.99, noNaN: true }),
    start: fc.double({ min: 0, max: 1, noNaN: true }),
    sign: fc.constantFrom(1, -1),
  });
  fc.assert(
    fc.property(numbers, ({ power, at, start, sign }) => {
      const found = one((x) => sign * (x ** power - at ** power), start, 0, 1, 1e-10);
      expect(found.reached).toBe(true);
      expect(found.evaluations).toBeLessThanOrEqual(40);
    }),
  );
});

test('two coupled aims are reached together', () => {
  // inert level and yield, each moved by purge and condenser temperature
  const figures = (x: Float64Array): readonly number[] => {
    const level = inertLevel(x[0]) * (1 + 0.002 * (x[1] - 270));
    const yielded = 0.99 - 2 * x[0] - 0.0008 * (x[1] - 250);
    return [level / 0.12 - 1, yielded / 0.85 - 1];
  };
  const found = several(figures, [0.02, 280], [0.002, 240], [0.2, 300]);
  expect(found.reached).toBe(true);
  for (const residual of figures(found.values)) expect(Math.abs(residual)).toBeLessThanOrEqual(1e-9);
  expect(found.evaluations).toBeLessThanOrEqual(30);
});

test('settings never leave their bounds', () => {
  const range = fc.double({ min: -3, max: 3, noNaN: true });
  fc.assert(
    fc.property(fc.array(range, { minLength: 6, maxLength: 6 }), ([a, b, c, d, e, f]) => {
      several(
        (x) => {
          for (const value of x) {
            expect(value).toBeGreaterThanOrEqual(1);
            expect(value).toBeLessThanOrEqual(2);
          }
          return [a * x[0] + b * x[1] ** 2 + e, c * x[0] * x[1] + d * x[1] + f];
        },
        [1.5, 1.2],
        [1, 1],
        [2, 2],
      );
    }),
  );
});

test('a linear pair of aims with its answer inside the bounds is reached', () => {
  const range = fc.double({ min: -1, max: 1, noNaN: true });
  const share = fc.double({ min: 0.05, max: 0.95, noNaN: true });
  fc.assert(
    fc.property(range, range, share, share, share, share, (b, c, x, y, startX, startY) => {
      // diagonal 2, off-diagonal at most 1: never singular
      const found = several(
        (s) => [2 * (s[0] - x) + b * (s[1] - y), c * (s[0] - x) + 2 * (s[1] - y)],
        [startX, startY],
        [0, 0],
        [1, 1],
      );
      expect(found.reached).toBe(true);
    }),
  );
});

test('two aims that ask for the same thing are told', () => {
  const found = several((x) => [x[0] + x[1] - 3, 2 * x[0] + 2 * x[1] - 7], [1, 1], [0, 0], [5, 5]);
  expect(found).toMatchObject({ reached: false, singular: [0, 1] });
});

test('an aim that no setting moves is told', () => {
  const found = several((x) => [x[0] + x[1] - 3, 0.5], [1, 1], [0, 0], [5, 5]);
  expect(found).toMatchObject({ reached: false, singular: [1] });
});

test('of two aims out of reach the bound in the way is named', () => {
  const found = several((x) => [x[0] - 9, x[1] - 2], [1, 1], [0, 0], [5, 5]);
  expect(found).toMatchObject({ reached: false, limit: 0, limitSide: 'high' });
  expect(found.values[0]).toBe(5);
});

test('two aims step back from settings at which the loop does not close', () => {
  const found = several(
    (x) => {
      if (x[0] > 3.2) throw new PassTrouble('dry', 'Nothing condenses.', 'Too warm.', 'Cool.');
      return [Math.exp(x[0] - 3) - 1, x[0] * x[1] - 6];
    },
    [0.5, 1],
    [0, 0],
    [5, 5],
  );
  expect(found.reached).toBe(true);
  expect(Math.abs(found.values[1] - 2)).toBeLessThan(1e-6);
});

test('two aims that want different things of one figure meet half-way, both named', () => {
  // least squares of a − 3 and a − 4: a = 3.5
  const found = several((x) => [x[0] + 2 * x[1] - 3, x[0] + 2 * x[1] - 4], [1, 1], [0, 0], [5, 5]);
  expect(found).toMatchObject({ reached: false, singular: [0, 1], limit: -1 });
  expect(found.values[0] + 2 * found.values[1]).toBeCloseTo(3.5, 6);
  expect(found.evaluations).toBeLessThan(60);
});

test('of three aims of which two fight the third is met and has no part in it', () => {
  const figures = (x: Float64Array) => [
    x[0] + x[1] - 3,
    x[1] * x[2] - 2,
    2 * (x[0] + x[1]) - 7 + 0.01 * (x[0] - 1) ** 2,
  ];
  const found = several(figures, [1, 1, 1], [0, 0, 0], [5, 5, 5]);
  expect(found.reached).toBe(false);
  expect(found.singular).toEqual([0, 2]);
  const ratio = Math.abs(found.residuals[1]) / Math.abs(found.residuals[0]);
  expect(ratio).toBeLessThan(1e-3);
});

test('aims that become parallel only where they are met are met', () => {
  // x + y = 2 and x y = 1 touch at (1, 1)
  const found = several((x) => [x[0] + x[1] - 2, x[0] * x[1] - 1], [0.4, 1.2], [0, 0], [3, 3], 1e-8);
  expect(found).toMatchObject({ reached: true, singular: null });
  expect(found.values[0]).toBeCloseTo(1, 3);
});

test('aims that can be told apart at the start and fight where the search ends are named', () => {
  // x + y = 2 allows x y = 1 at most
  const found = several((x) => [x[0] + x[1] - 2, x[0] * x[1] - 1.2], [0.4, 1.2], [0, 0], [3, 3]);
  expect(found).toMatchObject({ reached: false, singular: [0, 1], limit: -1 });
  // by symmetry x = y; least squares: 4 (2x − 2) + 4x (x² − 1.2) = 0, x³ + 0.8 x − 2 = 0
  const [x, y] = found.values;
  expect(Math.abs(x - y)).toBeLessThan(0.02);
  expect(Math.abs(x ** 3 + 0.8 * x - 2)).toBeLessThan(0.01);
  expect(found.evaluations).toBeLessThanOrEqual(120);
});

test('noise of closings hides no fight', () => {
  let k = 0;
  const noise = () => 1e-10 * Math.sin(7 * ++k);
  const figures = (x: Float64Array) => {
    const inert = x[0] * Math.exp(0.3 * x[1]);
    return [inert / 2 - 1 + noise(), inert / 2.2 - 1 + noise()];
  };
  const found = several(figures, [1, 1], [0, 0], [5, 5], 1e-8);
  expect(found).toMatchObject({ reached: false, singular: [0, 1] });
});

test('an aim that its bound keeps away, at either side, lets the other be met', () => {
  const figures = (first: number) => (x: Float64Array) => [x[0] + 0.3 * x[1] - first, x[1] - 0.2 * x[0] - 2];
  const high = several(figures(9), [1, 1], [0, 0], [5, 5]);
  expect(high).toMatchObject({ reached: false, limit: 0, limitSide: 'high', singular: null });
  expect(Array.from(high.values)).toEqual([5, expect.closeTo(3, 8)]);
  const low = several(figures(-2), [1, 1], [0, 0], [5, 5]);
  expect(low).toMatchObject({ reached: false, limit: 0, limitSide: 'low', singular: null });
  expect(Array.from(low.values)).toEqual([0, expect.closeTo(2, 8)]);
});

test('where each setting moves the figure of the other aim, the one that can still be met is met', () => {
  // x₁, the setting of the second aim, is what moves the first figure
  const found = several((x) => [x[1] - 9, x[0] - 2], [1, 1], [0, 0], [5, 5]);
  expect(found).toMatchObject({ reached: false, limit: 1, limitSide: 'high' });
  expect(Array.from(found.values)).toEqual([expect.closeTo(2, 8), 5]);
});

test('the nearest place between the bounds is found where the figure turns back', () => {
  const found = one((x) => -0.5 - (x - 4.3) ** 2, 2, 0, 10);
  expect(found).toMatchObject({ reached: false, limit: -1, singular: null });
  expect(Math.abs(found.values[0] - 4.3)).toBeLessThan(0.01);
  // and where it turns back just behind the target, it is met
  expect(one((x) => 1e-3 - (x - 4.3) ** 2, 2, 0, 10).reached).toBe(true);
});

test('a single aim that its setting does not move is told', () => {
  expect(one(() => 0.4, 2, 0, 10)).toMatchObject({ reached: false, singular: [0] });
});
