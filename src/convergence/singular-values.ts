import { dot } from './vectors.ts';

/** J = Σ σ w vᵀ, largest σ first. */
export interface SingularValues {
  readonly sigma: readonly number[];
  /** left vectors: which rows take part in what weight */
  readonly w: readonly Float64Array[];
  /** right vectors; zero where σ is */
  readonly v: readonly Float64Array[];
}

/** Rows count as at right angles below this cosine; sweeps until all do. */
const RIGHT_ANGLE = 1e-15;
const SWEEPS = 60;

/**
 * Singular values of a few rows: pairs of rows are turned against one another until all are at right angles.
 *
 * @source M. R. Hestenes, J. Soc. Ind. Appl. Math. 6 (1958) 51-90 (one-sided Jacobi rotations, from memory)
 */
export function singularValues(J: readonly Float64Array[]): SingularValues {
  const m = J.length;
  const a = J.map((row) => Float64Array.from(row));
  const w = J.map((_, i) => Float64Array.from(J, (__, k) => (i === k ? 1 : 0)));
  for (let sweep = 0, turned = true; turned && sweep < SWEEPS; sweep++) {
    turned = false;
    for (let p = 0; p < m; p++) {
      for (let q = p + 1; q < m; q++) {
        const alpha = dot(a[p], a[p]);
        const beta = dot(a[q], a[q]);
        const gamma = dot(a[p], a[q]);
        if (Math.abs(gamma) <= RIGHT_ANGLE * Math.sqrt(alpha * beta)) continue;
        turned = true;
        const zeta = (beta - alpha) / (2 * gamma);
        const t = (zeta < 0 ? -1 : 1) / (Math.abs(zeta) + Math.hypot(1, zeta));
        const c = 1 / Math.hypot(1, t);
        turn(a[p], a[q], c, c * t);
        turn(w[p], w[q], c, c * t);
      }
    }
  }
  const all = a.map((row, i) => ({ sigma: Math.hypot(...row), row, w: w[i] }));
  all.sort((one, other) => other.sigma - one.sigma);
  return {
    sigma: all.map((one) => one.sigma),
    w: all.map((one) => one.w),
    v: all.map(({ row, sigma }) => row.map((value) => (sigma > 0 ? value / sigma : 0))),
  };
}

function turn(p: Float64Array, q: Float64Array, c: number, s: number): void {
  for (let k = 0; k < p.length; k++) {
    const kept = p[k];
    p[k] = c * kept - s * q[k];
    q[k] = s * kept + c * q[k];
  }
}
