import type { Result } from '../model/result.ts';
import type { BlockCells } from './book-blocks.ts';
import type { ComponentCells } from './book-components.ts';
import type { LedgerCells } from './book-ledger.ts';
import type { StreamCells } from './book-streams.ts';
import { exitTags } from './ledger-rows.ts';
import { feedStreams } from './story.ts';
import { heads, looks, ownFormat, text } from './xlsx-looks.ts';
import { type Page, put } from './xlsx-model.ts';
import {
  agreed,
  cellTerm,
  constant,
  live,
  minus,
  plus,
  product,
  share,
  size,
  type Term,
  total,
  totalSize,
} from './xlsx-term.ts';

/** The relative closures by what they close: mass, energy, atoms of each element. */
export type ClosureCells = ReadonlyMap<string, Term>;

export interface Closed {
  readonly components: ComponentCells;
  readonly streams: ReadonlyMap<string, StreamCells>;
  readonly ledger: LedgerCells;
  readonly blocks: BlockCells;
}

/** The balances over the battery limit, each worked out again from the streams: mass, atoms, energy. */
export function fillClosure(page: Page, result: Result, cells: Closed): ClosureCells {
  const { components, ledger } = cells;
  put(
    page,
    heads(['balance', 'unit', 'in', 'added', 'out', 'left open', 'relative to', 'closure, relative'], 2),
  );
  const closures = new Map<string, Term>();
  const row = (name: string, unit: string, parts: Parts, expected: number) => {
    const at = put(page, [text(name), text(unit)]);
    const write = (term: Term) => {
      page.rows[at]!.push(live(term, ownFormat(term.value)));
      return cellTerm(page, at, page.rows[at]!.length - 1);
    };
    const into = write(parts.into);
    const added = write(parts.added ?? constant(0));
    const out = write(parts.out);
    const open = minus(plus([into, added]), out);
    page.rows[at]!.push(live(open, looks.closure));
    const base = write(parts.base ?? into);
    page.rows[at]!.push(agreed(share(cellTerm(page, at, 5), base), expected, looks.closure));
    closures.set(name, cellTerm(page, at, 7));
  };

  row('mass', 'kg/h', { into: ledger.massIn, out: ledger.massOut }, result.closure.mass);
  for (const [element, closure] of Object.entries(result.closure.atoms)) {
    const atoms = components.atoms.get(element)!;
    const parts = { into: product(ledger.enteringAll, atoms), out: product(ledger.leavingAll, atoms) };
    row(`atoms ${element}`, 'kmol/h', parts, closure);
  }
  row('energy', 'kW', energy(result, cells), result.closure.energy);
  return closures;
}

interface Parts {
  readonly into: Term;
  readonly added?: Term;
  readonly out: Term;
  /** what the closure is relative to; what comes in where left out */
  readonly base?: Term;
}

/** Enthalpies over the battery limit, heat and work; relative to the sum of their sizes, as enthalpies may be below zero. */
function energy(result: Result, { streams, blocks }: Closed): Parts {
  const enthalpies = (tags: readonly string[]) => tags.map((tag) => streams.get(tag)!.enthalpy);
  const into = enthalpies(feedStreams(result).map(([tag]) => tag));
  const out = enthalpies(exitTags(result));
  return {
    into: plus(into),
    added: plus([total(blocks.duties), total(blocks.works)]),
    out: plus(out),
    base: plus([...[...into, ...out].map(size), totalSize(blocks.duties), totalSize(blocks.works)]),
  };
}
