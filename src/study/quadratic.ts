import { solveInPlace } from '../convergence/linear-solve.ts';

/** The least of ½ x'Bx + g'x subject to rows · x ≤ right, with the multiplier of each row. */
export interface QuadraticAnswer {
  readonly x: Float64Array;
  readonly multipliers: Float64Array;
}

/**
 * Solve a small strictly convex quadratic programme by the dual active set method: from the free minimum, take in the
 * most violated row, and drop what blocks the way.
 *
 * @param B  rows of a symmetric positive definite matrix
 * @returns null where the rows contradict each other or B is not positive definite in these digits
 * @source D. Goldfarb & A. Idnani, Mathematical Programming 27 (1983) 1-33
 */
export function solveQuadratic(
  B: readonly Float64Array[],
  g: Float64Array,
  rows: readonly Float64Array[],
  right: Float64Array,
): QuadraticAnswer | null {
  const x = solved(
    B,
    g.map((value) => -value),
  );
  if (x === null) return null;
  const active: number[] = [];
  let u: number[] = [];
  const scale = rows.map((row) => Math.max(norm(row), 1e-300));
  for (let round = 0; round < 60 + 20 * rows.length; round++) {
    const p = mostViolated(rows, right, scale, x, active);
    if (p < 0) return { x, multipliers: spread(active, u, rows.length) };
    let mine = 0;
    for (;;) {
      const normal = rows[p]!;
      const step = direction(B, rows, active, normal);
      if (step === null) return null;
      const { z, r } = step;
      const along = -dot(z, normal);
      // How far the multipliers of the active rows allow, and how far the row itself asks.
      let drop = -1;
      let least = Number.POSITIVE_INFINITY;
      r.forEach((value, j) => {
        if (value > 1e-14 && u[j]! / value < least) {
          least = u[j]! / value;
          drop = j;
        }
      });
      const full =
        along > 1e-13 * scale[p]! ** 2 ? (dot(normal, x) - right[p]!) / along : Number.POSITIVE_INFINITY;
      const t = Math.min(least, full);
      if (!Number.isFinite(t)) return null;
      if (Number.isFinite(full)) for (let i = 0; i < x.length; i++) x[i]! += t * z[i]!;
      u = u.map((value, j) => Math.max(value - t * r[j]!, 0));
      mine += t;
      if (full <= least) {
        active.push(p);
        u.push(mine);
        break;
      }
      active.splice(drop, 1);
      u.splice(drop, 1);
    }
  }
  return null;
}

/**
 * The step z that takes a row's value down while the active rows stay as they are, per unit of its multiplier, and the
 * rates r at which their multipliers fall.
 */
function direction(
  B: readonly Float64Array[],
  rows: readonly Float64Array[],
  active: readonly number[],
  normal: Float64Array,
): { readonly z: Float64Array; readonly r: Float64Array } | null {
  const free = solved(B, normal);
  if (free === null) return null;
  const bent = active.map((a) => solved(B, rows[a]!)!);
  const r = Float64Array.from(active, (a) => dot(rows[a]!, free));
  const gram = active.map((a) => Float64Array.from(bent, (column) => dot(rows[a]!, column)));
  if (active.length > 0 && !solveInPlace(gram, r, 1e-15)) return null;
  const z = free.map((value, i) => -value + bent.reduce((sum, column, j) => sum + r[j]! * column[i]!, 0));
  return { z, r };
}

function mostViolated(
  rows: readonly Float64Array[],
  right: Float64Array,
  scale: readonly number[],
  x: Float64Array,
  active: readonly number[],
): number {
  let worst = -1;
  let most = 1e-11;
  rows.forEach((row, k) => {
    const over = (dot(row, x) - right[k]!) / scale[k]! / (1 + Math.abs(right[k]!) / scale[k]!);
    // An active row is met but for rounding.
    if (over > most && !active.includes(k)) {
      most = over;
      worst = k;
    }
  });
  return worst;
}

function spread(active: readonly number[], u: readonly number[], count: number): Float64Array {
  const all = new Float64Array(count);
  active.forEach((row, j) => {
    all[row] = u[j]!;
  });
  return all;
}

function solved(B: readonly Float64Array[], b: Float64Array): Float64Array | null {
  const x = b.slice();
  return solveInPlace(
    B.map((row) => row.slice()),
    x,
    1e-15,
  )
    ? x
    : null;
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
}

function norm(a: Float64Array): number {
  return Math.sqrt(dot(a, a));
}
