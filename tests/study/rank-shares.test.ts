import { expect, test } from 'vitest';
import { groupShare, groupsOf } from '../../src/study/rank-shares.ts';

test('spreads are grouped by what moves together, by way of others too', () => {
  const between = (a: string, b: string, value = 0.5) => ({ between: [a, b] as const, value });
  expect(groupsOf(['a', 'b', 'c', 'd'], [])).toEqual([[0], [1], [2], [3]]);
  expect(groupsOf(['a', 'b', 'c', 'd'], [between('b', 'd')])).toEqual([[0], [1, 3], [2]]);
  expect(groupsOf(['a', 'b', 'c', 'd'], [between('d', 'a'), between('b', 'c'), between('c', 'd')])).toEqual([
    [0, 1, 2, 3],
  ]);
  expect(groupsOf(['a', 'b'], [between('a', 'b', 0)])).toEqual([[0], [1]]);
});

test('the share of a group is that of its best combination, however much its members have in common', () => {
  const x = Float64Array.from([0, 1, 2, 3, 4, 5, 6, 7]);
  const z = Float64Array.from([3, -1, 2, -4, 4, -2, 1, -3]);
  const y = x.map((value, i) => value + 0.5 * z[i]!);
  const figure = x.map((value, i) => 2 * value - 3 * y[i]!);
  expect(groupShare([x, y], figure).share).toBeCloseTo(1, 12);
  expect(groupShare([x], x).share).toBeCloseTo(1, 12);
  const alone = groupShare([x], figure);
  expect(alone.share).toBeCloseTo(alone.correlations[0]! ** 2, 12);
  // the same spread twice over explains nothing more, and cannot be told apart
  expect(groupShare([x, x.slice()], figure).share).toBeNaN();
});
