import type { NumericSetting } from '../flowsheet/numeric-settings.ts';

const SMALLEST_PLAIN = 1e-4;
const LARGEST_PLAIN = 1e9;

/** A number with so many significant digits: plain where that reads well, with an exponent where it does not. */
export function significant(value: number | null | undefined, digits = 5): string {
  if (value === null || value === undefined || !Number.isFinite(value)) return '-';
  if (value === 0) return '0';
  const size = Math.abs(Number(value.toPrecision(digits)));
  if (size < SMALLEST_PLAIN || size >= LARGEST_PLAIN) return exponent(value, 2);
  return value.toFixed(Math.max(0, digits - 1 - Math.floor(Math.log10(size))));
}

/**
 * A number with a fixed count of decimals, for cells that stand under one another. What would round to zero
 * but is more than `noise` is shown with an exponent; what is not is 0.
 */
export function fixed(value: number | null | undefined, decimals: number, noise = 0): string {
  if (value === null || value === undefined || !Number.isFinite(value)) return '-';
  if (value === 0 || Math.abs(value) <= noise) return '0';
  if (Math.abs(value) >= LARGEST_PLAIN) return exponent(value, 5);
  const text = value.toFixed(decimals);
  return Number(text) === 0 ? exponent(value, 2) : text;
}

/** The decimals that give the largest of some values so many significant digits, between `least` and `most`. */
export function decimalsFor(values: readonly number[], digits = 5, least = 0, most = 4): number {
  const largest = values.reduce(
    (size, value) => Math.max(size, Number.isFinite(value) ? Math.abs(value) : 0),
    0,
  );
  if (largest === 0) return least;
  return Math.min(most, Math.max(least, digits - 1 - Math.floor(Math.log10(largest))));
}

/** A fraction 0-1 in per cent, two decimals. */
export function percent(fraction: number | null | undefined): string {
  if (fraction === null || fraction === undefined || !Number.isFinite(fraction)) return '-';
  return `${fixed(fraction * 100, 2, 1e-10)} %`;
}

/** A relative error or a residual: one figure and an exponent says all there is to say. */
export function closureText(value: number | null | undefined): string {
  if (value === null || value === undefined || !Number.isFinite(value)) return '-';
  return value === 0 ? '0' : exponent(value, 2);
}

/** A setting as an engineer reads it; `unit` is the SI unit it was moved in. */
export function settingText(path: string, value: number, unit: string): string {
  if (unit === 'K' && /temperature|intercooling/.test(path)) return `${fixed(value - 273.15, 2, 1e-9)} degC`;
  if (unit === 'Pa') return `${significant(value / 1e5)} bar`;
  if (unit === 'W') return `${significant(value / 1e3)} kW`;
  if (unit === 'mol/s') return `${significant(value * 3.6)} kmol/h`;
  if (unit === '' || unit === '-' || unit === '1') {
    return /fraction|conversion|efficiency|recover/.test(path) ? percent(value) : significant(value);
  }
  return `${significant(value)} ${unit}`;
}

/** A setting of the file as an engineer reads it: -8.0 degC, 200.0 bar, 2.20 %. */
export function valueText({ dimension, value, unit, unitSI, path }: NumericSetting): string {
  if (dimension === 'temperature') return `${(value - 273.15).toFixed(1)} degC`;
  if (dimension === 'fraction' && !path.includes('.composition.')) return percent(value);
  return `${significant(value / unitSI, 4)} ${unit === '1' ? '' : unit}`.trimEnd();
}

function exponent(value: number, digits: number): string {
  return value.toExponential(digits - 1);
}
