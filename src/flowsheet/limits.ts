import type { Reading } from './findings.ts';
import { child, entryOf, type YamlEntry } from './yaml-tree.ts';

const MIB = 1024 * 1024;

/**
 * Bounds that no flowsheet made in earnest meets, so that a mistaken or hostile file costs neither time nor memory.
 * A plant of 2,000 blocks stays below a quarter of each.
 */
export const limits = {
  /** of the text, unless more is asked for */
  bytes: MIB,
  /** of the text, whatever is asked for */
  mostBytes: 64 * MIB,
  /** brackets and indents inside each other */
  depth: 30,
  /** uses of anchors; what they bring in counts as values as well */
  aliases: 1000,
  values: 400_000,
  /** characters of a key */
  key: 200,
  /** entries of the parts of the file */
  entries: {
    components: 200,
    reactions: 500,
    feeds: 5000,
    blocks: 10_000,
    streams: 30_000,
    aims: 100,
    cases: 2000,
    figures: 2000,
    prices: 5000,
  },
} as const;

/** A size as the trade writes it: 1.5 MiB, 640 KiB, 12 bytes. */
export function sizeText(bytes: number): string {
  if (bytes >= MIB) return `${Number((bytes / MIB).toPrecision(4))} MiB`;
  return bytes >= 1024 ? `${Number((bytes / 1024).toPrecision(4))} KiB` : `${bytes} bytes`;
}

/** Report every part of the file with more entries than are read. True where there is one. */
export function hasTooManyEntries({ root, findings }: Reading): boolean {
  let found = false;
  for (const [part, most] of Object.entries(limits.entries)) {
    const node = child(root, part);
    const count =
      node?.kind === 'mapping' ? node.entries.length : node?.kind === 'list' ? node.items.length : 0;
    if (count <= most) continue;
    found = true;
    const entry = root.kind === 'mapping' ? (entryOf(root, part) as YamlEntry) : null;
    findings.error(entry?.keyPlace ?? root.place, {
      code: 'too-many-entries',
      what: `the file has ${count} ${part}.`,
      why: `at most ${most} ${part} are read: no plant has more, and the time that checking takes stays short`,
      mend:
        part === 'cases'
          ? 'divide them between several files'
          : `take some out, or divide the plant at a stream`,
    });
  }
  return found;
}
