import type { TraceEntry } from '../model/result.ts';
import { closureText } from './numbers.ts';
import { plainText, wrapped } from './plain.ts';
import { aligned } from './table.ts';

/**
 * What the passes were that are counted but not listed, in sentences: those that found the start values, and those that a
 * listed one took with it. Empty where all are listed.
 */
export function unlistedPasses(history: readonly TraceEntry[]): string {
  const before = (history[0]?.pass ?? 1) - 1;
  const first =
    before === 1 ? 'Pass 1 went' : before === 2 ? 'Passes 1 and 2 went' : `Passes 1 to ${before} went`;
  // A second recycle counts from one again, so that its numbers fall before they rise.
  const gaps = history.some(({ pass }, k) => k > 0 && pass > history[k - 1]!.pass + 1);
  return [
    ...(before > 0 ? [`${first} through from the feeds, to find where to start.`] : []),
    ...(gaps
      ? ['Where numbers are left out, the pass listed next needed them: for derivatives, tries or a start.']
      : []),
  ].join(' ');
}

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
  const unlisted = unlistedPasses(history);
  const lead = unlisted === '' ? [] : wrapped(unlisted, 100, '  ', '  ');
  return `${[...lead, ...aligned(rows, { left: [2, 3, 4], indent: 2 })].join('\n')}\n`;
}
