import { solveLinear } from '../chemistry/linear-solve.ts';
import { PassTrouble } from '../diagnostics/diagnostic.ts';

/** dx/dz of a small system, written into `out`. */
export type Slope = (z: number, x: Float64Array, out: Float64Array) => void;

/** Follows a system that may be stiff; keeps its step from one call to the next. */
export interface ImplicitMarch {
  /** Forget the step of the last call: the next one starts as if it were the first. */
  restart(): void;
  /** Take x from z = `from` to z = `to`, in place. @throws PassTrouble `bed-integration` */
  march(from: number, to: number, x: Float64Array): void;
}

/** Rows of the extrapolation table, the first step being one Euler step, the k-th k of them. */
const ROWS = 9;
const FIRST_ROWS = 6;
/** of the way behind it, below which a step no longer moves z; at the inlet itself steps may be any size */
const SMALLEST_STEP = 1e-14;
const NO_STEP = 1e-60;
const MAX_STEPS = 1000;

/**
 * Extrapolated linearly implicit Euler steps with step and order chosen anew at each step:
 *   (I − s J) Δ = s f(z + s, x),  x ← x + Δ,  s = h/k,  k = 1, 2, 3, ...
 *   T_jk = T_j,k−1 + (T_j,k−1 − T_j−1,k−1)/(j/(j−k+1) − 1)
 * with the Jacobian J by differences at the start of the step. Where a catalyst has brought the gas to
 * equilibrium and only follows it from there, explicit steps must stay as short as the way to equilibrium is; these
 * need not.
 *
 * @param size  number of unknowns, a handful @param tolerance  error of a step, on unknowns of the order of 1
 * @param isPossible  false for an answer to be thrown away and tried again with a shorter step
 * @source P. Deuflhard, SIAM Review 27 (1985) 505-535; E. Hairer, G. Wanner, Solving Ordinary Differential
 *   Equations II, 2nd ed. 1996, sec. IV.9
 */
export function createImplicitMarch(
  size: number,
  slope: Slope,
  tolerance: number,
  isPossible: (x: Float64Array) => boolean,
): ImplicitMarch {
  const width = size + 1;
  const table = Array.from({ length: ROWS }, () => new Float64Array(size));
  const jacobian = new Float64Array(size * size);
  const system = new Float64Array(size * width);
  const f = new Float64Array(size);
  const g = new Float64Array(size);
  const moved = new Float64Array(size);
  /** by row: the step that would just meet the tolerance, and the work it takes per way */
  const fitting = new Float64Array(ROWS);
  const work = new Float64Array(ROWS);
  /** a step of 0 is still to be chosen */
  const kept = { step: 0, rows: FIRST_ROWS };

  function differentiate(z: number, x: Float64Array): void {
    slope(z, x, f);
    for (let c = 0; c < size; c++) {
      const dx = 1e-8 * Math.max(Math.abs(x[c]), 1e-3);
      moved.set(x);
      moved[c] += dx;
      slope(z, moved, g);
      for (let r = 0; r < size; r++) jacobian[r * size + c] = (g[r] - f[r]) / dx;
    }
  }

  /** k linearly implicit Euler steps over h; false where they lead nowhere */
  function euler(z: number, x: Float64Array, h: number, k: number, out: Float64Array): boolean {
    const s = h / k;
    out.set(x);
    for (let step = 1; step <= k; step++) {
      slope(z + step * s, out, g);
      for (let r = 0; r < size; r++) {
        for (let c = 0; c < size; c++) {
          system[r * width + c] = (r === c ? 1 : 0) - s * jacobian[r * size + c];
        }
        system[r * width + size] = s * g[r];
      }
      if (!solveLinear(system, size)) return false;
      for (let r = 0; r < size; r++) out[r] += system[r * width + size];
    }
    return true;
  }

  /** Extrapolate row j; the estimate of its error in units of the tolerance, NaN where there is none. */
  function extrapolate(j: number, x: Float64Array): number {
    for (let k = j; k > 0; k--) {
      const ratio = (j + 1) / k - 1;
      const upper = table[k];
      const lower = table[k - 1];
      for (let r = 0; r < size; r++) lower[r] = upper[r] + (upper[r] - lower[r]) / ratio;
    }
    let sum = 0;
    for (let r = 0; r < size; r++) {
      sum += ((table[0][r] - table[1][r]) / (tolerance * (1 + Math.abs(x[r])))) ** 2;
    }
    return Math.sqrt(sum / size);
  }

  /** Try one step; true when x has been moved by h. Either way the next step and its rows are chosen. */
  function tryStep(z: number, h: number, x: Float64Array): boolean {
    let cost = size + 1;
    let last = 1;
    let before = Number.POSITIVE_INFINITY;
    for (let j = 0; j < Math.min(kept.rows + 2, ROWS); j++) {
      if (!euler(z, x, h, j + 1, table[j])) return shorten(0.25 * h, last);
      cost += j + 1;
      if (j === 0) continue;
      const error = extrapolate(j, x);
      last = j;
      if (!Number.isFinite(error)) return shorten(0.1 * h, last);
      const factor = 0.9 * (0.9 / Math.max(error, 1e-12)) ** (1 / (j + 1));
      fitting[j] = h * Math.min(Math.max(factor, 0.05), 5);
      work[j] = cost / fitting[j];
      if (error <= 1) {
        if (!isPossible(table[0])) return shorten(0.25 * h, last);
        x.set(table[0]);
        lengthen(j, cost);
        return true;
      }
      if (j > 1 && error > 2 * before) break;
      before = error;
    }
    return shorten(Math.min(fitting[last], 0.5 * h), last);
  }

  function shorten(step: number, row: number): false {
    kept.step = step;
    kept.rows = Math.max(2, Math.min(kept.rows, row));
    return false;
  }

  /** One row less where that is cheaper per way, one more where the last one was worth it. */
  function lengthen(j: number, cost: number): void {
    const less = j > 1 && work[j - 1] < 0.8 * work[j];
    const more = !less && j < ROWS - 2 && (j < 2 || work[j] < 0.9 * work[j - 1]);
    kept.rows = Math.max(2, less ? j - 1 : more ? j + 1 : j);
    kept.step = less ? fitting[j - 1] : fitting[j] * (more ? (cost + j + 2) / cost : 1);
  }

  return {
    restart() {
      kept.step = 0;
      kept.rows = FIRST_ROWS;
    },
    march(from, to, x) {
      if (kept.step === 0) {
        slope(from, x, f);
        kept.step = firstStep(f);
      }
      let z = from;
      for (let steps = 0; z < to; steps++) {
        const wanted = kept.step;
        const isLast = z + 1.01 * wanted >= to;
        const h = isLast ? to - z : wanted;
        if (steps > MAX_STEPS || h < Math.max(SMALLEST_STEP * z, NO_STEP)) throw lost(z);
        differentiate(z, x);
        if (!tryStep(z, h, x)) continue;
        z = isLast ? to : z + h;
        // A step cut short by the end says little of the next one.
        if (isLast) kept.step = Math.max(kept.step, wanted);
      }
    },
  };
}

/**
 * A first step that is short enough for the steepest start: it moves no unknown by more than 1e-5. With a longer one
 * a gas may be thrown beyond all that can react, where every estimate of the error is 0.
 */
export function firstStep(slope: Float64Array): number {
  let steepest = 0.01;
  for (const rise of slope) steepest = Math.max(steepest, Math.abs(rise));
  return 1e-5 / steepest;
}

function lost(z: number): PassTrouble {
  return new PassTrouble(
    'bed-integration',
    `The gas cannot be followed beyond ${(100 * z).toPrecision(3)} % of the bed.`,
    'rates or enthalpy change faster there than steps can be made short: a gas below its dew point, or one that lacks what the rate law is singular without',
    'check temperature, pressure and composition of the inlet and the amount of catalyst',
  );
}
