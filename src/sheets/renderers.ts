import type { Flowsheet } from '../model/flowsheet.ts';
import type { Result } from '../model/result.ts';
import { type CsvTableName, csvSheet } from './csv.ts';
import { type DrawingOptions, drawingOf } from './drawing/drawing.ts';
import { markdownSheet } from './markdown.ts';
import type { LivePage } from './page/sheet-page.ts';
import type { SheetOptions } from './sheet.ts';

export interface RenderOptions extends SheetOptions {
  /** the flowsheet that was closed: a workbook lists its settings and sources */
  readonly flowsheet: Flowsheet;
  /** which table a CSV file holds */
  readonly table?: CsvTableName;
  /** what a drawing says beyond the result */
  readonly drawing?: DrawingOptions;
  /** what lets an HTML page close the loop again; left out, the page stands still */
  readonly live?: LivePage;
}

/** The content of a file. */
export type Rendered = string | Uint8Array;

export interface Renderer {
  /** what the format is, for help and messages */
  readonly summary: string;
  /** the file; a promise of it where the format has to be loaded first */
  render(result: Result, options: RenderOptions): Rendered | Promise<Rendered>;
}

/** Formats of a sheet by the extension of its file. A new format is one file and one line here. */
export const renderers: ReadonlyMap<string, Renderer> = new Map([
  [
    '.csv',
    {
      summary: 'one table for a spreadsheet',
      render: (result, options) => csvSheet(result, options.table, options),
    },
  ],
  [
    '.html',
    {
      summary: 'the sheet as one page that still solves',
      render: async (result, options) => {
        const { sheetPage } = await import('./page/sheet-page.ts');
        return sheetPage(result, options);
      },
    },
  ],
  ['.md', { summary: 'the whole sheet as Markdown', render: markdownSheet }],
  [
    '.svg',
    {
      summary: 'the flow diagram',
      render: async (result, { drawing, version }) =>
        (await drawingOf(result, { ...drawing, ...(version === undefined ? {} : { version }) })).svg,
    },
  ],
  [
    '.xlsx',
    {
      summary: 'the study as a workbook with live formulas',
      render: async (result, options) => {
        const { workbook } = await import('./workbook.ts');
        return workbook(result, options.flowsheet, options);
      },
    },
  ],
] satisfies [string, Renderer][]);
