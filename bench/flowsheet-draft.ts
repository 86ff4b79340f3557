/** An open end of a line: where it comes from, and at what pressure. */
export interface End {
  readonly at: string;
  readonly bar: number;
}

/** A flowsheet being written: blocks are put on the ends of lines, one after another. */
export interface Draft {
  /** blocks written so far */
  readonly count: number;
  readonly tags: ReadonlyMap<string, string>;
  feed(name: string, settings: string, bar: number): End;
  block(name: string, kind: string, settings?: string): string;
  /** lead an end into a block or out of the plant; returns the tag of the stream */
  lead(from: End, to: string): string;
  text(head: readonly string[], foot: (draft: Draft) => readonly string[]): string;
}

export function createDraft(): Draft {
  const feeds: string[] = [];
  const blocks: string[] = [];
  const streams: string[] = [];
  const tags = new Map<string, string>();
  const draft: Draft = {
    get count() {
      return blocks.length;
    },
    tags,
    feed(name, settings, bar) {
      feeds.push(`  ${name}: {${settings}, pressure: ${short(bar)} bar}`);
      return { at: name, bar };
    },
    block(name, kind, settings = '') {
      blocks.push(`  ${name}: {kind: ${kind}${settings === '' ? '' : `, ${settings}`}}`);
      return name;
    },
    lead(from, to) {
      const tag = `S${streams.length + 1}`;
      streams.push(`  ${tag}: ${from.at} -> ${to}`);
      tags.set(from.at, tag);
      return tag;
    },
    text(head, foot) {
      return [
        ...head,
        'feeds:',
        ...feeds,
        'blocks:',
        ...blocks,
        'streams:',
        ...streams,
        ...foot(draft),
        '',
      ].join('\n');
    },
  };
  return draft;
}

/** As many digits as an engineer would write. */
export function short(value: number): string {
  return String(Number(value.toPrecision(5)));
}
