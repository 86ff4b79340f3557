import { edgesByNode } from './strong-components.ts';

/**
 * The signal-flow graph of a plant: its nodes are streams, and stream a leads to stream b when a ends at the
 * block b leaves. Tearing the fewest streams is cutting the fewest of its nodes, and there the reductions are
 * simple: a stream with a single predecessor is on no cycle that the predecessor is not on.
 */
export interface SignalFlow {
  /** streams still in the graph, ascending order of insertion */
  readonly before: Map<number, Set<number>>;
  readonly after: Map<number, Set<number>>;
}

/** Signal-flow graph of a graph of blocks; parallel edges stand beside each other. */
export function signalFlow(n: number, from: Int32Array, to: Int32Array): SignalFlow {
  const before = new Map<number, Set<number>>();
  const after = new Map<number, Set<number>>();
  const { first, edges } = edgesByNode(n, from);
  for (let a = 0; a < from.length; a++) {
    before.set(a, new Set());
    after.set(a, new Set(edges.subarray(first[to[a]], first[to[a] + 1])));
  }
  for (const [a, followers] of after) for (const b of followers) near(before, b).add(a);
  return { before, after };
}

export function copyFlow(flow: SignalFlow): SignalFlow {
  const copy = (side: Map<number, Set<number>>) => new Map([...side].map(([s, near]) => [s, new Set(near)]));
  return { before: copy(flow.before), after: copy(flow.after) };
}

/** Take a stream out together with every path through it: it is torn, or on no cycle. */
export function removeStream(flow: SignalFlow, stream: number): void {
  for (const b of near(flow.before, stream)) near(flow.after, b).delete(stream);
  for (const a of near(flow.after, stream)) near(flow.before, a).delete(stream);
  flow.before.delete(stream);
  flow.after.delete(stream);
}

/** Take a stream out but keep the paths through it: it is known not to be torn. */
export function bypassStream(flow: SignalFlow, stream: number): void {
  const before = [...near(flow.before, stream)];
  const after = [...near(flow.after, stream)];
  removeStream(flow, stream);
  for (const b of before) {
    for (const a of after) {
      near(flow.after, b).add(a);
      near(flow.before, a).add(b);
    }
  }
}

/**
 * Reduce until nothing more can be: streams without predecessor or successor go; self-loops are torn; a stream
 * with a single predecessor or successor is bypassed, since that one is on all its cycles.
 *
 * @returns the streams torn on the way
 * @source R. W. Barkley, R. L. Motard, Chem. Eng. J. 3 (1972) 265-275; H. Levy, D. W. Low, J. Algorithms 9 (1988)
 *   470-493 (rules from memory)
 */
export function reduceFlow(flow: SignalFlow): number[] {
  const torn: number[] = [];
  for (let changed = true; changed; ) {
    changed = false;
    for (const stream of [...flow.before.keys()]) {
      const before = near(flow.before, stream);
      const after = near(flow.after, stream);
      if (before.size === 0 || after.size === 0) removeStream(flow, stream);
      else if (before.has(stream)) {
        torn.push(stream);
        removeStream(flow, stream);
      } else if (before.size === 1 || after.size === 1) bypassStream(flow, stream);
      else continue;
      changed = true;
    }
  }
  return torn;
}

/** Split into parts that share no cycle; streams on no cycle are dropped. */
export function partsOf(flow: SignalFlow): SignalFlow[] {
  const streams = [...flow.before.keys()];
  const parts: SignalFlow[] = [];
  const placed = new Set<number>();
  for (const root of streams) {
    if (placed.has(root)) continue;
    const down = reach(flow.after, root);
    const up = reach(flow.before, root);
    const members = streams.filter((s) => !placed.has(s) && down.has(s) && up.has(s));
    if (members.length === 0) continue;
    for (const s of members) placed.add(s);
    const inside = new Set(members);
    const within = (side: Map<number, Set<number>>) =>
      new Map(members.map((s) => [s, new Set([...near(side, s)].filter((t) => inside.has(t)))]));
    parts.push({ before: within(flow.before), after: within(flow.after) });
  }
  return parts;
}

/** Number of cycles without a common stream found by always taking a shortest one: no fewer tears will do. */
export function disjointCycles(flow: SignalFlow): number {
  const left = copyFlow(flow);
  let count = 0;
  for (;;) {
    const cycle = shortestCycle(left);
    if (cycle === null) return count;
    for (const stream of cycle) removeStream(left, stream);
    count++;
  }
}

function shortestCycle(flow: SignalFlow): number[] | null {
  let best: number[] | null = null;
  for (const root of flow.after.keys()) {
    const cameFrom = new Map<number, number>();
    let layer = [root];
    search: for (let length = 1; layer.length > 0 && (best === null || length < best.length); length++) {
      const next: number[] = [];
      for (const stream of layer) {
        for (const follower of near(flow.after, stream)) {
          if (follower === root) {
            best = [root];
            for (let s = stream; s !== root; s = cameFrom.get(s) as number) best.push(s);
            break search;
          }
          if (cameFrom.has(follower)) continue;
          cameFrom.set(follower, stream);
          next.push(follower);
        }
      }
      layer = next;
    }
    if (best !== null && best.length <= 2) return best;
  }
  return best;
}

function reach(side: Map<number, Set<number>>, root: number): Set<number> {
  const seen = new Set<number>();
  const todo = [root];
  for (let s = todo.pop(); s !== undefined; s = todo.pop()) {
    for (const t of near(side, s)) {
      if (seen.has(t)) continue;
      seen.add(t);
      todo.push(t);
    }
  }
  return seen;
}

function near(side: Map<number, Set<number>>, stream: number): Set<number> {
  const set = side.get(stream);
  if (set === undefined) throw new Error(`stream ${stream} has left the signal-flow graph`);
  return set;
}
