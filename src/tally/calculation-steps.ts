import type { BlockKind } from '../blocks/block.ts';
import type { BlockSpec, Flowsheet } from '../model/flowsheet.ts';

/** One step of a pass: a block as a whole, or one of its outlets ahead of the rest. */
export interface Step {
  readonly block: number;
  /** the outlet that is calculated ahead; null for the block as a whole */
  readonly ahead: string | null;
}

/** The steps of a pass as nodes of a graph, and what has to be known first as its edges. */
export interface StepGraph {
  readonly steps: readonly Step[];
  readonly edgeFrom: Int32Array;
  readonly edgeTo: Int32Array;
  /** the stream of each edge, or the stream whose tear cuts it as well */
  readonly edgeStreams: readonly number[];
  /** true for an edge that is no stream: from an outlet calculated ahead to the rest of its block */
  readonly inner: readonly boolean[];
}

/**
 * The streams between blocks as a graph of steps: every block is one, and an outlet that needs one inlet only
 * (`BlockKind.needs`) is another ahead of it. An exchanger that heats the feed of a reactor with its effluent to
 * a set temperature thus makes no recycle: feed side, reactor, effluent side.
 */
export function stepGraph(
  flowsheet: Flowsheet,
  blocks: readonly BlockSpec[],
  kinds: readonly BlockKind[],
): StepGraph {
  const { streams } = flowsheet;
  const indexOf = new Map(blocks.map((b, i) => [b.name, i]));
  const steps: Step[] = blocks.map((_, block) => ({ block, ahead: null }));
  const early = new Map<string, number>();
  const fedEarly = new Map<string, number>();
  const key = (block: number, port: string) => `${block}.${port}`;
  blocks.forEach((one, block) => {
    const kind = kinds[block];
    for (const outlet of kind.ports(one.settings).outlets) {
      const inlet = kind.needs?.(one.settings, outlet);
      if (inlet === undefined || inlet === null) continue;
      early.set(key(block, outlet), steps.length);
      fedEarly.set(key(block, inlet), steps.length);
      steps.push({ block, ahead: outlet });
    }
  });
  const between = streams.flatMap((s, i) => {
    const from = indexOf.get(s.from.name);
    const to = s.to === null ? undefined : indexOf.get(s.to.name);
    if (from === undefined || to === undefined) return [];
    return [
      {
        from: early.get(key(from, s.from.port ?? '')) ?? from,
        to: fedEarly.get(key(to, s.to?.port ?? '')) ?? to,
        stream: i,
        inner: false,
      },
    ];
  });
  const feeding = new Map(between.toReversed().map(({ to, stream }) => [to, stream]));
  const inner = [...fedEarly.values()].map((from) => {
    // What only a feed reaches lies on no cycle: no edge is needed to cut it, only to keep the order.
    return { from, to: steps[from].block, stream: feeding.get(from) ?? -1, inner: true };
  });
  const edges = [...between, ...inner];
  return {
    steps,
    edgeFrom: Int32Array.from(edges, (edge) => edge.from),
    edgeTo: Int32Array.from(edges, (edge) => edge.to),
    edgeStreams: edges.map((edge) => edge.stream),
    inner: edges.map((edge) => edge.inner),
  };
}
