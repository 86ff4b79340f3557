import type { Diagnostic } from '../diagnostics/diagnostic.ts';
import type { Place } from '../model/place.ts';
import { readable } from './wording.ts';
import type { YamlNode } from './yaml-tree.ts';

/** The four parts of a message without its place. */
export interface Fault {
  readonly code: string;
  readonly what: string;
  readonly why: string;
  readonly mend: string;
}

/** What every part of the reader works on: the tree, and the list its findings go into. */
export interface Reading {
  readonly root: YamlNode;
  readonly findings: Findings;
}

/** Collects the findings of one file. */
export interface Findings {
  error(where: Place, fault: Fault, also?: Place): void;
  /** something worth a word that does not stand in the way */
  warning(where: Place, fault: Fault): void;
  readonly list: readonly Diagnostic[];
}

/** Thrown where a file has so many faults that checking the rest of it would only cost time. */
export class TooManyFaults extends Error {}

/** A file with more faults than this is not read to its end. */
const ENOUGH = 200;

export function createFindings(): Findings {
  const list: Diagnostic[] = [];
  const said = new Set<string>();
  const isNew = ({ line, column }: Place, what: string): boolean => {
    const before = said.size;
    return said.add(`${line}:${column} ${what}`).size > before;
  };
  return {
    list,
    error(where, fault, also) {
      const { code } = fault;
      const [what, why, mend] = [fault.what, fault.why, fault.mend].map(readable);
      const second = also === undefined ? {} : { also };
      if (isNew(where, what)) list.push({ code, severity: 'error', where, what, why, mend, ...second });
      if (list.length >= ENOUGH) throw new TooManyFaults();
    },
    warning(where, { code, what, why, mend }) {
      isNew(where, what);
      list.push({ code, severity: 'warning', where, what, why, mend });
    },
  };
}

/** More than this is no help to anybody. */
const MOST = 100;

/** In the order of the file, the file itself before changes to it; cut short when there are very many. */
export function inOrder(diagnostics: readonly Diagnostic[], file: string): readonly Diagnostic[] {
  const sorted = diagnostics.toSorted(
    (a, b) =>
      Number(a.where.file !== file) - Number(b.where.file !== file) ||
      a.where.line - b.where.line ||
      a.where.column - b.where.column,
  );
  if (sorted.length <= MOST) return sorted;
  const rest: Diagnostic = {
    code: 'too-many',
    severity: 'error',
    where: sorted[MOST].where,
    what: `${sorted.length >= ENOUGH ? 'at least ' : ''}${sorted.length - MOST} more errors are not shown.`,
    why: `only the first ${MOST} are listed`,
    mend: 'mend those first, then check again',
  };
  return [...sorted.slice(0, MOST), rest];
}
