import type { Result } from '../../model/result.ts';
import { studyTool } from '../sheet.ts';
import { closingLine } from '../text.ts';
import {
  type Box,
  LARGE,
  LINE,
  line,
  MAIN_LINE,
  MIDDLE,
  MM,
  type PlacedText,
  rectangle,
  SMALL,
  THIN_LINE,
  text,
} from './svg.ts';
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

/**
 * Sheets of ISO 216, landscape [mm], and the elongated ones of ISO 5457:1980 (from memory), which suit long trains; by
 * area. What fits none gets a sheet of its own size.
 */
const SHEETS = [
  ['A3', 420, 297],
  ['A4x3', 630, 297],
  ['A2', 594, 420],
  ['A4x4', 841, 297],
  ['A4x5', 1051, 297],
  ['A3x3', 891, 420],
  ['A1', 841, 594],
  ['A3x4', 1189, 420],
  ['A0', 1189, 841],
] as const;
/** Margins after ISO 5457: 20 mm for the file on the left, 10 mm elsewhere. */
const FILING = 20 * MM;
const MARGIN = 10 * MM;
/** Title block after ISO 7200: 180 mm wide, at the lower right. */
const BLOCK_WIDTH = 180 * MM;
const BLOCK_HEIGHT = 44 * MM;
const PADDING = 8 * MM;

export interface Frame {
  readonly size: string;
  readonly width: number;
  readonly height: number;
  /** the drawing is put in the middle of this */
  readonly field: Box;
}

/** The smallest sheet that takes a drawing at its full size. */
export function frameFor(width: number, height: number): Frame {
  const needed = {
    width: Math.max(width, BLOCK_WIDTH) + FILING + MARGIN + 2 * PADDING,
    height: height + BLOCK_HEIGHT + 2 * MARGIN + 2 * PADDING,
  };
  const found = SHEETS.find(([, w, h]) => w * MM >= needed.width && h * MM >= needed.height);
  const [size, w, h] = found ?? ['own size', Math.ceil(needed.width / MM), Math.ceil(needed.height / MM)];
  return {
    size,
    width: w * MM,
    height: h * MM,
    field: {
      x: FILING + PADDING,
      y: MARGIN + PADDING,
      width: w * MM - FILING - MARGIN - 2 * PADDING,
      height: h * MM - 2 * MARGIN - BLOCK_HEIGHT - 2 * PADDING,
    },
  };
}

export interface FrameWords {
  readonly notes: string;
  readonly titleBlock: TitleBlock;
}

/** Frame, title block, key and notes. */
export function drawFrame(
  frame: Frame,
  result: Result,
  words: FrameWords,
): { svg: string; texts: PlacedText[] } {
  const { width, height, size } = frame;
  const border = { x: FILING, y: MARGIN, width: width - FILING - MARGIN, height: height - 2 * MARGIN };
  const block = {
    x: width - MARGIN - BLOCK_WIDTH,
    y: height - MARGIN - BLOCK_HEIGHT,
    width: BLOCK_WIDTH,
    height: BLOCK_HEIGHT,
  };
  const title = titleBlock(block, size, result, words.titleBlock);
  const left = notes({ ...block, x: FILING, width: block.x - FILING }, result, words.notes);
  return {
    svg: rectangle(border, MAIN_LINE) + title.svg + left.svg,
    texts: [...title.texts, ...left.texts],
  };
}

/** Rows of cells [label, value, share of the width]; the labels are the fields of ISO 7200. */
function titleBlock(
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

const ROW = 13;

function notes(box: Box, result: Result, ownNotes: string): { svg: string; texts: PlacedText[] } {
  const x = box.x + 10;
  const width = box.width - 20;
  const texts: PlacedText[] = [];
  let y = box.y + 16;
  const heads = [
    'At every stream its tag, temperature, pressure (absolute) and flow.',
    ...(result.convergence.converged ? [] : [closingLine(result)]),
    ...(result.warnings.length === 0
      ? []
      : [`Warnings (${result.warnings.length}) stand in the sheet of the result.`]),
  ];
  texts.push(text('Key and notes', x, y, { bold: true }));
  y += ROW + 2;
  const svg =
    line(
      [
        { x, y: y - 4 },
        { x: x + 34, y: y - 4 },
      ],
      MAIN_LINE,
    ) +
    line(
      [
        { x, y: y + ROW - 4 },
        { x: x + 34, y: y + ROW - 4 },
      ],
      LINE,
    ) +
    line(
      [
        { x: box.x, y: box.y },
        { x: box.x + box.width, y: box.y },
      ],
      LINE,
    );
  texts.push(
    text('heavy line: goes round in a recycle; double head: on the way back', x + 42, y, {
      width: width - 42,
    }),
  );
  y += ROW;
  texts.push(text('light line: passes once', x + 42, y, { width: width - 42 }));
  y += ROW;
  const rows = Math.floor((box.y + box.height - 6 - y) / ROW);
  const warning = broken(`${studyTool} What was assumed stands in the sheet of the result.`, width, 4);
  const own =
    ownNotes === ''
      ? []
      : broken(`Notes: ${ownNotes}`, width, Math.max(1, rows - warning.length - heads.length));
  for (const row of [...heads, ...own, ...warning]) {
    texts.push(text(row, x, y, { width }));
    y += ROW;
  }
  return { svg, texts };
}

/** Text in lines of a width; the last line that there is room for takes the rest and is clipped when drawn. */
function broken(content: string, width: number, most: number): string[] {
  const lines: string[] = [];
  let current = '';
  const words = content.split(/\s+/);
  for (const [k, word] of words.entries()) {
    const longer = current === '' ? word : `${current} ${word}`;
    if (current !== '' && textWidth(longer.slice(0, 400), SMALL) > width) {
      if (lines.length === most - 1) return [...lines, [current, ...words.slice(k)].join(' ')];
      lines.push(current);
      current = word;
    } else current = longer;
  }
  return [...lines, current];
}
