/**
 * Solve A x = b in place by Gaussian elimination with row pivoting; for the handful of unknowns of aims.
 *
 * @param A  rows of an n × n matrix, overwritten
 * @param b  right side, overwritten by the solution
 * @param smallest  pivot, relative to the largest entry of A, below which the matrix counts as singular
 * @returns false when it is singular (b is then of no use)
 */
export function solveInPlace(A: readonly Float64Array[], b: Float64Array, smallest = 1e-10): boolean {
  const n = b.length;
  const row = Array.from(A);
  let largest = 0;
  for (const r of row) for (const value of r) largest = Math.max(largest, Math.abs(value));
  for (let k = 0; k < n; k++) {
    let pivot = k;
    for (let i = k + 1; i < n; i++) if (Math.abs(row[i][k]) > Math.abs(row[pivot][k])) pivot = i;
    if (!(Math.abs(row[pivot][k]) > smallest * largest)) return false;
    [row[k], row[pivot]] = [row[pivot], row[k]];
    [b[k], b[pivot]] = [b[pivot], b[k]];
    for (let i = k + 1; i < n; i++) {
      const factor = row[i][k] / row[k][k];
      for (let j = k; j < n; j++) row[i][j] -= factor * row[k][j];
      b[i] -= factor * b[k];
    }
  }
  for (let k = n - 1; k >= 0; k--) {
    for (let j = k + 1; j < n; j++) b[k] -= row[k][j] * b[j];
    b[k] /= row[k][k];
  }
  return true;
}
