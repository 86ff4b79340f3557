import fc from 'fast-check';

export interface Graph {
  readonly n: number;
  readonly from: Int32Array;
  readonly to: Int32Array;
}

/** Graphs with self-loops and parallel edges among them. */
export function randomGraph(maxNodes: number, maxEdges: number): fc.Arbitrary<Graph> {
  return fc.integer({ min: 1, max: maxNodes }).chain((n) => {
    const node = fc.integer({ min: 0, max: n - 1 });
    return fc.array(fc.tuple(node, node), { maxLength: maxEdges }).map((edges) => ({
      n,
      from: Int32Array.from(edges, ([a]) => a),
      to: Int32Array.from(edges, ([, b]) => b),
    }));
  });
}

/** reach[a][b]: a path of one edge or more leads from a to b. */
export function reaches(n: number, from: Int32Array, to: Int32Array): boolean[][] {
  const reach = Array.from({ length: n }, () => new Array<boolean>(n).fill(false));
  from.forEach((a, edge) => {
    reach[a][to[edge]] = true;
  });
  for (let k = 0; k < n; k++) {
    for (let a = 0; a < n; a++) {
      for (let b = 0; b < n; b++) reach[a][b] ||= reach[a][k] && reach[k][b];
    }
  }
  return reach;
}

export function hasCycle(n: number, from: Int32Array, to: Int32Array, without: ReadonlySet<number>): boolean {
  const kept = Array.from(from.keys()).filter((edge) => !without.has(edge));
  const reach = reaches(
    n,
    Int32Array.from(kept, (edge) => from[edge]),
    Int32Array.from(kept, (edge) => to[edge]),
  );
  return reach.some((row, node) => row[node]);
}

/** Smallest number of edges that run backward in any order of the nodes: the smallest tear set, by trying all orders. */
export function fewestBackwardEdges(n: number, from: Int32Array, to: Int32Array): number {
  let best = from.length;
  const place = new Int32Array(n);
  const used = new Array<boolean>(n).fill(false);
  const assign = (position: number): void => {
    if (position === n) {
      let backward = 0;
      for (let edge = 0; edge < from.length; edge++) if (place[from[edge]] >= place[to[edge]]) backward++;
      best = Math.min(best, backward);
      return;
    }
    for (let node = 0; node < n; node++) {
      if (used[node]) continue;
      used[node] = true;
      place[node] = position;
      assign(position + 1);
      used[node] = false;
    }
  };
  assign(0);
  return best;
}
