import type { Result } from '../../model/result.ts';
import { type Box, LARGE, LINE, MIDDLE, type PlacedText, rectangle, SMALL, THIN_LINE, text } from './svg.ts';
import { textWidth } from './text-width.ts';

/** What only the user can fill in; what is left out stays blank on the sheet, to be written by hand. */
export interface TitleBlock {
  readonly owner?: string;
  readonly number?: string;
  readonly revision?: string;
  /** of issue, year-month-day */
  readonly date?: string;
  readonly creator?: string;
  readonly approver?: string;
}

/** Rows of cells [label, value, share of the width]; the labels are the fields of ISO 7200. */
export function drawTitleBlock(
  box: Box,
  size: string,
  result: Result,
  fields: TitleBlock,
): { svg: string; texts: PlacedText[] } {
  const rows: [label: string, value: string, share: number][][] = [
    [
      ['legal owner', fields.owner ?? '', 0.5],
      ['document type', 'process flow diagram', 0.3],
      ['status', result.convergence.converged ? 'for study' : 'NOT CLOSED', 0.2],
    ],
    [
      ['title', result.title, 0.7],
      ['identification number', fields.number ?? '', 0.3],
    ],
    [
      ['supplementary title: case', result.case ?? 'as in the file', 0.7],
      ['revision', fields.revision ?? '', 0.12],
      ['date of issue', fields.date ?? '', 0.18],
    ],
    [
      ['creator', fields.creator ?? '', 0.29],
      ['approval person', fields.approver ?? '', 0.29],
      ['language', 'en', 0.12],
      ['paper', size, 0.14],
      ['sheet', '1/1', 0.16],
    ],
  ];
  const rowHeight = box.height / rows.length;
  let svg = rectangle(box, LINE);
  const texts: PlacedText[] = [];
  rows.forEach((cells, r) => {
    const y = box.y + r * rowHeight;
    let { x } = box;
    cells.forEach(([label, value, share]) => {
      const width = box.width * share;
      svg += rectangle({ x, y, width, height: rowHeight }, THIN_LINE);
      texts.push(text(label, x + 5, y + 11, { width: width - 10 }));
      const large = label === 'title';
      if (value !== '')
        texts.push(
          text(value, x + 5, y + rowHeight - 9, {
            size: large ? fitting(value, width - 10) : MIDDLE,
            bold: large,
            width: width - 10,
          }),
        );
      x += width;
    });
  });
  return { svg, texts };
}

/** A long title is set smaller before it is clipped. */
function fitting(title: string, width: number): number {
  const sizes = [LARGE, 17, MIDDLE, 12];
  return sizes.find((size) => textWidth(title.slice(0, 400), size, true) <= width) ?? SMALL;
}
