import type { BlockKind, Ports } from '../blocks/block.ts';
import { nearest } from '../diagnostics/nearest.ts';
import type { Component } from '../model/component.ts';
import type { Reaction } from '../model/reaction.ts';
import type { Reading } from './findings.ts';
import { checkPart } from './issues.ts';
import { checkName } from './names.ts';
import { requiredEntries } from './section.ts';
import { lowerArticle } from './wording.ts';
import {
  child,
  entryOf,
  keyPlaceOfPath,
  nodeAt,
  type Path,
  placeOfPath,
  toValue,
  type YamlNode,
} from './yaml-tree.ts';

export type BlockKinds = ReadonlyMap<string, BlockKind>;

/** A block of the file as far as it could be read. */
export interface ReadBlock {
  readonly name: string;
  /** null where the kind is not known */
  readonly kind: BlockKind | null;
  /** null where the settings are at fault */
  readonly settings: Readonly<Record<string, unknown>> | null;
  readonly ports: Ports | null;
}

/** Names that blocks may refer to, and those that stand in the file but could not be read. */
export interface Declared {
  readonly components: readonly Component[] | null;
  readonly reactions: readonly Reaction[];
  readonly failedIds: ReadonlySet<string>;
  readonly failedReactions: ReadonlySet<string>;
}

/** The blocks with their settings checked by the schema of their kind; null where there is no list of them. */
export function readBlocks(
  reading: Reading,
  kinds: BlockKinds,
  declared: Declared,
): readonly ReadBlock[] | null {
  const { root, findings } = reading;
  const entries = requiredEntries(
    reading,
    'blocks',
    'a flowsheet is made of blocks',
    'blocks: {mixer: {kind: mixer}, ...}',
  );
  if (entries === null) return null;
  return entries.map(({ key, keyPlace }) => {
    const named = checkName(findings, key, keyPlace, 'a block');
    const feeds = child(root, 'feeds');
    const feed = feeds?.kind === 'mapping' ? entryOf(feeds, key) : undefined;
    if (feed !== undefined) {
      const fault = {
        code: 'duplicate-name',
        what: `${key} names both a feed and a block.`,
        why: 'streams and paths could mean either',
      };
      findings.error(keyPlace, { ...fault, mend: 'give one of them another name' }, feed.keyPlace);
    }
    const block = readBlock(reading, kinds, declared, key);
    // What a block is called by mistake is not connected by that name: nothing is said of its ports.
    return named && feed === undefined ? block : { ...block, ports: null };
  });
}

export function readBlock(reading: Reading, kinds: BlockKinds, declared: Declared, name: string): ReadBlock {
  const { root } = reading;
  const path: Path = ['blocks', name];
  const node = nodeAt(root, path)!;
  const kind = readKind(reading, kinds, name, path, node);
  if (kind === null || node.kind !== 'mapping') return { name, kind: null, settings: null, ports: null };
  const own = { ...node, entries: node.entries.filter((entry) => entry.key !== 'kind') };
  const settings = checkPart(reading, kind.settings, path, own) as
    | Readonly<Record<string, unknown>>
    | undefined;
  if (settings === undefined) return { name, kind, settings: null, ports: null };
  const sound = checkSettings(reading, kind, settings, path, declared);
  return { name, kind, settings, ports: sound ? kind.ports(settings) : null };
}

function readKind(
  reading: Reading,
  kinds: BlockKinds,
  name: string,
  path: Path,
  node: YamlNode,
): BlockKind | null {
  const { root, findings } = reading;
  const list = [...kinds.keys()].join(', ');
  const given = child(node, 'kind');
  if (node.kind !== 'mapping' || given === undefined) {
    findings.error(keyPlaceOfPath(root, path), {
      code: 'missing-key',
      what: `the block ${name} has no kind.`,
      why: `the kind says what it does: ${list}`,
      mend: `write ${name}: {kind: ${nearest(name, kinds.keys()) ?? 'mixer'}, ...}`,
    });
    return null;
  }
  const text = given.kind === 'scalar' ? given.text : '';
  const kind = kinds.get(text);
  if (kind !== undefined) return kind;
  const near = nearest(text, kinds.keys());
  findings.error(placeOfPath(root, [...path, 'kind']), {
    code: 'unknown-kind',
    what: `Block ${name} is of kind "${text}".`,
    why:
      near === null
        ? `no block of that kind; the kinds are ${list}`
        : `no block of that kind; the nearest known kind is ${near}`,
    mend: near === null ? 'write one of these kinds' : `write kind: ${near}`,
  });
  return null;
}

/** The faults only the kind itself can see. True where there are none that spoil the ports. */
function checkSettings(
  reading: Reading,
  kind: BlockKind,
  settings: Readonly<Record<string, unknown>>,
  path: Path,
  declared: Declared,
): boolean {
  const { components, reactions, failedIds, failedReactions } = declared;
  const { root, findings } = reading;
  // Of what is declared but unreadable nothing can be said here; it has been reported where it stands.
  const uncertain = (kind.reactionsIn?.(settings) ?? []).some((name) => failedReactions.has(name));
  if (components === null || uncertain) return true;
  let sound = true;
  for (const fault of kind.check?.(settings, { components, reactions }) ?? []) {
    const at = [...path, ...fault.path];
    const word = String(fault.path.at(-1));
    const value = toValue(nodeAt(root, at));
    if (failedIds.has(word) || (typeof value === 'string' && failedIds.has(value))) continue;
    sound = false;
    const what = `${path[1]}: ${lowerArticle(fault.what)}`;
    const where = fault.code.startsWith('unknown-') ? nameOrValuePlace(reading, at) : placeOfPath(root, at);
    findings.error(where, { code: fault.code, what, why: fault.why, mend: fault.mend });
  }
  return sound;
}

/** An unknown name stands as a key of a mapping, or as a text value. */
function nameOrValuePlace(reading: Reading, path: Path) {
  const node = nodeAt(reading.root, path);
  const isText = node?.kind === 'scalar' && typeof node.value === 'string' && !/^[\d.+-]/.test(node.text);
  return isText ? node.place : keyPlaceOfPath(reading.root, path);
}
