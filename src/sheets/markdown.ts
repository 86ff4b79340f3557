import type { Result } from '../model/result.ts';
import { blockDetails, blockRows, closureRows } from './block-rows.ts';
import { caution, dangersOf, madeBy } from './cautions.ts';
import { ledgerRows } from './ledger-rows.ts';
import { settingText, significant } from './numbers.ts';
import { plainText } from './plain.ts';
import { diagnosisRows, type SheetOptions } from './sheet.ts';
import { story } from './story.ts';
import { streamRows } from './stream-rows.ts';
import { columnGroups, pickColumns, type Rows } from './table.ts';
import { closingLine } from './text.ts';

/** The columns of a stream table that a page takes side by side. */
const PAGE_WIDTH = 110;

/** The sheet as Markdown with pipe tables, in the order of the text sheet. */
export function markdownSheet(result: Result, options: SheetOptions = {}): string {
  return [
    `# ${escaped(result.title) || 'Untitled flowsheet'}`,
    `Case: ${result.case === null ? 'as in the file' : escaped(result.case)}. ${sentence(closingLine(result))}`,
    diagnosisRows(options)
      .map(([label, sentence]) => `- **${label}:** ${escaped(sentence)}`)
      .join('\n'),
    section('The loop', table([['figure', 'value'], ...storyRows(result, options)], 2)),
    section('Aims', aims(result)),
    section('Warnings', list(result.warnings.map((w) => `${w.where}: ${w.message} [${w.code}]`))),
    section('Streams', streamTables(result)),
    section('Ledger', table(ledger(result))),
    section('Blocks', blocks(result)),
    section('Closure, relative', table(closureRows(result), 0)),
    section('Assumptions', list(result.assumptions)),
    section('Cautions', list(dangersOf(result))),
    `---\n\n${madeBy(options.version)}. ${caution}`,
  ]
    .filter((part) => part !== '')
    .join('\n\n')
    .concat('\n');
}

function section(title: string, body: string): string {
  return body === '' ? '' : `## ${title}\n\n${body}`;
}

function storyRows(result: Result, options: SheetOptions): string[][] {
  const rows: string[][] = [];
  for (const { label, text: held } of story(result, options)) {
    const text = held.replaceAll('\u00a0', ' ');
    const last = rows.at(-1);
    if (label === '' && last !== undefined) last[1] = `${last[1]}; ${text}`;
    else rows.push([label.trim(), text]);
  }
  return rows;
}

function aims(result: Result): string {
  const rows = Object.entries(result.aims).map(([name, aim]) => [
    plainText(name),
    aim.reached ? 'reached' : 'not reached',
    aim.setting,
    settingText(aim.setting, aim.value, aim.unit),
    significant(aim.target),
    significant(aim.achieved),
    aim.note ?? '',
  ]);
  if (rows.length === 0) return '';
  return table([['aim', '', 'setting', 'value', 'wanted', 'got', 'note'], ...rows], 3);
}

function streamTables(result: Result): string {
  // A table that is pasted elsewhere has no groups: every row says its unit itself.
  const cells = streamRows(result)
    .filter((row) => !row.section)
    .map((row) => [row.alone ?? row.head, ...row.cells]);
  return columnGroups(cells, PAGE_WIDTH)
    .map((group) => table(pickColumns(cells, group)))
    .join('\n\n');
}

/** The ledger with the unit in every head. */
function ledger(result: Result): string[][] {
  const [head, ...rows] = ledgerRows(result);
  const last = head!.length - 1;
  const unit = (k: number) => (k === 0 ? '' : k === last ? ', relative' : ', kmol/h');
  return [head!.map((word, k) => word + unit(k)), ...rows];
}

function blocks(result: Result): string {
  const [head, ...rows] = blockRows(result);
  const details = Object.values(result.blocks).map((block) => blockDetails(block.details).join('; '));
  return table([[...head!, 'details'], ...rows.map((row, index) => [...row, details[index] ?? ''])], 2, 4);
}

/** A pipe table; the first `left` columns and column `alsoLeft` stand to the left, the others to the right. */
export function table(rows: Rows, left = 1, alsoLeft = -1): string {
  const [head, ...body] = rows.map((row) => `| ${row.map(escaped).join(' | ')} |`);
  const marks = rows[0]!.map((_, column) => (column < left || column === alsoLeft ? '---' : '---:'));
  return [head, `| ${marks.join(' | ')} |`, ...body].join('\n');
}

export function list(items: readonly string[]): string {
  return items.map((item) => `- ${escaped(item)}`).join('\n');
}

/** Text of the user's that Markdown must not read as markup. */
export function escaped(text: string): string {
  return plainText(text)
    .replace(/[\\`*_[\]|#~]/g, '\\$&')
    .replace(/&/g, '&amp;')
    .replace(/</g, '&lt;')
    .replace(/>/g, '&gt;');
}

function sentence(text: string): string {
  return `${text.charAt(0).toUpperCase()}${escaped(text.slice(1))}.`;
}
