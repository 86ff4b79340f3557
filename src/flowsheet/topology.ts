import { nearest } from '../diagnostics/nearest.ts';
import type { StreamSpec } from '../model/flowsheet.ts';
import type { Place } from '../model/place.ts';
import type { ReadBlock } from './blocks.ts';
import { checkConnections } from './connections.ts';
import type { Fault, Reading } from './findings.ts';
import { checkName, NAME } from './names.ts';
import { requiredEntries } from './section.ts';
import { parseStream, type StreamEnd } from './stream-text.ts';
import { placeInside, type YamlScalar } from './yaml-tree.ts';

/** A stream with the places of its ends, for messages. */
export interface PlacedStream extends StreamSpec {
  readonly fromPlace: Place;
  readonly toPlace: Place;
}

/**
 * The streams, every end resolved to a feed, to a port of a block or to the battery limit. Where there are no
 * feeds or blocks to speak of (null), nothing is said of the ends.
 */
export function readStreams(
  reading: Reading,
  feeds: readonly string[] | null,
  blocks: readonly ReadBlock[] | null,
): readonly StreamSpec[] {
  const { findings } = reading;
  const why = 'streams say what flows from one block to the next';
  const entries = requiredEntries(reading, 'streams', why, 'streams: {S1: makeup -> mixer, ...}');
  if (entries === null || feeds === null || blocks === null) return [];
  const ends: Ends = { feeds: new Set(feeds), blocks: new Map(blocks.map((b) => [b.name, b])) };
  let complete = true;
  const streams = entries.flatMap(({ key, keyPlace, value }): PlacedStream[] => {
    checkName(findings, key, keyPlace, 'a stream');
    if (value.kind !== 'scalar' || value.text.trim() === '') {
      const what = `the stream ${key} does not say where it flows.`;
      findings.error(keyPlace, {
        code: 'bad-stream',
        what,
        why: 'a stream is written from -> to',
        mend: `write e.g. ${key}: makeup -> mixer`,
      });
      complete = false;
      return [];
    }
    const stream = readStream(reading, key, value, ends);
    if (stream === null) complete = false;
    return stream === null ? [] : [stream];
  });
  checkConnections(reading, streams, feeds, blocks, complete);
  return streams.map(({ tag, from, to }) => ({ tag, from, to }));
}

function readStream(reading: Reading, tag: string, node: YamlScalar, ends: Ends): PlacedStream | null {
  const parsed = parseStream(node.text);
  const report = (end: StreamEnd | null, fault: Fault): null => {
    const place = end === null ? node.place : placeInside(node, end.offset, end.length);
    reading.findings.error(place, {
      ...fault,
      what: end === null ? `${tag}: ${fault.what}` : `stream ${tag}: ${fault.what}`,
    });
    return null;
  };
  if ('fault' in parsed) return report(null, parsed.fault);
  const from = resolveSource(parsed.from, ends);
  const to = resolveTarget(parsed.to, ends);
  if ('fault' in from) report(parsed.from, from.fault);
  if (to !== null && 'fault' in to) report(parsed.to, to.fault);
  if ('fault' in from || (to !== null && 'fault' in to)) return null;
  if (to !== null && to.name === from.name) {
    const what = `it leads from ${from.name} back into ${from.name}.`;
    return report(parsed.to, {
      code: 'stream-to-itself',
      what,
      why: 'nothing happens on the way, and nothing can be solved',
      mend: 'lead it to another block',
    });
  }
  const place = (end: StreamEnd): Place => placeInside(node, end.offset, end.length);
  return { tag, from, to, fromPlace: place(parsed.from), toPlace: place(parsed.to) };
}

/** What a stream can begin at or lead to. */
interface Ends {
  readonly feeds: ReadonlySet<string>;
  readonly blocks: ReadonlyMap<string, ReadBlock>;
}

type End = { readonly name: string; readonly port: string | null };

function resolveSource(end: StreamEnd, { feeds, blocks }: Ends): End | { fault: Fault } {
  if (end.name === 'out') {
    const why = 'out is where streams leave; what enters is a feed';
    return {
      fault: { code: 'bad-stream', what: 'it comes from out.', why, mend: 'begin it at a feed or a block' },
    };
  }
  if (feeds.has(end.name)) {
    if (end.port === null) return { name: end.name, port: null };
    const what = `the feed ${end.name} has no port ${end.port}.`;
    return { fault: { code: 'unknown-port', what, why: 'a feed has no ports', mend: `write ${end.name}` } };
  }
  const block = blocks.get(end.name);
  if (block === undefined)
    return { fault: unknownName(end.name, [...feeds, ...blocks.keys()], 'no feed or block') };
  return resolvePort(end, block, block.ports?.outlets ?? null, 'outlet');
}

function resolveTarget(end: StreamEnd, { feeds, blocks }: Ends): End | null | { fault: Fault } {
  if (end.name === 'out') {
    if (end.port === null) return null;
    const why = 'the battery limit has no ports';
    return { fault: { code: 'unknown-port', what: `out has no port ${end.port}.`, why, mend: 'write out' } };
  }
  if (feeds.has(end.name)) {
    const what = `it leads into the feed ${end.name}.`;
    const why = 'a feed comes from outside; nothing flows into it';
    return {
      fault: { code: 'bad-stream', what, why, mend: `lead both ${end.name} and this stream into a mixer` },
    };
  }
  const block = blocks.get(end.name);
  if (block === undefined) return { fault: unknownName(end.name, [...blocks.keys(), 'out'], 'no block') };
  const inlets = block.ports?.inlets ?? null;
  if (inlets !== 'any') return resolvePort(end, block, inlets, 'inlet');
  if (end.port === null) return { name: end.name, port: null };
  const why = `a ${block.kind?.kind} takes any number of inlets, none of which has a name`;
  return {
    fault: {
      code: 'unknown-port',
      what: `${end.name} has no inlet ${end.port}.`,
      why,
      mend: `write ${end.name}`,
    },
  };
}

/** A single port needs no name, and is called null; of several one must be named. */
function resolvePort(
  end: StreamEnd,
  block: ReadBlock,
  ports: readonly string[] | null,
  noun: 'inlet' | 'outlet',
): End | { fault: Fault } {
  const { name, port } = end;
  if (ports === null) return { name, port };
  if (port === null) {
    if (ports.length === 1) return { name, port: null };
    const list = ports.map((p) => `${name}.${p}`).join(', ');
    return {
      fault: {
        code: 'missing-port',
        what: `${name} has more than one ${noun}.`,
        why: `it must be said which one: ${list}`,
        mend: `write one of them, e.g. ${name}.${ports[0]}`,
      },
    };
  }
  if (ports.includes(port)) return { name, port: ports.length === 1 ? null : port };
  const near = nearest(port, ports);
  const kind = block.kind?.kind ?? 'block';
  return {
    fault: {
      code: 'unknown-port',
      what: `${name} has no ${noun} ${port}.`,
      why:
        near === null
          ? `the ${noun}s of this ${kind} are ${ports.join(', ')}`
          : `the nearest ${noun} is ${near}`,
      mend: near === null && ports.length === 1 ? `write ${name}` : `write ${name}.${near ?? ports[0]}`,
    },
  };
}

function unknownName(name: string, known: readonly string[], none: string): Fault {
  const near = nearest(
    name,
    known.filter((one) => NAME.test(one)),
  );
  return {
    code: 'unknown-name',
    what: `${name} is not known.`,
    why:
      near === null
        ? `${none} has that name; known are ${known.join(', ')}`
        : `${none} has that name; the nearest is ${near}`,
    mend: near === null ? 'write one of the known names, or add the block' : `write ${near}`,
  };
}
