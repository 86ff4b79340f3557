import { plainText } from '../plain.ts';
import { clipped, isMeasured, textWidth } from './text-width.ts';

export interface Point {
  readonly x: number;
  readonly y: number;
}

export interface Box {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}

/** Four units of a drawing are one millimetre on paper. */
export const MM = 4;
/** Widths of lines after ISO 10628-1: main stream, other streams and symbols, thin lines stand as 4 : 2 : 1. */
export const MAIN_LINE = 2.8;
export const LINE = 1.4;
export const THIN_LINE = 0.7;
/** Sizes of letters whose capitals are 1.8, 2.5 and 3.5 mm high (ISO 3098). */
export const SMALL = 10;
export const MIDDLE = 14;
export const LARGE = 20;

export const FACES = `Arial, 'Liberation Sans', Helvetica, 'Nimbus Sans', sans-serif`;

/** Text and the room it takes. */
export interface PlacedText {
  readonly svg: string;
  readonly text: string;
  readonly box: Box;
}

export interface TextStyle {
  readonly size?: number;
  readonly bold?: boolean;
  readonly anchor?: 'start' | 'middle' | 'end';
  /** more than this is clipped; the whole stands in a tooltip */
  readonly width?: number;
}

/** A line of text with its base line at y. Nothing in it can be read as markup. */
export function text(content: string, x: number, y: number, style: TextStyle = {}): PlacedText {
  const { size = SMALL, bold = false, anchor = 'start', width = Number.POSITIVE_INFINITY } = style;
  const whole = plainText(content);
  const shown = clipped(whole, width, size, bold);
  const taken = textWidth(shown, size, bold);
  const attributes = [
    `x="${num(x)}" y="${num(y)}"`,
    ...(size === SMALL ? [] : [`font-size="${size}"`]),
    ...(bold ? ['font-weight="bold"'] : []),
    ...(anchor === 'start' ? [] : [`text-anchor="${anchor}"`]),
    // Letters whose width is not known here are held to the room that was kept for them.
    ...(isMeasured(shown) ? [] : [`textLength="${num(taken)}" lengthAdjust="spacingAndGlyphs"`]),
  ];
  const title = shown === whole ? '' : `<title>${escaped(whole)}</title>`;
  const left = anchor === 'start' ? x : anchor === 'end' ? x - taken : x - taken / 2;
  return {
    svg: `<text ${attributes.join(' ')}>${title}${escaped(shown)}</text>`,
    text: shown,
    box: { x: left, y: y - 0.78 * size, width: taken, height: size },
  };
}

/** Text as XML takes it; what XML forbids (half a surrogate pair, code points that are none) becomes a mark. */
export function escaped(content: string): string {
  return content
    .replace(
      /[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]|[\ufffe\uffff]/g,
      '\ufffd',
    )
    .replace(/&/g, '&amp;')
    .replace(/</g, '&lt;')
    .replace(/>/g, '&gt;')
    .replace(/"/g, '&quot;');
}

/** A coordinate to a hundredth: the same digits on every machine. */
export function num(value: number): string {
  const rounded = Math.round(value * 100) / 100;
  return String(rounded === 0 ? 0 : rounded);
}

export function line(points: readonly Point[], width: number): string {
  const path = points.map(({ x, y }, k) => `${k === 0 ? 'M' : 'L'}${num(x)} ${num(y)}`).join('');
  return `<path d="${path}" stroke-width="${width}"/>`;
}

export function rectangle({ x, y, width, height }: Box, lineWidth: number, attributes = ''): string {
  const more = attributes === '' ? '' : ` ${attributes}`;
  return `<rect x="${num(x)}" y="${num(y)}" width="${num(width)}" height="${num(height)}" stroke-width="${lineWidth}"${more}/>`;
}
