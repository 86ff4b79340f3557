import type { FixedPointMethod } from './method.ts';

/** Direct steps between two leaps: the faster modes die out in them and leave the slowest one alone. */
const DIRECT_STEPS = 3;

/**
 * Dominant eigenvalue: direct substitution, and in place of every fourth step a leap to where the slowest mode would end.
 * With dₖ the steps, λ = dₖ·dₖ₋₁ / dₖ₋₁·dₖ₋₁ (scaled) and
 *   xNext = x + (g − x) / (1 − λ)   when λ < 1, a direct step otherwise.
 * One mode at a time: where two are slow, or a pair turns about (complex eigenvalues), a leap mends one and upsets
 * the other.
 *
 * @source O. Orbach, C. M. Crowe, Can. J. Chem. Eng. 49 (1971) 509-513
 */
export function createEigenvalue(): FixedPointMethod {
  let before = new Float64Array(0);
  let sinceLeap = 0;
  let note = '';
  return {
    name: () => 'eigenvalue',
    reset(n) {
      before = new Float64Array(n);
      sinceLeap = 0;
      note = '';
    },
    next(x, g, scale, xNext) {
      note = '';
      let share = 1;
      if (sinceLeap >= DIRECT_STEPS) {
        const lambda = dominantEigenvalue(x, g, before, scale);
        if (lambda < 1) {
          share = 1 / (1 - lambda);
          note = `leap with the largest eigenvalue ${lambda.toPrecision(4)}`;
        } else note = `no leap: the largest eigenvalue comes out as ${lambda.toPrecision(4)}`;
        sinceLeap = 0;
      } else sinceLeap++;
      for (let i = 0; i < x.length; i++) {
        before[i] = g[i] - x[i];
        xNext[i] = x[i] + share * before[i];
      }
    },
    note: () => note,
  };
}

/** Of the last two steps: how long the second is along the first, in scaled variables; NaN when the first is nil. */
function dominantEigenvalue(
  x: Float64Array,
  g: Float64Array,
  before: Float64Array,
  scale: Float64Array,
): number {
  let along = 0;
  let whole = 0;
  for (let i = 0; i < x.length; i++) {
    const earlier = before[i] / scale[i];
    along += ((g[i] - x[i]) / scale[i]) * earlier;
    whole += earlier * earlier;
  }
  return along / whole;
}
