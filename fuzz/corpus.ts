import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { load } from 'js-yaml';

/** What mutants are made from: the flowsheets that come along, and the words and values met in them. */
export interface Corpus {
  readonly files: readonly { readonly name: string; readonly text: string; readonly tree: Tree }[];
  /** every scalar that stands in one of the files, as text */
  readonly scalars: readonly string[];
  readonly keys: readonly string[];
}

export type Tree = { [key: string]: Node };
export type Node = Tree | Node[] | string | number | boolean | null;

/** Read all flowsheets of a folder. */
export function readCorpus(folder: string): Corpus {
  const files = readdirSync(folder)
    .filter((name) => name.endsWith('.yaml'))
    .sort()
    .map((name) => {
      const text = readFileSync(join(folder, name), 'utf8');
      return { name, text, tree: load(text) as Tree };
    });
  const scalars = new Set<string>();
  const keys = new Set<string>();
  for (const { tree } of files) collect(tree, scalars, keys);
  return { files, scalars: [...scalars], keys: [...keys] };
}

function collect(node: Node, scalars: Set<string>, keys: Set<string>): void {
  if (typeof node !== 'object' || node === null) {
    scalars.add(String(node));
    return;
  }
  for (const [key, value] of Object.entries(node)) {
    if (!Array.isArray(node)) keys.add(key);
    collect(value, scalars, keys);
  }
}
