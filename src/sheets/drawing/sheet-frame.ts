import type { Result } from '../../model/result.ts';
import { drawNotes } from './key-and-notes.ts';
import { type Box, MAIN_LINE, MM, type PlacedText, rectangle } from './svg.ts';
import { drawTitleBlock, type TitleBlock } from './title-block.ts';

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

/** No frame at all: a little room around a drawing at its full size. */
export function bareFrame(width: number, height: number): Frame {
  const room = 2 * MM;
  return {
    size: 'bare',
    width: Math.ceil(width + 2 * room),
    height: Math.ceil(height + 2 * room),
    field: { x: room, y: room, width, height },
  };
}

export interface FrameWords {
  readonly notes: string;
  readonly titleBlock: TitleBlock;
  readonly version?: string | undefined;
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
  const title = drawTitleBlock(block, size, result, words.titleBlock);
  const left = drawNotes(
    { ...block, x: FILING, width: block.x - FILING },
    result,
    words.notes,
    words.version,
  );
  return {
    svg: rectangle(border, MAIN_LINE) + title.svg + left.svg,
    texts: [...title.texts, ...left.texts],
  };
}
