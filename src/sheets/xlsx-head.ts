import type { Result } from '../model/result.ts';
import { madeBy, studyTool } from './cautions.ts';
import { plainText } from './plain.ts';
import { closingLine } from './text.ts';
import { looks, text } from './xlsx-looks.ts';
import { type Cell, type Page, put } from './xlsx-model.ts';

/** Points of a line, and the tallest row that a spreadsheet allows. */
const LINE = 15;
const TALLEST = 409;
/** A wide sheet gets no wider lines than can be read. */
const LONGEST_LINE = 180;

/**
 * A sheet with the lines that each begins with: title, case and closing, version and caution, warnings. They stay in
 * sight together with the heads put next, and are printed on every page.
 */
export function createPage(
  name: string,
  widths: readonly number[],
  result: Result,
  version: string | undefined,
  frozenColumns = 0,
): Page {
  const page: Page = { name, widths, rows: [], heights: new Map(), merged: [], frozenRows: 0, frozenColumns };
  const across = (cell: Cell) => page.merged.push(put(page, [cell]));
  const wrapped = (line: string, style: (typeof looks)[keyof typeof looks]) => {
    across(text(line, style));
    page.heights.set(page.rows.length - 1, heightOf(line, sum(widths)));
  };
  across(text(plainText(result.title) || 'Untitled flowsheet', looks.title));
  page.heights.set(0, 20);
  wrapped(caseLine(result), result.convergence.converged ? looks.note : looks.alarm);
  wrapped(`${madeBy(version)}. ${studyTool}`, looks.caution);
  const open = openLine(result);
  wrapped(open === '' ? 'No warnings.' : open, open === '' ? looks.note : looks.alarm);
  put(page, []);
  page.frozenRows = page.rows.length + 1;
  return page;
}

/** The height in points of a row whose text is broken at a width in characters. */
export function heightOf(line: string, width: number): number {
  return Math.min(TALLEST, LINE * Math.max(1, Math.ceil(line.length / Math.min(width, LONGEST_LINE))));
}

function caseLine(result: Result): string {
  const changed = result.assumptions.filter((line) => line.startsWith('Changed by --set'));
  const name = result.case === null ? 'as in the file' : plainText(result.case);
  return [`Case: ${name}; ${closingLine(result)}.`, ...changed.map(plainText)].join(' ');
}

function openLine({ warnings, aims }: Result): string {
  const missed = Object.entries(aims).flatMap(([name, { reached }]) => (reached ? [] : [plainText(name)]));
  return [
    ...(missed.length === 0 ? [] : [`Aims NOT REACHED: ${missed.join(', ')}.`]),
    ...(warnings.length === 0
      ? []
      : [`${warnings.length} ${warnings.length === 1 ? 'warning' : 'warnings'}: see the sheet Warnings.`]),
  ].join(' ');
}

function sum(values: readonly number[]): number {
  return values.reduce((all, value) => all + value, 0);
}
