import type { Result } from '../../model/result.ts';
import { crossings } from './crossings.ts';
import type { Flag } from './flags.ts';
import { type Layout, layOut } from './layout.ts';
import type { Network } from './network.ts';
import type { NodeBox } from './node-box.ts';
import { nodeBoxes } from './node-boxes.ts';

export interface Arrangement {
  readonly boxes: readonly NodeBox[];
  readonly layout: Layout;
}

/** Layouts tried at most; a large sheet takes longer over each and has crossings anyhow. */
const TRIES = 12;
const TRIES_WHEN_LARGE = 3;
const LARGE = 40;
/** Symbols whose streams may leave upwards as well as downwards: gravity has no say in them. */
const MAY_FLIP = new Set(['mixer', 'splitter', 'separator', 'exchanger']);

/**
 * The arrangement with the fewest crossings of lines among some tries: symbols are flipped one by one where that helps,
 * then other seeds are tried. Ends at once where nothing crosses.
 */
export async function arrange(
  network: Network,
  result: Result,
  flags: readonly Flag[],
  product: string | null,
): Promise<Arrangement> {
  let left = network.streams.length > LARGE ? TRIES_WHEN_LARGE : TRIES;
  let flipped: ReadonlySet<number> = new Set();
  let best = await attempt(flipped, 1);
  const flips = network.nodes.filter(({ kind, id }) => MAY_FLIP.has(kind) && degree(network, id) > 2);
  for (const { id } of flips) {
    if (best.crossings === 0 || left <= 1) break;
    const next = new Set([...flipped, id]);
    if (keep(await attempt(next, 1))) flipped = next;
  }
  for (let seed = 2; left > 0 && best.crossings > 0; seed++) keep(await attempt(flipped, seed));
  return best;

  async function attempt(
    flip: ReadonlySet<number>,
    seed: number,
  ): Promise<Arrangement & { crossings: number }> {
    left--;
    const boxes = nodeBoxes(network, result, product, flip);
    const layout = await layOut(network, boxes, flags, seed);
    return { boxes, layout, crossings: crossings(layout.lines) };
  }

  function keep(found: Awaited<ReturnType<typeof attempt>>): boolean {
    if (found.crossings >= best.crossings) return false;
    best = found;
    return true;
  }
}

function degree({ lanes, streams }: Network, node: number): number {
  return streams.filter(({ from, to }) => lanes[from]!.node === node || lanes[to]!.node === node).length;
}
