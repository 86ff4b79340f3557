import { describe, expect, test } from 'vitest';
import type { BoxProblem } from '../../src/study/box-problem.ts';
import { descend } from '../../src/study/trust-region.ts';

type Plain = (x: number, y: number) => number | null;

/** A problem in two variables from -2 to 3, which the box knows as 0 to 1. */
function problem(f: Plain, ...limits: Plain[]): BoxProblem {
  return {
    size: 2,
    limits: limits.length,
    evaluate(u) {
      const [x, y] = [wide(u[0]!), wide(u[1]!)];
      const values = [f, ...limits].map((one) => one(x, y));
      if (values.some((value) => value === null)) return null;
      return { f: values[0]!, c: Float64Array.from(values.slice(1) as number[]) };
    },
  };
}

const wide = (u: number) => -2 + 5 * u;

function endOf(one: BoxProblem, ...start: number[]) {
  const end = descend(
    one,
    Float64Array.from(start, (x) => (x + 2) / 5),
  )!;
  return { x: wide(end.u[0]!), y: wide(end.u[1]!), ...end };
}

describe('known problems', () => {
  test('a curved valley without limits (Rosenbrock 1960)', () => {
    const { x, value } = endOf(
      problem((x, y) => 100 * (y - x * x) ** 2 + (1 - x) ** 2),
      -1.2,
      1,
    );
    // Differences over a thousandth of the box see the floor of so steep a valley half a per cent aside.
    expect(x).toBeCloseTo(1, 2);
    expect(value.f).toBeLessThan(1e-4);
  });

  test('two limits that meet in a corner (Hock & Schittkowski 1981, no. 22)', () => {
    const { x, y, value, multipliers } = endOf(
      problem(
        (x, y) => (x - 2) ** 2 + (y - 1) ** 2,
        (x, y) => x + y - 2,
        (x, y) => x * x - y,
      ),
      2,
      2,
    );
    expect(x).toBeCloseTo(1, 6);
    expect(y).toBeCloseTo(1, 6);
    expect(value.f).toBeCloseTo(1, 6);
    // The slopes of f are those of the limits times 2/3 each.
    expect(multipliers[0]).toBeCloseTo(2 / 3, 4);
    expect(multipliers[1]).toBeCloseTo(2 / 3, 4);
  });

  test('a limit that bends away: the least of x on a circle (Maratos)', () => {
    const { x, y } = endOf(
      problem(
        (x, y) => 2 * (x * x + y * y - 1) - x,
        (x, y) => x * x + y * y - 1,
        (x, y) => 1 - x * x - y * y,
      ),
      0.8,
      0.6,
    );
    expect(x).toBeCloseTo(1, 4);
    expect(y).toBeCloseTo(0, 2);
  });

  test('a kink does not hold it up', () => {
    const { x, y } = endOf(
      problem((x, y) => Math.abs(x - 0.3) + (y - 0.5) ** 2),
      -1.5,
      2.5,
    );
    expect(x).toBeCloseTo(0.3, 4);
    expect(y).toBeCloseTo(0.5, 2);
  });

  test('noise of closings does not matter', () => {
    const noise = (x: number) => 1e-9 * Math.sin(1e7 * x);
    const { value } = endOf(
      problem(
        (x, y) => 1 + (x - 2) ** 2 + (y - 1) ** 2 + noise(x + 3 * y),
        (x, y) => x * x - y + noise(x - y),
      ),
      -1,
      2,
    );
    const exact = endOf(
      problem(
        (x, y) => 1 + (x - 2) ** 2 + (y - 1) ** 2,
        (x, y) => x * x - y,
      ),
      0,
      0,
    );
    expect(Math.abs(value.f / exact.value.f - 1)).toBeLessThan(1e-7);
  });
});

test('bounds hold, to the last digit', () => {
  const { u } = endOf(
    problem((x, y) => x - y),
    0,
    0,
  );
  expect(Array.from(u)).toEqual([0, 1]);
});

test('limits that contradict each other are missed as little as may be', () => {
  const { x, value } = endOf(
    problem(
      (_, y) => y * y,
      (x) => 1 - x,
      (x) => x,
    ),
    2.5,
    1,
  );
  expect(x).toBeCloseTo(0.5, 5);
  expect(Math.max(...value.c)).toBeCloseTo(0.5, 5);
});

test('steps into a region without values are shortened, and a start there is refused', () => {
  const edge: Plain = (x, y) => (x + y > 4.02 ? null : (x - 2) ** 2 + (y - 2) ** 2 + (x - 2) ** 4 / 5);
  expect(endOf(problem(edge), -1.5, 0.2).value.f).toBeLessThan(1e-6);
  expect(descend(problem(edge), Float64Array.from([1, 1]))).toBeNull();
});
