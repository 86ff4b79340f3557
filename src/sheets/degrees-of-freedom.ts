import type { Flowsheet } from '../model/flowsheet.ts';

/** How the unknowns of a flowsheet are used up. */
export interface DegreesOfFreedom {
  /** component flows, temperature and pressure of one stream */
  readonly perStream: number;
  readonly streams: number;
  readonly unknowns: number;
  /** fixed by the feeds */
  readonly byFeeds: number;
  /** fixed by the balances and settings of the blocks */
  readonly byBlocks: number;
  /** settings that aims set free again, and the wanted values that fix them */
  readonly aims: number;
  readonly left: number;
}

/**
 * Degrees of freedom: every stream has as many unknowns as components plus temperature and pressure; a feed
 * gives those of its stream, a block with its settings those of each of its outlets. An aim frees one setting
 * and fixes it by one wanted value.
 */
export function degreesOfFreedom(flowsheet: Flowsheet): DegreesOfFreedom {
  const perStream = flowsheet.components.length + 2;
  const feeds = new Set(flowsheet.feeds.map((feed) => feed.name));
  const fed = flowsheet.streams.filter((stream) => feeds.has(stream.from.name)).length;
  const streams = flowsheet.streams.length;
  const unknowns = streams * perStream;
  const byFeeds = fed * perStream;
  const byBlocks = (streams - fed) * perStream;
  return {
    perStream,
    streams,
    unknowns,
    byFeeds,
    byBlocks,
    aims: flowsheet.aims.length,
    left: unknowns - byFeeds - byBlocks,
  };
}
