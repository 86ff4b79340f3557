import { type Box, escaped, FACES, num, text } from '../drawing/svg.ts';
import { textWidth } from '../drawing/text-width.ts';
import { plainText } from '../plain.ts';
import { type AxisScale, axisTitle, type ChartAxis, type Tick } from './axis-scale.ts';
import { INK, QUIET, RULE } from './palette.ts';

/** Size of the letters; a chart is drawn small, so that they can be read where it is as wide as a telephone. */
export const LETTERS = 12;
export const CHART_WIDTH = 460;
export const CHART_HEIGHT = 300;

/** The rectangle that the values lie in, with its scales. */
export interface Frame {
  readonly plot: Box;
  readonly x: AxisScale;
  readonly y: AxisScale;
  /** places of values in the drawing */
  atX(value: number): number;
  atY(value: number): number;
}

export interface FrameRoom {
  readonly width: number;
  readonly height: number;
  /** room kept to the right of the plot and below the title of the x axis */
  readonly right: number;
  readonly below?: number;
}

const ABOVE = 26;
const UNDER = 40;
const GAP = 6;
const TICK = 4;

/** Lay out the plot: the ticks of the y axis decide how far it stands from the left. */
export function createFrame(x: AxisScale, y: AxisScale, room: FrameRoom): Frame {
  const widest = Math.max(0, ...y.ticks.map((tick) => textWidth(tick.text, LETTERS)));
  const left = Math.ceil(widest + GAP + TICK + 2);
  const plot = {
    x: left,
    y: ABOVE,
    width: Math.max(40, room.width - left - room.right),
    height: Math.max(40, room.height - ABOVE - UNDER - (room.below ?? 0)),
  };
  return {
    plot,
    x,
    y,
    atX: (value) => plot.x + plot.width * x.share(value),
    atY: (value) => plot.y + plot.height * (1 - y.share(value)),
  };
}

/** About how many ticks there is room for along the x axis. */
export function ticksAcross(width: number): number {
  return Math.max(2, Math.floor(width / 75));
}

/** Grid lines, which lie under everything else. */
export function gridLines({ plot, x, y, atX, atY }: Frame): string {
  const lines = [
    ...x.ticks.map(({ value }) => `M${num(atX(value))} ${num(plot.y)}v${num(plot.height)}`),
    ...y.ticks.map(({ value }) => `M${num(plot.x)} ${num(atY(value))}h${num(plot.width)}`),
  ];
  return `<path d="${lines.join('')}" stroke="${RULE}" fill="none"/>`;
}

/** Axes with ticks, numbers and titles; the title of the y axis stands level above it, where it can be read. */
export function axes(frame: Frame, xAxis: ChartAxis, yAxis: ChartAxis, width: number): string {
  const { plot, x, y, atX, atY } = frame;
  const bottom = plot.y + plot.height;
  const parts = [
    `<path d="M${num(plot.x)} ${num(plot.y)}V${num(bottom)}H${num(plot.x + plot.width)}" stroke="${QUIET}" fill="none"/>`,
  ];
  let free = Number.NEGATIVE_INFINITY;
  for (const tick of x.ticks) {
    const at = atX(tick.value);
    parts.push(`<path d="M${num(at)} ${num(bottom)}v${TICK}" stroke="${QUIET}"/>`);
    const half = textWidth(tick.text, LETTERS) / 2;
    // A number that would touch the one before it, or leave the drawing, is left out; its tick stays.
    if (at - half < free || at + half > width || at - half < 0) continue;
    free = at + half + GAP;
    parts.push(tickNumber(tick, at, bottom + TICK + LETTERS, 'middle'));
  }
  for (const tick of y.ticks) {
    const at = atY(tick.value);
    parts.push(`<path d="M${num(plot.x - TICK)} ${num(at)}h${TICK}" stroke="${QUIET}"/>`);
    parts.push(tickNumber(tick, plot.x - TICK - 3, at + 0.35 * LETTERS, 'end'));
  }
  const titles = [
    text(axisTitle(yAxis), 2, LETTERS + 2, { size: LETTERS, width: width - 4 }).svg,
    xTitle(axisTitle(xAxis), plot, bottom + TICK + 2 * LETTERS + 5, width),
  ];
  return `<g fill="${QUIET}" class="numbers">${parts.join('')}</g><g fill="${INK}">${titles.join('')}</g>`;
}

/** Ends flush with the plot where it is long, so that it does not run out of the drawing to the right. */
function xTitle(title: string, plot: Box, y: number, width: number): string {
  const room = width - 4;
  const wanted = Math.min(textWidth(title, LETTERS), room);
  const middle = plot.x + plot.width / 2;
  const at = Math.max(2, Math.min(middle - wanted / 2, width - 2 - wanted));
  return text(title, at, y, { size: LETTERS, width: room }).svg;
}

/** A number of an axis, with what a page needs to write it as its reader does. */
function tickNumber({ value, text: shown, decimals }: Tick, x: number, y: number, anchor: string): string {
  return `<text x="${num(x)}" y="${num(y)}" text-anchor="${anchor}" data-number="${value}" data-decimals="${decimals}">${escaped(shown)}</text>`;
}

/** The whole picture: what it is called and what it says come first, for those who cannot see it. */
export function svgFigure(
  id: string,
  title: string,
  description: string,
  { width, height, data = '' }: { readonly width: number; readonly height: number; readonly data?: string },
  body: string,
): string {
  return (
    `<svg xmlns="http://www.w3.org/2000/svg" class="chart"${data} role="img" aria-labelledby="${id}-title ${id}-desc" viewBox="0 0 ${num(width)} ${num(height)}" width="${num(width)}" height="${num(height)}" font-family="${FACES}" font-size="${LETTERS}">` +
    `<title id="${id}-title">${escaped(plainText(title))}</title><desc id="${id}-desc">${escaped(plainText(description))}</desc>${body}</svg>`
  );
}

/** What a script needs to find the place of a value and to say it: ends, name and unit of each axis. */
export function axisData({ plot, x, y }: Frame, xAxis: ChartAxis, yAxis: ChartAxis): string {
  const ends = ({ low, high, log }: AxisScale, from: number, to: number) =>
    `${num(from)} ${num(to)} ${low} ${high} ${log ? 'log' : 'linear'}`;
  const said = (name: string, { title, unit }: ChartAxis) =>
    ` data-${name}-name="${escaped(plainText(title))}" data-${name}-unit="${escaped(plainText(unit))}"`;
  return (
    ` data-x-axis="${ends(x, plot.x, plot.x + plot.width)}" data-y-axis="${ends(y, plot.y + plot.height, plot.y)}"` +
    `${said('x', xAxis)}${said('y', yAxis)}`
  );
}

/** @throws Error where an id is none that XML and CSS take: ids are ours, never the user's text */
export function checkId(id: string): void {
  if (!/^[a-z][a-z0-9-]*$/.test(id)) throw new Error(`no id of a chart: ${id}`);
}
