import { type Dimension, dimensions } from './dimension.ts';
import { nearest } from './nearest.ts';
import { hidesSomething, isTooSmall, LONGEST_QUANTITY, whyNoQuantity } from './no-quantity.ts';
import { engineFactor, isUnitText } from './unit-engine.ts';
import { dimensionsOf, knownUnits, type UnitFactor, unitFactor } from './unit-table.ts';

export { loadUnitEngine } from './unit-engine.ts';
export type { Dimension };

/** Why a text is no quantity: plain sentences for a Diagnostic. */
export interface QuantityFault {
  readonly ok: false;
  readonly code: string;
  readonly what: string;
  readonly why: string;
  readonly mend: string;
}

export type QuantityResult = { readonly ok: true; readonly value: number } | QuantityFault;

/** Bounds in SI; `above` and `below` exclude the bound itself. */
export interface Limits {
  readonly min?: number;
  readonly max?: number;
  readonly above?: number;
  readonly below?: number;
}

/**
 * Turn text such as `450 degC` or `3 %` into a number in SI units (K, Pa, mol/s, kg/s, Nm3/s, W, J/mol,
 * J/(mol K), m3/mol, fractions 0-1).
 *
 * A number without a unit is a fault where the dimension has one. Units outside our own table are asked of
 * mathjs when it has been loaded (see needsUnitEngine).
 */
export function parseQuantity(text: string, dimension: Dimension, limits: Limits = {}): QuantityResult {
  const split = splitQuantity(text);
  if (split === null) return noQuantity(text, dimension);
  const { number, unit } = split;
  const facts = dimensions[dimension];
  if (unit === '' && facts.si !== '') return bareNumber(text.trim(), number, dimension);
  const scale = unitScale(unit, dimension);
  if (scale === undefined) return wrongUnit(text.trim(), unit, dimension);
  const value = (number + scale.offset) * scale.factor;
  const lost = !Number.isFinite(value) || isTooSmall(value, `${number + scale.offset}`);
  if (lost) return noQuantity(text, dimension, value);
  return withinLimits(value, text.trim(), dimension, limits);
}

/** Check a value in SI against the natural bounds of its dimension and the bounds asked for. */
export function withinLimits(
  value: number,
  shown: string,
  dimension: Dimension,
  limits: Limits,
): QuantityResult {
  const facts = dimensions[dimension];
  if (facts.least !== undefined && value !== 0 && Math.abs(value) < facts.least) {
    const limit = dimension === 'temperature' ? `${facts.least} K` : formatQuantity(facts.least, dimension);
    const orZero = facts.min === 0;
    return {
      ok: false,
      code: 'out-of-range',
      what: `the value ${shown} is out of range.`,
      why: `${facts.noun}${orZero ? ' that is not 0' : ''} must be at least ${limit}: less cannot be told apart from 0`,
      mend: orZero ? `write 0, or at least ${limit}` : `write at least ${limit}`,
    };
  }
  const natural = beyond(value, facts);
  const asked = beyond(value, limits);
  // Adding 0 turns -0 into 0: no sheet should show a minus there.
  if (natural === null && asked === null) return { ok: true, value: value + 0 };
  const [direction, bound, open] = (natural ?? asked)!;
  const limit = dimension === 'temperature' && bound === 0 ? '0 K' : formatQuantity(bound, dimension);
  const asPerCent =
    dimension === 'fraction' && direction === 'high' && value > 1 && value <= 100 && /^[\d.]+$/.test(shown)
      ? `write ${shown} %, or ${value / 100}`
      : undefined;
  const rule = direction === 'low' ? (open ? 'above' : 'at least') : open ? 'below' : 'at most';
  return {
    ok: false,
    code: 'out-of-range',
    what: `the value ${shown} is out of range.`,
    why: `${facts.noun} ${natural === null ? 'here ' : ''}must be ${rule} ${limit}`,
    mend: asPerCent ?? `write a value ${open ? '' : 'of '}${rule} ${limit}`,
  };
}

/** True where a text is a number, or a range `a..b` of two, with a unit that only mathjs can know. */
export function needsUnitEngine(text: string): boolean {
  if (text.length > 2 * LONGEST_QUANTITY) return false;
  return text.split('..').some((part) => {
    const split = splitQuantity(part);
    return split !== null && isUnitText(split.unit) && dimensionsOf(split.unit).length === 0;
  });
}

/** A value in SI as the trade writes it: `450 degC`, `200 bar`, `3 %`. */
export function formatQuantity(value: number, dimension: Dimension, digits = 6): string {
  const { shown } = dimensions[dimension];
  const { factor, offset } = unitFactor(shown, dimension)!;
  const number = Number((value / factor - offset).toPrecision(digits));
  const text = Math.abs(number) < 1e9 ? `${number}` : number.toExponential().replace('+', '');
  return shown === '' ? text : `${text} ${shown}`;
}

/**
 * A value in SI as a number of the given unit, at twelve digits.
 * @throws Error for a unit that does not fit: it has been read from the file before
 */
export function numberIn(value: number, unit: string, dimension: Dimension): number {
  const scale = unitScale(unit, dimension);
  if (scale === undefined) throw new Error(`${unit} is no unit of ${dimensions[dimension].noun}`);
  return Number((value / scale.factor - scale.offset).toPrecision(12));
}

/** Does a unit measure a dimension? No unit fits what has none. */
export function fitsDimension(unit: string, dimension: Dimension): boolean {
  return unitScale(unit, dimension) !== undefined;
}

/** The scale of a unit, value in SI = (number + offset) × factor; undefined where the dimension does not have it. */
export function unitScale(unit: string, dimension: Dimension): UnitFactor | undefined {
  const known = unitFactor(unit, dimension) ?? engineFactor(unit, dimension);
  const isDifference = dimension === 'temperatureDifference' || dimension === 'pressureDifference';
  return known === undefined ? undefined : { factor: known.factor, offset: isDifference ? 0 : known.offset };
}

/** Number and unit of a text; null where it does not begin with a decimal number. The unit may be empty. */
export function splitQuantity(text: string): { readonly number: number; readonly unit: string } | null {
  if (text.length > LONGEST_QUANTITY || hidesSomething(text)) return null;
  const match = /^\s*([+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?)(.*)$/s.exec(text);
  if (match === null) return null;
  const number = Number(match[1]);
  const rest = match[2];
  const isNoNumber = !Number.isFinite(number) || isTooSmall(number, match[1]);
  if (isNoNumber || /^([\d,._]|[:-]\d)/.test(rest)) return null;
  if (number === 0 && /^[xXoObB][\dA-Fa-f]/.test(rest) && !/^bar/i.test(rest)) return null;
  return { number, unit: tidyUnit(rest) };
}

/** The unit of the last of some values that has one; '' where none has. */
export function lastUnit(values: readonly string[]): string {
  return values.map((value) => splitQuantity(value)?.unit ?? '').findLast((unit) => unit !== '') ?? '';
}

/** One spelling for the many ways a unit is typed: `Nm³/hr`, `bar(g)`, `°C`, `kmol / h`. */
function tidyUnit(text: string): string {
  return text
    .trim()
    .replace(/\s+/g, ' ')
    .replace(/[°º]\s?/g, 'deg')
    .replace(/²/g, '2')
    .replace(/³/g, '3')
    .replace(/[·⋅]/g, ' ')
    .replace(/\s*\/\s*/g, '/')
    .replace(/(Nm|Sm|cm|^m|kNm)\^3/, '$13')
    .replace(/cm\^2/, 'cm2')
    .replace(/\((a|g|abs|gauge)\)$/, (_, kind: string) => kind[0])
    .replace(/\/(hr|hour)\b/, '/h')
    .replace(/\/day\b/, '/d')
    .replace(/\/sec\b/, '/s')
    .replace(/\((k?mol)[*.]K\)/, '($1 K)');
}

function beyond(value: number, limits: Limits): ['low' | 'high', number, boolean] | null {
  if (limits.above !== undefined && !(value > limits.above)) return ['low', limits.above, true];
  if (limits.min !== undefined && !(value >= limits.min)) return ['low', limits.min, false];
  if (limits.below !== undefined && !(value < limits.below)) return ['high', limits.below, true];
  if (limits.max !== undefined && !(value <= limits.max)) return ['high', limits.max, false];
  return null;
}

/** A number beyond it is no temperature that somebody meant, in whatever unit. */
const HOTTEST_MEANT = 1e5;

function bareNumber(text: string, number: number, dimension: Dimension): QuantityFault {
  const { noun, offered } = dimensions[dimension];
  const mend =
    dimension === 'temperature'
      ? number > -273.15 && number < HOTTEST_MEANT
        ? `write ${text} degC, or ${Number((number + 273.15).toPrecision(10))} K for the same temperature`
        : `write the temperature with its unit, e.g. 450 degC`
      : `write ${text} ${offered[0]} or another unit that fits: ${offered.slice(1).join(', ')}`;
  return {
    ok: false,
    code: 'missing-unit',
    what: `the number ${text} has no unit.`,
    why: `${noun} needs its unit; these fit: ${offered.join(', ')}`,
    mend,
  };
}

function wrongUnit(text: string, unit: string, dimension: Dimension): QuantityFault {
  const { noun, offered, examples } = dimensions[dimension];
  const write = offered.length > 0 ? `write it in ${offered.join(', ')}` : `write the number alone`;
  if (dimension === 'number') {
    return {
      ok: false,
      code: 'wrong-unit',
      what: `${text} is no plain number.`,
      why: `a number without any unit is needed here; "${unit}" does not belong to it`,
      mend: `${write}, e.g. ${examples[0]}`,
    };
  }
  const fault = { ok: false, what: `${text} is no ${noun.replace(/^an? /, '')}.` } as const;
  if (/^(ton|tons|tonne|tonnes)\b/.test(unit)) {
    const mend = `write t for 1000 kg (e.g. 1200 t/d), or lb`;
    return { ...fault, code: 'unknown-unit', why: `"${unit}" may mean a metric, short or long ton`, mend };
  }
  const others = dimensionsOf(unit);
  if (others.length > 0) {
    const gauge = dimension === 'pressureDifference' && others[0] === 'pressure';
    const why = gauge
      ? `"${unit}" tells a pressure from an absolute zero or the atmosphere; a difference has neither`
      : `"${unit}" is a unit of ${dimensions[others[0]].noun.replace(/^an? /, '')}, and ${noun} is needed here`;
    return { ...fault, code: 'wrong-unit', why, mend: write };
  }
  const near = nearest(
    unit,
    knownUnits(dimension).filter((name) => name.length > 0),
  );
  const why =
    near === null ? `no unit "${unit}" fits here` : `no unit "${unit}"; the nearest known unit is ${near}`;
  const mend =
    near === null ? write : `write ${text.slice(0, text.length - unit.length).trim() || '1'} ${near}`;
  return { ...fault, code: 'unknown-unit', why, mend: text.includes(unit) ? mend : write };
}

function noQuantity(text: string, dimension: Dimension, valueInSi?: number): QuantityFault {
  const { noun } = dimensions[dimension];
  const shown = text.trim().length > 40 ? `${text.trim().slice(0, 40)}...` : text.trim();
  return {
    ok: false,
    code: 'no-quantity',
    what: `"${shown}" is no ${noun.replace(/^an? /, '')}.`,
    ...whyNoQuantity(text, dimension, valueInSi),
  };
}
