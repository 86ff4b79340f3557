import { type AimsOutcome, type AimsSearch, aimsMerit } from './aims.ts';
import { solveInPlace } from './linear-solve.ts';

/** Step of the finite differences, as a share of the way between the bounds; loops close far tighter than that. */
const DIFFERENCE = 1e-3;
/** Halvings of a step that makes things worse, before the Jacobian is made anew. */
const HALVINGS = 6;
/** What a full step has to improve by for the Broyden update to be trusted further. */
const PROGRESS = 0.5;
/** Cosine above which two aims answer to all settings alike. */
const ALIKE = 1 - 1e-9;

/**
 * Several aims: Newton in settings scaled to 0 ... 1 between their bounds, Jacobian by differences, kept up to
 * date by Broyden's rule while it serves. Steps are halved until the largest residual falls; a setting that
 * would leave its bounds is held there while the others move on.
 *
 * @source C. G. Broyden, Math. Comput. 19 (1965) 577-593
 */
export function reachSeveralAims(search: AimsSearch): AimsOutcome {
  const { low, high, tolerances } = search;
  const n = low.length;
  let u: Float64Array = search.start.map((value, i) => (value - low[i]) / (high[i] - low[i]));
  const settingsAt = (share: Float64Array): Float64Array =>
    share.map((v, i) => low[i] + v * (high[i] - low[i]));
  let f = search.tryAt(settingsAt(u));
  if (f === null) return search.outcome();

  let J = jacobian(search, settingsAt, u, f);
  let fresh = true;
  while (J !== null && aimsMerit(f, tolerances) > 1 && search.left() > 0) {
    const step = boundedStep(J, u, f);
    if (step === null) {
      if (fresh) return search.outcome(-1, null, alikeRows(J));
      J = jacobian(search, settingsAt, u, f);
      fresh = true;
      continue;
    }
    const tried = dampedTry(search, settingsAt, u, f, step.du);
    if (tried === null) {
      if (fresh) return search.outcome(step.limit, step.side, null);
      J = jacobian(search, settingsAt, u, f);
      fresh = true;
      continue;
    }
    const good = aimsMerit(tried.f, tolerances) <= PROGRESS * aimsMerit(f, tolerances);
    if (good || fresh) broydenUpdate(J, u, f, tried.u, tried.f);
    u = tried.u;
    f = tried.f;
    fresh = false;
    if (!good && aimsMerit(f, tolerances) > 1) {
      J = jacobian(search, settingsAt, u, f);
      fresh = true;
    }
  }
  const atBound = u.findIndex((v) => v <= 0 || v >= 1);
  return search.outcome(atBound, atBound < 0 ? null : u[atBound] <= 0 ? 'low' : 'high', null);

  /** Newton step with the settings that run against a bound held there, one after the other. */
  function boundedStep(
    matrix: readonly Float64Array[],
    from: Float64Array,
    residuals: Float64Array,
  ): { du: Float64Array; limit: number; side: 'low' | 'high' | null } | null {
    const held = new Int8Array(n);
    const du = new Float64Array(n);
    let limit = -1;
    for (let round = 0; round <= n; round++) {
      if (!freeStep(matrix, residuals, held, du)) {
        if (round === 0) return null;
        break;
      }
      let added = false;
      for (let j = 0; j < n; j++) {
        if (held[j] !== 0) continue;
        const outside = (from[j] <= 0 && du[j] < 0) || (from[j] >= 1 && du[j] > 0);
        if (!outside) continue;
        held[j] = du[j] < 0 ? -1 : 1;
        limit = j;
        added = true;
      }
      if (!added) break;
    }
    return { du, limit, side: limit < 0 ? null : held[limit] < 0 ? 'low' : 'high' };
  }
}

/** Least squares of J du = −f over the settings not held, by the normal equations; exact when none is held. */
function freeStep(J: readonly Float64Array[], f: Float64Array, held: Int8Array, du: Float64Array): boolean {
  const free = Array.from(held.keys()).filter((j) => held[j] === 0);
  du.fill(0);
  if (free.length === 0) return false;
  let A: Float64Array[];
  let b: Float64Array;
  if (free.length === f.length) {
    A = J.map((row) => Float64Array.from(row));
    b = f.map((value) => -value);
    // rows to one size, so that a pivot speaks of dependence and not of units
    A.forEach((row, i) => {
      const size = Math.max(...row.map(Math.abs)) || 1;
      for (let j = 0; j < row.length; j++) row[j] /= size;
      b[i] /= size;
    });
  } else {
    A = free.map((j) => Float64Array.from(free, (k) => J.reduce((sum, row) => sum + row[j] * row[k], 0)));
    b = Float64Array.from(free, (j) => -J.reduce((sum, row, i) => sum + row[j] * f[i], 0));
  }
  if (!solveInPlace(A, b)) return false;
  free.forEach((j, k) => {
    du[j] = b[k];
  });
  return true;
}

/** The step, clipped at the bounds and halved until the largest residual falls; null when it does not. */
function dampedTry(
  search: AimsSearch,
  settingsAt: (share: Float64Array) => Float64Array,
  u: Float64Array,
  f: Float64Array,
  du: Float64Array,
): { u: Float64Array; f: Float64Array } | null {
  const before = aimsMerit(f, search.tolerances);
  let share = 1;
  for (let k = 0; k <= HALVINGS; k++) {
    const next = u.map((value, j) => Math.min(Math.max(value + share * du[j], 0), 1));
    const found = search.tryAt(settingsAt(next));
    if (found !== null && aimsMerit(found, search.tolerances) < before) return { u: next, f: found };
    if (search.left() <= 0) return null;
    share /= 2;
  }
  return null;
}

/** Rows are aims, columns settings; null when a neighbouring point does not close on either side. */
function jacobian(
  search: AimsSearch,
  settingsAt: (share: Float64Array) => Float64Array,
  u: Float64Array,
  f: Float64Array,
): Float64Array[] | null {
  const n = u.length;
  const J = Array.from({ length: n }, () => new Float64Array(n));
  for (let j = 0; j < n; j++) {
    const near = Float64Array.from(u);
    let h = u[j] + DIFFERENCE <= 1 ? DIFFERENCE : -DIFFERENCE;
    near[j] = u[j] + h;
    let beside = search.tryAt(settingsAt(near));
    if (beside === null) {
      h = -h;
      near[j] = Math.min(Math.max(u[j] + h, 0), 1);
      h = near[j] - u[j];
      beside = h === 0 ? null : search.tryAt(settingsAt(near));
    }
    if (beside === null) return null;
    for (let i = 0; i < n; i++) J[i][j] = (beside[i] - f[i]) / h;
  }
  return J;
}

/** J += (Δf − J Δu) Δuᵀ / Δuᵀ Δu */
function broydenUpdate(
  J: readonly Float64Array[],
  u: Float64Array,
  f: Float64Array,
  uNew: Float64Array,
  fNew: Float64Array,
): void {
  const du = uNew.map((value, j) => value - u[j]);
  const square = du.reduce((sum, value) => sum + value * value, 0);
  if (square === 0) return;
  J.forEach((row, i) => {
    let miss = fNew[i] - f[i];
    for (let j = 0; j < du.length; j++) miss -= row[j] * du[j];
    for (let j = 0; j < du.length; j++) row[j] += (miss * du[j]) / square;
  });
}

/** The two aims whose rows point the same way; a row of zeros pairs with itself. */
function alikeRows(J: readonly Float64Array[]): readonly [number, number] | null {
  const sizes = J.map((row) => Math.hypot(...row));
  const largest = Math.max(...sizes);
  const dead = sizes.findIndex((size) => size <= 1e-12 * largest || size === 0);
  if (dead >= 0) return [dead, dead];
  let pair: readonly [number, number] | null = null;
  let most = 0;
  for (let i = 0; i < J.length; i++) {
    for (let k = i + 1; k < J.length; k++) {
      const cosine = Math.abs(J[i].reduce((sum, v, j) => sum + v * J[k][j], 0)) / (sizes[i] * sizes[k]);
      if (cosine > most) {
        most = cosine;
        pair = [i, k];
      }
    }
  }
  return most >= ALIKE || J.length === 2 ? pair : null;
}
