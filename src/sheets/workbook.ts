import type { Flowsheet } from '../model/flowsheet.ts';
import type { Result } from '../model/result.ts';
import { BLOCK_WIDTHS, fillBlocks } from './book-blocks.ts';
import { fillClosure } from './book-closure.ts';
import { elementsOf, fillComponents } from './book-components.ts';
import { fillFigures } from './book-figures.ts';
import { fillLedger } from './book-ledger.ts';
import { fillAssumptions, fillSources, fillTrace, fillWarnings } from './book-notes.ts';
import { fillSettings } from './book-settings.ts';
import { fillStreams } from './book-streams.ts';
import { exitTags } from './ledger-rows.ts';
import { workbookBytes } from './xlsx-file.ts';
import { createPage } from './xlsx-head.ts';
import type { Book } from './xlsx-model.ts';
import { createNames } from './xlsx-names.ts';

export interface WorkbookOptions {
  /** units of the user's own figures by name */
  readonly figureUnits?: Readonly<Record<string, string>>;
  /** version of Looptally, for the head of every sheet */
  readonly version?: string;
}

/** The study in one workbook (.xlsx), its totals, closures and figures as formulas. The same result gives the same bytes. */
export function workbook(result: Result, flowsheet: Flowsheet, options: WorkbookOptions = {}): Uint8Array {
  return workbookBytes(bookOf(result, flowsheet, options));
}

/** The cells of the workbook, sheet by sheet. */
export function bookOf(result: Result, flowsheet: Flowsheet, options: WorkbookOptions = {}): Book {
  const page = (name: string, widths: readonly number[], frozenColumns = 0) =>
    createPage(name, widths, result, options.version, frozenColumns);
  const numbers = (count: number, width = 13) => Array<number>(count).fill(width);
  const pages = {
    figures: page('Figures', [30, 28, 16, 12, 14]),
    streams: page('Streams', [34, 9, ...numbers(Object.keys(result.streams).length, 14)], 2),
    ledger: page('Ledger', [20, 9, ...numbers(exitTags(result).length + 6)], 2),
    closure: page('Closure', [14, 9, ...numbers(6, 16)]),
    blocks: page('Blocks', BLOCK_WIDTHS, 1),
    settings: page('Settings', [44, 44, 14, 60]),
    assumptions: page('Assumptions', [150]),
    sources: page('Sources', [16, 24, 110]),
    components: page('Components', [13, 24, 12, 13, 14, ...numbers(elementsOf(flowsheet).length, 9)], 1),
    trace: page('Trace', [8, 12, 14, 20, 80]),
    warnings: page('Warnings', [20, 24, 110]),
  };
  const names = createNames();
  const components = fillComponents(pages.components, flowsheet);
  const streams = fillStreams(pages.streams, result, components, names);
  const ledger = fillLedger(pages.ledger, result, components, streams);
  const blocks = fillBlocks(pages.blocks, result);
  const cells = { components, streams, ledger, blocks };
  const closures = fillClosure(pages.closure, result, cells);
  const { figureUnits = {} } = options;
  fillFigures({ ...cells, page: pages.figures, result, flowsheet, closures, names, figureUnits });
  fillSettings(pages.settings, result, flowsheet);
  fillAssumptions(pages.assumptions, result);
  fillSources(pages.sources, flowsheet);
  fillTrace(pages.trace, result);
  fillWarnings(pages.warnings, result);
  return { pages: Object.values(pages), names: names.all };
}
