import { blockKinds } from '../../blocks/registry.ts';
import { strongComponents } from '../../graph/strong-components.ts';
import type { BlockResult, Result, StreamResult } from '../../model/result.ts';

/** A block, or a feed or outlet at the battery limit. */
export interface DrawnNode {
  readonly id: number;
  readonly name: string;
  /** kind of the block, or 'feed' or 'outlet' */
  readonly kind: string;
  readonly block: BlockResult | null;
}

/** One side of a block that keeps its streams apart (an exchanger has two), or the block as a whole. */
export interface Lane {
  readonly node: number;
  /** the port that names the side, '' for a block whose inlets all reach its outlets */
  readonly side: string;
  /** entered from the right, left to the left: on the way back to the start of a recycle, or of an exchanger */
  inBackward: boolean;
  outBackward: boolean;
  /** what leaves it is on the way back of a recycle */
  returning: boolean;
}

/** A stream between two lanes. */
export interface DrawnStream {
  readonly tag: string;
  readonly state: StreamResult;
  readonly from: number;
  readonly fromPort: string;
  readonly to: number;
  readonly toPort: string;
  /** part of what goes round */
  readonly loop: boolean;
  /** leads back to a lane that comes before it */
  back: boolean;
}

export interface Network {
  readonly nodes: readonly DrawnNode[];
  readonly lanes: readonly Lane[];
  readonly streams: readonly DrawnStream[];
}

/** The graph of a result: its blocks, its ends at the battery limit, and which streams go round. */
export function networkOf(result: Result): Network {
  const nodes: DrawnNode[] = [];
  const lanes: Lane[] = [];
  const laneByKey = new Map<string, number>();
  const add = (name: string, kind: string, block: BlockResult | null): number => {
    nodes.push({ id: nodes.length, name, kind, block });
    return nodes.length - 1;
  };
  const blocks = new Map(
    Object.entries(result.blocks).map(([name, block]) => [name, add(name, block.kind, block)]),
  );
  const feeds = new Map<string, number>();
  const laneOf = (node: number, side: string): number => {
    const key = JSON.stringify([node, side]);
    const known = laneByKey.get(key);
    if (known !== undefined) return known;
    laneByKey.set(key, lanes.length);
    lanes.push({ node, side, inBackward: false, outBackward: false, returning: false });
    return lanes.length - 1;
  };
  const endAt = (text: string, outlet: string | null): { lane: number; port: string } => {
    const whole = blocks.has(text);
    const dot = whole ? -1 : text.indexOf('.');
    const node = blocks.get(dot < 0 ? text : text.slice(0, dot));
    if (node !== undefined) {
      const port = dot < 0 ? '' : text.slice(dot + 1);
      const apart = blockKinds.get(nodes[node]!.kind)?.through !== undefined;
      return { lane: laneOf(node, apart ? port : ''), port };
    }
    if (outlet !== null) return { lane: laneOf(add(outlet, 'outlet', null), ''), port: '' };
    const feed = feeds.get(text) ?? add(text, 'feed', null);
    feeds.set(text, feed);
    return { lane: laneOf(feed, ''), port: '' };
  };
  const ends = Object.entries(result.streams).map(([tag, state]) => ({
    tag,
    state,
    from: endAt(state.from, null),
    to: endAt(state.to, tag),
  }));
  const { of } = strongComponents(
    lanes.length,
    Int32Array.from(ends, ({ from }) => from.lane),
    Int32Array.from(ends, ({ to }) => to.lane),
  );
  // A block that no stream touches is drawn all the same, so that nothing is left out in silence.
  for (const node of blocks.values()) if (!lanes.some((lane) => lane.node === node)) laneOf(node, '');
  return {
    nodes,
    lanes,
    streams: ends.map(({ tag, state, from, to }) => ({
      tag,
      state,
      from: from.lane,
      fromPort: from.port,
      to: to.lane,
      toPort: to.port,
      loop: of[from.lane] === of[to.lane],
      back: false,
    })),
  };
}
