/**
 * Which absent species can appear, and a direction of extents that makes all of them appear at once.
 *
 * With Z the absent species, the open directions are the cone { ξ : (ν ξ)_j ≥ 0 for j in Z }; it depends on
 * what is absent, not on amounts. The linear program
 *   max Σ z_j   with  z_j ≤ (ν ξ)_j,  0 ≤ z_j ≤ 1,  ξ free
 * has z_j = 1 exactly for the species that can appear (a cone may be stretched until each reaches 1). It
 * starts feasible at 0 and is solved by the simplex method with Bland's rule, which cannot cycle.
 *
 * @param rows reaction rows, `count` of `width` each
 * @param absent indices of the absent species
 * @param direction extent per row, written; all 0 when nothing can appear
 * @param reachable 1 for each absent species that can appear, in the order of `absent`, written
 * @source R. G. Bland, Math. Oper. Res. 2, 103–107 (1977)
 */
export function reachableSpecies(
  rows: Float64Array,
  width: number,
  count: number,
  absent: readonly number[],
  direction: Float64Array,
  reachable: Uint8Array,
): void {
  direction.fill(0);
  reachable.fill(0);
  const z = absent.length;
  if (z === 0) return;
  // columns: ξ⁺ (count), ξ⁻ (count), z; rows: z_j − (ν ξ)_j ≤ 0, then z_j ≤ 1
  const variables = 2 * count + z;
  const limits: Float64Array[] = [];
  absent.forEach((species, j) => {
    const row = new Float64Array(variables + 1);
    for (let r = 0; r < count; r++) {
      row[r] = -rows[r * width + species];
      row[count + r] = rows[r * width + species];
    }
    row[2 * count + j] = 1;
    limits.push(row);
  });
  for (let j = 0; j < z; j++) {
    const row = new Float64Array(variables + 1);
    row[2 * count + j] = 1;
    row[variables] = 1;
    limits.push(row);
  }
  const worth = new Float64Array(variables);
  worth.fill(1, 2 * count);
  const x = maximise(worth, limits);
  for (let r = 0; r < count; r++) direction[r] = x[r] - x[count + r];
  for (let j = 0; j < z; j++) reachable[j] = x[2 * count + j] > 1e-7 ? 1 : 0;
}

const tiny = 1e-9;

/** max worth·x with limits [row | bound], x ≥ 0, all bounds ≥ 0: the simplex method with Bland's rule. */
function maximise(worth: Float64Array, limits: readonly Float64Array[]): Float64Array {
  const n = worth.length;
  const m = limits.length;
  const width = n + m + 1;
  const table = limits.map((limit, i) => {
    const row = new Float64Array(width);
    row.set(limit.subarray(0, n));
    row[n + i] = 1;
    row[width - 1] = limit[n];
    return row;
  });
  const basis = limits.map((_, i) => n + i);
  const cost = new Float64Array(width);
  cost.set(worth);
  for (let pass = 0; pass < 10_000; pass++) {
    const enter = cost.subarray(0, width - 1).findIndex((c) => c > tiny);
    if (enter < 0) break;
    const leave = leavingRow(table, basis, enter, width);
    if (leave < 0) throw new Error('reachableSpecies: the linear program is unbounded');
    exchange(table, cost, leave, enter);
    basis[leave] = enter;
  }
  const x = new Float64Array(n);
  basis.forEach((column, i) => {
    if (column < n) x[column] = table[i][width - 1];
  });
  return x;
}

/** The row that binds first; of equals the one whose variable comes first (Bland). */
function leavingRow(
  table: readonly Float64Array[],
  basis: readonly number[],
  enter: number,
  width: number,
): number {
  let leave = -1;
  let least = Number.POSITIVE_INFINITY;
  table.forEach((row, i) => {
    if (row[enter] <= tiny) return;
    const ratio = row[width - 1] / row[enter];
    if (ratio < least - tiny || (ratio < least + tiny && basis[i] < basis[leave])) {
      least = Math.min(ratio, least);
      leave = i;
    }
  });
  return leave;
}

function exchange(table: readonly Float64Array[], cost: Float64Array, leave: number, enter: number): void {
  const pivotRow = table[leave];
  const scale = 1 / pivotRow[enter];
  for (let j = 0; j < pivotRow.length; j++) pivotRow[j] = pivotRow[j] * scale;
  for (const row of [...table, cost]) {
    if (row === pivotRow) continue;
    const factor = row[enter];
    if (factor === 0) continue;
    for (let j = 0; j < row.length; j++) {
      const left = row[j] - factor * pivotRow[j];
      row[j] = Math.abs(left) < 1e-13 ? 0 : left;
    }
  }
}
