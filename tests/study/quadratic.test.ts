import { expect, test } from 'vitest';
import { haltonPoints } from '../../src/study/halton.ts';
import { solveQuadratic } from '../../src/study/quadratic.ts';

const vector = (...values: number[]) => Float64Array.from(values);
const dot = (a: Float64Array, b: Float64Array) => a.reduce((sum, x, i) => sum + x * b[i]!, 0);

test('the least of a bowl over a half plane and at a corner, with the worth of each row', () => {
  const bowl = [vector(1, 0), vector(0, 1)];
  const corner = solveQuadratic(bowl, vector(-2, -1), [vector(1, 0), vector(0, 1)], vector(0.2, 0.2))!;
  expect(corner.x[0]).toBeCloseTo(0.2, 12);
  expect(corner.x[1]).toBeCloseTo(0.2, 12);
  expect(corner.multipliers[0]).toBeCloseTo(1.8, 12);
  expect(corner.multipliers[1]).toBeCloseTo(0.8, 12);
  const half = solveQuadratic(bowl, vector(-2, -1), [vector(1, 1)], vector(1))!;
  expect(Array.from(half.x)).toEqual([1, 0]);
});

test('rows that contradict each other have no answer', () => {
  const rows = [vector(1), vector(-1)];
  expect(solveQuadratic([vector(1)], vector(0), rows, vector(-1, -1))).toBeNull();
});

test('300 drawn problems end where slopes, rows and multipliers agree', () => {
  const draws = haltonPoints(300, 12);
  for (const draw of draws) {
    const n = 3;
    const root = Array.from({ length: n }, (_, i) => draw.slice(3 * i, 3 * i + 3).map((x) => 2 * x - 1));
    const B = root.map((a, i) => Float64Array.from(root, (b, j) => dot(a, b) + (i === j ? 0.05 : 0)));
    const g = Float64Array.from([draw[9]! - 0.5, draw[10]! - 0.5, draw[11]! - 0.5]);
    const box = [0, 1, 2].flatMap((i) =>
      [1, -1].map((s) => vector(...[0, 1, 2].map((j) => (j === i ? s : 0)))),
    );
    const rows = [...box, root[0]!, root[1]!, vector(1, 1, 1)];
    const right = Float64Array.from([...box.map(() => 0.3), 0.1, 0.05, 0.2]);
    const { x, multipliers } = solveQuadratic(B, g, rows, right)!;
    for (let i = 0; i < n; i++) {
      const pull = rows.reduce((sum, row, k) => sum + multipliers[k]! * row[i]!, 0);
      expect(dot(B[i]!, x) + g[i]! + pull).toBeCloseTo(0, 9);
    }
    rows.forEach((row, k) => {
      const slack = right[k]! - dot(row, x);
      expect(slack).toBeGreaterThan(-1e-9);
      expect(multipliers[k]).toBeGreaterThanOrEqual(0);
      expect(Math.abs(slack * multipliers[k]!)).toBeLessThan(1e-9);
    });
  }
});
