import type { Result } from '../model/result.ts';
import type { ComponentCells } from './book-components.ts';
import type { StreamCells } from './book-streams.ts';
import { exitTags } from './ledger-rows.ts';
import { plainText } from './plain.ts';
import { feedStreams } from './story.ts';
import { amountFormat, heads, looks, number, text } from './xlsx-looks.ts';
import { type Cell, type Page, put, type Style } from './xlsx-model.ts';
import {
  agreed,
  cellTerm,
  live,
  minus,
  plus,
  type Range,
  share,
  type Term,
  times,
  total,
} from './xlsx-term.ts';

/** Where the numbers of the ledger stand. */
export interface LedgerCells {
  /** kmol/h of one component */
  readonly entering: ReadonlyMap<string, Term>;
  readonly leaving: ReadonlyMap<string, Term>;
  /** kmol/h of all components in their order */
  readonly enteringAll: Range;
  readonly leavingAll: Range;
  /** kg/h over the battery limit */
  readonly massIn: Term;
  readonly massOut: Term;
}

const IN = 2;
const FORMED = 3;
const CONSUMED = 4;
const FIRST_EXIT = 5;

/**
 * The ledger by mole and by mass: what came in and went out is taken from the stream table, what the reactors formed
 * and consumed is theirs; what is left open, the closures and the totals follow by formulas.
 */
export function fillLedger(
  page: Page,
  result: Result,
  components: ComponentCells,
  streams: ReadonlyMap<string, StreamCells>,
): LedgerCells {
  const exits = exitTags(result);
  const feeds = feedStreams(result).map(([tag]) => tag);
  const columns = {
    out: FIRST_EXIT + exits.length,
    open: FIRST_EXIT + exits.length + 1,
    closure: FIRST_EXIT + exits.length + 2,
  };
  const ids = Object.keys(result.ledger);
  put(
    page,
    heads(
      [
        'component',
        'unit',
        'in',
        'formed',
        'consumed',
        ...exits.map((tag) => `out ${plainText(tag)}`),
        'out, all',
        'left open',
        'closure, relative',
      ],
      2,
    ),
  );

  const table = (title: string, unit: string, style: Style, numbers: (id: string) => Numbers): number => {
    section(page, `${title}, ${unit}`, columns.closure);
    const first = page.rows.length;
    for (const id of ids) {
      const { entering, formed, consumed, leaving, closure } = numbers(id);
      const row = put(page, [text(id), text(unit), entering, formed, consumed, ...leaving]);
      finish(page, row, columns, style);
      const open = over(page, row, columns);
      page.rows[row]!.push(
        closure === null ? live(open, looks.closure) : agreed(open, closure, looks.closure),
      );
    }
    const row = put(page, [text('total', looks.sum), text(unit, looks.sum)]);
    for (let column = IN; column <= columns.out; column++) {
      const sum = total({ page, from: [first, column], to: [row - 1, column] });
      page.rows[row]!.push(live(sum, { ...looks.sum, ...style }));
    }
    page.rows[row]!.push(live(openOf(page, row, columns.out), { ...looks.sum, ...looks.closure }));
    page.rows[row]!.push(live(over(page, row, columns), { ...looks.sum, ...looks.closure }));
    return first;
  };

  const entries = Object.values(result.ledger);
  const moleStyle = {
    format: amountFormat(entries.flatMap((e) => [e.in, e.formed, e.consumed, ...Object.values(e.out)])),
  };
  const from = table('moles', 'kmol/h', moleStyle, (id) => {
    const entry = result.ledger[id]!;
    const amount = (tag: string) => streams.get(tag)!.amounts.get(id)!;
    return {
      entering: agreed(plus(feeds.map(amount)), entry.in, moleStyle),
      formed: number(entry.formed, moleStyle),
      consumed: number(entry.consumed, moleStyle),
      leaving: exits.map((tag) => agreed(amount(tag), entry.out[tag] ?? 0, moleStyle)),
      closure: entry.closure,
    };
  });
  const massStyle = {
    format: amountFormat(
      feeds.map((tag) => streams.get(tag)!.mass.value),
      1,
    ),
  };
  const massFrom = table('mass', 'kg/h', massStyle, (id) => {
    const mass = (column: number) =>
      live(times(cellTerm(page, from + ids.indexOf(id), column), components.molarMass.get(id)!), massStyle);
    return {
      entering: mass(IN),
      formed: mass(FORMED),
      consumed: mass(CONSUMED),
      leaving: exits.map((_, k) => mass(FIRST_EXIT + k)),
      closure: null,
    };
  });

  const byId = (column: number) => new Map(ids.map((id, k) => [id, cellTerm(page, from + k, column)]));
  const all = (column: number): Range => ({
    page,
    from: [from, column],
    to: [from + ids.length - 1, column],
  });
  const massTotals = massFrom + ids.length;
  return {
    entering: byId(IN),
    leaving: byId(columns.out),
    enteringAll: all(IN),
    leavingAll: all(columns.out),
    massIn: cellTerm(page, massTotals, IN),
    massOut: cellTerm(page, massTotals, columns.out),
  };
}

interface Numbers {
  readonly entering: Cell;
  readonly formed: Cell;
  readonly consumed: Cell;
  readonly leaving: readonly Cell[];
  /** of the result; null where it has none */
  readonly closure: number | null;
}

interface Columns {
  readonly out: number;
  readonly open: number;
  readonly closure: number;
}

function section(page: Page, title: string, last: number): void {
  put(
    page,
    Array.from({ length: last + 1 }, (_, c) => text(c === 0 ? title : '', looks.section)),
  );
}

/** What went out in all, and what is left open. */
function finish(page: Page, row: number, columns: Columns, style: Style): void {
  const exits = { page, from: [row, FIRST_EXIT], to: [row, columns.out - 1] } as const;
  page.rows[row]!.push(live(total(exits), style));
  page.rows[row]!.push(live(openOf(page, row, columns.out), looks.closure));
}

/** in + formed − consumed − out */
function openOf(page: Page, row: number, out: number): Term {
  const [into, formed, consumed, leaving] = [IN, FORMED, CONSUMED, out].map((c) => cellTerm(page, row, c));
  return minus(minus(plus([into!, formed!]), consumed!), leaving!);
}

/** What is left open as a part of what came in and was formed. */
function over(page: Page, row: number, columns: Columns): Term {
  return share(
    cellTerm(page, row, columns.open),
    plus([cellTerm(page, row, IN), cellTerm(page, row, FORMED)]),
  );
}
