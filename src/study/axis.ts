import type { Fault } from '../flowsheet/findings.ts';
import type { Dimension } from '../units/dimension.ts';
import { lastUnit, parseQuantity, splitQuantity } from '../units/quantity.ts';

/** One setting of a sweep and the values it takes. */
export interface Axis {
  readonly path: string;
  /** unit of `numbers`, as written; '' where there is none */
  readonly unit: string;
  /** the values in that unit, at twelve digits: what the table shows is what was calculated */
  readonly numbers: Float64Array;
  /** the same in SI */
  readonly values: Float64Array;
}

/** Most values of one axis: as many points as a grid of safe size may have in all. */
const MOST_VALUES = 10_000_000;
const DIGITS = 12;

/** A fault in the text of an axis; offset and length point into that text. */
export interface AxisFault extends Fault {
  readonly offset: number;
  readonly length: number;
}

interface Piece {
  readonly text: string;
  readonly offset: number;
}

/**
 * The values of an axis: a list `a, b, c`, each item a value or a range `a..b:n` (n values, both ends among them), a
 * range followed by `log` with equal ratios. A bare number takes the unit of the last one written.
 */
export function axisPieces(text: string): readonly Piece[] {
  const pieces: Piece[] = [];
  let offset = 0;
  for (const part of text.split(',')) {
    const lead = part.search(/\S|$/);
    pieces.push({ text: part.trim(), offset: offset + lead });
    offset += part.length + 1;
  }
  return pieces;
}

/** The first value of an axis with its unit, to try the setting with; null where the text is no list of values. */
export function firstValue(text: string): string | null {
  const ends = axisPieces(text).flatMap(({ text: piece }) => rangeOf(piece)?.ends ?? [piece]);
  const unit = lastUnit(ends);
  const first = splitQuantity(ends[0]!);
  return first === null ? null : `${first.number} ${first.unit || unit}`.trim();
}

/** Read the values of an axis in the dimension of its setting. */
export function readAxis(path: string, text: string, dimension: Dimension): Axis | AxisFault {
  const pieces = axisPieces(text);
  const ranges = pieces.map(({ text: piece }) => rangeOf(piece));
  const unit = lastUnit(pieces.flatMap(({ text: piece }, p) => ranges[p]?.ends ?? [piece]));
  const numbers: number[] = [];
  const values: number[] = [];
  const take = (written: string): Fault | null => {
    const split = splitQuantity(written);
    const full = split !== null && split.unit === '' ? `${written} ${unit}`.trim() : written;
    const read = parseQuantity(full, dimension);
    if (!read.ok) return { code: read.code, what: read.what, why: read.why, mend: read.mend };
    // One unit in one column: a value in another unit is shown in that of the last.
    numbers.push(split!.unit === '' || split!.unit === unit ? split!.number : Number.NaN);
    values.push(read.value);
    return null;
  };
  for (const [p, piece] of pieces.entries()) {
    const at = { offset: piece.offset, length: Math.max(1, piece.text.length) };
    const range = ranges[p] ?? null;
    if (piece.text === '') return { ...noValue(path), ...at };
    if (range === null) {
      const fault = take(piece.text);
      if (fault !== null) return { ...fault, ...at };
      continue;
    }
    const fault = range.fault ?? take(range.ends[0]!) ?? take(range.ends[1]!);
    if (fault !== null) return { ...fault, ...at };
    const ends = { numbers: numbers.splice(-2), values: values.splice(-2) };
    const filled = fill(range, ends, unit, dimension);
    if ('code' in filled) return { ...filled, ...at };
    for (let k = 0; k < range.count; k++) {
      numbers.push(filled.numbers[k]!);
      values.push(filled.values[k]!);
    }
    if (numbers.length > MOST_VALUES) return { ...tooMany(range.count), ...at };
  }
  const stranger = numbers.findIndex(Number.isNaN);
  if (stranger >= 0) return { ...mixedUnits(unit), offset: 0, length: Math.max(1, text.length) };
  return { path, unit, numbers: Float64Array.from(numbers), values: Float64Array.from(values) };
}

interface Range {
  readonly ends: readonly [string, string];
  readonly count: number;
  readonly log: boolean;
  readonly fault: Fault | null;
}

function rangeOf(text: string): Range | null {
  const dots = text.indexOf('..');
  if (dots < 0) return null;
  const match = /^(.*?)\.\.(.*?):\s*([^:\s]*)\s*(log)?\s*$/s.exec(text);
  if (match === null) {
    return { ends: [text.slice(0, dots), text.slice(dots + 2)], count: 0, log: false, fault: noCount(text) };
  }
  const ends: [string, string] = [match[1]!.trim(), match[2]!.trim()];
  const count = Number(match[3]);
  const fits = /^\d+$/.test(match[3]!) && Number.isSafeInteger(count) && count >= 2;
  const fault = fits ? (count > MOST_VALUES ? tooMany(count) : null) : badCount(match[3]!);
  return { ends, count, log: match[4] !== undefined, fault };
}

function fill(
  { count, log, ends }: Range,
  { numbers: [a, b], values: [low, high] }: { numbers: number[]; values: number[] },
  unit: string,
  dimension: Dimension,
): { readonly numbers: readonly number[]; readonly values: readonly number[] } | Fault {
  if (Number.isNaN(a!) || Number.isNaN(b!)) return mixedUnits(unit);
  if (low === high) return emptyRange(ends);
  if (log && !(low! > 0 && high! > 0)) return noLog(ends);
  const numbers: number[] = [];
  const values: number[] = [];
  for (let k = 0; k < count; k++) {
    const share = k / (count - 1);
    const inSI = log ? low! * (high! / low!) ** share : Number.NaN;
    // A gauge pressure or a temperature in degC has its zero elsewhere: equal ratios are those of the SI value.
    const exact = log ? a! + ((inSI - low!) * (b! - a!)) / (high! - low!) : a! + (b! - a!) * share;
    const number = k === 0 ? a! : k === count - 1 ? b! : Number(exact.toPrecision(DIGITS));
    const read = parseQuantity(`${number} ${unit}`.trim(), dimension);
    if (!read.ok) return { code: read.code, what: read.what, why: read.why, mend: read.mend };
    numbers.push(number);
    values.push(read.value);
  }
  return { numbers, values };
}

const EXAMPLE = 'write it as in -25 degC..10 degC:8, or 1 %, 2 %, 5 %';

function noValue(path: string): Fault {
  return {
    code: 'bad-range',
    what: `${path} is given no value here.`,
    why: 'between two commas, and behind the =, stands a value or a range',
    mend: EXAMPLE,
  };
}

function noCount(text: string): Fault {
  return {
    code: 'bad-range',
    what: `${text} does not say how many values it has.`,
    why: 'behind a range stands a colon and the number of values, both ends among them',
    mend: `write ${text}:8`,
  };
}

function badCount(text: string): Fault {
  return {
    code: 'bad-range',
    what: text === '' ? 'a range has no number of values.' : `a range cannot have ${text} values.`,
    why: 'both ends are among them, so it is a whole number from 2 on',
    mend: 'write it as in -25 degC..10 degC:8, with log behind it for equal ratios',
  };
}

function tooMany(count: number): Fault {
  return {
    code: 'grid-too-large',
    what: `one setting cannot take ${count} values.`,
    why: `at most ${MOST_VALUES} values of one setting are taken`,
    mend: 'take fewer values',
  };
}

function emptyRange([a]: readonly string[]): Fault {
  return {
    code: 'bad-range',
    what: 'the range is empty.',
    why: `both ends are ${a}`,
    mend: 'write two different ends, or the one value alone',
  };
}

function noLog(ends: readonly string[]): Fault {
  return {
    code: 'bad-range',
    what: `${ends.join('..')} cannot have equal ratios.`,
    why: 'log needs both ends above zero',
    mend: 'take log out, or begin above zero',
  };
}

function mixedUnits(unit: string): Fault {
  return {
    code: 'bad-range',
    what: 'the values of one setting are written in different units.',
    why: `they stand in one column of the table, which is in ${unit}`,
    mend: `write all of them in ${unit}`,
  };
}
