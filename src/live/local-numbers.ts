import { type NumberText, pointText } from '../sheets/charts/number-text.ts';
import type { NumberWords } from '../sheets/page/tables.ts';

/** How numbers are written where the reader lives. */
export interface LocalNumbers {
  readonly decimal: string;
  /** between thousands */
  readonly group: string;
  /** every number in a text */
  readonly words: NumberWords;
  readonly axisText: NumberText;
}

/** Fewer digits before the decimal mark stand without marks between thousands: a flow of 5330 is no year, but nearly. */
const LONG = 5;

/** @param locale  e.g. de-DE; one that the browser does not know gives the format of files */
export function localNumbers(locale: string): LocalNumbers {
  const { decimal, group } = marksOf(locale);
  const words: NumberWords = (text) =>
    text.replace(
      NUMBER,
      (_, sign: string, whole: string, part: string | undefined, power: string | undefined) => {
        const grouped = whole.length < LONG ? whole : whole.replace(/\B(?=(\d{3})+$)/g, group);
        return `${sign}${grouped}${part === undefined ? '' : decimal + part}${power ?? ''}`;
      },
    );
  return { decimal, group, words, axisText: (value, decimals) => words(pointText(value, decimals)) };
}

/** A number that is no part of a name or of another number (S1, H2, 10.1.2). */
const NUMBER = /(?<![\w.,])(-?)(\d+)(?:\.(\d+))?(e[+-]?\d+)?(?![\w]|\.\d)/g;

function marksOf(locale: string): { decimal: string; group: string } {
  try {
    const parts = new Intl.NumberFormat(locale, { numberingSystem: 'latn' }).formatToParts(1234567.8);
    const of = (type: string, otherwise: string) =>
      parts.find((part) => part.type === type)?.value ?? otherwise;
    return { decimal: of('decimal', '.'), group: of('group', ',') };
  } catch {
    return { decimal: '.', group: ',' };
  }
}

/**
 * What was typed as the file writes it: `-2,5 %` becomes `-2.5 %`, a bare number takes the unit given. A decimal comma
 * and a decimal point are both taken, whatever the locale. What is no number is handed back as it is, to be judged by the
 * reader of files.
 *
 * @returns null where a mark may be that of decimals or of thousands, and what it means is not to be guessed
 */
export function typedText(
  typed: string,
  unit: string,
  { group }: Pick<LocalNumbers, 'group'>,
): string | null {
  const text = typed.trim().replace(/^[\u2212\u2013]/, '-');
  const match = /^([+-]?)(\d[\d.,'\u2019 \u00a0\u202f]*\d|\d|[.,]\d+)((?:[eE][+-]?\d+)?)\s*(.*)$/s.exec(text);
  if (match === null) return text;
  const [, sign, digits, power, rest] = match as unknown as [string, string, string, string, string];
  const number = plainDigits(digits.replace(/['\u2019 \u00a0\u202f](?=\d{3}(?!\d))/g, ''), group);
  return number === null ? null : `${sign}${number}${power} ${rest === '' ? unit : rest}`.trim();
}

function plainDigits(digits: string, group: string): string | null {
  const marks = digits.replace(/\d/g, '');
  if (marks === '') return digits;
  const last = marks.at(-1)!;
  const repeated = marks.length > 1 && [...marks].every((mark) => mark === last);
  if (repeated) return digits.replaceAll(last, '');
  if (marks.length === 1 && last === group && /^\d{1,3}[.,]\d{3}$/.test(digits)) return null;
  const at = digits.lastIndexOf(last);
  return `${digits.slice(0, at).replace(/[.,]/g, '')}.${digits.slice(at + 1)}`;
}
