import type { Term } from './xlsx-term.ts';

/** Names of cells, so that a formula of the reader's can say flow_S2 or recycle_ratio. */
export interface Names {
  readonly all: ReadonlyMap<string, string>;
  /** Name a cell; gives the term that calls it by its name. */
  define(wanted: string, term: Term): Term;
}

/** Well inside the 255 characters that a name may have, so that a number at its end still fits. */
const LONGEST = 240;

/**
 * Collect names. Letters, digits and _ only; every name of ours has a word before its first _, so none reads as a cell
 * (S1, R1C1). Spreadsheets do not tell small letters from capitals: a second s1 beside S1 gets a number.
 */
export function createNames(): Names {
  const all = new Map<string, string>();
  const taken = new Set<string>();
  return {
    all,
    define(wanted, term) {
      const plain = wanted.replace(/[^A-Za-z0-9_]/g, '_').slice(0, LONGEST);
      let name = plain;
      for (let k = 2; taken.has(name.toLowerCase()); k++) name = `${plain}_${k}`;
      taken.add(name.toLowerCase());
      all.set(name, term.formula);
      return { formula: name, value: term.value, loose: false };
    },
  };
}
