import { type BoxProblem, type BoxSlopes, type BoxValue, slopesAt, violation } from './box-problem.ts';
import { createCurvature } from './curvature.ts';
import { solveQuadratic } from './quadratic.ts';

/** Where a descent ended. */
export interface Descent {
  readonly u: Float64Array;
  readonly value: BoxValue;
  /** per limit, by how much f falls where the limit is let off by one */
  readonly multipliers: Float64Array;
}

const MOST_STEPS = 60;
/** A radius below this share of the bounds, or a promise below what closings leave open, ends the descent. */
const SMALLEST_RADIUS = 1e-7;
const SMALLEST_GAIN = 2e-9;
/** A penalty above this no longer tells limits from the objective. */
const MOST_PENALTY = 1e7;

/**
 * The nearest least of f within the limits, from a start: sequential quadratic programming in a trust region, where one
 * slack lets limits that cannot be met together be met as well as may be (the worst of them counts, times a penalty).
 * The curvature is learnt from slopes (damped BFGS); a second step corrects for limits that bend away. A point at which
 * the loop does not close counts as a bad step, and so does one across a kink: both shorten the radius.
 *
 * @returns null where the start itself cannot be evaluated
 * @source R. Fletcher, Practical Methods of Optimization, 2nd ed. (1987), sections 12.4 and 14.4-14.5; M. J. D. Powell,
 *   Lecture Notes in Mathematics 630 (1978) 144-157 (damping)
 */
export function descend(problem: BoxProblem, start: Float64Array, firstRadius = 0.2): Descent | null {
  let u: Float64Array = start.slice();
  let here = problem.evaluate(u);
  if (here === null) return null;
  let slopes = slopesAt(problem, u, here);
  const curvature = createCurvature(problem.size, slopes.f);
  let radius = firstRadius;
  let penalty = 10;
  let multipliers: Float64Array = new Float64Array(problem.limits);
  for (let round = 0; round < MOST_STEPS && radius > SMALLEST_RADIUS; round++) {
    const found = promising(curvature.rows, slopes, here.c, u, radius, penalty);
    if (found === null) break;
    penalty = found.penalty;
    multipliers = found.multipliers;
    const before = merit(here, penalty);
    const gain = before - (here.f + found.model);
    if (!(gain > SMALLEST_GAIN * Math.max(1, Math.abs(here.f)))) break;
    let next = moved(u, found.step);
    let value = problem.evaluate(next);
    if (value !== null && before - merit(value, penalty) < 0.25 * gain && here.c.length > 0) {
      const bent = value.c.map((c, k) => c - along(slopes.c[k]!, found.step));
      const second = boxed(curvature.rows, slopes, bent, u, radius, penalty);
      const there = second === null ? null : moved(u, second.step);
      const corrected = there === null ? null : problem.evaluate(there);
      if (corrected !== null && merit(corrected, penalty) < merit(value, penalty)) {
        next = there!;
        value = corrected;
      }
    }
    const length = next.reduce((most, x, i) => Math.max(most, Math.abs(x - u[i]!)), 0);
    const kept = value === null ? Number.NEGATIVE_INFINITY : (before - merit(value, penalty)) / gain;
    if (kept < 0.25) radius = Math.min(radius, Math.max(length, 1e-12)) * 0.35;
    else if (kept > 0.7 && length > 0.9 * radius) radius = Math.min(2 * radius, 1);
    if (value === null || !(kept > 1e-3)) continue;
    const newSlopes = slopesAt(problem, next, value);
    curvature.learn(
      difference(next, u),
      lagrangian(newSlopes, found.multipliers),
      lagrangian(slopes, found.multipliers),
    );
    u = next;
    here = value;
    slopes = newSlopes;
  }
  return { u, value: here, multipliers };
}

function merit(value: BoxValue, penalty: number): number {
  return value.f + penalty * violation(value);
}

interface Step {
  readonly step: Float64Array;
  readonly multipliers: Float64Array;
  /** what the model says of the merit there, f counted from where it is */
  readonly model: number;
  readonly slack: number;
}

/** The step of the model, with a penalty that is above what the limits are worth and high enough to meet them. */
function promising(
  B: readonly Float64Array[],
  slopes: BoxSlopes,
  c: Float64Array,
  u: Float64Array,
  radius: number,
  penaltyBefore: number,
): (Step & { readonly penalty: number }) | null {
  let penalty = penaltyBefore;
  let found = boxed(B, slopes, c, u, radius, penalty);
  while (found !== null && penalty < MOST_PENALTY) {
    const worth = found.multipliers.reduce((sum, one) => sum + one, 0);
    if (found.slack <= 1e-10 && penalty >= 1.2 * worth) break;
    const more = Math.max(10 * penalty, 1.5 * worth);
    const harder = boxed(B, slopes, c, u, radius, more);
    // Where a higher penalty gains nothing, the radius is in the way, not the penalty.
    if (harder === null || harder.slack > 0.99 * found.slack) break;
    penalty = more;
    found = harder;
  }
  return found === null ? null : { ...found, penalty };
}

/** Least of f'd + ½ d'Bd + penalty · slack within radius and bounds, each limit let off by the one slack. */
function boxed(
  B: readonly Float64Array[],
  slopes: BoxSlopes,
  c: Float64Array,
  u: Float64Array,
  radius: number,
  penalty: number,
): Step | null {
  const n = u.length;
  const slackAt = c.length > 0 ? n : -1;
  const size = n + (slackAt < 0 ? 0 : 1);
  const matrix = Array.from({ length: size }, (_, i) => {
    const row = new Float64Array(size);
    if (i < n) row.set(B[i]!);
    else row[i] = penalty;
    return row;
  });
  const g = new Float64Array(size);
  g.set(slopes.f);
  const rows: Float64Array[] = [];
  const right: number[] = [];
  const add = (row: Float64Array, bound: number) => {
    rows.push(row);
    right.push(bound);
  };
  slopes.c.forEach((slope, k) => {
    const row = new Float64Array(size);
    row.set(slope);
    row[slackAt] = -1;
    add(row, -c[k]!);
  });
  if (slackAt >= 0) {
    g[slackAt] = penalty;
    add(unit(size, slackAt, -1), 0);
  }
  for (let i = 0; i < n; i++) {
    add(unit(size, i, 1), Math.min(radius, 1 - u[i]!));
    add(unit(size, i, -1), Math.min(radius, u[i]!));
  }
  const answer = solveQuadratic(matrix, g, rows, Float64Array.from(right));
  if (answer === null) return null;
  const step = answer.x.slice(0, n);
  const over = c.reduce((worst, value, k) => Math.max(worst, value + along(slopes.c[k]!, step)), 0);
  const bend = step.reduce((sum, d, i) => sum + 0.5 * d * along(B[i]!, step), 0);
  return {
    step,
    multipliers: answer.multipliers.slice(0, c.length),
    model: along(slopes.f, step) + bend + penalty * over,
    slack: over,
  };
}

function unit(size: number, at: number, sign: number): Float64Array {
  const row = new Float64Array(size);
  row[at] = sign;
  return row;
}

/** A step within the box; what rounding keeps off a bound is put on it. */
function moved(u: Float64Array, step: Float64Array): Float64Array {
  return u.map((x, i) => {
    const next = x + step[i]!;
    return next < 1e-12 ? 0 : next > 1 - 1e-12 ? 1 : next;
  });
}

function difference(a: Float64Array, b: Float64Array): Float64Array {
  return a.map((x, i) => x - b[i]!);
}

function lagrangian(slopes: BoxSlopes, multipliers: Float64Array): Float64Array {
  return slopes.f.map((value, i) => slopes.c.reduce((sum, row, k) => sum + multipliers[k]! * row[i]!, value));
}

function along(slope: Float64Array, step: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < step.length; i++) sum += slope[i]! * step[i]!;
  return sum;
}
