import { edgesByNode, strongComponents } from './strong-components.ts';
import { chooseTears } from './tear-set.ts';

/** Nodes calculated together: a loop with its tears, or a single node without any. */
export interface CalculationGroup {
  /** in order of calculation, the tears taken as known */
  readonly nodes: Int32Array;
  /** ids of the torn edges, ascending; empty for a node that is in no loop */
  readonly tears: Int32Array;
}

export interface CalculationPlan {
  /** upstream groups first */
  readonly groups: readonly CalculationGroup[];
  /** true when no smaller number of tears exists (beside the prescribed ones) */
  readonly exact: boolean;
}

/**
 * Order a graph for calculation: loops one after the other, nodes within a loop so that every edge but the tears
 * runs forward. Whatever the edges leave open follows the numbers of the nodes, so the plan is the same each time.
 *
 * @param n  number of nodes
 * @param from,to  ends of the edges
 * @param prescribed  ids of edges to be torn where they lie on a cycle
 * @param weights  preference per edge among equally small tear sets, larger is rather torn
 */
export function planCalculation(
  n: number,
  from: Int32Array,
  to: Int32Array,
  prescribed: Iterable<number> = [],
  weights?: Float64Array,
): CalculationPlan {
  const { edges: tears, exact } = chooseTears(n, from, to, weights, prescribed);
  const torn = new Set(tears);
  const kept = Int32Array.from(from.keys()).filter((edge) => !torn.has(edge));
  const nodeOrder = sortNodes(n, pick(from, kept), pick(to, kept));

  const { count, of } = strongComponents(n, from, to);
  const members: number[][] = Array.from({ length: count }, () => []);
  for (const node of nodeOrder) members[of[node]].push(node);
  const cuts: number[][] = Array.from({ length: count }, () => []);
  for (const edge of tears) cuts[of[from[edge]]].push(edge);

  // components in order of their lowest node where the edges leave it open
  const lead = members.map((nodes) => Math.min(...nodes));
  const byLead = Int32Array.from(lead.keys()).sort((a, b) => lead[a] - lead[b]);
  const place = new Int32Array(count);
  byLead.forEach((component, position) => {
    place[component] = position;
  });
  const between = Int32Array.from(from.keys()).filter((edge) => of[from[edge]] !== of[to[edge]]);
  const placeOf = (ends: Int32Array): Int32Array => pick(ends, between).map((node) => place[of[node]]);
  const groupOrder = sortNodes(count, placeOf(from), placeOf(to));

  return {
    groups: Array.from(groupOrder, (position) => {
      const component = byLead[position];
      return { nodes: Int32Array.from(members[component]), tears: Int32Array.from(cuts[component]) };
    }),
    exact,
  };
}

/**
 * Nodes of a graph without cycles so that every edge runs forward; of the nodes that may come next, the lowest.
 *
 * @throws Error when there is a cycle: that is a fault of the tearing
 */
export function sortNodes(n: number, from: Int32Array, to: Int32Array): Int32Array {
  const { first, edges } = edgesByNode(n, from);
  const waiting = new Int32Array(n);
  for (const node of to) waiting[node]++;
  const ready = Array.from(waiting.keys()).filter((node) => waiting[node] === 0);
  const order = new Int32Array(n);
  let done = 0;
  while (ready.length > 0) {
    const node = ready.shift() as number;
    order[done++] = node;
    for (let k = first[node]; k < first[node + 1]; k++) {
      const next = to[edges[k]];
      if (--waiting[next] === 0) insertAscending(ready, next);
    }
  }
  if (done < n) throw new Error('a cycle is left among the nodes to be ordered');
  return order;
}

function insertAscending(list: number[], value: number): void {
  let place = list.length;
  while (place > 0 && list[place - 1] > value) place--;
  list.splice(place, 0, value);
}

function pick(values: Int32Array, at: Int32Array): Int32Array {
  return at.map((index) => values[index]);
}
