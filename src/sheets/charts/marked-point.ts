import { type Box, num, text } from '../drawing/svg.ts';
import { textWidth } from '../drawing/text-width.ts';
import { type Frame, LETTERS } from './frame.ts';
import { INK, PAPER } from './palette.ts';

/** A point that stands out: the operating point, an optimum. */
export interface Marked {
  readonly x: number;
  readonly y: number;
  readonly label: string;
}

const RADIUS = 6.5;

/** A ring with a dot in it, which no series has, and its name on the side where there is room. */
export function markedPoint(marked: Marked, frame: Frame, width: number): string {
  if (!Number.isFinite(marked.x) || !Number.isFinite(marked.y)) return '';
  const { at, name } = placed(marked, frame, width);
  const circle = `<circle cx="${num(at.x)}" cy="${num(at.y)}"`;
  return (
    `<g class="marked">${circle} r="${RADIUS}" fill="none" stroke="${PAPER}" stroke-width="4.4"/>` +
    `${circle} r="${RADIUS}" fill="none" stroke="${INK}" stroke-width="1.8"/>${circle} r="1.8" fill="${INK}"/>` +
    `<g fill="${INK}" stroke="${PAPER}" stroke-width="3" paint-order="stroke" stroke-linejoin="round">${name.svg}</g></g>`
  );
}

/** The room that a marked point and its name take. */
export function markedBox(marked: Marked, frame: Frame, width: number): Box {
  const { at, name } = placed(marked, frame, width);
  const left = Math.min(name.box.x, at.x - RADIUS);
  const top = Math.min(name.box.y, at.y - RADIUS);
  return {
    x: left,
    y: top,
    width: Math.max(name.box.x + name.box.width, at.x + RADIUS) - left,
    height: Math.max(name.box.y + name.box.height, at.y + RADIUS) - top,
  };
}

function placed({ x, y, label }: Marked, { plot, atX, atY }: Frame, width: number) {
  const at = { x: atX(x), y: atY(y) };
  const room = textWidth(label, LETTERS, true);
  const right = at.x + RADIUS + 4;
  const left = at.x - RADIUS - 4;
  const toRight = right + room <= width - 2 || left < room;
  const above = at.y - plot.y > 2 * LETTERS;
  const name = text(label, toRight ? right : left, at.y + (above ? -6 : LETTERS + 4), {
    size: LETTERS,
    bold: true,
    anchor: toRight ? 'start' : 'end',
    width: Math.max(60, toRight ? width - right - 2 : left),
  });
  return { at, name };
}
