import type { GasModel } from './gas-model.ts';
import type { LiquidPhase } from './liquid-phase.ts';
import { vapourFraction } from './rachford-rice.ts';

const MAX_STEPS = 300;
/** ln K is taken as settled when no value moves more than this. */
const SETTLED = 1e-13;
/** A step this small that no longer shrinks is rounding, not drift. */
const ROUNDING = 1e-10;
/** A split that has been single-phase for this many steps is taken to stay so. */
const SINGLE_STEPS = 30;
/** Every so many steps of substitution the rest of the way is guessed from the dominant eigenvalue. */
const STEPS_PER_LEAP = 5;
/** A leap is at most this many times the last step [-]. */
const LONGEST_LEAP = 50;
/** After so many steps a substitution is a long one: it creeps through a narrow place or nearly so. */
const LONG = 60;
/** How far a leap may lead in ln K then, whatever the last step. */
const LEAP_OUT = 0.1;
/** A substitution that halves ln K's error at each step, and moves it by less than this, is hastened by secants. */
const CLOSING = 0.1;
/** Steps that swing back by more than this share of the last one are shortened. */
export const SWING = -0.3;

/** Two phases of one overall composition, found from a guess of their K values; arrays in component order. */
export interface Substitution {
  /** overall mole fractions, to be set: solids 0 */
  readonly z: Float64Array;
  /** ln(y/x): the guess, then the answer */
  readonly lnK: Float64Array;
  /** compositions of liquid and gas */
  readonly x: Float64Array;
  readonly y: Float64Array;
  /** vapour and liquid fraction, each accurate when it is small; 0 or 1 says that one phase holds all */
  readonly share: { V: number; L: number };
  /**
   * Repeat K → V → x, y → K; the liquid phase must have been set to T and P.
   * @returns false when the K values do not settle
   */
  run(T: number, P: number): boolean;
}

/**
 * Successive substitution in ln K = ln(f/x)_liquid − ln(φ P). Near a critical point of the mixture the steps
 * shrink by a few per cent each; there the way left is leapt over by the dominant eigenvalue. In a liquid of
 * strong attraction (ammonia and water) they overshoot; there they are shortened by it. Where they close in fast
 * anyway, the last two are combined to the step that would have left least (Anderson's method, one step deep).
 *
 * @source Michelsen & Mollerup, Thermodynamic Models: Fundamentals & Computational Aspects, 2nd ed., ch. 10;
 *   eigenvalue: O. Orbach & C. M. Crowe, Can. J. Chem. Eng. 49 (1971) 509; D. G. Anderson, J. ACM 12 (1965) 547
 */
export function createSubstitution(gas: GasModel, liquidPhase: LiquidPhase): Substitution {
  const size = gas.size;
  const z = new Float64Array(size);
  const x = new Float64Array(size);
  const y = new Float64Array(size);
  const K = new Float64Array(size);
  const inverseK = new Float64Array(size);
  const lnPhi = new Float64Array(size);
  const lnLiquid = new Float64Array(size);
  const lnK = new Float64Array(size);
  /** what the next K values are off, now and in the step before; the step that was taken then */
  const offset = new Float64Array(size);
  const change = new Float64Array(size);
  const taken = new Float64Array(size);
  const share = { V: 0.5, L: 0.5 };

  return { z, lnK, x, y, share, run };

  function run(T: number, P: number): boolean {
    const lnP = Math.log(P);
    let last = Number.POSITIVE_INFINITY;
    change.fill(0);
    let shortened = 1;
    let factor = 1;
    for (let step = 0; step < MAX_STEPS; step++) {
      shareBetweenPhases();
      const single = share.V <= 0 || share.L <= 0;
      liquidPhase.lnFugacityPerFraction(x, lnLiquid);
      gas.lnPhi(T, P, y, lnPhi);
      let moved = 0;
      let along = 0;
      let before = 0;
      let turned = 0;
      for (let i = 0; i < size; i++) {
        offset[i] = 0;
        if (z[i] === 0) continue;
        const next = lnLiquid[i] - lnPhi[i] - lnP;
        const off = next === Number.POSITIVE_INFINITY ? 0 : next - lnK[i];
        if (off === 0) lnK[i] = next;
        moved = Math.max(moved, Math.abs(off));
        along += off * change[i];
        before += change[i] * change[i];
        turned += (off - change[i]) * (off - change[i]);
        offset[i] = off;
      }
      let done = moved <= SETTLED || (moved <= ROUNDING && moved >= last) || (single && step > SINGLE_STEPS);
      if (!done && !single && last < Number.POSITIVE_INFINITY && moved < CLOSING && moved < 0.5 * last) {
        // The next step would be shorter again by as much: this one leads to the answer.
        done = (moved * moved) / last <= SETTLED;
        let weight = 0;
        for (let i = 0; i < size; i++) weight += (offset[i] * (offset[i] - change[i])) / turned;
        for (let i = 0; i < size; i++) taken[i] = offset[i] - weight * (taken[i] + offset[i] - change[i]);
        factor = Number.NaN;
      } else {
        // The last step was multiplied by `factor`; from that follows the eigenvalue of a plain one.
        const eigenvalue = before > 0 && factor > 0 ? 1 + (along / before - 1) / factor : 0;
        if (eigenvalue < SWING) shortened = Math.min(shortened, 1 / (1 - eigenvalue));
        const leaps = step % STEPS_PER_LEAP === STEPS_PER_LEAP - 1 && !single && eigenvalue > 0;
        factor = leaps ? Math.max(shortened, wholeWay(eigenvalue, moved, step > LONG)) : shortened;
        for (let i = 0; i < size; i++) taken[i] = factor * offset[i];
        if (leaps) moved = Number.POSITIVE_INFINITY;
      }
      for (let i = 0; i < size; i++) {
        lnK[i] += taken[i];
        change[i] = offset[i];
      }
      if (done) {
        if (!single) shareBetweenPhases();
        return true;
      }
      last = moved;
    }
    return false;
  }

  /**
   * From lnK: V and L, and the compositions x and y. The lesser phase is the one solved for, so that a film of
   * dew has its composition to all digits.
   */
  function shareBetweenPhases(): void {
    for (let i = 0; i < size; i++) {
      if (share.L < 0.5) inverseK[i] = Math.exp(-lnK[i]);
      else K[i] = Math.exp(lnK[i]);
    }
    if (share.L < 0.5) {
      share.L = vapourFraction(z, inverseK, share.L);
      share.V = 1 - share.L;
      compositions(inverseK, share.L, y, x);
    } else {
      share.V = vapourFraction(z, K, share.V);
      share.L = 1 - share.V;
      compositions(K, share.V, x, y);
    }
  }

  /** Compositions of two phases, the second of which is that part of the whole and has `ratio` times the first. */
  function compositions(ratio: Float64Array, part: number, first: Float64Array, second: Float64Array): void {
    let sumFirst = 0;
    let sumSecond = 0;
    for (let i = 0; i < size; i++) {
      const k = ratio[i];
      const onlySecond = k === Number.POSITIVE_INFINITY;
      first[i] = onlySecond ? 0 : z[i] / (1 + part * (k - 1));
      second[i] = onlySecond ? z[i] / Math.max(part, 1e-300) : k * first[i];
      sumFirst += first[i];
      sumSecond += second[i];
    }
    for (let i = 0; i < size; i++) {
      first[i] /= sumFirst;
      second[i] /= sumSecond;
    }
  }
}

/**
 * By how much a step is multiplied to go the rest of the way. At an eigenvalue of 1 and more the steps of a long
 * substitution lead through the narrow place where two phases have just ceased to exist.
 */
function wholeWay(eigenvalue: number, moved: number, long: boolean): number {
  const furthest = 1 + (long ? Math.max(LEAP_OUT / moved, LONGEST_LEAP) : LONGEST_LEAP);
  if (eigenvalue < 1) return Math.min(1 / (1 - eigenvalue), furthest);
  return long ? 1 + LEAP_OUT / moved : 1;
}
