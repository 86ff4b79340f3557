import type { PathTable } from '../study/sweep.ts';
import { plainText } from './plain.ts';
import { numbersOf } from './sweep.ts';
import { aligned, columnGroups, letters, pickColumns, type Rows } from './table.ts';

/** A table of a sweep for reading, as it comes: `before` stands on top, `after` at the end. */
export interface PrintedSweep {
  readonly before: string;
  rows(table: PathTable): string;
  after(): string;
}

/** Columns that tell how closing went: converged, passes, note. */
const CLOSING = 3;
const NUMBER_WIDTH = 11;
const CLOSING_WIDTH = 6;
const GAP = 2;

/**
 * Aligned columns of six digits, as wide for the first path as for the last. Where that is wider than the terminal, letters
 * stand for the heads, with their meaning on top; where that is still too wide, the table comes at the end in parts below each
 * other, each with the settings.
 *
 * @param settings  how many of the columns are settings
 * @param width  of the terminal [characters]; notes stand last and may go beyond it
 */
export function printedSweep(heads: readonly string[], settings: number, width: number): PrintedSweep {
  const names = heads.map(plainText);
  if (widthOf(names) <= width) return asItComes(names, '');
  const count = names.length - CLOSING;
  const short = names.map((name, c) => (c < count ? letters(c) : name));
  const legend = lines(
    aligned(
      names.slice(0, count).map((name, c) => [short[c]!, name]),
      { left: [0, 1] },
    ),
  );
  if (widthOf(short) <= width) return asItComes(short, `${legend}\n`);
  const all: string[][] = [short];
  return {
    before: legend,
    rows(table) {
      all.push(...rowsOf(table));
      return '';
    },
    after: () => inParts(all, settings, width),
  };
}

function asItComes(heads: readonly string[], legend: string): PrintedSweep {
  const note = heads.length - 1;
  const widest = heads.map((head, c) => 'x'.repeat(columnWidth(head, c, heads.length)));
  // A row as wide as anything that may come, to hold the columns.
  const print = (rows: Rows) => lines(aligned([widest, ...rows], { left: [note], gap: GAP }).slice(1));
  return { before: legend + print([heads]), rows: (table) => print(rowsOf(table)), after: () => '' };
}

function inParts(rows: Rows, settings: number, width: number): string {
  const note = rows[0]!.length - 1;
  const groups = columnGroups(
    rows.map((row) => row.slice(0, note)),
    width,
    settings,
    GAP,
  );
  return groups
    .map((group, g) => (g < groups.length - 1 ? group : [...group, note]))
    .map(
      (group) => `\n${lines(aligned(pickColumns(rows, group), { left: [group.indexOf(note)], gap: GAP }))}`,
    )
    .join('');
}

/** Without the note, which needs no width: it stands last. */
function widthOf(heads: readonly string[]): number {
  const widths = heads.slice(0, -1).map((head, c) => columnWidth(head, c, heads.length));
  return widths.reduce((sum, width) => sum + width + GAP, -GAP);
}

function columnWidth(head: string, c: number, count: number): number {
  if (c === count - 1) return 0;
  return Math.max([...head].length, c < count - CLOSING ? NUMBER_WIDTH : CLOSING_WIDTH);
}

function rowsOf(table: PathTable): string[][] {
  return Array.from({ length: table.rows }, (_, row) => [
    ...numbersOf(table, row).map(shortNumber),
    table.converged[row] === 1 ? 'yes' : 'no',
    String(table.passes[row]),
    plainText(table.notes[row]!),
  ]);
}

function shortNumber(value: number): string {
  return Number.isNaN(value) ? '-' : String(Number(value.toPrecision(6)));
}

function lines(list: readonly string[]): string {
  return list.map((line) => `${line}\n`).join('');
}
