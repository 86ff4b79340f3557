import type { Place } from '../model/place.ts';

/** The tree of a YAML text; every node knows where it stands. Nodes are never changed, only replaced. */
export type YamlNode = YamlScalar | YamlList | YamlMapping;

export interface YamlScalar {
  readonly kind: 'scalar';
  readonly value: string | number | boolean | null;
  /** as written, without quotes */
  readonly text: string;
  readonly place: Place;
  /** place of the first character of `text`, for pointing inside it; null where escapes or line folds move it */
  readonly textPlace: Place | null;
}

export interface YamlList {
  readonly kind: 'list';
  readonly items: readonly YamlNode[];
  readonly place: Place;
}

export interface YamlMapping {
  readonly kind: 'mapping';
  readonly entries: readonly YamlEntry[];
  readonly place: Place;
}

export interface YamlEntry {
  readonly key: string;
  readonly keyPlace: Place;
  readonly value: YamlNode;
}

export type Path = readonly (string | number)[];

/** The child of a mapping or list; undefined where there is none. */
export function child(node: YamlNode | undefined, key: string | number): YamlNode | undefined {
  if (node?.kind === 'mapping') return entryOf(node, String(key))?.value;
  if (node?.kind === 'list') return node.items[Number(key)];
  return undefined;
}

/** Entries of large mappings by their keys, made when first asked for: a plant has a thousand blocks. */
const byKey = new WeakMap<YamlMapping, ReadonlyMap<string, YamlEntry>>();
/** Of a mapping no larger than this, looking through it is as quick. */
const SMALL = 12;

/** The entry of a mapping with a key; undefined where there is none. */
export function entryOf(node: YamlMapping, key: string): YamlEntry | undefined {
  if (node.entries.length <= SMALL) return node.entries.find((entry) => entry.key === key);
  let index = byKey.get(node);
  if (index === undefined) {
    index = new Map(node.entries.map((entry) => [entry.key, entry]));
    byKey.set(node, index);
  }
  return index.get(key);
}

/** The node at a path; undefined where the path leads nowhere. */
export function nodeAt(root: YamlNode | undefined, path: Path): YamlNode | undefined {
  return path.reduce<YamlNode | undefined>(child, root);
}

/** The entries of a mapping; empty for everything else. */
export function entriesOf(node: YamlNode | undefined): readonly YamlEntry[] {
  return node?.kind === 'mapping' ? node.entries : [];
}

/**
 * Where a path stands: the value where that is a scalar or an inline collection's key otherwise. A path that
 * leads nowhere gives the place of the nearest enclosing part.
 */
export function placeOfPath(root: YamlNode, path: Path): Place {
  let node = root;
  let place = root.place;
  for (const key of path) {
    const entry = node.kind === 'mapping' ? entryOf(node, String(key)) : undefined;
    const next = entry?.value ?? child(node, key);
    if (next === undefined) break;
    const empty = next.kind === 'scalar' && next.text === '';
    place = entry !== undefined && (next.kind !== 'scalar' || empty) ? entry.keyPlace : next.place;
    node = next;
  }
  return place;
}

/** Where the key at the end of a path stands; the nearest enclosing part where there is none. */
export function keyPlaceOfPath(root: YamlNode, path: Path): Place {
  const parent = nodeAt(root, path.slice(0, -1));
  const entry = parent?.kind === 'mapping' ? entryOf(parent, String(path.at(-1))) : undefined;
  return entry?.keyPlace ?? placeOfPath(root, path);
}

/** Plain values: objects, arrays and scalars. */
export function toValue(node: YamlNode | undefined): unknown {
  if (node === undefined) return undefined;
  if (node.kind === 'scalar') return node.value;
  if (node.kind === 'list') return node.items.map(toValue);
  return Object.fromEntries(node.entries.map((entry) => [entry.key, toValue(entry.value)]));
}

/** Every scalar below a node. */
export function* scalarsOf(node: YamlNode): Generator<YamlScalar> {
  if (node.kind === 'scalar') yield node;
  else if (node.kind === 'list') for (const item of node.items) yield* scalarsOf(item);
  else for (const entry of node.entries) yield* scalarsOf(entry.value);
}

/**
 * The tree with the node at a path put in or replaced, or taken out where `value` is null. Mappings missing on
 * the way are made.
 *
 * @returns null where a scalar, or a list without that item, stands in the way
 */
export function withNode(
  root: YamlNode,
  path: Path,
  value: YamlNode | null,
  keyPlace: Place,
): YamlNode | null {
  if (path.length === 0) return value;
  const [key, ...rest] = path;
  if (root.kind === 'list') {
    const index = Number(key);
    if (!Number.isInteger(index) || index < 0 || index >= root.items.length) return null;
    const item = withNode(root.items[index], rest, value, keyPlace);
    if (item === null && rest.length > 0) return null;
    const items = item === null ? root.items.toSpliced(index, 1) : root.items.with(index, item);
    return { ...root, items };
  }
  if (root.kind !== 'mapping') return null;
  const at = root.entries.findIndex((entry) => entry.key === String(key));
  if (at < 0) {
    if (value === null) return root;
    const made = rest.length === 0 ? value : withNode(emptyMapping(keyPlace), rest, value, keyPlace);
    return made === null
      ? null
      : { ...root, entries: [...root.entries, { key: String(key), keyPlace, value: made }] };
  }
  const entry = root.entries[at];
  if (rest.length === 0) {
    const entries =
      value === null ? root.entries.toSpliced(at, 1) : root.entries.with(at, { ...entry, value });
    return { ...root, entries };
  }
  const changed = withNode(entry.value, rest, value, keyPlace);
  return changed === null ? null : { ...root, entries: root.entries.with(at, { ...entry, value: changed }) };
}

/** A place inside a scalar's text, or the whole scalar where it cannot be told. */
export function placeInside(node: YamlScalar, offset: number, length: number): Place {
  const start = node.textPlace;
  return start === null
    ? node.place
    : { ...start, column: start.column + offset, length: Math.max(1, length) };
}

function emptyMapping(place: Place): YamlMapping {
  return { kind: 'mapping', entries: [], place };
}
