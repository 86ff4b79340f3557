import fc from 'fast-check';
import { expect, test } from 'vitest';
import { planCalculation, sortNodes } from '../../src/graph/calculation-order.ts';
import { strongComponents } from '../../src/graph/strong-components.ts';
import { randomGraph } from './random-graph.ts';

test('a synthesis loop is calculated from the mixer round to the circulator, then what it feeds', () => {
  // 0 mixer -> 1 converter -> 2 condenser -> 3 purge -> 4 circulator -> 0; 2 -> 5 let-down, 6 preheater -> 0
  const from = Int32Array.of(6, 0, 1, 2, 3, 4, 2);
  const to = Int32Array.of(0, 1, 2, 3, 4, 0, 5);
  const { groups } = planCalculation(7, from, to, [5]);
  expect(groups.map((group) => [Array.from(group.nodes), Array.from(group.tears)])).toEqual([
    [[6], []],
    [[0, 1, 2, 3, 4], [5]],
    [[5], []],
  ]);
});

test('loops side by side and one after the other are closed one by one', () => {
  // 0 <-> 1, 2 <-> 3, both feed 4 <-> 5
  const from = Int32Array.of(0, 1, 2, 3, 1, 3, 4, 5);
  const to = Int32Array.of(1, 0, 3, 2, 4, 4, 5, 4);
  const { groups } = planCalculation(6, from, to);
  expect(groups.map((group) => Array.from(group.nodes))).toEqual([
    [1, 0],
    [3, 2],
    [5, 4],
  ]);
  expect(groups.map((group) => Array.from(group.tears))).toEqual([[0], [2], [6]]);
});

test('every stream but the tears runs forward, groups are strong components, and no block is lost', () => {
  fc.assert(
    fc.property(randomGraph(9, 24), ({ n, from, to }) => {
      const { groups } = planCalculation(n, from, to);
      const order = groups.flatMap((group) => Array.from(group.nodes));
      expect([...order].sort((a, b) => a - b)).toEqual(Array.from({ length: n }, (_, node) => node));
      const torn = new Set(groups.flatMap((group) => Array.from(group.tears)));
      const place = new Map(order.map((node, position) => [node, position]));
      from.forEach((node, edge) => {
        if (torn.has(edge)) return;
        expect(place.get(node)).toBeLessThan(place.get(to[edge]) as number);
      });
      const { of } = strongComponents(n, from, to);
      for (const group of groups) {
        expect(new Set(Array.from(group.nodes, (node) => of[node])).size).toBe(1);
        for (const edge of group.tears) expect(group.nodes).toContain(from[edge]);
      }
    }),
  );
});

test('a cycle that was not torn is refused', () => {
  expect(() => sortNodes(2, Int32Array.of(0, 1), Int32Array.of(1, 0))).toThrow(
    'a cycle is left among the nodes to be ordered',
  );
});
