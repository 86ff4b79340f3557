import { dump } from 'js-yaml';
import type { Chance } from './chance.ts';
import type { Corpus, Node, Tree } from './corpus.ts';
import { formulaText, quantityText, scalarInstead } from './words.ts';

/** A place in the tree of a file: what holds it, and by which key. */
interface Spot {
  readonly holder: Tree | Node[];
  readonly key: string;
}

/** A flowsheet after one to three changes that somebody who knows the format could make. */
export function mutateStructure(corpus: Corpus, chance: Chance): string {
  const tree = structuredClone(chance.pick(corpus.files).tree);
  for (let left = chance.once(2) ? 1 : 1 + chance.below(3); left > 0; left--) change(tree, corpus, chance);
  return dump(tree, { lineWidth: -1 });
}

function change(tree: Tree, corpus: Corpus, chance: Chance): void {
  const spots = [...spotsOf(tree)];
  if (spots.length === 0) return;
  const leaves = spots.filter(({ holder, key }) => typeof at(holder, key) !== 'object');
  const spot = chance.pick(spots);
  switch (chance.below(10)) {
    case 0:
    case 1:
    case 2:
    case 3: {
      const leaf = chance.pick(leaves.length > 0 ? leaves : spots);
      put(leaf, scalarInstead(String(at(leaf.holder, leaf.key)), chance, corpus));
      return;
    }
    case 4:
      drop(spot);
      return;
    case 5:
      swap(spot, chance.pick(spots));
      return;
    case 6:
      swapPorts(tree, chance);
      return;
    case 7:
      splice(tree, corpus, chance);
      return;
    case 8:
      rename(
        spot,
        chance.once(2) ? chance.pick(corpus.keys) : `${spot.key}${chance.pick(['2', ' ', '.x', "'"])}`,
        chance,
      );
      return;
    default:
      put(
        spot,
        chance.pick([
          null,
          [],
          {},
          true,
          '',
          quantityText(chance, corpus),
          formulaText(chance, corpus),
          [1, 'x'],
        ]),
      );
  }
}

/** The ends of two streams change places, or one stream turns round. */
function swapPorts(tree: Tree, chance: Chance): void {
  const streams = tree['streams'];
  if (typeof streams !== 'object' || streams === null || Array.isArray(streams)) return;
  const tags = Object.keys(streams);
  if (tags.length === 0) return;
  const [a, b] = [chance.pick(tags), chance.pick(tags)];
  const [from, to] = String(streams[a]).split('->');
  const [fromB, toB] = String(streams[b]).split('->');
  if (a === b) streams[a] = `${to} -> ${from}`;
  else
    [streams[a], streams[b]] = chance.once(2)
      ? [`${from} -> ${toB}`, `${fromB} -> ${to}`]
      : [`${fromB} -> ${to}`, `${from} -> ${toB}`];
}

/** A section, or one entry of it, from another file. */
function splice(tree: Tree, corpus: Corpus, chance: Chance): void {
  const other = chance.pick(corpus.files).tree;
  const name = chance.pick(Object.keys(other));
  const [ours, theirs] = [tree[name], structuredClone(other[name])];
  if (chance.once(2) || !isTree(ours) || !isTree(theirs)) tree[name] = theirs ?? null;
  else {
    const key = chance.pick(Object.keys(theirs));
    ours[chance.once(2) ? key : chance.pick(Object.keys(ours))] = theirs[key] ?? null;
  }
}

function rename({ holder, key }: Spot, name: string, chance: Chance): void {
  if (Array.isArray(holder)) {
    holder.splice(Number(key), 0, structuredClone(holder[Number(key)]!));
    return;
  }
  // Assignment would set the prototype of the object instead of an entry.
  const value = structuredClone(holder[key]!);
  Object.defineProperty(holder, name, { value, enumerable: true, configurable: true, writable: true });
  if (chance.once(2)) delete holder[key];
}

function swap(a: Spot, b: Spot): void {
  const [one, other] = [structuredClone(at(a.holder, a.key)), structuredClone(at(b.holder, b.key))];
  put(a, other);
  put(b, one);
}

function drop({ holder, key }: Spot): void {
  if (Array.isArray(holder)) holder.splice(Number(key), 1);
  else delete holder[key];
}

function put({ holder, key }: Spot, value: Node): void {
  (holder as Tree)[key] = value;
}

function at(holder: Tree | Node[], key: string): Node {
  return (holder as Tree)[key] ?? null;
}

function* spotsOf(node: Node): Generator<Spot> {
  if (typeof node !== 'object' || node === null) return;
  for (const key of Object.keys(node)) {
    yield { holder: node, key };
    yield* spotsOf(at(node, key));
  }
}

function isTree(node: Node | undefined): node is Tree {
  return typeof node === 'object' && node !== null && !Array.isArray(node) && Object.keys(node).length > 0;
}
