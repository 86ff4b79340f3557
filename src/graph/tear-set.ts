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
  const onCycle = edgesOnCycles(n, from, to);
  const given = new Set([...prescribed].filter((edge) => onCycle.has(edge)));
  const open = [...onCycle].filter((edge) => !given.has(edge));
  const flow = signalFlow(open, from, to);
  const torn = reduceFlow(flow);
  let exact = true;
  for (const part of partsOf(flow)) {
    const found = searchPart(part);
    torn.push(...found.torn);
    exact &&= found.exact;
  }
  const chosen = preferred(torn, open, signalFlow(open, from, to), weights);
  return { edges: Int32Array.from([...given, ...chosen].sort((a, b) => a - b)), exact };
}

/** Edges inside a strong component, ascending. */
function edgesOnCycles(n: number, from: Int32Array, to: Int32Array): Set<number> {
  const { of } = strongComponents(n, from, to);
  const edges = new Set<number>();
  for (let edge = 0; edge < from.length; edge++) if (of[from[edge]] === of[to[edge]]) edges.add(edge);
  return edges;
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
  torn: readonly number[],
  open: readonly number[],
  flow: SignalFlow,
  weights: Float64Array | undefined,
): number[] {
  const weight = (edge: number): number => weights?.[edge] ?? 0;
  const ranked = [...open].sort((a, b) => weight(b) - weight(a) || a - b);
  const rank = new Map(ranked.map((edge, place) => [edge, place]));
  const chosen = new Set(torn);
  for (const tear of torn) {
    chosen.delete(tear);
    if (!isCutBy(flow, chosen)) chosen.add(tear);
  }
  for (let changed = true; changed; ) {
    changed = false;
    for (const tear of [...chosen]) {
      chosen.delete(tear);
      for (const other of ranked) {
        if (chosen.has(other)) continue;
        chosen.add(other);
        if (other === tear || isCutBy(flow, chosen)) {
          changed ||= other !== tear && (rank.get(other) as number) < (rank.get(tear) as number);
          break;
        }
        chosen.delete(other);
      }
    }
  }
  return [...chosen];
}

/** Whether no cycle is left without the chosen streams: all others can be put in order. */
function isCutBy(flow: SignalFlow, chosen: ReadonlySet<number>): boolean {
  const waiting = new Map<number, number>();
  const ready: number[] = [];
  for (const [stream, before] of flow.before) {
    if (chosen.has(stream)) continue;
    let count = 0;
    for (const b of before) if (!chosen.has(b)) count++;
    waiting.set(stream, count);
    if (count === 0) ready.push(stream);
  }
  let done = 0;
  for (let stream = ready.pop(); stream !== undefined; stream = ready.pop()) {
    done++;
    for (const follower of flow.after.get(stream) ?? []) {
      const left = waiting.get(follower);
      if (left === undefined) continue;
      waiting.set(follower, left - 1);
      if (left === 1) ready.push(follower);
    }
  }
  return done === waiting.size;
}
