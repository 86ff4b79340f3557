import type { Place } from '../model/place.ts';
import type { ReadBlock } from './blocks.ts';
import { bySource } from './by-source.ts';
import type { Reading } from './findings.ts';
import type { PlacedStream } from './topology.ts';
import { keyPlaceOfPath } from './yaml-tree.ts';

/**
 * Every feed used once, every outlet and inlet taken by exactly one stream, every block reached from a feed.
 *
 * @param complete  false where some streams could not be read: then nothing is said of what seems to be missing
 */
export function checkConnections(
  reading: Reading,
  streams: readonly PlacedStream[],
  feeds: readonly string[],
  blocks: readonly ReadBlock[],
  complete: boolean,
): void {
  checkTwice(reading, streams, feeds, blocks);
  if (!complete) return;
  const nextTag = freeTag(streams);
  const taken: Taken = {
    outlets: new Set(streams.map((s) => shown(s.from))),
    inlets: new Set(streams.flatMap((s) => (s.to === null ? [] : [shown(s.to)]))),
    fed: new Set(streams.map((s) => s.to?.name)),
  };
  for (const feed of feeds) checkFeedUsed(reading, taken, feed, nextTag);
  for (const block of blocks) checkDangling(reading, taken, block, nextTag);
  checkReached(reading, streams, feeds, blocks);
}

/** What streams begin at and lead to, as it is shown: purge.bleed, mixer. */
interface Taken {
  readonly outlets: ReadonlySet<string>;
  readonly inlets: ReadonlySet<string>;
  /** names of the blocks that a stream leads into */
  readonly fed: ReadonlySet<string | undefined>;
}

/** Two streams on one port, or out of one feed. */
function checkTwice(
  reading: Reading,
  streams: readonly PlacedStream[],
  feeds: readonly string[],
  blocks: readonly ReadBlock[],
): void {
  const seen = new Map<string, { tag: string; place: Place }>();
  const known = new Map(blocks.map((b) => [b.name, b]));
  const fromFeed = new Set(feeds);
  const take = (
    key: string,
    tag: string,
    place: Place,
    what: (other: string) => string,
    mend: string,
  ): void => {
    const before = seen.get(key);
    if (before === undefined) seen.set(key, { tag, place });
    else {
      const why = 'a port has one stream';
      reading.findings.error(place, { code: 'port-taken', what: what(before.tag), why, mend }, before.place);
    }
  };
  for (const { tag, from, to, fromPlace, toPlace } of streams) {
    const isFeed = fromFeed.has(from.name);
    const source = shown(from);
    take(
      `from ${source}`,
      tag,
      fromPlace,
      (other) => `${other} and ${tag} both come out of ${isFeed ? 'the feed ' : ''}${source}.`,
      `divide it with a splitter, or take one of the two out`,
    );
    if (to === null) continue;
    const target = known.get(to.name);
    if (target?.ports === null || target?.ports.inlets === 'any') continue;
    const mend = `join them in a mixer before ${to.name}, or take one of the two out`;
    take(
      `to ${shown(to)}`,
      tag,
      toPlace,
      (other) => `${other} and ${tag} both lead into ${shown(to)}.`,
      mend,
    );
  }
}

function checkFeedUsed(reading: Reading, { outlets }: Taken, feed: string, tag: string): void {
  if (outlets.has(feed)) return;
  reading.findings.error(keyPlaceOfPath(reading.root, ['feeds', feed]), {
    code: 'unused-feed',
    what: `the feed ${feed} flows nowhere.`,
    why: 'no stream begins at it',
    mend: `add to streams: ${tag}: ${feed} -> BLOCK, or take the feed out`,
  });
}

function checkDangling(reading: Reading, taken: Taken, block: ReadBlock, tag: string): void {
  const { name, ports } = block;
  if (ports === null) return;
  const where = keyPlaceOfPath(reading.root, ['blocks', name]);
  for (const port of ports.outlets) {
    const wanted = ports.outlets.length === 1 ? null : port;
    const end = shown({ name, port: wanted });
    if (taken.outlets.has(end)) continue;
    const why = 'what leaves there must go somewhere; no stream begins at it';
    const mend = `add to streams: ${tag}: ${end} -> out, or lead it to a block`;
    reading.findings.error(where, {
      code: 'dangling-outlet',
      what: `the outlet ${end} is not connected.`,
      why,
      mend,
    });
  }
  const inlets = ports.inlets === 'any' ? [null] : ports.inlets.length === 1 ? [null] : ports.inlets;
  for (const port of inlets) {
    const end = shown({ name, port });
    if (ports.inlets === 'any' ? taken.fed.has(name) : taken.inlets.has(end)) continue;
    const what =
      port === null ? `nothing flows into the block ${name}.` : `the inlet ${end} is not connected.`;
    const mend = `add to streams: ${tag}: SOMETHING -> ${end}${port === null ? ', or take the block out' : ''}`;
    reading.findings.error(where, { code: 'unfed-block', what, why: 'no stream leads to it', mend });
  }
}

/** A ring of blocks that no feed leads into has nothing to work on. */
function checkReached(
  reading: Reading,
  streams: readonly PlacedStream[],
  feeds: readonly string[],
  blocks: readonly ReadBlock[],
): void {
  const onward = bySource(streams);
  const reached = new Set<string>(feeds);
  // A set is walked in the order of its filling, what is added on the way included.
  for (const name of reached)
    for (const { to } of onward.get(name) ?? []) if (to !== null) reached.add(to.name);
  const fed = new Set(streams.map((s) => s.to?.name));
  for (const { name } of blocks) {
    if (reached.has(name) || !fed.has(name)) continue;
    const why =
      'following the streams from the feeds, it is never reached: what flows into it comes from a ring of its own';
    reading.findings.error(keyPlaceOfPath(reading.root, ['blocks', name]), {
      code: 'unreached-block',
      what: `no feed reaches the block ${name}.`,
      why,
      mend: 'connect it, or the blocks before it, with a feed',
    });
  }
}

function shown(end: { readonly name: string; readonly port: string | null }): string {
  return end.port === null ? end.name : `${end.name}.${end.port}`;
}

/** S9 after S1 to S8: a tag for the stream that a message proposes. */
function freeTag(streams: readonly PlacedStream[]): string {
  const numbers = streams.map((s) => Number(/^S(\d{1,6})$/.exec(s.tag)?.[1] ?? 0));
  return `S${Math.max(0, ...numbers) + 1}`;
}
