import type { Result } from '../model/result.ts';
import { blockDetails, blockRows, closureRows } from './block-rows.ts';
import { caution, dangersOf, madeBy } from './cautions.ts';
import { ledgerRows } from './ledger-rows.ts';
import { closureText, settingText, significant } from './numbers.ts';
import { plainText, wrapped } from './plain.ts';
import { diagnosisRows, noPaint, type SheetOptions } from './sheet.ts';
import { story } from './story.ts';
import { streamRows } from './stream-rows.ts';
import { aligned, columnGroups, pickColumns } from './table.ts';
import { traceText } from './trace.ts';

const WIDTH = 100;

/** The sheet for a terminal or a memo: the loop's story first, then streams, ledger, blocks, closure, the small print. */
export function textSheet(result: Result, options: SheetOptions = {}): string {
  const paint = options.paint ?? noPaint;
  const section = (title: string, lines: readonly string[]): string[] =>
    lines.length === 0 ? [] : ['', paint.head(title), ...lines];
  return [
    ...title(result, options),
    ...section('The loop', storyLines(result, options)),
    ...section('Aims', aimLines(result)),
    ...section('Warnings', warningLines(result).map(paint.alarm)),
    ...section('Streams', streamLines(result)),
    ...section('Ledger, kmol/h', ledgerLines(result)),
    ...section('Blocks', blockLines(result)),
    ...section('Closure, relative', aligned(closureRows(result), { left: [], indent: 2 })),
    ...(options.trace ? section('Passes', traceText(result.convergence.history).trimEnd().split('\n')) : []),
    ...section(
      'Assumptions',
      result.assumptions.flatMap((text) => wrapped(plainText(text), WIDTH, '  - ', '    ')),
    ),
    ...section(
      'Cautions',
      dangersOf(result).flatMap((text) => wrapped(text, WIDTH, '  - ', '    ')),
    ),
    '',
    ...wrapped(`${madeBy(options.version)}. ${caution}`, WIDTH),
    '',
  ].join('\n');
}

/** One line on how the loop closed, or that it did not. */
export function closingLine(result: Result): string {
  const { converged, method, passes, residual, tears } = result.convergence;
  const count = passes === 1 ? '1 pass' : `${passes} passes`;
  if (tears.length === 0 && converged) return `no recycle to close, ${count}`;
  const torn = `${tears.length === 1 ? 'tear' : 'tears'} ${tears.map(plainText).join(', ')}`;
  const how = `${method}, residual ${closureText(residual)}, ${torn}`;
  return converged
    ? `closed in ${count} (${how})`
    : `NOT CLOSED after ${count} (${how}): what follows is the last pass, not an answer`;
}

function title(result: Result, options: SheetOptions): string[] {
  const paint = options.paint ?? noPaint;
  const name = plainText(result.title) || 'Untitled flowsheet';
  const closing = closingLine(result);
  return [
    paint.head(name),
    '='.repeat(Math.min(WIDTH, [...name].length)),
    `case: ${result.case === null ? 'as in the file' : plainText(result.case)}`,
    ...changedLines(result),
    result.convergence.converged ? closing : paint.alarm(closing),
    ...diagnosisRows(options).flatMap(([label, sentence]) =>
      wrapped(plainText(sentence), WIDTH, `  ${`${label}:`.padEnd(6)}`, ' '.repeat(8)),
    ),
  ];
}

/** What was changed on the command line, in the head: a sheet must tell what it is a sheet of. */
function changedLines(result: Result): string[] {
  return result.assumptions
    .filter((text) => text.startsWith('Changed by --set'))
    .flatMap((text) => wrapped(plainText(text.replace('Changed by --set', 'changed')), WIDTH));
}

function storyLines(result: Result, options: SheetOptions): string[] {
  const lines = story(result, options);
  const width = Math.max(...lines.map((line) => [...line.label].length), 0);
  return lines.flatMap(({ label, text }) =>
    wrapped(text, WIDTH - width - 4).map((line, index) =>
      `  ${(index === 0 ? label : '').padEnd(width)}  ${line}`.trimEnd(),
    ),
  );
}

function aimLines(result: Result): string[] {
  return Object.entries(result.aims).flatMap(([name, aim]) => {
    const value = settingText(aim.setting, aim.value, aim.unit);
    const text =
      `${plainText(name)}: ${aim.reached ? 'reached' : 'NOT REACHED'} with ${plainText(aim.setting)} = ${value}; ` +
      `until ${plainText(aim.until)}; got ${significant(aim.achieved)} for ${significant(aim.target)}` +
      (aim.note === null ? '' : `; ${plainText(aim.note)}`);
    return wrapped(text, WIDTH, '  ', '    ');
  });
}

function warningLines(result: Result): string[] {
  return result.warnings.flatMap(({ code, where, message }) =>
    wrapped(`${plainText(where)}: ${plainText(message)} [${plainText(code)}]`, WIDTH, '  ', '    '),
  );
}

function streamLines(result: Result): string[] {
  const rows = streamRows(result);
  const columns = Object.keys(result.streams).length;
  const cells = rows.map((row) => [row.head, ...(row.section ? Array<string>(columns).fill('') : row.cells)]);
  return columnGroups(cells, WIDTH - 2).flatMap((group, index) => {
    const shown = pickColumns(cells, group).filter(
      (row, i) => rows[i]!.section || row.slice(1).join('') !== '',
    );
    return [...(index === 0 ? [] : ['']), ...aligned(shown, { indent: 2 })];
  });
}

function ledgerLines(result: Result): string[] {
  const rows = ledgerRows(result);
  return columnGroups(rows, WIDTH - 2).flatMap((group, index) => [
    ...(index === 0 ? [] : ['']),
    ...aligned(pickColumns(rows, group), { indent: 2 }),
  ]);
}

function blockLines(result: Result): string[] {
  const [head, ...rows] = aligned(blockRows(result), { left: [0, 1], indent: 2 });
  const blocks = Object.values(result.blocks);
  return [
    head ?? '',
    ...rows.flatMap((row, index) => {
      const details = blockDetails(blocks[index].details);
      return [row, ...details.flatMap((line) => wrapped(line, WIDTH, '      ', '        '))];
    }),
  ];
}
