/**
 * Gaussian elimination with partial pivoting on [A | b ...], the answers in the last columns.
 * @param a m rows of m + `sides` columns, rewritten @param sides number of right-hand sides
 * @returns false when A is singular
 */
export function solveLinear(a: Float64Array, m: number, sides = 1): boolean {
  const w = m + sides;
  for (let k = 0; k < m; k++) {
    let p = k;
    for (let r = k + 1; r < m; r++) if (Math.abs(a[r * w + k]) > Math.abs(a[p * w + k])) p = r;
    if (!(Math.abs(a[p * w + k]) > 1e-300)) return false;
    if (p !== k) {
      for (let j = k; j < w; j++) {
        const keep = a[k * w + j];
        a[k * w + j] = a[p * w + j];
        a[p * w + j] = keep;
      }
    }
    for (let r = k + 1; r < m; r++) {
      const factor = a[r * w + k] / a[k * w + k];
      for (let j = k; j < w; j++) a[r * w + j] = a[r * w + j] - factor * a[k * w + j];
    }
  }
  for (let b = m; b < w; b++) {
    for (let k = m - 1; k >= 0; k--) {
      let sum = a[k * w + b];
      for (let j = k + 1; j < m; j++) sum -= a[k * w + j] * a[j * w + b];
      a[k * w + b] = sum / a[k * w + k];
    }
  }
  return true;
}
