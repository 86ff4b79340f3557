import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { FixedPointProblem } from './problem.ts';

/** Relative step of a variable for its difference quotient [-]: inert modes are linear, so it may be large. */
const STEP = 1e-4;
/** Squarings of the matrix: A^(2^40), by which nothing but the slowest mode is left. */
const SQUARINGS = 40;
/** More variables than this are not looked through: a pass each is spent on them, and n³ on each squaring. */
const MOST_VARIABLES = 60;

/**
 * Spectral radius of dG/dx at x, the share of a deviation that is left after a pass where most of it is left; from the
 * derivatives of the map, or by one pass per variable.
 *
 * @param scale  sizes of the variables, > 0
 * @returns null where a block fails beside x, or where there are too many variables
 */
export function spectralRadius(
  problem: FixedPointProblem,
  x: Float64Array,
  scale: Float64Array,
): number | null {
  const n = problem.size;
  if (n === 0 || n > MOST_VARIABLES) return null;
  const a = scaledSlopes(problem, x, scale);
  return a === null ? null : radiusOf(a, n);
}

/**
 * Spectral radius of a matrix, ρ = lim ‖Aᵐ‖^(1/m) by repeated squaring, which holds for complex pairs too.
 *
 * @param a  n × n numbers, row by row; overwritten
 * @param squarings  the answer is good to a share of some ln(n)/2^squarings
 * @source Gelfand's formula; e.g. R. A. Horn, C. R. Johnson, Matrix Analysis, 2nd ed., corollary 5.6.14
 */
export function radiusOf(a: Float64Array, n: number, squarings = SQUARINGS): number {
  let from: Float64Array = a;
  let to: Float64Array = new Float64Array(n * n);
  let logRadius = 0;
  let power = 1;
  for (let k = 0; k <= squarings; k++) {
    let size = 0;
    for (let i = 0; i < from.length; i++) size = Math.max(size, Math.abs(from[i]));
    if (!(size > 0)) return 0;
    for (let i = 0; i < from.length; i++) from[i] /= size;
    logRadius += Math.log(size) / power;
    if (k === squarings) break;
    square(from, n, to);
    [from, to] = [to, from];
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
    if (problem.derivatives?.at(a)) return a.every((value) => Number.isFinite(value)) ? a : null;
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

function square(a: Float64Array, n: number, out: Float64Array): void {
  out.fill(0);
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < n; k++) {
      const left = a[i * n + k];
      if (left === 0) continue;
      for (let j = 0; j < n; j++) out[i * n + j] += left * a[k * n + j];
    }
  }
}
