import { checkedAtomicWeights, furtherAtomicWeights } from './data/atomic-weights.ts';

/** Atoms per molecule by element symbol. */
export type Elements = Readonly<Record<string, number>>;

/** A chemical formula read, or what is wrong with it and where in the text. */
export type ParsedFormula =
  | { readonly ok: true; readonly elements: Elements }
  | {
      readonly ok: false;
      readonly what: string;
      readonly why: string;
      readonly mend: string;
      readonly offset: number;
      readonly length: number;
    };

/** Read a chemical formula such as C2H5OH, Ca(OH)2 or N2O4 into the atoms of one molecule. */
export function parseFormula(text: string): ParsedFormula {
  const groups: Map<string, number>[] = [new Map()];
  const openings: number[] = [];
  const pattern = /\(|\)(\d*)|([A-Z][a-z]?)(\d*)/y;
  while (pattern.lastIndex < text.length) {
    const offset = pattern.lastIndex;
    const match = pattern.exec(text);
    if (!match) return fault(text, offset, 1, `"${text[offset]}" cannot stand here`);
    const [token, groupCount, symbol, atomCount] = match;
    if (token === '(') {
      openings.push(offset);
      groups.push(new Map());
    } else if (symbol === undefined) {
      const group = groups.length > 1 ? groups.pop()! : null;
      if (!group) return fault(text, offset, 1, 'this bracket was never opened');
      openings.pop();
      for (const [element, n] of group) add(groups.at(-1)!, element, n * count(groupCount));
    } else {
      if (atomicWeight(symbol) === undefined) {
        return fault(text, offset, symbol.length, `"${symbol}" is not an element known here`);
      }
      add(groups.at(-1)!, symbol, count(atomCount));
    }
  }
  if (openings.length > 0) return fault(text, openings[0], 1, 'this bracket is never closed');
  const elements = Object.fromEntries(groups[0]);
  if (Object.values(elements).every((n) => n === 0)) {
    return fault(text, 0, Math.max(text.length, 1), 'the formula contains no atoms');
  }
  return { ok: true, elements };
}

/** Atomic weight [g/mol]; undefined for an element that is not in the table. */
export function atomicWeight(symbol: string): number | undefined {
  return checkedAtomicWeights[symbol] ?? furtherAtomicWeights[symbol];
}

/**
 * Molar mass as the sum of the atomic weights [kg/mol]: a reaction that balances its atoms then balances its
 * mass to the last digit.
 */
export function molarMass(elements: Elements): number {
  let grams = 0;
  for (const [symbol, n] of Object.entries(elements)) {
    const weight = atomicWeight(symbol);
    if (weight === undefined) throw new Error(`no atomic weight of ${symbol}`);
    grams += n * weight;
  }
  return grams / 1000;
}

function add(group: Map<string, number>, element: string, n: number): void {
  group.set(element, (group.get(element) ?? 0) + n);
}

function count(digits: string | undefined): number {
  return digits ? Number(digits) : 1;
}

function fault(text: string, offset: number, length: number, why: string): ParsedFormula {
  return {
    ok: false,
    what: `The formula "${text}" cannot be read.`,
    why,
    mend: 'write element symbols with their counts, brackets allowed, for example C2H5OH or Ca(OH)2',
    offset,
    length,
  };
}
