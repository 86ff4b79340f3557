/** The row that holds each unknown, −1 for one that floats. */
let holder = new Int32Array(0);

/**
 * Solve A x = b in place by Gaussian elimination with row pivoting; for the unknowns of recycles and aims.
 *
 * @param A  rows of an n × n matrix, overwritten and put into another order
 * @param b  right side, overwritten by the solution
 * @param smallest  pivot, relative to the largest entry of A, below which the matrix counts as singular
 * @param mayFloat  unknowns that may be left at 0 where nothing holds them and the equations are met all the same
 * @param settled  |b| of an equation that is met
 * @returns false when it is singular (b is then of no use)
 */
export function solveInPlace(
  A: Float64Array[],
  b: Float64Array,
  smallest = 1e-10,
  mayFloat: (unknown: number) => boolean = () => false,
  settled = 0,
): boolean {
  const n = b.length;
  const row = A;
  if (holder.length < n) holder = new Int32Array(n);
  let largest = 0;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) largest = Math.max(largest, Math.abs(row[i][j]));
  }
  let r = 0;
  for (let k = 0; k < n; k++) {
    let pivot = r;
    for (let i = r + 1; i < n; i++) if (Math.abs(row[i][k]) > Math.abs(row[pivot][k])) pivot = i;
    if (r === n || !(Math.abs(row[pivot][k]) > smallest * largest)) {
      if (!mayFloat(k)) return false;
      holder[k] = -1;
      continue;
    }
    if (pivot !== r) {
      const lifted = row[pivot];
      row[pivot] = row[r];
      row[r] = lifted;
      const answer = b[pivot];
      b[pivot] = b[r];
      b[r] = answer;
    }
    for (let i = r + 1; i < n; i++) {
      const factor = row[i][k] / row[r][k];
      if (factor === 0) continue;
      for (let j = k; j < n; j++) row[i][j] -= factor * row[r][j];
      b[i] -= factor * b[r];
    }
    holder[k] = r++;
  }
  for (let i = r; i < n; i++) if (!(Math.abs(b[i]) <= settled)) return false;
  for (let k = n - 1; k >= 0; k--) {
    const h = holder[k];
    if (h < 0) {
      b[k] = 0;
      continue;
    }
    // Equations stand above the unknowns they hold, or beside them: what is read here has not been written yet.
    let sum = b[h];
    for (let j = k + 1; j < n; j++) sum -= row[h][j] * b[j];
    b[k] = sum / row[h][k];
  }
  return true;
}
