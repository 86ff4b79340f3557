import { PassTrouble } from '../diagnostics/diagnostic.ts';
import { createCorrection } from './correction.ts';
import { solveInPlace } from './linear-solve.ts';
import { dot, largest } from './vectors.ts';

/** A recycle x = G(x, u) and aims f(x, u) = 0 that one and the same pass answers. */
export interface TogetherProblem {
  /** sizes of the variables of the recycle, > 0; as many as variables */
  readonly scale: Float64Array;
  /**
   * One pass: writes G(x, u); may throw PassTrouble.
   * @returns what writes the residuals of the aims after this pass, to be called before the next one if at all
   */
  evaluate(x: Float64Array, u: Float64Array, g: Float64Array): (f: Float64Array) => void;
  /** Turn a residual r of the recycle into (I − dG/dx)⁻¹ r, in place; false where that is singular. */
  correct(r: Float64Array): boolean;
}

export interface TogetherOptions {
  /** largest scaled distance of a closed recycle from its fixed point */
  readonly tolerance: number;
  /** largest |residual| of a reached aim */
  readonly aimTolerance: number;
  /** Called after every pass but those for the tangents. */
  readonly onPass?: (pass: TogetherPoint, note: string) => void;
}

/** Recycle and settings, and what a pass there leaves open. */
export interface TogetherPoint {
  readonly x: Float64Array;
  readonly u: Float64Array;
  /** what the recycle is from closed, scaled: (I − A)⁻¹(G − x) */
  readonly open: Float64Array;
  /** residuals of the aims; NaN after a pass that only corrected the recycle */
  readonly f: Float64Array;
}

export interface Together {
  /** why it ended; null when all is closed and reached */
  readonly stopped: string | null;
  /** where the recycle was closed well enough and the aims were best; null when there is no such place */
  readonly best: TogetherPoint | null;
  readonly passes: number;
}

/** Step of a setting for its difference quotients, and what a recycle is moved by at most along with it. */
const STEP = 1e-4;
const RECYCLE_STEP = 1e-3;
/** A tangent is good when a pass along it leaves this share: the rest is learnt on the way. */
const TANGENT = 0.05;
const TANGENT_PASSES = 5;
/** A recycle open by no more than this share of the largest residual of the aims is closed well enough to judge them. */
const CLOSED = 0.1;
/** Passes to close it so far, each of which has to leave no more than this share. */
const CORRECTIONS = 6;
const CONTRACTION = 0.7;
const STEPS = 25;
const HALVINGS = 4;
/** In one step a variable of the recycle grows by twice its size at most, or loses this share of it. */
const GROW = 2;
const LOSE = 0.7;
/** A step goes so far toward a bound of a setting, so often in succession before the bound counts as in the way. */
const TOWARD_BOUND = 0.9;
const AT_BOUND = 2;
/** A step that has to be cut to less than this share leads nowhere. */
const SHORTEST = 0.02;
/** Rows scaled to one, pivots below this leave the aims undecided: differences are good to some 1e-6. */
const SINGULAR = 1e-5;

/**
 * Newton's method on recycle and aims at once, from a closed recycle. With the tangents T = dx/du along the linearised
 * recycle and R = df/du along them a step is du = −R⁻¹f, dx = (I − A)⁻¹(G − x) + T du; one pass, or a few where a long
 * step has opened the recycle by more than the aims can be judged with, correct x at the settings reached. R, T and
 * (I − A)⁻¹ are kept up to date by Broyden's rule. A step that does not lessen the largest residual is halved.
 *
 * It gives up where a bound is in the way, where the aims cannot be told apart, and where steps do not help: the caller
 * then looks for the aims around closings.
 *
 * @source Broyden's rule: C. G. Broyden, Math. Comput. 19 (1965) 577-593
 */
export function solveTogether(
  problem: TogetherProblem,
  x0: Float64Array,
  u0: Float64Array,
  options: TogetherOptions,
): Together {
  const n = x0.length;
  const m = u0.length;
  const { scale } = problem;
  const correction = createCorrection(problem.correct, scale);
  let passes = 0;
  let best: TogetherPoint | null = null;
  const stop = (stopped: string | null): Together => ({ stopped, best, passes });

  let at = tryAt(x0, u0);
  if (at === null) return stop('a pass failed');
  best = at;
  /** columns dx/du and df/du, one of each for every setting */
  const T: Float64Array[] = [];
  const R: Float64Array[] = [];
  for (let a = 0; a < m; a++) if (!addTangent(a, at)) return stop('the recycle has no tangent');

  let atBound = 0;
  for (let k = 0; k < STEPS; k++) {
    if (largest(at.f) <= options.aimTolerance) {
      const closed = close(at, options.tolerance);
      if (closed === null) return stop('the recycle does not settle');
      at = closed;
      best = at;
      if (largest(at.f) <= options.aimTolerance) return stop(null);
    }
    const du = settingStep(at.f);
    if (du === null) return stop('the settings move aims alike');
    const reach = shareWithin(at, du);
    atBound = reach.bound ? atBound + 1 : 0;
    if (atBound > AT_BOUND || reach.share < SHORTEST) return stop('a bound is in the way');
    let next: TogetherPoint | null = null;
    let share = reach.share;
    for (let half = 0; half <= HALVINGS && next === null; half++, share /= 2) next = tryStep(at, du, share);
    if (next === null) return stop('steps do not help');
    learn(at, next);
    at = next;
    best = at;
  }
  return stop('steps do not help');

  /**
   * A pass, its aims judged where they are asked for: that takes about as long. Null where it fails.
   * @param isJudged  by what the recycle is open by, scaled
   */
  function tryAt(
    x: Float64Array,
    u: Float64Array,
    isJudged: (open: Float64Array) => boolean = () => true,
  ): TogetherPoint | null {
    const g = new Float64Array(n);
    const f = new Float64Array(m).fill(Number.NaN);
    passes++;
    try {
      const judge = problem.evaluate(x, u, g);
      const open = g.map((value, i) => value - x[i]);
      if (!open.every(Number.isFinite) || !correction.apply(open)) return null;
      if (!isJudged(open)) return { x, u, open, f };
      judge(f);
      return f.every(Number.isFinite) ? { x, u, open, f } : null;
    } catch (trouble) {
      if (!(trouble instanceof PassTrouble)) throw trouble;
      return null;
    }
  }

  /** Pass until the recycle is open by no more than so much; null where it does not get there. */
  function close(from: TogetherPoint, most: number): TogetherPoint | null {
    let here = from;
    for (let k = 0; k < CORRECTIONS; k++) {
      const before = largest(here.open);
      if (before <= most) return here;
      const next = tryAt(moved(here.x, here.open, 1), here.u, (open) => largest(open) <= most);
      if (next === null) return null;
      correction.learn(here.open, next.open);
      options.onPass?.(next, 'the recycle corrected');
      if (largest(next.open) > CONTRACTION * before) return null;
      here = next;
    }
    return null;
  }

  function tryStep(from: TogetherPoint, du: Float64Array, share: number): TogetherPoint | null {
    let x = moved(from.x, from.open, 1);
    for (let a = 0; a < m; a++) x = moved(x, T[a], share * du[a]);
    const found = tryAt(
      x,
      from.u.map((value, a) => Math.min(Math.max(value + share * du[a], 0), 1)),
    );
    if (found === null) return null;
    options.onPass?.(found, share < 1 ? `${(100 * share).toFixed(0)} % of the step` : '');
    const worth = (1 - share / 4) * largest(from.f);
    const closed = close(
      found,
      Math.max(CLOSED * Math.max(largest(found.f), 0.1 * worth), options.tolerance),
    );
    return closed !== null && largest(closed.f) <= worth ? closed : null;
  }

  /** x + share · dx, dx scaled; flows, temperatures and pressures stay above nothing. */
  function moved(x: Float64Array, dx: Float64Array, share: number): Float64Array {
    return x.map((value, i) => Math.max(value + share * dx[i] * scale[i], 0));
  }

  /** The columns of T and R of one setting, by passes along the tangent found so far; false where there is none. */
  function addTangent(a: number, from: TogetherPoint): boolean {
    const t = new Float64Array(n);
    const r = new Float64Array(m);
    const sign = from.u[a] + STEP <= 1 ? 1 : -1;
    for (let k = 0; k < TANGENT_PASSES; k++) {
      const size = largest(t);
      const h = sign * Math.min(STEP, size > 0 ? RECYCLE_STEP / size : STEP);
      const u = from.u.slice();
      u[a] += h;
      const isLast = (open: Float64Array) =>
        k === TANGENT_PASSES - 1 ||
        open.every((value, i) => Math.abs((value - from.open[i]) / h) <= TANGENT * size);
      const beside = tryAt(moved(from.x, t, h), u, isLast);
      if (beside === null) return false;
      for (let i = 0; i < m; i++) r[i] = (beside.f[i] - from.f[i]) / h;
      for (let i = 0; i < n; i++) t[i] += (beside.open[i] - from.open[i]) / h;
      if (isLast(beside.open)) break;
    }
    T.push(t);
    R.push(r);
    return true;
  }

  /** du = −R⁻¹f; null where R is singular. */
  function settingStep(f: Float64Array): Float64Array | null {
    const du = f.map((value) => -value);
    const rows = Array.from(f, (_, i) => Float64Array.from(R, (column) => column[i]));
    rows.forEach((row, i) => {
      const most = largest(row) || 1;
      for (let a = 0; a < m; a++) row[a] /= most;
      du[i] /= most;
    });
    return solveInPlace(rows, du, SINGULAR) ? du : null;
  }

  /** Bring T and R up to date with a step made. */
  function learn(from: TogetherPoint, to: TogetherPoint): void {
    const du = to.u.map((value, a) => value - from.u[a]);
    const dx = to.x.map((value, i) => (value - from.x[i]) / scale[i] + to.open[i] - from.open[i]);
    const df = to.f.map((value, i) => value - from.f[i]);
    rankOne(T, du, dx);
    rankOne(R, du, df);
  }

  /** How much of a step keeps to the bounds of the settings and to what a recycle may change by. */
  function shareWithin({ x, u }: TogetherPoint, du: Float64Array): { share: number; bound: boolean } {
    let share = 1;
    for (let i = 0; i < n; i++) {
      let dx = 0;
      for (let a = 0; a < m; a++) dx += T[a][i] * du[a];
      const size = Math.max(x[i] / scale[i], 1);
      if (dx > GROW * size) share = Math.min(share, (GROW * size) / dx);
      else if (-dx > LOSE * size) share = Math.min(share, (LOSE * size) / -dx);
    }
    let bound = false;
    for (let a = 0; a < m; a++) {
      const room = du[a] < 0 ? u[a] : 1 - u[a];
      if (Math.abs(du[a]) * share <= room) continue;
      share = (TOWARD_BOUND * room) / Math.abs(du[a]);
      bound = true;
    }
    return { share, bound };
  }
}

/** Columns J += (dy − J du) duᵀ / du·du */
function rankOne(J: readonly Float64Array[], du: Float64Array, dy: Float64Array): void {
  const whole = dot(du, du);
  if (whole === 0) return;
  const miss = dy.slice();
  J.forEach((column, a) => {
    for (let i = 0; i < miss.length; i++) miss[i] -= column[i] * du[a];
  });
  J.forEach((column, a) => {
    for (let i = 0; i < miss.length; i++) column[i] += (miss[i] * du[a]) / whole;
  });
}
