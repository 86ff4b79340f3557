import { num, text } from '../drawing/svg.ts';
import { textWidth } from '../drawing/text-width.ts';
import { plainText } from '../plain.ts';
import { CHART_WIDTH, checkId, LETTERS, svgFigure } from './frame.ts';
import { hatchPattern } from './hatch.ts';
import { INK, QUIET, seriesLook } from './palette.ts';

export interface Bar {
  readonly label: string;
  /** length, from 0 to `full` */
  readonly value: number;
  /** what stands at its end */
  readonly text: string;
  /** hatched instead of full, for what works the other way */
  readonly hatched?: boolean;
}

export interface BarChartSpec {
  /** unlike any other on the page: small letters, digits and hyphens */
  readonly id: string;
  readonly title: string;
  readonly bars: readonly Bar[];
  /** value of a bar that goes all the way */
  readonly full: number;
  readonly width?: number;
}

const ROW = 22;
const THICK = 12;

/** Level bars with their names before and their numbers behind them, as an SVG picture. */
export function barChart({ id, title, bars, full, width = CHART_WIDTH }: BarChartSpec): string {
  checkId(id);
  const room = (texts: readonly string[], most: number) =>
    Math.min(most, Math.max(0, ...texts.map((each) => textWidth(plainText(each), LETTERS))));
  const names = room(
    bars.map(({ label }) => label),
    0.45 * width,
  );
  const numbers = room(
    bars.map((bar) => bar.text),
    0.3 * width,
  );
  const left = 2 + names + 8;
  const longest = width - left - numbers - 10;
  const rows = bars.map(({ label, value, text: said, hatched = false }, k) => {
    const middle = 4 + (k + 0.5) * ROW;
    const base = middle + 0.35 * LETTERS;
    const length = Math.min(Math.max(value / full, 0), 1) * longest;
    const fill = hatched ? `url(#${id}-hatch)` : seriesLook(0).colour;
    return (
      text(label, left - 8, base, { size: LETTERS, anchor: 'end', width: names }).svg +
      `<rect x="${num(left)}" y="${num(middle - THICK / 2)}" width="${num(length)}" height="${THICK}" fill="${fill}" stroke="${seriesLook(0).colour}"/>` +
      text(said, left + length + 6, base, { size: LETTERS, width: numbers }).svg
    );
  });
  const height = bars.length * ROW + 8;
  const body =
    `<defs>${hatchPattern(id)}</defs><path d="M${num(left)} 2V${num(height - 2)}" stroke="${QUIET}"/>` +
    `<g fill="${INK}">${rows.join('')}</g>`;
  const words = bars.map(({ label, text: said }) => `${label}: ${said}.`).join(' ');
  return svgFigure(id, title, words, { width, height }, body);
}
