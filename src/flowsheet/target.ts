import { NORMAL_VOLUME_M3_PER_MOL } from '../properties/constants.ts';
import { type Dimension, dimensions } from '../units/dimension.ts';
import type { FormulaName } from '../units/formula.ts';
import { parseQuantity, splitQuantity } from '../units/quantity.ts';
import type { Fault } from './findings.ts';

/**
 * The wanted value of an aim in the unit of its formula: K, bar, kmol/h, kg/h, kW, fractions 0-1; where the
 * formula names a figure with its unit in the name, that unit (`production_t_d`: t/d).
 *
 * A bare number is taken as it stands, except where the formula is a single name whose unit is not in it
 * (`streams.S2.T`): there the unit must be said.
 */
export function readTarget(
  text: string,
  names: readonly FormulaName[],
  isSingleName: boolean,
): { readonly value: number } | { readonly fault: Fault } {
  const split = splitQuantity(text);
  if (split === null) {
    const why = 'after the = stands the wanted value, a number with its unit';
    return {
      fault: {
        code: 'bad-aim',
        what: `"${text.trim()}" is no target.`,
        why,
        mend: 'write it as in streams.S2.y.Ar = 12 %',
      },
    };
  }
  const unitInName =
    names
      .flatMap(({ parts }) => parts)
      .map((part) => suffixUnit(part))
      .find((u) => u !== null) ?? null;
  const expected = isSingleName && unitInName === null ? dimensionOf(names[0].parts) : null;
  if (expected !== null) return convert(text, expected, null);
  if (split.unit === '') return { value: split.number };
  const order: readonly Dimension[] = [
    'fraction',
    'temperature',
    'pressure',
    'molarFlow',
    'massFlow',
    'power',
    'normalVolumeFlow',
  ];
  for (const dimension of order) {
    const result = convert(text, dimension, unitInName);
    if (!('fault' in result) || result.fault.code === 'out-of-range') return result;
  }
  const why =
    'a target has one of the units of formulas: K or degC, bar, kmol/h, kg/h, t/d, kW, MW, %, or none';
  return {
    fault: {
      code: 'bad-aim',
      what: `${text.trim()} is no target.`,
      why,
      mend: 'write it as in streams.S2.y.Ar = 12 %',
    },
  };
}

/** Number of formula units in one SI unit. */
const formulaUnits: Readonly<Partial<Record<Dimension, number>>> = {
  temperature: 1,
  pressure: 1e-5,
  molarFlow: 3.6,
  massFlow: 3600,
  normalVolumeFlow: 3.6 / NORMAL_VOLUME_M3_PER_MOL,
  power: 1e-3,
  fraction: 1,
};

const suffixes: readonly (readonly [string, Dimension, number])[] = [
  ['_t_d', 'massFlow', 86.4],
  ['_kg_h', 'massFlow', 3600],
  ['_kmol_h', 'molarFlow', 3.6],
  ['_MW', 'power', 1e-6],
  ['_kW', 'power', 1e-3],
  ['_bar', 'pressure', 1e-5],
  ['_K', 'temperature', 1],
  ['_kWh_t', 'number', 1],
];

function suffixUnit(part: string) {
  return suffixes.find(([suffix]) => part.endsWith(suffix)) ?? null;
}

function convert(text: string, dimension: Dimension, unitInName: (typeof suffixes)[number] | null) {
  const result = parseQuantity(text, dimension);
  if (!result.ok) {
    const { code, what, why, mend } = result;
    return { fault: { code, what, why, mend } };
  }
  const named = unitInName !== null && unitInName[1] === dimension ? unitInName[2] : undefined;
  return { value: result.value * (named ?? formulaUnits[dimension] ?? 1) };
}

/** Unit of a single name of a formula, '' for a fraction; null where it cannot be told. */
export function unitOfName(parts: readonly string[]): string | null {
  const units: Readonly<Partial<Record<Dimension, string>>> = {
    temperature: 'K',
    pressure: 'bar',
    molarFlow: 'kmol/h',
    massFlow: 'kg/h',
    power: 'kW',
    fraction: '',
  };
  const dimension = dimensionOf(parts);
  return dimension === null ? null : (units[dimension] ?? null);
}

/** What a single name of a formula stands for; null where it cannot be told or has no dimension. */
function dimensionOf(parts: readonly string[]): Dimension | null {
  const [root, , field] = parts;
  const last = parts.at(-1) ?? '';
  if (root === 'blocks') return last === 'duty' || last === 'power' ? 'power' : null;
  if (root !== 'streams') return null;
  const byField: Readonly<Record<string, Dimension>> = {
    T: 'temperature',
    P: 'pressure',
    flow: 'molarFlow',
    n: 'molarFlow',
    mass: 'massFlow',
    m: 'massFlow',
    y: 'fraction',
    w: 'fraction',
    vapour_fraction: 'fraction',
    enthalpy: 'power',
  };
  const dimension = byField[field] ?? null;
  return dimension !== null && dimensions[dimension] !== undefined ? dimension : null;
}
