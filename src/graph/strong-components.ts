/** Nodes grouped by mutual reach. */
export interface StrongComponents {
  readonly count: number;
  /** number of the component of each node; a component stands before all that it feeds */
  readonly of: Int32Array;
}

/**
 * Strong components of a directed graph (nodes that reach each other), numbered upstream first.
 *
 * @param n  number of nodes, 0 ... n−1
 * @param from,to  ends of the edges, same length; parallel edges and self-loops are welcome
 * @source R. E. Tarjan, SIAM J. Comput. 1(2) (1972) 146-160; the recursion is kept on a stack of our own
 */
export function strongComponents(n: number, from: Int32Array, to: Int32Array): StrongComponents {
  const { first, edges } = edgesByNode(n, from);
  const of = new Int32Array(n).fill(-1);
  const visited = new Int32Array(n).fill(-1); // order of the first visit
  const lowest = new Int32Array(n); // earliest visit reached
  const cursor = Int32Array.from(first.subarray(0, n));
  const pending: number[] = []; // visited, component not yet known
  const path: number[] = []; // from the root of the search to the present node
  let visits = 0;
  let count = 0;

  const enter = (node: number): void => {
    visited[node] = lowest[node] = visits++;
    pending.push(node);
    path.push(node);
  };

  for (let root = 0; root < n; root++) {
    if (visited[root] >= 0) continue;
    enter(root);
    while (path.length > 0) {
      const node = path[path.length - 1];
      if (cursor[node] < first[node + 1]) {
        const next = to[edges[cursor[node]++]];
        if (visited[next] < 0) enter(next);
        else if (of[next] < 0) lowest[node] = Math.min(lowest[node], visited[next]);
        continue;
      }
      path.pop();
      const above = path.length > 0 ? path[path.length - 1] : -1;
      if (above >= 0) lowest[above] = Math.min(lowest[above], lowest[node]);
      if (lowest[node] === visited[node]) {
        for (;;) {
          const member = pending.pop() as number;
          of[member] = count;
          if (member === node) break;
        }
        count++;
      }
    }
  }
  for (let node = 0; node < n; node++) of[node] = count - 1 - of[node]; // found downstream first
  return { count, of };
}

/** Edge ids sorted by the node they leave: those of node v are edges[first[v] ... first[v + 1] − 1], ascending. */
export function edgesByNode(n: number, from: Int32Array): { first: Int32Array; edges: Int32Array } {
  const first = new Int32Array(n + 1);
  for (const node of from) first[node + 1]++;
  for (let node = 0; node < n; node++) first[node + 1] += first[node];
  const fill = Int32Array.from(first);
  const edges = new Int32Array(from.length);
  for (let edge = 0; edge < from.length; edge++) edges[fill[from[edge]]++] = edge;
  return { first, edges };
}
