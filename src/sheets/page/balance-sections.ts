import { blockDetails, blockRows, closureRows } from '../block-rows.ts';
import { ledgerRows } from '../ledger-rows.ts';
import { type Html, html, userText } from './html.ts';
import { headCell, numberCell, table, textCell } from './tables.ts';
import type { PageView } from './view.ts';

/** What came in, was formed and consumed, and went out, by component. */
export function ledgerSection({ result, words }: PageView): Html {
  const [heads, ...rows] = ledgerRows(result);
  return html`${table({
    caption: 'Ledger over the battery limit, kmol/h; closure relative to what enters or is formed',
    showCaption: true,
    heads: heads!.map((text, k) => ({ text: userText(text), right: k > 0 })),
    rows: rows.map(([id, ...cells]) => [headCell(id!), ...cells.map((cell) => numberCell(cell, words))]),
  })}<h3>Closure</h3>${closure({ result, words })}`;
}

function closure({ result, words }: Pick<PageView, 'result' | 'words'>): Html {
  const [heads, values] = closureRows(result);
  return table({
    caption: 'Balances over the battery limit, what is left open relative to what enters',
    showCaption: true,
    heads: heads!.map((text) => ({ text, right: true })),
    rows: [values!.map((value) => numberCell(value, words))],
  });
}

/** What the blocks say of themselves. */
export function blocksSection({ result, words }: PageView): Html {
  const [heads, ...rows] = blockRows(result);
  const details = Object.values(result.blocks).map((block) => blockDetails(block.details));
  return table({
    caption: 'Blocks',
    heads: [...heads!, 'details'].map((text, k) => ({ text, right: k === 2 || k === 3 })),
    rows: rows.map(([name, kind, duty, power], k) => [
      headCell(name!),
      textCell(kind!),
      numberCell(duty!, words),
      numberCell(power!, words),
      {
        content: html`${details[k]!.map((line) => html`<div>${words(line)}</div>`)}`,
        kind: 'text' as const,
        mark: 'prose',
      },
    ]),
    mark: 'blocks',
  });
}
