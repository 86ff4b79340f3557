import { type Chance, chanceOf } from './chance.ts';
import type { Corpus, Node, Tree } from './corpus.ts';
import { judgeBytes, judgeOver, judgeText } from './judge-file.ts';
import { judgeJournal, judgeSlice, type Tables } from './judge-tables.ts';
import { judgeFormula, judgeQuantity } from './judge-words.ts';
import { mutateStructure } from './mutate-structure.ts';
import { mutateText, slip } from './mutate-text.ts';
import { formulaText, quantityText, scalarInstead, valuesText } from './words.ts';

/** What mutants are made from and judged with. */
export interface Bench {
  readonly corpus: Corpus;
  readonly tables: Tables;
  /** a folder of its own */
  readonly scratch: string;
}

/** One mutant: what it is, its bytes for whoever looks into it, and what it comes to. */
export interface FuzzCase {
  readonly kind: string;
  /** the mutant as it can be kept, the ending of its name, and what goes with it on the command line */
  readonly content: string | Uint8Array;
  readonly ending: string;
  readonly beside: string;
  /** @throws Error where the contract is broken */
  judge(): string | Promise<string>;
}

/** The case of this number: the same for the same seed, whichever process makes it. */
export function makeCase({ corpus, tables, scratch }: Bench, seed: number, index: number): FuzzCase {
  const chance = chanceOf(seed, index);
  const dice = chance.below(100);
  if (dice < 25) {
    const content = mutateText(chance.pick(corpus.files).text, chance);
    return file('bytes', content, () => judgeBytes(content, scratch));
  }
  if (dice < 65) {
    const content = mutateStructure(corpus, chance);
    return file('structure', content, () => judgeText(content));
  }
  const { text, tree } = chance.pick(corpus.files);
  if (dice < 75) {
    const set = Array.from({ length: 1 + chance.below(2) }, () => setWord(tree, corpus, chance));
    return file(
      'set',
      text,
      () => judgeText(text, set),
      set.map((word) => `--set ${JSON.stringify(word)}`).join(' '),
    );
  }
  if (dice < 82) {
    const { path, value } = settingIn(tree, chance);
    const near = `${value},${scalarInstead(String(value), chance, corpus)}`;
    const values = chance.once(2) ? near : valuesText(chance, corpus);
    const over = chance.once(12) ? path : `${path}=${values}`;
    return file('over', text, () => judgeOver(text, over), `--over ${JSON.stringify(over)}`);
  }
  if (dice < 88) {
    const content = formulaText(chance, corpus);
    return { kind: 'formula', content, ending: '.txt', beside: '', judge: () => judgeFormula(content) };
  }
  if (dice < 94) {
    const content = quantityText(chance, corpus);
    return { kind: 'quantity', content, ending: '.txt', beside: '', judge: () => judgeQuantity(content) };
  }
  if (dice < 97) {
    const content = slip(tables.journal, chance);
    return {
      kind: 'journal',
      content,
      ending: '.part',
      beside: '',
      judge: () => judgeJournal(content, tables, scratch),
    };
  }
  const ending = chance.pick([...tables.slices.keys()]);
  const whole = tables.slices.get(ending)!;
  const content = chance.once(8) ? whole : slip(whole, chance);
  return {
    kind: 'slice',
    content,
    ending,
    beside: '',
    judge: () => judgeSlice(content, ending, whole, scratch),
  };
}

function file(
  kind: string,
  content: string | Uint8Array,
  judge: () => Promise<string>,
  beside = '',
): FuzzCase {
  return { kind, content, ending: '.yaml', beside, judge };
}

/** A setting of a file with another value, more or less. */
function setWord(tree: Tree, corpus: Corpus, chance: Chance): string {
  const { path, value } = settingIn(tree, chance);
  return chance.once(12) ? path : `${path}=${scalarInstead(String(value), chance, corpus)}`;
}

/** The path of something in a file, as the command line writes it, and what stands there; slightly wrong at times. */
function settingIn(tree: Tree, chance: Chance): { readonly path: string; readonly value: Node } {
  const parts: string[] = [];
  let value: Node = tree;
  while (typeof value === 'object' && value !== null && Object.keys(value).length > 0) {
    if (parts.length > 1 && chance.once(10)) break;
    const key: string = parts.length === 0 && !chance.once(4) ? 'blocks' : chance.pick(Object.keys(value));
    parts.push(key);
    value = (value as Tree)[key] ?? null;
  }
  if (['blocks', 'feeds'].includes(parts[0] ?? '') && !chance.once(10)) parts.shift();
  const path = parts.join('.');
  return { path: chance.once(15) ? `${path}${chance.pick(SLIPS)}` : path, value };
}

const SLIPS = ['.', '..', '.__proto__', ' ', "'", '.x', '[0]'];
