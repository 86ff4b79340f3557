import type { TraceEntry } from '../model/result.ts';
import { closureText } from './numbers.ts';
import { plainText } from './plain.ts';
import { aligned } from './table.ts';

/** The passes of the solver as a table; one line that says so where there was nothing to close. */
export function traceText(history: readonly TraceEntry[]): string {
  if (history.length === 0) return 'no passes to show: nothing had to be closed\n';
  const rows = [
    ['pass', 'residual', 'method', 'worst', 'note'],
    ...history.map((entry) => [
      String(entry.pass),
      closureText(entry.residual),
      plainText(entry.method),
      plainText(entry.worst),
      plainText(entry.note),
    ]),
  ];
  return `${aligned(rows, { left: [2, 3, 4], indent: 2 }).join('\n')}\n`;
}
