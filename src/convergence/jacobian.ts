import { solveInPlace } from './linear-solve.ts';
import type { Derivatives } from './problem.ts';
import { radiusOf } from './spectral-radius.ts';

/** Pivots smaller than this, in scaled variables, make the derivatives singular; behind a purge of 0.01 % they are 1e-4. */
const SINGULAR = 1e-14;
/** Guess and answer this near to one another are equal. */
const SETTLED = 1e-13;
/** What is taken off the diagonal of singular derivatives to be able to solve with them. */
const NEXT_TO = 1e-8;
/** Squarings for a spectral radius to four digits, and variables up to which it is worth its n³. */
const SQUARINGS = 12;
const MOST_VARIABLES = 60;

/** Derivatives of f(x) = G(x) − x in scaled variables, and the corrections that follow from them. */
export interface Jacobian {
  /** Take those that the map has at its last guess; false where it has none. */
  read(derivatives: Derivatives | null, scale: Float64Array): boolean;
  /** Begin afresh with −1 on the diagonal: a map whose answer depends on nothing. */
  begin(scale: Float64Array): void;
  /** Column j from a probe: what a step h of variable j, in units of its size, did to G. */
  setColumn(j: number, h: number, gBase: Float64Array, g: Float64Array): void;
  /**
   * Correction −J⁻¹ f in units of the variables; false when the derivatives are singular. A variable that may
   * float (a pressure that a mixer may take from the recycle as well as from the feed) stays as it is where nothing holds it.
   */
  correction(x: Float64Array, g: Float64Array, out: Float64Array): boolean;
  /** Broyden's good update with the step from one point to another. */
  update(xFrom: Float64Array, gFrom: Float64Array, x: Float64Array, g: Float64Array): void;
  /** Put aside what there is, and take it back. */
  keep(): void;
  restore(): void;
  /** Works out the spectral radius of ∂G/∂x as the map gave it last; NaN where there are too many variables. */
  radius(): () => number;
  /** Index of the variable that moves most where the derivatives are singular. */
  loosest(): number;
  /** what variable i is measured with */
  readonly size: Float64Array;
}

/** Room for the derivatives of a map of n variables. */
export function createJacobian(n: number): Jacobian {
  const rows = () => Array.from({ length: n }, () => new Float64Array(n));
  const J = rows();
  const work = rows();
  const kept = rows();
  const size = new Float64Array(n).fill(1);
  const keptSize = new Float64Array(n);
  const moved = new Float64Array(n);
  /** ∂G/∂x as the map gives it, row by row; made when a map has any */
  let given = new Float64Array(0);
  let mayFloat = (_variable: number): boolean => false;

  return {
    size,
    read(derivatives, scale) {
      if (derivatives === null) return false;
      if (derivatives.mayFloat) mayFloat = derivatives.mayFloat;
      if (given.length !== n * n) given = new Float64Array(n * n);
      if (!derivatives.at(given) || !allFinite(given)) return false;
      size.set(scale);
      for (let i = 0; i < n; i++) {
        for (let j = 0; j < n; j++) J[i][j] = (given[i * n + j] * size[j]) / size[i] - (i === j ? 1 : 0);
      }
      return true;
    },
    begin(scale) {
      size.set(scale);
      for (let i = 0; i < n; i++) {
        J[i].fill(0);
        J[i][i] = -1;
      }
    },
    setColumn(j, h, gBase, g) {
      for (let i = 0; i < n; i++) J[i][j] = (g[i] - gBase[i]) / (h * size[i]) - (i === j ? 1 : 0);
    },
    correction(x, g, out) {
      for (let i = 0; i < n; i++) {
        work[i].set(J[i]);
        out[i] = (x[i] - g[i]) / size[i];
      }
      if (!solveInPlace(work, out, SINGULAR, mayFloat, SETTLED)) return false;
      for (let i = 0; i < n; i++) out[i] = out[i] * size[i];
      return true;
    },
    update(xFrom, gFrom, x, g) {
      let whole = 0;
      for (let i = 0; i < n; i++) {
        moved[i] = (x[i] - xFrom[i]) / size[i];
        whole += moved[i] * moved[i];
      }
      if (!(whole > 0)) return;
      for (let i = 0; i < n; i++) {
        let unforeseen = (g[i] - x[i] - (gFrom[i] - xFrom[i])) / size[i];
        for (let j = 0; j < n; j++) unforeseen -= J[i][j] * moved[j];
        for (let j = 0; j < n; j++) J[i][j] += (unforeseen * moved[j]) / whole;
      }
    },
    keep() {
      for (let i = 0; i < n; i++) kept[i].set(J[i]);
      keptSize.set(size);
    },
    restore() {
      for (let i = 0; i < n; i++) J[i].set(kept[i]);
      size.set(keptSize);
    },
    loosest() {
      // Inverse iteration: next to singular, a right side is answered by what the derivatives hold least.
      const answer = Float64Array.from({ length: n }, (_, i) => 1 + i / n);
      for (let round = 0; round < 2; round++) {
        for (let i = 0; i < n; i++) {
          work[i].set(J[i]);
          work[i][i] -= mayFloat(i) ? 1 : NEXT_TO;
        }
        solveInPlace(work, answer, 0);
      }
      let most = 0;
      for (let i = 1; i < n; i++) if (Math.abs(answer[i]) > Math.abs(answer[most])) most = i;
      return most;
    },
    radius() {
      if (n > MOST_VARIABLES || given.length === 0) return () => Number.NaN;
      const then = given.slice();
      return () => radiusOf(then.slice(), n, SQUARINGS);
    },
  };
}

function allFinite(values: Float64Array): boolean {
  for (let i = 0; i < values.length; i++) if (!Number.isFinite(values[i])) return false;
  return true;
}
