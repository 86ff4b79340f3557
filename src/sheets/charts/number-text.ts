/** A number of an axis or a key as text, with so many decimals. */
export type NumberText = (value: number, decimals: number) => string;

/** Decimals beyond this, or numbers from here on, are written with an exponent. */
const MOST_DECIMALS = 9;
const LARGEST_PLAIN = 1e7;

/** With a decimal point and without marks between thousands; `decimals` above nine or huge numbers give an exponent. */
export const pointText: NumberText = (value, decimals) => {
  if (value === 0) return '0';
  if (decimals > MOST_DECIMALS || Math.abs(value) >= LARGEST_PLAIN) {
    const digits = Math.max(0, Math.min(6, decimals + Math.floor(Math.log10(Math.abs(value)))));
    return value
      .toExponential(digits)
      .replace(/\.?0+e/, 'e')
      .replace('e+', 'e');
  }
  const text = value.toFixed(decimals);
  return Number(text) === 0 ? (0).toFixed(decimals) : text;
};

/** Decimals that tell numbers so far apart from one another. */
export function decimalsOfStep(step: number): number {
  if (!(step > 0)) return 0;
  // Steps of ticks are 1, 2 or 5 times a power of ten: what is left of it after rounding is no digit.
  return Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
}

/** Decimals that give a number so many digits. */
export function decimalsOfDigits(value: number, digits: number): number {
  if (value === 0 || !Number.isFinite(value)) return 0;
  return Math.max(0, digits - 1 - Math.floor(Math.log10(Math.abs(value)) + 1e-12));
}
