/** Largest |value|; 0 of none. */
export function largest(values: Float64Array): number {
  let most = 0;
  for (let i = 0; i < values.length; i++) most = Math.max(most, Math.abs(values[i]));
  return most;
}

export function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i] * b[i];
  return sum;
}

/** Largest |value| / scale; 0 of none. */
export function largestShare(values: Float64Array, scale: Float64Array): number {
  let most = 0;
  for (let i = 0; i < values.length; i++) most = Math.max(most, Math.abs(values[i]) / scale[i]);
  return most;
}

/** The share of `step` that the correction left over takes back again; negative when it goes on. */
export function takenBack(left: Float64Array, step: Float64Array, scale: Float64Array): number {
  let along = 0;
  let whole = 0;
  for (let i = 0; i < step.length; i++) {
    along += (left[i] * step[i]) / (scale[i] * scale[i]);
    whole += (step[i] / scale[i]) ** 2;
  }
  return whole > 0 ? -along / whole : 0;
}
