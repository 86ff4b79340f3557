import { edgesByNode } from './strong-components.ts';

/**
 * What may be torn in place of one tear, the other tears kept: the edges that every path from its end back to its
 * beginning uses. Found in one sweep: with the nodes of those paths in order, an edge is on every path where it is
 * the only one to cross the gap between two neighbours.
 *
 * @param n  number of nodes
 * @param from,to  ends of the edges
 * @param torn  1 for every torn edge, this one included; without them there is no cycle
 * @param order  the nodes in an order in which every edge that is not torn runs forward
 * @returns ids of the edges, this one not included; null where no path leads back, so that it need not be torn
 */
export function exchangeable(
  n: number,
  from: Int32Array,
  to: Int32Array,
  torn: Uint8Array,
  order: Int32Array,
  tear: number,
): number[] | null {
  const { first, edges } = edgesByNode(n, from);
  const [begin, end] = [to[tear], from[tear]];
  if (begin === end) return [];
  const reached = new Uint8Array(n);
  const leads = new Uint8Array(n);
  reached[begin] = 1;
  leads[end] = 1;
  for (const node of order) {
    if (reached[node] === 0) continue;
    for (let k = first[node]; k < first[node + 1]; k++) if (torn[edges[k]] === 0) reached[to[edges[k]]] = 1;
  }
  for (let i = n - 1; i >= 0; i--) {
    const node = order[i];
    for (let k = first[node]; k < first[node + 1]; k++)
      if (torn[edges[k]] === 0 && leads[to[edges[k]]] === 1) leads[node] = 1;
  }
  if (leads[begin] === 0) return null;
  const place = new Int32Array(n);
  let between = 0;
  for (const node of order) if (reached[node] === 1 && leads[node] === 1) place[node] = between++;
  // Crossings of each gap: how many, and the sum of their ids, which is the id itself where there is one.
  const crossings = new Int32Array(between);
  const ids = new Float64Array(between);
  for (let edge = 0; edge < from.length; edge++) {
    const [a, b] = [from[edge], to[edge]];
    if (torn[edge] === 1 || reached[a] + leads[a] + reached[b] + leads[b] < 4) continue;
    crossings[place[a]]++;
    crossings[place[b]]--;
    ids[place[a]] += edge;
    ids[place[b]] -= edge;
  }
  const alone: number[] = [];
  let open = 0;
  let sum = 0;
  for (let gap = 0; gap < between - 1; gap++) {
    open += crossings[gap];
    sum += ids[gap];
    if (open === 1) alone.push(sum);
  }
  return alone;
}

/** The nodes in an order in which every edge that is not torn runs forward. */
export function orderWithout(n: number, from: Int32Array, to: Int32Array, torn: Uint8Array): Int32Array {
  const { first, edges } = edgesByNode(n, from);
  const waiting = new Int32Array(n);
  for (let edge = 0; edge < from.length; edge++) if (torn[edge] === 0) waiting[to[edge]]++;
  const order = new Int32Array(n);
  let placed = 0;
  for (let node = 0; node < n; node++) if (waiting[node] === 0) order[placed++] = node;
  for (let next = 0; next < placed; next++) {
    const node = order[next];
    for (let k = first[node]; k < first[node + 1]; k++)
      if (torn[edges[k]] === 0 && --waiting[to[edges[k]]] === 0) order[placed++] = to[edges[k]];
  }
  return order;
}
