import { fixed, significant } from './numbers.ts';

/** How a figure of the result is shown: the number of the contract times `factor` plus `offset`, with its unit. */
export interface FigureDisplay {
  readonly unit: string;
  /** unit of a difference: points for per cent, K for degC */
  readonly step: string;
  readonly factor: number;
  readonly offset: number;
}

/** The display of a figure by its dotted name; `userUnits` are the units of the user's own figures. */
export function figureDisplay(
  figure: string,
  userUnits: Readonly<Record<string, string>> = {},
): FigureDisplay {
  const [root, ...rest] = figure.split('.');
  if (root === 'user') {
    const unit = userUnits[rest.join('.')] ?? '';
    return unit === '%' ? PERCENT : plainDisplay(unit);
  }
  if (FRACTIONS.some((name) => `${figure}.`.startsWith(`${name}.`))) return PERCENT;
  const named = UNITS_IN_NAMES.find(([suffix]) => figure.split('.').some((part) => part.endsWith(suffix)));
  return plainDisplay(named?.[1] ?? '');
}

/** The display of a value moved in SI, as an aim moves it. */
export function settingDisplay(path: string, unit: string): FigureDisplay {
  if (unit === 'K' && /temperature|intercooling/.test(path))
    return { unit: 'degC', step: 'K', factor: 1, offset: -273.15 };
  if (unit === 'Pa') return { ...plainDisplay('bar'), factor: 1e-5 };
  if (unit === 'W') return { ...plainDisplay('kW'), factor: 1e-3 };
  if (unit === 'mol/s') return { ...plainDisplay('kmol/h'), factor: 3.6 };
  if (unit === '' && /fraction|conversion|efficiency|recover/.test(path)) return PERCENT;
  return plainDisplay(unit);
}

/** The number without its unit. */
export function shownValue(value: number | null, { factor, offset, unit }: FigureDisplay): string {
  if (value === null) return '-';
  const shown = value * factor + offset;
  return unit === '%' ? fixed(shown, 2, 1e-8) : unit === 'degC' ? fixed(shown, 2, 1e-9) : significant(shown);
}

/** The number with its unit. */
export function shownWithUnit(value: number | null, display: FigureDisplay): string {
  return `${shownValue(value, display)} ${display.unit}`.trimEnd();
}

/** A difference with its sign, three digits; 0 stays 0. */
export function shownStep(difference: number | null, factor: number): string {
  if (difference === null) return '-';
  if (difference === 0) return '0';
  return `${difference > 0 ? '+' : ''}${significant(difference * factor, 3)}`;
}

const PERCENT: FigureDisplay = { unit: '%', step: 'points', factor: 100, offset: 0 };

const FRACTIONS: readonly string[] = [
  'per_pass_conversion',
  'overall_conversion',
  'overall_yield',
  'inerts',
  'purge.fraction_of_makeup',
  'purge.lost_fraction',
];

const UNITS_IN_NAMES: readonly (readonly [string, string])[] = [
  ['_kWh_t', 'kWh/t'],
  ['_t_d', 't/d'],
  ['_kmol_h', 'kmol/h'],
  ['_MW', 'MW'],
  ['_kW', 'kW'],
];

/** A number as it stands, with its unit. */
export function plainDisplay(unit: string): FigureDisplay {
  return { unit, step: unit, factor: 1, offset: 0 };
}
