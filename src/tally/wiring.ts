import type { BlockKind } from '../blocks/block.ts';
import type { BlockSpec, Flowsheet } from '../model/flowsheet.ts';

/** Which stream joins which ports, by index. */
export interface Wiring {
  /** stream indices per block, in port order */
  readonly inlets: readonly (readonly number[])[];
  readonly outlets: readonly (readonly number[])[];
  readonly enters: readonly number[];
  readonly leaves: readonly number[];
  streamOf(tag: string): number;
}

/** Resolve the ends of the streams of a checked flowsheet. */
export function wire(
  flowsheet: Flowsheet,
  blocks: readonly BlockSpec[],
  kinds: readonly BlockKind[],
): Wiring {
  const { streams } = flowsheet;
  const indexOf = new Map(blocks.map((b, i) => [b.name, i]));
  const at = (end: { readonly name: string; readonly port: string | null }, port: string) =>
    end.port === port || end.port === null;
  const into = blocks.map((): number[] => []);
  const outOf = blocks.map((): number[] => []);
  for (const [i, { from, to }] of streams.entries()) {
    const source = indexOf.get(from.name);
    if (source !== undefined) outOf[source].push(i);
    if (to !== null) into[indexOf.get(to.name)!].push(i);
  }
  const inlets = blocks.map((block, b) => {
    const { inlets: ports } = kinds[b].ports(block.settings);
    const arriving = into[b];
    if (ports === 'any') return arriving;
    return ports.flatMap((port) => arriving.filter((i) => at(streams[i].to!, port)));
  });
  const outlets = blocks.map((block, b) => {
    const { outlets: ports } = kinds[b].ports(block.settings);
    return ports.flatMap((port) => outOf[b].filter((i) => at(streams[i].from, port)));
  });
  return {
    inlets,
    outlets,
    enters: streams.flatMap((s, i) => (indexOf.has(s.from.name) ? [] : [i])),
    leaves: streams.flatMap((s, i) => (s.to === null ? [i] : [])),
    streamOf: (tag) => streams.findIndex((s) => s.tag === tag),
  };
}
