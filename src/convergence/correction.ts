import { dot } from './vectors.ts';

/** An update whose denominator is smaller than this beside the step would throw the next one out of all proportion. */
const SMALLEST = 1e-6;

/** The correction (I − A)⁻¹(G − x) of a recycle, which learns from the passes made with it. */
export interface Correction {
  /** turn a residual G − x into a scaled correction, in place; false where the recycle is singular */
  apply(r: Float64Array): boolean;
  /** take in what a whole step has left, and bring that up to date */
  learn(step: Float64Array, left: Float64Array): void;
}

/**
 * Broyden's good update of an inverse that is given to begin with: H += (s − H y) sᵀH / (sᵀH y), where a whole step
 * s = H r leaves H r' so that H y = s − H r'. Held as pairs of vectors.
 *
 * @param solve  turns r into (I − A)⁻¹ r in place
 * @param scale  sizes of the variables
 * @source C. G. Broyden, Math. Comput. 19 (1965) 577-593
 */
export function createCorrection(solve: (r: Float64Array) => boolean, scale: Float64Array): Correction {
  const updates: { readonly a: Float64Array; readonly s: Float64Array }[] = [];
  return {
    apply(r) {
      if (!solve(r)) return false;
      for (let i = 0; i < r.length; i++) r[i] /= scale[i];
      for (const { a, s } of updates) {
        const along = dot(s, r);
        for (let i = 0; i < r.length; i++) r[i] += along * a[i];
      }
      return true;
    },
    learn(step, left) {
      const along = dot(step, step) - dot(step, left);
      if (!(Math.abs(along) > SMALLEST * dot(step, step))) return;
      updates.push({ a: left.map((value) => value / along), s: step.slice() });
      const more = dot(step, left) / along;
      for (let i = 0; i < left.length; i++) left[i] *= 1 + more;
    },
  };
}
