import type { Result } from '../model/result.ts';
import { blockDetails } from './block-rows.ts';
import { heightOf } from './xlsx-head.ts';
import { formatFor, heads, looks, number, text, unitHeads } from './xlsx-looks.ts';
import { type Page, put } from './xlsx-model.ts';
import { cellTerm, live, type Range, type Term, total } from './xlsx-term.ts';

export const BLOCK_WIDTHS = [20, 14, 15, 15, 17, 110] as const;

/** Where the numbers of the blocks stand, kW. */
export interface BlockCells {
  readonly duty: ReadonlyMap<string, Term>;
  readonly power: ReadonlyMap<string, Term>;
  readonly duties: Range;
  /** what of the power reaches the process */
  readonly works: Range;
}

/** Heat and power of every block, and what else it says of itself. */
export function fillBlocks(page: Page, result: Result): BlockCells {
  const blocks = Object.entries(result.blocks);
  put(page, [
    ...heads(['block', 'kind', 'heat added, kW', 'power, kW', 'work to process, kW'], 2),
    ...unitHeads(['details']),
  ]);
  const first = page.rows.length;
  const style = {
    format: formatFor(
      blocks.flatMap(([, b]) => [b.duty_kW, b.power_kW]),
      1,
    ),
  };
  for (const [name, { kind, duty_kW, power_kW, details }] of blocks) {
    const { shaft_power_kW: shaft } = details;
    const said = blockDetails(details).join('; ');
    const row = put(page, [
      text(name),
      text(kind),
      number(duty_kW, style),
      number(power_kW, style),
      // What a drive loses never reaches the process.
      number(typeof shaft === 'number' ? shaft : power_kW, style),
      text(said, looks.remark),
    ]);
    page.heights.set(row, heightOf(said, BLOCK_WIDTHS[5]));
  }
  const column = (c: number): Range => ({ page, from: [first, c], to: [first + blocks.length - 1, c] });
  const sums = [2, 3, 4].map((c) => live(total(column(c)), { ...looks.sum, ...style }));
  put(page, [text('total', looks.sum), text('', looks.sum), ...sums]);
  const byName = (c: number) => new Map(blocks.map(([name], k) => [name, cellTerm(page, first + k, c)]));
  return { duty: byName(2), power: byName(3), duties: column(2), works: column(4) };
}
