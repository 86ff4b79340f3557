import type { Result } from '../model/result.ts';
import { type CsvTableName, csvSheet } from './csv.ts';
import { markdownSheet } from './markdown.ts';
import type { SheetOptions } from './sheet.ts';

export interface RenderOptions extends SheetOptions {
  /** which table a CSV file holds */
  readonly table?: CsvTableName;
}

export interface Renderer {
  /** what the format is, for help and messages */
  readonly summary: string;
  render(result: Result, options: RenderOptions): string;
}

/** Formats of a sheet by the extension of its file. A new format is one file and one line here. */
export const renderers: ReadonlyMap<string, Renderer> = new Map([
  [
    '.csv',
    { summary: 'one table for a spreadsheet', render: (result, options) => csvSheet(result, options.table) },
  ],
  ['.md', { summary: 'the whole sheet as Markdown', render: markdownSheet }],
] satisfies [string, Renderer][]);
