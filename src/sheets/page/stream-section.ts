import { type StreamRow, streamRows } from '../stream-rows.ts';
import { type Html, html, joined, nameText, userText } from './html.ts';
import { type Cell, headCell, numberCell, table, textCell } from './tables.ts';
import type { PageView } from './view.ts';

/** Streams side by side in one table: as many as a sheet of A4 takes upright. */
const MOST = 7;
/** Rows whose cells are words. */
const WORDS = new Set(['from', '  port', 'to', 'phase']);

/** The stream table, in tables of about equal width. */
export function streamsSection({ result, words }: PageView): Html {
  const [tags, ...rows] = streamRows(result);
  const count = tags!.cells.length;
  const tables = Math.max(1, Math.ceil(count / MOST));
  const width = Math.ceil(count / tables);
  return joined(
    Array.from({ length: tables }, (_, t) => {
      const shown = tags!.cells.slice(t * width, (t + 1) * width);
      const first = shown[0] ?? '';
      const last = shown.at(-1) ?? '';
      return table({
        caption: tables === 1 ? 'Streams' : `Streams ${first} to ${last}`,
        heads: [{ text: 'stream' }, ...shown.map((tag) => ({ text: userText(tag), right: true }))],
        rows: rows.map((row) => line(row, t * width, shown.length, words)),
        mark: 'streams',
      });
    }),
  );
}

function line(
  { head, cells, section }: StreamRow,
  from: number,
  count: number,
  words: (text: string) => string,
): Cell[] {
  if (section) return [{ content: head, kind: 'head', span: count + 1, mark: 'group' }];
  const mark = head.startsWith('  ') ? 'inner' : '';
  return [
    { ...headCell(head === '  port' ? html`port` : head.trim()), mark },
    ...cells
      .slice(from, from + count)
      .map((cell) =>
        WORDS.has(head) ? { ...textCell(nameText(cell)), mark: 'r word' } : numberCell(cell, words),
      ),
  ];
}
