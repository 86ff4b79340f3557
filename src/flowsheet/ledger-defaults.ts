import type { Component } from '../model/component.ts';
import type { LedgerSpec, StreamSpec } from '../model/flowsheet.ts';
import type { Reaction } from '../model/reaction.ts';
import type { ReadBlock } from './blocks.ts';
import { bySource } from './by-source.ts';
import { streamsInLoops } from './loops.ts';

/** What the ledger refers to where the file does not say, with a sentence for each; empty where nothing is assumed. */
export interface LedgerDefaults extends LedgerSpec {
  readonly sentences: Readonly<Record<'product' | 'reactant' | 'purge' | 'recycle', string>>;
}

/**
 * The defaults of the ledger:
 * - product: of the first reaction the product with the largest coefficient, water and solids only where there
 *   is nothing else; in the stream found by following, from the first block with an outlet `liquid`, the liquid
 *   (or the first outlet of a block without one) until it leaves the plant; where there is no such block, the
 *   first stream that leaves and is no purge.
 * - reactant: hydrogen where the first reaction takes it up, else the first reactant in declared order.
 * - purge: every stream that leaves from a named outlet of a splitter (not from `rest`).
 * - recycle: the first stream of the file, not from a feed, that flows into a mixer from which it can itself
 *   be reached.
 */
export function ledgerDefaults(
  components: readonly Component[],
  reactions: readonly Reaction[],
  streams: readonly StreamSpec[],
  blocks: readonly ReadBlock[],
): LedgerDefaults {
  const purge = purgeStreams(streams, blocks);
  const component = productComponent(components, reactions);
  const stream = component === null ? null : productStream(streams, blocks, purge);
  const product = component === null || stream === null ? null : { component, stream };
  const reactant = keyReactant(components, reactions);
  const recycle = recycleStream(streams, blocks);
  return {
    product,
    reactant,
    purge,
    recycle,
    sentences: {
      product:
        product === null
          ? ''
          : `The ledger takes ${product.component} in ${product.stream} as the product, for none is named.`,
      reactant:
        reactant === null ? '' : `The ledger takes ${reactant} as the key reactant, for none is named.`,
      purge: purge.length === 0 ? '' : `The ledger takes ${purge.join(', ')} as purge, for none is named.`,
      recycle: recycle === null ? '' : `The ledger takes ${recycle} as the recycle, for none is named.`,
    },
  };
}

function productComponent(components: readonly Component[], reactions: readonly Reaction[]): string | null {
  if (reactions.length === 0) return null;
  const { coefficients } = reactions[0];
  const made = components
    .map((component, i) => ({ component, coefficient: coefficients[i] }))
    .filter(({ component, coefficient }) => coefficient > 0 && !component.solid);
  const wanted = made.filter(({ component }) => component.id !== 'H2O');
  const choice = wanted.length > 0 ? wanted : made;
  return choice.toSorted((a, b) => b.coefficient - a.coefficient)[0]?.component.id ?? null;
}

function keyReactant(components: readonly Component[], reactions: readonly Reaction[]): string | null {
  if (reactions.length === 0) return null;
  const taken = components.filter((_, i) => reactions[0].coefficients[i] < 0);
  return (taken.find((c) => c.id === 'H2') ?? taken[0])?.id ?? null;
}

function purgeStreams(streams: readonly StreamSpec[], blocks: readonly ReadBlock[]): readonly string[] {
  const splitters = new Set(blocks.filter((b) => b.kind?.kind === 'splitter').map((b) => b.name));
  return streams
    .filter((s) => s.to === null && splitters.has(s.from.name) && s.from.port !== 'rest')
    .map((s) => s.tag);
}

function productStream(
  streams: readonly StreamSpec[],
  blocks: readonly ReadBlock[],
  purge: readonly string[],
): string | null {
  const onward = bySource(streams);
  const outletsOf = (name: string) => onward.get(name) ?? [];
  const start = blocks.find((b) => b.ports?.outlets.includes('liquid'));
  let stream = start === undefined ? undefined : outletsOf(start.name).find((s) => s.from.port === 'liquid');
  const seen = new Set<string>();
  while (stream !== undefined && stream.to !== null && !seen.has(stream.tag)) {
    seen.add(stream.tag);
    const next = outletsOf(stream.to.name);
    stream = next.find((s) => s.from.port === 'liquid') ?? next[0];
  }
  if (stream !== undefined && stream.to === null) return stream.tag;
  const exits = streams.filter((s) => s.to === null);
  return (exits.find((s) => !purge.includes(s.tag)) ?? exits[0])?.tag ?? null;
}

function recycleStream(streams: readonly StreamSpec[], blocks: readonly ReadBlock[]): string | null {
  const mixers = new Set(blocks.flatMap((b) => (b.kind?.kind === 'mixer' ? [b.name] : [])));
  const inLoops = streamsInLoops(streams);
  const found = streams.find((s) => s.to !== null && mixers.has(s.to.name) && inLoops.has(s.tag));
  return found?.tag ?? null;
}
