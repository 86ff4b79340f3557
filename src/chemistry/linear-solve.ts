/** Gaussian elimination with partial pivoting on [A | b], the answer in the last column. */
export function solveLinear(a: Float64Array, m: number): boolean {
  const w = m + 1;
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
  for (let k = m - 1; k >= 0; k--) {
    let sum = a[k * w + m];
    for (let j = k + 1; j < m; j++) sum -= a[k * w + j] * a[j * w + m];
    a[k * w + m] = sum / a[k * w + k];
  }
  return true;
}
