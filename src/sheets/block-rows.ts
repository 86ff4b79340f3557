import type { Result } from '../model/result.ts';
import { closureText, fixed, significant } from './numbers.ts';
import { plainText } from './plain.ts';

/** What the blocks say of themselves: heads, then name, kind, duty, power. */
export function blockRows(result: Result): string[][] {
  return [
    ['block', 'kind', 'heat added, kW', 'power, kW'],
    ...Object.entries(result.blocks).map(([name, block]) => [
      plainText(name),
      block.kind,
      significant(block.duty_kW),
      significant(block.power_kW),
    ]),
  ];
}

/** Units that end the key of a detail, and how they are written. */
const UNITS: readonly (readonly [ending: string, unit: string])[] = [
  ['_kJ_mol', 'kJ/mol'],
  ['_kWh_t', 'kWh/t'],
  ['_kmol_h', 'kmol/h'],
  ['_kW_K', 'kW/K'],
  ['_kg_h', 'kg/h'],
  ['_kg_m3', 'kg/m3'],
  ['_m3_h', 'm3/h'],
  ['_t_d', 't/d'],
  ['_t_h', 't/h'],
  ['_bar', 'bar'],
  ['_kW', 'kW'],
  ['_MW', 'MW'],
  ['_Pa', 'Pa'],
  ['_K', 'K'],
];

/**
 * The details of one block as `name value unit`, the unit taken from the ending of the key: first what stands alone in
 * one line, then a line for each bed, level or whatever else there are several of.
 */
export function blockDetails(details: Readonly<Record<string, unknown>>): string[] {
  const alone: Record<string, unknown> = {};
  const groups: string[] = [];
  for (const [key, value] of Object.entries(details)) {
    if (key.includes(CARBON) && !carbonMatters(details)) continue;
    const parts = severalParts(key, value);
    if (parts === null) alone[key] = value;
    else if (!isToldAlready(parts, details))
      for (const [name, part] of parts) groups.push(`${name}: ${flat(part, '', null).join(', ')}`);
  }
  const first = flat(alone, '', null).join(', ');
  return first === '' ? groups : [first, ...groups];
}

const CARBON = 'carbon_';
/** A gas with less of what carbon needs, as the traces of methane in an ammonia loop, is not worth a word [-]. */
const SMALL_ACTIVITY = 1e-3;

/** Is a reactor anywhere near laying down carbon? */
function carbonMatters(details: Readonly<Record<string, unknown>>): boolean {
  const activities = [details['carbon_activity_inlet'], details['carbon_activity_outlet']];
  return activities.some((activity) => typeof activity === 'number' && activity >= SMALL_ACTIVITY);
}

/** Is there one part only, every number of which stands alone as well (a condenser with one evaporator)? */
function isToldAlready(
  parts: readonly [string, unknown][],
  details: Readonly<Record<string, unknown>>,
): boolean {
  const [first, ...more] = parts;
  if (first === undefined || more.length > 0) return false;
  const told = Object.values(details).filter((value) => typeof value === 'number');
  return Object.values(first[1] as object).every((value) =>
    told.some((one) => Math.abs(one - value) <= 1e-9 * Math.abs(value)),
  );
}

/** The parts of a detail that holds several things of one kind, by name; null for any other. */
function severalParts(key: string, value: unknown): [string, unknown][] | null {
  const isThing = (part: unknown) => typeof part === 'object' && part !== null && !Array.isArray(part);
  if (typeof value !== 'object' || value === null) return null;
  const parts = Object.entries(value);
  if (parts.length === 0 || parts.length > LONGEST_LIST || !parts.every(([, part]) => isThing(part)))
    return null;
  // A map of reactions by component (selectivity) reads better in one line.
  if (parts.every(([, part]) => Object.values(part).length < 3)) return null;
  const word = plainText(key).replaceAll('_', ' ').replace(/s$/, '');
  return parts.map(([name, part], k) => [
    Array.isArray(value) ? `${word} ${k + 1}` : plainText(name).replace(/(\D)(\d+)$/, '$1 $2'),
    part,
  ]);
}

/** The three closures: heads and one row. */
export function closureRows(result: Result): string[][] {
  const atoms = Object.entries(result.closure.atoms);
  return [
    ['mass', 'energy', ...atoms.map(([element]) => `atoms ${element}`)],
    [
      closureText(result.closure.mass),
      closureText(result.closure.energy),
      ...atoms.map(([, value]) => closureText(value)),
    ],
  ];
}

/** A longer list is a curve to be drawn, not to be read. */
const LONGEST_LIST = 9;
/** Keys that only look as if they ended in a unit. */
const NO_UNIT = /^(ln_?)?K$/;
/** Kelvins that are a difference and stay kelvins. */
const DIFFERENCE = /approach|rise|difference|drop|spread/;

function flat(value: unknown, name: string, unit: string | null): string[] {
  if (value === null || value === undefined) return [];
  if (Array.isArray(value) && value.length > LONGEST_LIST) return [];
  if (typeof value === 'number') return [`${name} ${numberText(value, name, unit)}`];
  if (typeof value === 'boolean') return [`${name} ${value ? 'yes' : 'no'}`];
  if (typeof value === 'string') return [`${name} ${plainText(value)}`];
  return Object.entries(value).flatMap(([key, part]) => {
    const found = NO_UNIT.test(key) ? undefined : UNITS.find(([ending]) => key.endsWith(ending));
    const word = plainText(found ? key.slice(0, -found[0].length) : key).replaceAll('_', ' ');
    return flat(part, name === '' ? word : `${name} ${word}`, found ? found[1] : unit);
  });
}

function numberText(value: number, name: string, unit: string | null): string {
  if (unit === 'K' && !DIFFERENCE.test(name)) return `${fixed(value - 273.15, 2, 1e-9)} degC`;
  if (unit !== null) return `${significant(value, 5)} ${unit}`;
  if (Number.isInteger(value) && Math.abs(value) < 1e6) return String(value);
  return Math.abs(value) < 1e6 ? significant(value, 4) : value.toExponential(2);
}
