import { exchangeable, orderWithout } from './exchangeable.ts';
import type { SignalFlow } from './signal-flow.ts';
import {
  bypassStream,
  copyFlow,
  disjointCycles,
  partsOf,
  reduceFlow,
  removeStream,
  signalFlow,
} from './signal-flow.ts';
import { strongComponents } from './strong-components.ts';

export interface TearSet {
  /** ids of the torn edges, ascending */
  readonly edges: Int32Array;
  /** true when no smaller set exists (beside the prescribed ones) */
  readonly exact: boolean;
}

/**
 * Work allowed for each tangled part, a step costing the square of the streams left; counted, not timed, so that
 * the answer is the same anywhere. About a second.
 */
const SEARCH_WORK = 1e6;

/**
 * The fewest edges whose removal leaves no cycle.
 *
 * Prescribed tears that lie on a cycle are taken first. What is left is reduced and then searched by branch and
 * bound: exact while the search stays within its allowance, else the best set found, which is at least as good as
 * always tearing the stream that joins most. Among sets that differ by one edge the one with the larger weight
 * is preferred, then the lower id.
 *
 * @param n  number of nodes
 * @param from,to  ends of the edges; self-loops and parallel edges are welcome
 * @param weights  preference per edge, larger is rather torn; all alike when left out
 * @param prescribed  ids of edges to be torn in any case
 */
export function chooseTears(
  n: number,
  from: Int32Array,
  to: Int32Array,
  weights?: Float64Array,
  prescribed: Iterable<number> = [],
): TearSet {
  const given = new Set<number>();
  const onCycle = edgesOnCycles(n, from, to, given);
  const all = new Set(onCycle.flat());
  for (const edge of prescribed) if (all.has(edge)) given.add(edge);
  const chosen = [...given];
  let exact = true;
  // What has no cycle in common is torn by itself: the cost grows with the tangles, not with the square of the plant.
  for (const tangle of given.size === 0 ? onCycle : edgesOnCycles(n, from, to, given)) {
    const part = renumbered(tangle, from, to);
    const flow = signalFlow(part.nodes, part.from, part.to);
    const torn = reduceFlow(flow);
    for (const core of partsOf(flow)) {
      const found = searchPart(core);
      torn.push(...found.torn);
      exact &&= found.exact;
    }
    const weightOf = (edge: number): number => weights?.[tangle[edge]] ?? 0;
    for (const edge of preferred(torn, part, weightOf)) chosen.push(tangle[edge]);
  }
  return { edges: Int32Array.from(chosen.sort((a, b) => a - b)), exact };
}

/** Edges inside each strong component that is left without the given ones, ascending. */
function edgesOnCycles(
  n: number,
  from: Int32Array,
  to: Int32Array,
  without: ReadonlySet<number>,
): number[][] {
  const left = Int32Array.from(from.keys()).filter((edge) => !without.has(edge));
  const ends = (side: Int32Array) => left.map((edge) => side[edge]);
  const { count, of } = strongComponents(n, ends(from), ends(to));
  const inside: number[][] = Array.from({ length: count }, () => []);
  for (const edge of left) if (of[from[edge]] === of[to[edge]]) inside[of[from[edge]]].push(edge);
  return inside.filter((edges) => edges.length > 0);
}

interface Part {
  /** number of nodes */
  readonly nodes: number;
  readonly from: Int32Array;
  readonly to: Int32Array;
}

/** Some edges of a graph as a graph of their own. */
function renumbered(edges: readonly number[], from: Int32Array, to: Int32Array): Part {
  const number = new Map<number, number>();
  for (const edge of edges)
    for (const node of [from[edge], to[edge]]) if (!number.has(node)) number.set(node, number.size);
  const ends = (side: Int32Array) => Int32Array.from(edges, (edge) => number.get(side[edge]) as number);
  return { nodes: number.size, from: ends(from), to: ends(to) };
}

/** Branch and bound on one part: the stream that joins most is torn, or else bypassed. */
function searchPart(part: SignalFlow): { torn: number[]; exact: boolean } {
  let best: number[] | null = null;
  let work = 0;
  let exact = true;

  const search = (flow: SignalFlow, torn: number[]): void => {
    work += flow.before.size ** 2;
    if (best !== null && work > SEARCH_WORK) {
      exact = false;
      return;
    }
    const all = [...torn, ...reduceFlow(flow)];
    if (flow.before.size === 0) {
      if (best === null || all.length < best.length) best = all;
      return;
    }
    if (best !== null && all.length + disjointCycles(flow) >= best.length) return;
    const pivot = busiest(flow);
    const without = copyFlow(flow);
    removeStream(without, pivot);
    search(without, [...all, pivot]);
    bypassStream(flow, pivot);
    search(flow, all);
  };

  search(copyFlow(part), []);
  return { torn: best ?? [], exact };
}

/** The stream with the most paths of length two through it; the first of several. */
function busiest(flow: SignalFlow): number {
  let pivot = -1;
  let most = -1;
  for (const [stream, before] of flow.before) {
    const paths = before.size * (flow.after.get(stream)?.size ?? 0);
    if (paths > most) {
      most = paths;
      pivot = stream;
    }
  }
  return pivot;
}

/** Drop what is not needed, then exchange single tears for preferred ones until nothing improves. */
function preferred(
  chosen: readonly number[],
  { nodes, from, to }: Part,
  weight: (edge: number) => number,
): number[] {
  const ranked = Int32Array.from(from.keys()).sort((a, b) => weight(b) - weight(a) || a - b);
  const rank = new Int32Array(from.length);
  for (const [place, edge] of ranked.entries()) rank[edge] = place;
  const torn = new Uint8Array(from.length);
  for (const edge of chosen) torn[edge] = 1;
  const tears: number[] = [];
  for (const tear of chosen) {
    if (exchangeable(nodes, from, to, torn, orderWithout(nodes, from, to, torn), tear) === null)
      torn[tear] = 0;
    else tears.push(tear);
  }
  for (let changed = true; changed; ) {
    changed = false;
    for (const [k, tear] of tears.entries()) {
      const order = orderWithout(nodes, from, to, torn);
      let best = tear;
      for (const other of exchangeable(nodes, from, to, torn, order, tear) ?? [])
        if (rank[other] < rank[best]) best = other;
      if (best === tear) continue;
      torn[tear] = 0;
      torn[best] = 1;
      tears[k] = best;
      changed = true;
    }
  }
  return tears;
}
