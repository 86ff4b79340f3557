import { decimalsFor } from './numbers.ts';
import type { Cell, Style } from './xlsx-model.ts';

/** The looks of a workbook in one place. */
export const looks = {
  title: { bold: true, size: 14 },
  note: { wrap: true },
  caution: { italic: true, wrap: true },
  alarm: { bold: true, colour: 'C00000', wrap: true },
  head: { bold: true, fill: 'D9E2EC', line: 'below', wrap: true },
  numberHead: { bold: true, fill: 'D9E2EC', line: 'below', side: 'right', wrap: true },
  section: { bold: true, fill: 'F0F3F6' },
  prose: { wrap: true },
  remark: { wrap: true, indent: true },
  right: { side: 'right' },
  rightProse: { side: 'right', wrap: true },
  sum: { bold: true, line: 'above' },
  closure: { format: '0.0E+00' },
  share: { format: '0.00%' },
  unit: { indent: true },
  unitHead: { bold: true, fill: 'D9E2EC', line: 'below', indent: true },
} as const satisfies Record<string, Style>;

export function text(content: string, style: Style = {}): Cell {
  return { text: content, style };
}

/** A number, or an empty cell where there is none. */
export function number(value: number | null, style: Style = {}): Cell {
  return value === null || !Number.isFinite(value) ? null : { value, style };
}

/** Heads over the text that follows a number. */
export function unitHeads(words: readonly string[]): Cell[] {
  return words.map((word) => text(word, looks.unitHead));
}

/** A line of heads: the first `left` of them over text, the others over numbers. */
export function heads(words: readonly string[], left: number): Cell[] {
  return words.map((word, k) => text(word, k < left ? looks.head : looks.numberHead));
}

/** A format with the decimals that suit the largest of some values; signs and zeros as they are. */
export function formatFor(values: readonly number[], least = 0, most = 4): string {
  return `#,##0${decimalPart(decimalsFor(values, 6, least, most))}`;
}

/** The same for amounts, which are never negative: what would round to zero is shown with an exponent. */
export function amountFormat(values: readonly number[], least = 2, most = 4): string {
  const decimals = decimalsFor(values, 6, least, most);
  return `[=0]0;[<${0.5 * 10 ** -decimals}]0.0E+00;#,##0${decimalPart(decimals)}`;
}

/** The format of a number that stands alone: six digits, an exponent where it is small. */
export function ownFormat(value: number): Style {
  const small = value !== 0 && Math.abs(value) < 1e-3;
  return { format: small ? '0.000E+00' : formatFor([value], 0, 5) };
}

function decimalPart(decimals: number): string {
  return decimals === 0 ? '' : `.${'0'.repeat(decimals)}`;
}
