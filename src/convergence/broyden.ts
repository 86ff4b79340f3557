import type { FixedPointMethod } from './method.ts';

/** Updates kept; with all of them used the memory starts afresh. */
const MEMORY = 20;
/** An update whose denominator is smaller than this beside the step would throw the next guess out of all proportion. */
const SMALLEST = 1e-6;

/**
 * Broyden's good update of the inverse Jacobian of f(x) = G(x) − x, from H₀ = −I, so that the first step is direct:
 *   xNext = x − H f,  Hₖ₊₁ = Hₖ + (s − Hₖ y) sᵀHₖ / (sᵀHₖ y),  s = Δx, y = Δf (s·y in scaled variables)
 * Limited memory: an update is held as the two vectors a = (s − H y)/(s·H y) and b = s/scale², and applied to f one
 * after the other.
 *
 * @source C. G. Broyden, Math. Comput. 19 (1965) 577-593; the limited memory after C. T. Kelley, Iterative Methods
 * for Linear and Nonlinear Equations, SIAM 1995, chapter 7
 */
export function createBroyden(): FixedPointMethod {
  let a: Float64Array[] = [];
  let b: Float64Array[] = [];
  let xLast = new Float64Array(0);
  let fLast = new Float64Array(0);
  let y = new Float64Array(0);
  let held = 0;
  let points = 0;
  let note = '';

  /** v := H v. */
  function apply(v: Float64Array): void {
    for (let i = 0; i < v.length; i++) v[i] = -v[i];
    for (let k = 0; k < held; k++) {
      let along = 0;
      for (let i = 0; i < v.length; i++) along += b[k][i] * v[i];
      for (let i = 0; i < v.length; i++) v[i] += along * a[k][i];
    }
  }

  function update(x: Float64Array, g: Float64Array, scale: Float64Array): void {
    if (held === MEMORY) {
      held = 0;
      note = `${MEMORY} updates used: afresh`;
      return;
    }
    const n = x.length;
    for (let i = 0; i < n; i++) y[i] = g[i] - x[i] - fLast[i];
    apply(y);
    let along = 0;
    let whole = 0;
    for (let i = 0; i < n; i++) {
      const s = x[i] - xLast[i];
      b[held][i] = s / (scale[i] * scale[i]);
      along += b[held][i] * y[i];
      whole += b[held][i] * s;
    }
    if (!(Math.abs(along) > SMALLEST * whole)) return;
    for (let i = 0; i < n; i++) a[held][i] = (x[i] - xLast[i] - y[i]) / along;
    held++;
  }

  return {
    name: () => 'broyden',
    reset(n) {
      const room = (): Float64Array[] => Array.from({ length: MEMORY }, () => new Float64Array(n));
      a = room();
      b = room();
      xLast = new Float64Array(n);
      fLast = new Float64Array(n);
      y = new Float64Array(n);
      held = 0;
      points = 0;
      note = '';
    },
    next(x, g, scale, xNext) {
      note = '';
      if (points++ > 0) update(x, g, scale);
      for (let i = 0; i < x.length; i++) {
        xLast[i] = x[i];
        fLast[i] = g[i] - x[i];
        xNext[i] = fLast[i];
      }
      apply(xNext);
      for (let i = 0; i < x.length; i++) xNext[i] = x[i] - xNext[i];
    },
    note: () => note,
  };
}
