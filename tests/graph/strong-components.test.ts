import fc from 'fast-check';
import { expect, test } from 'vitest';
import { strongComponents } from '../../src/graph/strong-components.ts';
import { randomGraph, reaches } from './random-graph.ts';

test('a loop is one component, what feeds it stands before and what it feeds stands behind', () => {
  // 0 -> 1 -> 2 -> 1, 2 -> 3
  const found = strongComponents(4, Int32Array.of(0, 1, 2, 2), Int32Array.of(1, 2, 1, 3));
  expect(found.count).toBe(3);
  expect(Array.from(found.of)).toEqual([0, 1, 1, 2]);
});

test('blocks are in one component exactly when each reaches the other, and upstream ones stand first', () => {
  fc.assert(
    fc.property(randomGraph(7, 14), ({ n, from, to }) => {
      const { of } = strongComponents(n, from, to);
      const reach = reaches(n, from, to);
      for (let a = 0; a < n; a++) {
        for (let b = 0; b < n; b++) {
          if (a === b) continue;
          expect(of[a] === of[b]).toBe(reach[a][b] && reach[b][a]);
          if (reach[a][b]) expect(of[a]).toBeLessThanOrEqual(of[b]);
        }
      }
    }),
  );
});

test('a chain of 100 000 blocks does not exhaust the stack', () => {
  const n = 100_000;
  const from = Int32Array.from({ length: n }, (_, k) => k);
  const to = from.map((k) => (k + 1) % n);
  expect(strongComponents(n, from, to).count).toBe(1);
  expect(strongComponents(n, from.subarray(1), to.subarray(1)).count).toBe(n);
});
