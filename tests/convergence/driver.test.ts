import fc from 'fast-check';
import { expect, test } from 'vitest';
import { closeFixedPoint, type FixedPointProblem } from '../../src/convergence/driver.ts';
import { methods } from '../../src/convergence/methods.ts';
import { PassTrouble } from '../../src/diagnostics/diagnostic.ts';
import type { MethodName } from '../../src/model/flowsheet.ts';
import { loop1, recycleProblem } from './ammonia-loop.ts';
import { scaledDistance } from './expectations.ts';

const names = Object.keys(methods) as MethodName[];
const trouble = () =>
  new PassTrouble('no-split', 'Nothing condenses.', 'The gas is too dry.', 'Cool further.');

function scalar(f: (x: number) => number, extra: Partial<FixedPointProblem> = {}): FixedPointProblem {
  return {
    size: 1,
    lower: Float64Array.of(0),
    evaluate(x, g) {
      g[0] = f(x[0]);
    },
    ...extra,
  };
}

test('an exact start closes in one pass', () => {
  const closed = closeFixedPoint(
    scalar(() => 3),
    Float64Array.of(3),
    { method: 'auto' },
  );
  expect(closed).toMatchObject({ converged: true, reason: 'closed', passes: 1, residual: 0 });
});

test('a start with a small residual but unknown slope is not called closed', () => {
  // residual 1e-10, true error 1e-5: only a second pass shows it
  const closed = closeFixedPoint(
    scalar((x) => 1e-5 + (1 - 1e-5) * x),
    Float64Array.of(1 - 1e-5),
    { method: 'auto' },
  );
  expect(closed.history[0].residual).toBeLessThan(1e-9);
  expect(closed.reason).toBe('closed');
  expect(closed.passes).toBeGreaterThan(1);
  expect(Math.abs(closed.x[0] - 1)).toBeLessThan(1e-9);
});

test('the balance over the battery limit must close as well', () => {
  let left = 4;
  const problem = scalar(() => 3, { extraError: () => --left });
  const closed = closeFixedPoint(problem, Float64Array.of(3), { method: 'direct' });
  expect(closed.reason).toBe('closed');
  expect(closed.passes).toBe(4);
  expect(closed.history.map((record) => record.extraError)).toEqual([3, 2, 1, 0]);
});

test.each(names)('%s stops at the passes allowed and says so', (method) => {
  const closed = closeFixedPoint(recycleProblem(loop1), Float64Array.of(0, 0, 0, 0, 0, 300, 2e7), {
    method,
    maxPasses: 3,
  });
  expect(closed).toMatchObject({ converged: false, reason: 'max-passes', passes: 3, trouble: null });
  expect(closed.history.map((record) => record.pass)).toEqual([1, 2, 3]);
  expect(closed.history[0].method).toBe('start');
});

test('a component that only enters is never closed', () => {
  // without a way out the flow grows by 1 in every pass; no fixed point exists
  for (const method of names) {
    const closed = closeFixedPoint(
      scalar((x) => x + 1),
      Float64Array.of(1),
      { method, maxPasses: 500 },
    );
    expect(closed.converged).toBe(false);
  }
});

test('a map that swings between two values is given up as stalled', () => {
  const closed = closeFixedPoint(
    scalar((x) => 10 / x),
    Float64Array.of(1),
    { method: 'direct' },
  );
  expect(closed.reason).toBe('stalled');
  expect(closed.passes).toBeLessThan(100);
});

test.each(names)('%s keeps every guess inside the bounds, whatever the map', (method) => {
  const anyMap = fc.record({
    A: fc.array(fc.double({ min: -3, max: 3, noNaN: true }), { minLength: 9, maxLength: 9 }),
    b: fc.array(fc.double({ min: -5, max: 5, noNaN: true }), { minLength: 3, maxLength: 3 }),
    start: fc.array(fc.double({ min: 0, max: 8, noNaN: true }), { minLength: 3, maxLength: 3 }),
  });
  fc.assert(
    fc.property(anyMap, ({ A, b, start }) => {
      const lower = new Float64Array(3);
      const upper = new Float64Array(3).fill(8);
      const problem: FixedPointProblem = {
        size: 3,
        lower,
        upper,
        evaluate(x, g) {
          for (let i = 0; i < 3; i++) {
            expect(x[i]).toBeGreaterThanOrEqual(lower[i]);
            expect(x[i]).toBeLessThanOrEqual(upper[i]);
            let sum = b[i];
            for (let j = 0; j < 3; j++) sum += A[3 * i + j] * x[j];
            g[i] = Math.min(Math.max(sum, 0), 8);
          }
        },
      };
      closeFixedPoint(problem, Float64Array.from(start), { method, maxPasses: 40 });
    }),
  );
});

test('a flow that is there is never thrown to zero by extrapolation', () => {
  const problem = scalar((x) => {
    expect(x).toBeGreaterThan(0);
    return 0.5 * x ** 1.5 + 1e-3;
  });
  const closed = closeFixedPoint(problem, Float64Array.of(2), { method: 'anderson' });
  expect(closed.reason).toBe('closed');
});

test.each(names)('%s steps back from a guess at which a block fails and closes all the same', (method) => {
  // the block fails below 0.9, where the first direct step leads
  const problem = scalar((x) => {
    if (x < 0.9) throw trouble();
    return 0.2 + 0.4 * x + 0.4 * x * x * Math.exp(1 - x);
  });
  const closed = closeFixedPoint(problem, Float64Array.of(9), { method, maxPasses: 300 });
  expect(closed.reason).toBe('closed');
  expect(Math.abs(closed.x[0] - 1)).toBeLessThan(1e-8); // 0.2 + 0.4 + 0.4 = 1
  const failed = closed.history.filter((record) => Number.isNaN(record.residual));
  if (failed.length > 0) expect(closed.history[failed[0].pass].method).toBe('shortened');
});

test('a failed pass is counted, told in the trace, and followed by half the step', () => {
  const problem = scalar((x) => {
    if (x > 6) throw trouble();
    return 8 - 0.5 * x; // fixed point 16/3
  });
  const closed = closeFixedPoint(problem, Float64Array.of(1), { method: 'direct' });
  expect(closed.history[1]).toMatchObject({ pass: 2, worst: -1, note: 'failed: Nothing condenses.' });
  expect(closed.history[2]).toMatchObject({
    pass: 3,
    method: 'shortened',
    guess: 4.25,
    note: 'half the step',
  });
  expect(closed.reason).toBe('closed');
  expect(closed.trouble).toBeNull();
});

test('a block that fails wherever the loop leads ends with its own account', () => {
  const problem = scalar((x) => {
    if (x !== 1) throw trouble();
    return 5;
  });
  const closed = closeFixedPoint(problem, Float64Array.of(1), { method: 'auto' });
  expect(closed).toMatchObject({ converged: false, reason: 'trouble', trouble: { code: 'no-split' } });
  expect(Array.from(closed.x)).toEqual([1]);
  expect(closed.history.at(-1)?.method).toBe('direct');
});

test('a block that fails at the start ends at once', () => {
  const problem = scalar(() => {
    throw trouble();
  });
  const closed = closeFixedPoint(problem, Float64Array.of(1), { method: 'auto' });
  expect(closed).toMatchObject({ converged: false, reason: 'trouble', passes: 1, residual: NaN });
});

test('numbers that are not finite are recognised', () => {
  const closed = closeFixedPoint(
    scalar((x) => Math.log(x - 2)),
    Float64Array.of(1),
    { method: 'auto' },
  );
  expect(closed).toMatchObject({ converged: false, reason: 'not-finite', passes: 1, trouble: null });
});

test('a fault of ours is not taken for trouble of a block', () => {
  const problem = scalar(() => {
    throw new RangeError('a bug');
  });
  expect(() => closeFixedPoint(problem, Float64Array.of(1), { method: 'auto' })).toThrow('a bug');
});

test('the same problem gives the same trace, and the trace can be watched', () => {
  const start = Float64Array.of(0, 0, 0, 0, 0, 300, 2e7);
  const seen: number[] = [];
  const once = closeFixedPoint(recycleProblem(loop1), start, {
    method: 'auto',
    onPass: (record) => seen.push(record.pass),
  });
  const again = closeFixedPoint(recycleProblem(loop1), start, { method: 'auto' });
  expect(again).toEqual(once);
  expect(seen).toEqual(once.history.map((record) => record.pass));
  expect(Array.from(start)).toEqual([0, 0, 0, 0, 0, 300, 2e7]);
  expect(scaledDistance(once.x, once.g)).toBeLessThan(1e-9);
});

test('auto says what it leads ahead and when it changes over', () => {
  const loop = closeFixedPoint(recycleProblem(loop1), Float64Array.of(0, 0, 0, 0, 0, 300, 2e7), {
    method: 'auto',
  });
  expect(loop.history.map((record) => record.method).slice(0, 4)).toEqual([
    'start',
    'direct',
    'anderson',
    'anderson',
  ]);
  expect(loop.history[2].note).toBe('5 of 7 variables pile up and are led ahead');

  // no fixed point at all: every method gets its turn
  const hopeless = closeFixedPoint(
    scalar((x) => x + 1),
    Float64Array.of(0.3),
    { method: 'auto' },
  );
  const notes = hopeless.history
    .map((record) => record.note)
    .map((note) => /passes: (from \w+ to \w+)/.exec(note)?.[1])
    .filter((change) => change !== undefined);
  expect(hopeless.reason).toBe('stalled');
  expect(notes.slice(0, 5)).toEqual([
    'from anderson to newton',
    'from newton to anderson',
    'from anderson to newton',
    'from newton to wegstein',
    'from wegstein to direct',
  ]);
});
