/** The last few differences of guess and residual: a model of how the residual answers to a step. */
export interface Secants {
  /** pairs of differences held */
  held(): number;
  /** Forget the differences and the last point. */
  clear(): void;
  /** Take in a point; from the second one on, a pair of differences is held. */
  record(x: Float64Array, g: Float64Array): void;
  /**
   * The fixed point of the model: out = x − Σ γⱼ Δxⱼ + β (f − Σ γⱼ Δfⱼ), γ from least squares of f − Σ γⱼ Δfⱼ.
   * Without any pair held, out = x + β f.
   *
   * @param mixing  β, how much of the residual that the pairs do not explain is taken, per variable [-]
   * @returns the number of pairs used; the others were nearly dependent on newer ones
   */
  step(
    x: Float64Array,
    g: Float64Array,
    scale: Float64Array,
    mixing: Float64Array,
    out: Float64Array,
  ): number;
}

/**
 * Multi-secant model of a map G on n variables, f = G(x) − x.
 *
 * Least squares in scaled variables by modified Gram-Schmidt from the newest pair to the oldest, two rounds for
 * each column; a pair whose remainder is below `independence` times its length says nothing that newer
 * pairs have not said better and is left out. Nothing is allocated after creation.
 *
 * @param n  number of variables
 * @param memory  pairs kept at most; the oldest goes first
 * @param independence  relative remainder below which a pair is left out [-]
 * @source D. G. Anderson, J. ACM 12 (1965) 547-560; H. F. Walker, P. Ni, SIAM J. Numer. Anal. 49 (2011) 1715-1735
 */
export function createSecants(n: number, memory: number, independence: number): Secants {
  // by slot, n numbers each
  const dx = new Float64Array(memory * n);
  const df = new Float64Array(memory * n);
  const Q = new Float64Array(memory * n);
  const column = new Float64Array(n);
  const R = new Float64Array(memory * memory);
  const slotOf = new Int32Array(memory);
  const gamma = new Float64Array(memory);
  const f = new Float64Array(n);
  const xLast = new Float64Array(n);
  const fLast = new Float64Array(n);
  let points = 0;
  let held = 0;
  let newest = -1;

  function record(x: Float64Array, g: Float64Array): void {
    if (points > 0) {
      newest = (newest + 1) % memory;
      held = Math.min(held + 1, memory);
      for (let i = 0; i < n; i++) {
        dx[newest * n + i] = x[i] - xLast[i];
        df[newest * n + i] = g[i] - x[i] - fLast[i];
      }
    }
    for (let i = 0; i < n; i++) {
      xLast[i] = x[i];
      fLast[i] = g[i] - x[i];
    }
    points++;
  }

  /** Orthonormal columns of the scaled Δf, newest first; returns how many were independent. */
  function factorise(scale: Float64Array): number {
    let used = 0;
    for (let age = 0; age < held && used < n; age++) {
      const slot = (newest - age + memory) % memory;
      const q = column;
      for (let i = 0; i < n; i++) q[i] = df[slot * n + i] / scale[i];
      const length = Math.sqrt(dot(q, 0, q));
      if (!(length > 0) || !Number.isFinite(length)) continue;
      for (let k = 0; k < used; k++) R[k * memory + used] = 0;
      for (let round = 0; round < 2; round++) {
        for (let k = 0; k < used; k++) {
          const along = dot(Q, k * n, q);
          R[k * memory + used] = R[k * memory + used] + along;
          for (let i = 0; i < n; i++) q[i] = q[i] - along * Q[k * n + i];
        }
      }
      const rest = Math.sqrt(dot(q, 0, q));
      if (rest <= independence * length) continue;
      for (let i = 0; i < n; i++) Q[used * n + i] = q[i] / rest;
      R[used * memory + used] = rest;
      slotOf[used] = slot;
      used++;
    }
    return used;
  }

  function step(
    x: Float64Array,
    g: Float64Array,
    scale: Float64Array,
    mixing: Float64Array,
    out: Float64Array,
  ): number {
    const used = factorise(scale);
    for (let i = 0; i < n; i++) f[i] = (g[i] - x[i]) / scale[i];
    for (let k = used - 1; k >= 0; k--) {
      let sum = dot(Q, k * n, f);
      for (let j = k + 1; j < used; j++) sum -= R[k * memory + j] * gamma[j];
      gamma[k] = sum / R[k * memory + k];
    }
    for (let i = 0; i < n; i++) {
      let move = 0;
      let unexplained = g[i] - x[i];
      for (let k = 0; k < used; k++) {
        move -= gamma[k] * dx[slotOf[k] * n + i];
        unexplained -= gamma[k] * df[slotOf[k] * n + i];
      }
      out[i] = x[i] + move + mixing[i] * unexplained;
    }
    return used;
  }

  return {
    held: () => held,
    clear() {
      points = 0;
      held = 0;
      newest = -1;
    },
    record,
    step,
  };
}

/** Σ a b with a from place `at` on. */
function dot(a: Float64Array, at: number, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < b.length; i++) sum += a[at + i] * b[i];
  return sum;
}
