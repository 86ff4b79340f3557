import { nearest } from '../diagnostics/nearest.ts';
import type { Component } from '../model/component.ts';
import type { LedgerSpec, StreamSpec } from '../model/flowsheet.ts';
import type { Reading } from './findings.ts';
import { checkPart } from './issues.ts';
import type { LedgerDefaults } from './ledger-defaults.ts';
import { ledgerSchema } from './schema.ts';
import { child, nodeAt, type Path, placeInside, placeOfPath } from './yaml-tree.ts';

export interface ReadLedger {
  readonly ledger: LedgerSpec;
  readonly assumptions: readonly string[];
}

/** The ledger as written, with the defaults filled in and said. Null where it is at fault. */
export function readLedger(
  reading: Reading,
  components: readonly Component[],
  streams: readonly StreamSpec[],
  defaults: LedgerDefaults,
): ReadLedger | null {
  const written = child(reading.root, 'ledger');
  const entry = written === undefined ? {} : checkPart(reading, ledgerSchema, ['ledger']);
  if (entry === undefined) return null;
  const check = new LedgerCheck(reading, components, streams);
  const product = entry.product === undefined ? null : check.product(entry.product);
  if (entry.reactant !== undefined) check.component(entry.reactant, ['ledger', 'reactant']);
  const purgeIsList = nodeAt(reading.root, ['ledger', 'purge'])?.kind === 'list';
  entry.purge?.forEach((tag, i) => {
    check.leaves(tag, purgeIsList ? ['ledger', 'purge', i] : ['ledger', 'purge']);
  });
  if (entry.recycle !== undefined) check.recycle(entry.recycle);
  if (check.failed) return null;
  const assumptions = [
    ...(entry.product === undefined ? [defaults.sentences.product] : []),
    ...(entry.reactant === undefined ? [defaults.sentences.reactant] : []),
    ...(entry.purge === undefined ? [defaults.sentences.purge] : []),
    ...(entry.recycle === undefined ? [defaults.sentences.recycle] : []),
  ].filter((sentence) => sentence !== '');
  return {
    ledger: {
      product: product ?? defaults.product,
      reactant: entry.reactant ?? defaults.reactant,
      purge: entry.purge ?? defaults.purge,
      recycle: entry.recycle ?? defaults.recycle,
    },
    assumptions,
  };
}

class LedgerCheck {
  failed = false;
  private readonly reading: Reading;
  private readonly ids: readonly string[];
  private readonly streams: readonly StreamSpec[];

  constructor(reading: Reading, components: readonly Component[], streams: readonly StreamSpec[]) {
    this.reading = reading;
    this.ids = components.map((c) => c.id);
    this.streams = streams;
  }

  /** `NH3 in S5` */
  product(text: string): { component: string; stream: string } | null {
    const path: Path = ['ledger', 'product'];
    const match = /^\s*(\S+)\s+in\s+(\S+)\s*$/.exec(text);
    if (match === null) {
      const why = 'a product is a component and the stream it leaves by';
      this.fault(
        path,
        'bad-ledger',
        `ledger.product: "${text}" names no product.`,
        why,
        'write e.g. NH3 in S5',
      );
      return null;
    }
    const [, component, stream] = match;
    this.component(component, path, text.indexOf(component));
    this.leaves(stream, path, text.lastIndexOf(stream));
    return { component, stream };
  }

  component(id: string, path: Path, offset = 0): void {
    if (this.ids.includes(id)) return;
    const near = nearest(id, this.ids);
    const why =
      near === null ? `the components are ${this.ids.join(', ')}` : `the nearest component is ${near}`;
    const mend = near === null ? 'write one of them' : `write ${near}`;
    this.fault(
      path,
      'unknown-component',
      `${path.slice(0, 2).join('.')}: ${id} is no component of this file.`,
      why,
      mend,
      [offset, id.length],
    );
  }

  /** A stream that exists and crosses the battery limit. */
  leaves(tag: string, path: Path, offset = 0): void {
    const stream = this.stream(tag, path, offset);
    if (stream === null || stream.to === null) return;
    const exits = this.streams.filter((s) => s.to === null).map((s) => s.tag);
    const what = `${path.slice(0, 2).join('.')}: ${tag} does not leave the plant.`;
    const why = `it flows into ${stream.to.name}; the streams that leave are ${exits.join(', ')}`;
    this.fault(path, 'bad-ledger', what, why, 'write a stream that leads to out', [offset, tag.length]);
  }

  /** A stream that exists and stays inside the plant. */
  recycle(tag: string): void {
    const path: Path = ['ledger', 'recycle'];
    const stream = this.stream(tag, path, 0);
    if (stream === null || stream.to !== null) return;
    const why = 'a recycle comes back into a block';
    this.fault(
      path,
      'bad-ledger',
      `ledger.recycle: ${tag} leaves the plant.`,
      why,
      'write the tag of the stream that comes back',
    );
  }

  private stream(tag: string, path: Path, offset: number): StreamSpec | null {
    const stream = this.streams.find((s) => s.tag === tag);
    if (stream !== undefined) return stream;
    const tags = this.streams.map((s) => s.tag);
    const near = nearest(tag, tags);
    const why = near === null ? `the streams are ${tags.join(', ')}` : `the nearest stream is ${near}`;
    const mend = near === null ? 'write the tag of a stream' : `write ${near}`;
    this.fault(
      path,
      'unknown-stream',
      `${path.slice(0, 2).join('.')}: there is no stream ${tag}.`,
      why,
      mend,
      [offset, tag.length],
    );
    return null;
  }

  private fault(
    path: Path,
    code: string,
    what: string,
    why: string,
    mend: string,
    inside?: readonly [number, number],
  ): void {
    this.failed = true;
    const node = nodeAt(this.reading.root, path);
    const where =
      inside !== undefined && node?.kind === 'scalar'
        ? placeInside(node, inside[0], inside[1])
        : placeOfPath(this.reading.root, path);
    this.reading.findings.error(where, { code, what, why, mend });
  }
}
