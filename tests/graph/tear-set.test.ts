import fc from 'fast-check';
import { expect, test } from 'vitest';
import { strongComponents } from '../../src/graph/strong-components.ts';
import { chooseTears } from '../../src/graph/tear-set.ts';
import { processGraphs } from '../published/process-graphs.ts';
import { fewestBackwardEdges, hasCycle, randomGraph } from './random-graph.ts';

// Gundersen and Hertzberg (1983), see tests/published/process-graphs.ts; whole numbers, no tolerance.
test.each(processGraphs)('$name is torn at the published $tears streams', (graph) => {
  const from: number[] = [];
  const to: number[] = [];
  for (const [node, fed] of Object.entries(graph.feeds)) {
    for (const next of fed) {
      from.push(Number(node));
      to.push(next);
    }
  }
  const n = Math.max(...from, ...to) + 1;
  const [f, t] = [Int32Array.from(from), Int32Array.from(to)];
  expect(new Set([...from, ...to]).size).toBe(graph.nodes);
  expect(from.length).toBe(graph.edges);

  const sizes = new Map<number, number>();
  for (const component of strongComponents(n, f, t).of) sizes.set(component, (sizes.get(component) ?? 0) + 1);
  expect([...sizes.values()].filter((size) => size > 1)).toEqual(graph.tangled);

  const tears = chooseTears(n, f, t);
  expect(tears.edges.length).toBe(graph.tears);
  expect(tears.exact).toBe(true);
  expect(hasCycle(n, f, t, new Set(tears.edges))).toBe(false);
});

// n(n-1)/2, exact; six nodes are Problem 1 of Gundersen and Hertzberg (1983)
test.each([
  [3, 3],
  [6, 15],
  [8, 28],
])('%d blocks that all feed each other need %d tears', (n, tears) => {
  const pairs = Array.from({ length: n * n }, (_, k) => [Math.floor(k / n), k % n]).filter(
    ([a, b]) => a !== b,
  );
  const found = chooseTears(
    n,
    Int32Array.from(pairs, ([a]) => a),
    Int32Array.from(pairs, ([, b]) => b),
  );
  expect(found.edges.length).toBe(tears);
  expect(found.exact).toBe(true);
});

// The four-flash recycle (R. H. Cavett, Proc. Am. Petrol. Inst. 43 (1963) 57-76, from memory): the number of
// tears follows from the drawing; three two-way pairs without a common edge need three.
test('the four-flash recycle needs two tears with mixers drawn and three without', () => {
  const [M2, F2, F1, M3, F3, F4] = [0, 1, 2, 3, 4, 5];
  const drawn = chooseTears(
    6,
    Int32Array.of(M2, F2, F1, F2, M3, F3, F3, F4),
    Int32Array.of(F2, F1, M2, M3, F3, M2, F4, M3),
  );
  expect(Array.from(drawn.edges)).toEqual([0, 4]); // M2 -> F2 and M3 -> F3, the only pair
  const merged = chooseTears(4, Int32Array.of(1, 0, 1, 2, 2, 3), Int32Array.of(0, 1, 2, 1, 3, 2));
  expect(merged.edges.length).toBe(3);
});

test('no graph of up to six blocks can be torn at fewer streams than chosen', () => {
  fc.assert(
    fc.property(randomGraph(6, 16), ({ n, from, to }) => {
      const { edges, exact } = chooseTears(n, from, to);
      expect(exact).toBe(true);
      expect(hasCycle(n, from, to, new Set(edges))).toBe(false);
      expect(edges.length).toBe(fewestBackwardEdges(n, from, to));
    }),
    { numRuns: 300 },
  );
});

test('nor can one of seven blocks', () => {
  fc.assert(
    fc.property(randomGraph(7, 20), ({ n, from, to }) => {
      expect(chooseTears(n, from, to).edges.length).toBe(fewestBackwardEdges(n, from, to));
    }),
    { numRuns: 60 },
  );
});

test('prescribed tears on a cycle are kept, others are ignored, and no cycle is left', () => {
  fc.assert(
    fc.property(randomGraph(7, 18), fc.array(fc.nat(17), { maxLength: 3 }), ({ n, from, to }, wanted) => {
      const { of } = strongComponents(n, from, to);
      const prescribed = wanted.filter((edge) => edge < from.length);
      const { edges } = chooseTears(n, from, to, undefined, prescribed);
      const torn = new Set(edges);
      for (const edge of prescribed) expect(torn.has(edge)).toBe(of[from[edge]] === of[to[edge]]);
      expect(hasCycle(n, from, to, torn)).toBe(false);
    }),
  );
});

test('weights choose among equally small sets but never enlarge one', () => {
  const [from, to] = [Int32Array.of(0, 1, 2, 3), Int32Array.of(1, 2, 3, 0)];
  expect(Array.from(chooseTears(4, from, to).edges)).toEqual([0]);
  expect(Array.from(chooseTears(4, from, to, Float64Array.of(1, 1, 5, 1)).edges)).toEqual([2]);
  fc.assert(
    fc.property(
      randomGraph(6, 14),
      fc.infiniteStream(fc.double({ min: 0, max: 9, noNaN: true })),
      (graph, stream) => {
        const { n, from, to } = graph;
        const weights = Float64Array.from(from, () => stream.next().value as number);
        const { edges } = chooseTears(n, from, to, weights);
        expect(hasCycle(n, from, to, new Set(edges))).toBe(false);
        expect(edges.length).toBe(chooseTears(n, from, to).edges.length);
      },
    ),
  );
});

test.each([
  [40, 200, 7],
  [60, 300, 1],
  [60, 300, 2],
])(
  'a tangle of %i blocks and %i streams is beyond the exact search, is still torn, the same way each time, and says so',
  (n, streams, first) => {
    let seed = first;
    const next = (n: number): number => {
      seed = (seed * 1103515245 + 12345) % 2147483648;
      return Math.floor((seed / 2147483648) * n);
    };
    const from = Int32Array.from({ length: streams }, () => next(n));
    const to = Int32Array.from({ length: streams }, () => next(n));
    const once = chooseTears(n, from, to);
    expect(once.exact).toBe(false);
    expect(hasCycle(n, from, to, new Set(once.edges))).toBe(false);
    expect(chooseTears(n, from, to)).toEqual(once);
  },
);
