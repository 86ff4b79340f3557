import { type AimStep, aimStep } from './aim-step.ts';
import type { AimsOutcome, AimsSearch } from './aims.ts';
import { fightingAims } from './fighting-aims.ts';

/** Step of the finite differences, as a share of the way between the bounds; loops close far tighter than that. */
const DIFFERENCE = 1e-3;
/** Dampings of a step that makes things worse: none, then relative to the largest singular value. */
const DAMPINGS = [0, 1e-3, 1e-2, 0.05, 0.2, 0.5, 1, 3, 10, 100] as const;
/** A step that brings less than this share of what was foreseen asks for more damping, one that brings so much for less. */
const POOR = 0.25;
const FORESEEN = 0.75;
/** What a step has to improve by for the Broyden update to be trusted further. */
const PROGRESS = 0.5;
/** Steps that improve by less than this share, so many in succession, have come as near as it gets. */
const SLOW = 1e-3;
const SLOW_STEPS = 3;
/** A step so much shorter than the way between the bounds leads nowhere, where no step meets the aims. */
const SHORTEST = 1e-6;

interface Place {
  readonly u: Float64Array;
  readonly f: Float64Array;
}

/**
 * Several aims: Newton in settings scaled to 0 ... 1 between their bounds, Jacobian by differences, kept up to
 * date by Broyden's rule while it serves. Steps are damped until the squares of the residuals come to less; a setting
 * that would leave its bounds is held there, one aim given up for it, while the others move on.
 *
 * @source C. G. Broyden, Math. Comput. 19 (1965) 577-593; damping: D. W. Marquardt, J. Soc. Ind. Appl. Math. 11 (1963)
 * 431-441
 */
export function reachSeveralAims(search: AimsSearch): AimsOutcome {
  const { low, high, tolerances } = search;
  const settingsAt = (share: Float64Array): Float64Array =>
    share.map((v, i) => (v >= 1 ? high[i] : low[i] + v * (high[i] - low[i])));
  const tryAt = (share: Float64Array): Float64Array | null => search.tryAt(settingsAt(share));
  const u = search.start.map((value, i) => (value - low[i]) / (high[i] - low[i]));
  const f = tryAt(u);
  if (f === null) return search.outcome();
  let at: Place = { u, f };
  if (miss(at.f) <= 1) return search.outcome();

  let J = jacobian(tryAt, at);
  let fresh = true;
  let level = 0;
  const renew = (): void => {
    J = jacobian(tryAt, at);
    fresh = true;
  };
  const none = new Uint8Array(u.length);
  let held = goToward(none);
  if (miss(at.f) <= 1) return search.outcome();
  if (!fresh) renew();
  const singular = J === null ? null : fightingAims(J);
  const fighters = none.map((_, i) => (singular?.includes(i) ? 1 : 0));
  if (miss(at.f, fighters) > 1 && fighters.includes(1)) held = goToward(fighters);
  const limit = held.findIndex((side) => side !== 0);
  return search.outcome({
    at: { values: settingsAt(at.u), residuals: at.f },
    limit,
    side: limit < 0 ? null : held[limit] < 0 ? 'low' : 'high',
    singular,
  });

  /** Move on until the aims are met but for those left aside and those given up; the settings held at bounds. */
  function goToward(aside: Uint8Array): Int8Array {
    let slow = 0;
    let step: AimStep | null = null;
    while (J !== null && search.left() > 0) {
      step = aimStep(J, at.u, at.f, 0, aside);
      if (miss(at.f, step.given) <= 1) break;
      const found = dampedTry(J, at, aside);
      if (found === null) {
        if (fresh) break;
        renew();
        continue;
      }
      const gain = found.after / found.before;
      const moved = Math.max(...found.to.u.map((value, j) => Math.abs(value - at.u[j])));
      if (gain <= PROGRESS || fresh) broydenUpdate(J, at, found.to);
      at = found.to;
      step = found.step;
      fresh = false;
      slow = gain > 1 - SLOW ? slow + 1 : 0;
      if (slow >= SLOW_STEPS || (gain > PROGRESS && moved < SHORTEST)) break;
      if (gain > PROGRESS && miss(at.f, step.given) > 1) renew();
    }
    return step?.held ?? new Int8Array(u.length);
  }

  /** Largest residual in units of its tolerance, without the aims given up. */
  function miss(residuals: Float64Array, given?: Uint8Array): number {
    return residuals.reduce(
      (most, value, i) => (given?.[i] ? most : Math.max(most, Math.abs(value) / tolerances[i])),
      0,
    );
  }

  /** Steps with more and more damping, clipped at the bounds, until one lessens what it goes for; null when none does. */
  function dampedTry(matrix: readonly Float64Array[], from: Place, aside: Uint8Array) {
    for (; level < DAMPINGS.length; level++) {
      const planned = aimStep(matrix, from.u, from.f, DAMPINGS[level], aside);
      const to = from.u.map((value, j) => Math.min(Math.max(value + planned.du[j], 0), 1));
      if (to.every((value, j) => value === from.u[j])) break;
      const found = tryAt(to);
      if (found !== null) {
        const before = squares(from.f, planned.given);
        const after = squares(found, planned.given);
        if (after < before) {
          const linear = from.f.map((value, i) =>
            to.reduce((sum, share, j) => sum + matrix[i][j] * (share - from.u[j]), value),
          );
          const share = (before ** 2 - after ** 2) / (before ** 2 - squares(linear, planned.given) ** 2);
          if (share < POOR) level = Math.min(level + 1, DAMPINGS.length - 1);
          else if (share > FORESEEN) level = Math.max(level - 1, 0);
          return { to: { u: to, f: found }, step: planned, before, after };
        }
      }
      if (search.left() <= 0) break;
    }
    level = 0;
    return null;
  }

  /** Root of the squares of the residuals in units of their tolerances, without the aims given up. */
  function squares(residuals: Float64Array, given: Uint8Array): number {
    return Math.hypot(...Array.from(residuals, (value, i) => (given[i] ? 0 : value / tolerances[i])));
  }
}

/** Rows are aims, columns settings; null when a neighbouring point does not close on either side. */
function jacobian(
  tryAt: (share: Float64Array) => Float64Array | null,
  { u, f }: Place,
): Float64Array[] | null {
  const n = u.length;
  const J = Array.from({ length: n }, () => new Float64Array(n));
  for (let j = 0; j < n; j++) {
    const near = Float64Array.from(u);
    let h = u[j] + DIFFERENCE <= 1 ? DIFFERENCE : -DIFFERENCE;
    near[j] = u[j] + h;
    let beside = tryAt(near);
    if (beside === null) {
      h = -h;
      near[j] = Math.min(Math.max(u[j] + h, 0), 1);
      h = near[j] - u[j];
      beside = h === 0 ? null : tryAt(near);
    }
    if (beside === null) return null;
    for (let i = 0; i < n; i++) J[i][j] = (beside[i] - f[i]) / h;
  }
  return J;
}

/** J += (Δf − J Δu) Δuᵀ / Δuᵀ Δu */
function broydenUpdate(J: readonly Float64Array[], from: Place, to: Place): void {
  const du = to.u.map((value, j) => value - from.u[j]);
  const square = du.reduce((sum, value) => sum + value * value, 0);
  if (square === 0) return;
  J.forEach((row, i) => {
    let miss = to.f[i] - from.f[i];
    for (let j = 0; j < du.length; j++) miss -= row[j] * du[j];
    for (let j = 0; j < du.length; j++) row[j] += (miss * du[j]) / square;
  });
}
