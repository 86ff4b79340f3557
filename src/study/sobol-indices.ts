import { meanOf } from './statistics.ts';

/** The share of the variance of a figure that one spread causes, each with its 95 % range of chance (±). */
export interface SobolIndices {
  /** alone */
  readonly first: number;
  readonly firstError: number;
  /** alone and together with others */
  readonly total: number;
  readonly totalError: number;
  /** rows of the sample that were used: all cases of a row have to close */
  readonly rows: number;
}

/**
 * The rows of Saltelli's plan from points of 2k dimensions: matrix A, matrix B, and for each dimension i a matrix A with the
 * column i of B. All of them below each other: A, B, AB1 ... ABk, so (k + 2) times as many rows as points.
 *
 * @source A. Saltelli, P. Annoni, I. Azzini, F. Campolongo, M. Ratto & S. Tarantola, Comput. Phys. Commun. 181 (2010) 259
 */
export function saltelliPlan(points: Float64Array, dimensions: number): Float64Array {
  const k = dimensions;
  const count = points.length / (2 * k);
  const plan = new Float64Array(count * k * (k + 2));
  for (let m = 0; m < k + 2; m++) {
    for (let r = 0; r < count; r++) {
      const row = (m * count + r) * k;
      for (let d = 0; d < k; d++) {
        const fromB = m === 1 || d === m - 2;
        plan[row + d] = points[r * 2 * k + (fromB ? k + d : d)];
      }
    }
  }
  return plan;
}

/**
 * First-order and total indices of each dimension from the figure at the rows of `saltelliPlan`:
 *   S  = mean(fB (fABi − fA)) / V        (Saltelli 2010, f less its mean)
 *   ST = mean((fA − fABi)²) / (2 V)      (Jansen 1999)
 * with V the variance of A and B together. The range of chance is that of the two means, V taken as known.
 *
 * @param f  one value per row, NaN where the case did not close
 * @returns null where the figure does not vary, or fewer than two rows closed
 * @source as saltelliPlan; M. J. W. Jansen, Comput. Phys. Commun. 117 (1999) 35
 */
export function sobolIndices(f: Float64Array, dimensions: number): readonly SobolIndices[] | null {
  const count = f.length / (dimensions + 2);
  const known = f.subarray(0, 2 * count).filter((value) => Number.isFinite(value));
  if (known.length < 2) return null;
  const mean = meanOf(known);
  const variance = meanOf(known.map((value) => (value - mean) ** 2));
  if (!(variance > ROUNDING * mean * mean)) return null;
  const found = Array.from({ length: dimensions }, (_, d) => {
    const firsts: number[] = [];
    const totals: number[] = [];
    for (let r = 0; r < count; r++) {
      const a = f[r];
      const b = f[count + r];
      const mixed = f[(d + 2) * count + r];
      if (!Number.isFinite(a + b + mixed)) continue;
      firsts.push((b - mean) * (mixed - a));
      totals.push((a - mixed) ** 2 / 2);
    }
    const first = meanWithRange(firsts);
    const total = meanWithRange(totals);
    return {
      first: first.mean / variance,
      firstError: first.range / variance,
      total: total.mean / variance,
      totalError: total.range / variance,
      rows: firsts.length,
    };
  });
  return found.some(({ rows }) => rows < 2) ? null : found;
}

/** A variance below this share of the squared mean is what closing a loop leaves [-]. */
const ROUNDING = 1e-16;

function meanWithRange(values: readonly number[]): { mean: number; range: number } {
  const mean = meanOf(values);
  const variance = values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (values.length - 1);
  return { mean, range: 1.96 * Math.sqrt(variance / values.length) };
}
