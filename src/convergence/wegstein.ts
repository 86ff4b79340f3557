import type { FixedPointMethod } from './method.ts';

/**
 * How far a component may be thrown ahead: q = −100 is 101 direct steps, what a purge of 1 % asks for. Further out
 * the slopes of coupled components throw more than they help (ammonia loops with −5 to −1000 tried).
 */
const Q_MIN = -100;
/** How far an oscillating component may be damped; q = 1 would not move at all. */
const Q_MAX = 0.9;

/**
 * Bounded Wegstein: a direct step, then each component by itself along its own secant. Blind to what one
 * component does to another, so that maps with complex eigenvalues defeat it.
 */
export function createWegstein(): FixedPointMethod {
  let xPrev = new Float64Array(0);
  let gPrev = new Float64Array(0);
  let passes = 0;
  return {
    name: () => 'wegstein',
    reset(n) {
      xPrev = new Float64Array(n);
      gPrev = new Float64Array(n);
      passes = 0;
    },
    next(x, g, _scale, xNext) {
      if (passes++ === 0) xNext.set(g);
      else wegsteinStep(x, g, xPrev, gPrev, xNext, Q_MIN, Q_MAX);
      xPrev.set(x);
      gPrev.set(g);
    },
    note: () => '',
  };
}

/**
 * One bounded Wegstein step, component by component:
 *   sᵢ = (gᵢ − gPrevᵢ) / (xᵢ − xPrevᵢ),  qᵢ = sᵢ / (sᵢ − 1) held in [qMin, qMax],
 *   nextᵢ = qᵢ xᵢ + (1 − qᵢ) gᵢ
 *
 * @param x,g  guess and G(guess), length n [units of each variable]
 * @param xPrev,gPrev  the same one pass earlier, length n
 * @param next  written in place, length n; may be xPrev or gPrev
 * @param qMin,qMax  finite bounds on q [-]; q = 0 is direct substitution
 * @throws nothing: xᵢ unmoved gives sᵢ = 0, sᵢ = 1 gives qMax, NaN passes through
 * @source J. H. Wegstein, Commun. ACM 1(6), 9-13 (1958)
 */
export function wegsteinStep(
  x: Float64Array,
  g: Float64Array,
  xPrev: Float64Array,
  gPrev: Float64Array,
  next: Float64Array,
  qMin: number,
  qMax: number,
): void {
  for (let i = 0; i < x.length; i++) {
    const dx = x[i] - xPrev[i];
    const s = dx === 0 ? 0 : (g[i] - gPrev[i]) / dx;
    const q = Math.min(Math.max(s / (s - 1), qMin), qMax);
    next[i] = q * x[i] + (1 - q) * g[i];
  }
}
