import type { FixedPointProblem } from '../convergence/problem.ts';
import { PassTrouble } from '../diagnostics/diagnostic.ts';

/** Relative step of a variable for its difference quotient [-]: inert modes are linear, so it may be large. */
const STEP = 1e-4;
/** Squarings of the matrix: A^(2^40), by which nothing but the slowest mode is left. */
const SQUARINGS = 40;
/** More variables than this are not looked through: a pass each is spent on them. */
const MOST_VARIABLES = 60;

/**
 * Spectral radius of dG/dx at x, the share of a deviation that is left after a pass where most of it is left, by one
 * pass per variable: ρ = lim ‖Aᵐ‖^(1/m) by repeated squaring of the scaled
 * matrix, which holds for complex pairs too.
 *
 * @param scale  sizes of the variables, > 0
 * @returns null where a block fails beside x, or where there are too many variables
 * @source Gelfand's formula; e.g. R. A. Horn, C. R. Johnson, Matrix Analysis, 2nd ed., corollary 5.6.14
 */
export function spectralRadius(
  problem: FixedPointProblem,
  x: Float64Array,
  scale: Float64Array,
): number | null {
  const n = problem.size;
  if (n === 0 || n > MOST_VARIABLES) return null;
  let a = scaledSlopes(problem, x, scale);
  if (a === null) return null;
  let logRadius = 0;
  let power = 1;
  for (let k = 0; k <= SQUARINGS; k++) {
    const size = a.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
    if (!(size > 0)) return 0;
    for (let i = 0; i < a.length; i++) a[i] /= size;
    logRadius += Math.log(size) / power;
    if (k === SQUARINGS) break;
    a = squared(a, n);
    power *= 2;
  }
  return Math.exp(logRadius);
}

function scaledSlopes(problem: FixedPointProblem, x: Float64Array, scale: Float64Array): Float64Array | null {
  const n = problem.size;
  const a = new Float64Array(n * n);
  const base = new Float64Array(n);
  const beside = new Float64Array(n);
  const at = Float64Array.from(x);
  try {
    problem.evaluate(at, base);
    for (let j = 0; j < n; j++) {
      const h = STEP * scale[j];
      at[j] = x[j] + h;
      problem.evaluate(at, beside);
      at[j] = x[j];
      for (let i = 0; i < n; i++) a[i * n + j] = (beside[i] - base[i]) / (STEP * scale[i]);
    }
  } catch (trouble) {
    if (trouble instanceof PassTrouble) return null;
    throw trouble;
  }
  return a.every((value) => Number.isFinite(value)) ? a : null;
}

function squared(a: Float64Array, n: number): Float64Array {
  const out = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < n; k++) {
      const left = a[i * n + k];
      if (left === 0) continue;
      for (let j = 0; j < n; j++) out[i * n + j] += left * a[k * n + j];
    }
  }
  return out;
}
