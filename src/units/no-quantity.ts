import { type Dimension, dimensions } from './dimension.ts';
import { invisibleIn } from './invisible.ts';

/** Characters of a quantity: more than any number with its unit has. */
export const LONGEST_QUANTITY = 100;

/**
 * Why a text is no number with a unit, and what to write: the commonest slips by name.
 *
 * @param valueInSi  what it would be, where it came so far
 */
export function whyNoQuantity(
  text: string,
  dimension: Dimension,
  valueInSi = 1,
): { readonly why: string; readonly mend: string } {
  const { noun, examples, si } = dimensions[dimension];
  const mend = `write it as in ${examples.join(' or ')}`;
  const invisible = invisibleIn(text.replaceAll(blank, ' '));
  if (text.length > LONGEST_QUANTITY) {
    const why = `${noun} has at most ${LONGEST_QUANTITY} characters, and here stand ${text.length}`;
    return { why, mend };
  }
  if (invisible !== null) {
    return { why: `the invisible character ${invisible.name} stands in it`, mend: 'type the value anew' };
  }
  if (/^\s*[+-]?\d+,\d+/.test(text) || /^\s*[+-]?\d+_\d/.test(text)) {
    const why = 'a number has a decimal point and no marks between its thousands';
    return { why, mend: `write it as in ${examples[0]}: no comma, no underscore` };
  }
  const dash = /^\s*([\u2010-\u2015\u2212])\s*(?=[\d.])/.exec(text);
  if (dash !== null) {
    const code = dash[1]!.codePointAt(0)!.toString(16).toUpperCase();
    const why = `before the number stands a dash (U+${code}), not the minus sign of the keyboard`;
    return { why, mend: `write -${text.slice(dash[0].length).trim()}` };
  }
  if (/^\s*[+-]?\p{Nd}/u.test(text) && !/^\s*[+-]?\d/.test(text)) {
    return { why: 'its digits are not the plain digits 0 to 9', mend };
  }
  if (/^\s*[+-]?0[xXoObB][\dA-Fa-f]/.test(text)) {
    return {
      why: 'a number is written with decimal digits: hexadecimal, octal and binary are not read',
      mend,
    };
  }
  if (/^\s*\d+:\d/.test(text)) return { why: 'it reads like a time of the day; numbers are decimal', mend };
  if (/^\s*\d+-\d/.test(text)) return { why: 'it reads like a date, or like a range', mend };
  return (
    extreme(text, valueInSi, mend) ?? {
      why: `${noun} is a decimal number${si === '' ? '' : ' followed by its unit'}`,
      mend,
    }
  );
}

/** Between a number and its unit any kind of blank will do: typesetters have several. */
const blank = /\p{Zs}/gu;

/** True where a text has a character in it that cannot be seen and is no blank. */
export function hidesSomething(text: string): boolean {
  return invisibleIn(text.replaceAll(blank, ' ')) !== null;
}

/** Numbers that a computer cannot hold; null for all others. */
function extreme(
  text: string,
  valueInSi: number,
  mend: string,
): { readonly why: string; readonly mend: string } | null {
  const number = /^\s*([+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?)/.exec(text)?.[1];
  if (number === undefined) return null;
  const written = Number(number);
  if (!Number.isFinite(written) || !Number.isFinite(valueInSi)) {
    return { why: 'it is larger than the largest number there is, 1.8e308 in SI units', mend };
  }
  if (!isTooSmall(written, number) && !isTooSmall(valueInSi, number)) return null;
  return {
    why: 'it is nearer to 0 than the smallest number there is, 5e-324 in SI units',
    mend: `${mend}, or 0`,
  };
}

/** True where a number that was not written as 0 has become 0, below the smallest that there is. */
export function isTooSmall(value: number, written: string): boolean {
  return value === 0 && /[1-9]/.test(written.split(/[eE]/)[0]!);
}
