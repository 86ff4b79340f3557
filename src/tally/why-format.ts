/** A number to three figures: plain where that reads well, else with an exponent. */
export function figure(value: number): string {
  const size = Math.abs(value);
  if (size !== 0 && (size < 1e-4 || size >= 1e7))
    return Number(value.toPrecision(3)).toExponential().replace('e+', 'e');
  return String(Number(value.toPrecision(3)));
}

/** A flow [mol/s] as kmol/h. */
export function kmolPerHour(molPerS: number): string {
  return `${figure(molPerS * 3.6)} kmol/h`;
}

/** A share [0–1] in per cent; near 100 % with as many digits as tell it from 100 %. */
export function perCent(share: number): string {
  const missing = 1 - share;
  if (missing > 0 && missing < 0.1) {
    const decimals = Math.min(Math.max(Math.ceil(-Math.log10(missing)), 1), 12);
    return `${(100 * share).toFixed(decimals)} %`;
  }
  return `${figure(100 * share)} %`;
}

export function degC(kelvin: number): string {
  return `${(kelvin - 273.15).toFixed(1)} degC`;
}

export function bar(pascal: number): string {
  return `${figure(pascal / 1e5)} bar`;
}
