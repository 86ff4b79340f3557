import fc from 'fast-check';
import { expect, test, vi } from 'vitest';
import { solveInPlace } from '../../src/convergence/linear-solve.ts';
import { solveTogether } from '../../src/convergence/together.ts';
import { PassTrouble } from '../../src/diagnostics/diagnostic.ts';

const OPTIONS = { tolerance: 1e-10, aimTolerance: 1e-10 };

/** An inert of which 0.01 comes in and the share 1 − p/5 comes back, beside a gas of which half comes back. */
function inertLoop(target: number, most = Infinity) {
  const back = (u: number) => 1 - u / 5;
  return {
    scale: Float64Array.of(0.1, 1),
    evaluate(x: Float64Array, u: Float64Array, g: Float64Array) {
      if (u[0] > most) throw new PassTrouble('dry', 'Nothing condenses.', 'Too warm.', 'Cool.');
      g[0] = back(u[0]) * (x[0] + 0.01);
      g[1] = 0.5 * back(u[0]) * (x[1] + 1);
      return (f: Float64Array) => {
        f[0] = g[0] / (g[0] + g[1]) / target - 1;
      };
    },
    /** at the start u = 0.2 */
    correct(r: Float64Array) {
      r[0] /= 1 - back(0.2);
      r[1] /= 1 - 0.5 * back(0.2);
      return true;
    },
    start: [Float64Array.of((0.96 * 0.01) / 0.04, 0.48 / 0.52), Float64Array.of(0.2)] as const,
  };
}

test('inert of a loop with a slow purge is brought to its level in less passes than one closing takes', () => {
  const loop = inertLoop(0.12);
  const { stopped, best, passes } = solveTogether(loop, ...loop.start, OPTIONS);
  expect(stopped).toBeNull();
  const g = new Float64Array(2);
  const f = new Float64Array(1);
  loop.evaluate(best!.x, best!.u, g)(f);
  expect(Math.abs(f[0])).toBeLessThan(1e-9);
  expect(Math.abs(g[0] - best!.x[0])).toBeLessThan(1e-10);
  expect(Math.abs(g[1] - best!.x[1])).toBeLessThan(1e-9);
  // direct passes at 4 % purge: ln(1e-10)/ln(0.96) = 564
  expect(passes).toBeLessThan(25);
});

test('aims are judged only where the recycle is closed well enough for that', () => {
  const loop = inertLoop(0.1);
  let judged = 0;
  const counting = {
    ...loop,
    evaluate(x: Float64Array, u: Float64Array, g: Float64Array) {
      const judge = loop.evaluate(x, u, g);
      return (f: Float64Array) => {
        judged++;
        judge(f);
      };
    },
  };
  const onPass = vi.fn();
  const { stopped, passes } = solveTogether(counting, ...loop.start, { ...OPTIONS, onPass });
  expect(stopped).toBeNull();
  expect(judged).toBeLessThan(passes);
  const corrected = onPass.mock.calls.filter(([, note]) => note === 'the recycle corrected');
  expect(corrected.some(([{ f }]) => Number.isNaN(f[0]))).toBe(true);
});

test('a bound in the way ends it, with the settings inside', () => {
  // at a purge of 20 % it is 5.7 %
  const loop = inertLoop(0.05);
  const { stopped, best } = solveTogether(loop, ...loop.start, OPTIONS);
  expect(stopped).toBe('a bound is in the way');
  expect(best!.u[0]).toBeGreaterThan(0.2);
  expect(best!.u[0]).toBeLessThanOrEqual(1);
});

test('steps that lead where a block fails are shortened, or given up', () => {
  const near = inertLoop(0.12, 0.7);
  expect(solveTogether(near, ...near.start, OPTIONS).stopped).toBeNull();
  const walled = inertLoop(0.12, 0.21);
  const { stopped, best } = solveTogether(walled, ...walled.start, OPTIONS);
  expect(stopped).toBe('steps do not help');
  expect(best!.u[0]).toBeLessThanOrEqual(0.21);
});

test('aims that settings move alike are left to the search around closings', () => {
  const { stopped } = solveTogether(
    {
      scale: Float64Array.of(1),
      evaluate(x, u, g) {
        g[0] = 0.5 * x[0] + u[0] + u[1];
        return (f) => f.set([g[0] - 1, g[0] - 1.2]);
      },
      correct(r) {
        r[0] *= 2;
        return true;
      },
    },
    Float64Array.of(1.6),
    Float64Array.of(0.4, 0.4),
    OPTIONS,
  );
  expect(stopped).toBe('the settings move aims alike');
});

test('linear recycles with linear aims are solved, whatever they are, as far as the answer lies between the bounds', () => {
  const entry = fc.double({ min: -0.3, max: 0.3, noNaN: true });
  const share = fc.double({ min: 0.2, max: 0.8, noNaN: true });
  const numbers = fc.record({
    A: fc.array(entry, { minLength: 9, maxLength: 9 }),
    B: fc.array(entry, { minLength: 6, maxLength: 6 }),
    start: fc.tuple(share, share),
    answer: fc.tuple(share, share),
  });
  fc.assert(
    fc.property(numbers, ({ A, B, start, answer }) => {
      const inverse = (r: Float64Array) =>
        solveInPlace(
          [0, 1, 2].map((i) => Float64Array.from([0, 1, 2], (j) => (i === j ? 1 : 0) - A[3 * i + j])),
          r,
        );
      const fed = (u: ArrayLike<number>) =>
        Float64Array.from([0, 1, 2], (i) => 3 + B[2 * i] * u[0] + B[2 * i + 1] * u[1]);
      const closed = (u: ArrayLike<number>) => {
        const x = fed(u);
        inverse(x);
        return x;
      };
      // each aim is mostly its own setting's
      const wanted = closed(answer);
      const { stopped, best } = solveTogether(
        {
          scale: Float64Array.of(3, 3, 3),
          evaluate(x, u, g) {
            const feed = fed(u);
            for (let i = 0; i < 3; i++)
              g[i] = feed[i] + A[3 * i] * x[0] + A[3 * i + 1] * x[1] + A[3 * i + 2] * x[2];
            return (f) => {
              for (let a = 0; a < 2; a++) f[a] = 2 * (u[a] - answer[a]) + 0.2 * (g[a] - wanted[a]);
            };
          },
          correct: inverse,
        },
        closed(start),
        Float64Array.from(start),
        OPTIONS,
      );
      expect(stopped).toBeNull();
      expect(Math.abs(best!.u[0] - answer[0])).toBeLessThan(1e-8);
      expect(Math.abs(best!.u[1] - answer[1])).toBeLessThan(1e-8);
    }),
  );
});
