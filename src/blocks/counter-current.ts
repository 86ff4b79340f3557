import type { StreamState } from '../model/stream.ts';
import type { Mixture } from '../properties/mixture.ts';
import { drawn, drawnChanges } from './heat-curve.ts';
import { createHeatPath, evenShares, inOrder, phaseChanges } from './heat-path.ts';
import { lowestPoint } from './lowest-point.ts';

/** Where two streams come closest. */
export interface ClosestApproach {
  /** share of the heat, counted from the cold end [0–1] */
  readonly share: number;
  readonly hotK: number;
  readonly coldK: number;
  /** hot less cold [K]; negative where they cross */
  readonly differenceK: number;
}

/** Two streams in counter-current flow, by share of the heat counted from the cold end. */
export interface CounterCurrent {
  lay(hotIn: StreamState, hotOut: StreamState, coldIn: StreamState, coldOut: StreamState): void;
  /**
   * The closest approach along the whole curve: at an end, where a stream starts to condense or boil, or
   * between, where heat capacities change over.
   * @throws PassTrouble
   */
  closest(): ClosestApproach;
  /**
   * UA = Σ ΔQ/ΔT_lm over intervals of the curve [W/K], null where the streams touch.
   * @throws PassTrouble
   */
  conductance(heatW: number): number | null;
  /** Points ready to be plotted, those where phases change and the closest included. @throws PassTrouble */
  curve(heatW: number, closest: ClosestApproach): ExchangeCurve;
}

export interface ExchangeCurve {
  /** from 0 at the cold end */
  readonly heat_kW: readonly number[];
  readonly hot_K: readonly number[];
  readonly cold_K: readonly number[];
}

/** Even intervals in which the closest approach is looked for; a valley narrower than one, without a change of phases, is not seen. */
const SEARCHED = 20;
/** Even intervals of the sum for UA: of two straight lines each is exact. */
const SUMMED = 40;
const DRAWN = 18;
/** How closely the share at which phases change is found: it decides the difference there directly. */
const CHANGE = 1e-12;
/** How closely the lowest point of a smooth valley is found: the difference there is good to the square of it. */
const VALLEY = 1e-6;
/** Share of an interval at which it is asked whether a curve falls away from its end or from a kink. */
const PROBE = 1e-3;

export function createCounterCurrent(mixture: Mixture): CounterCurrent {
  const hot = createHeatPath(mixture);
  const cold = createHeatPath(mixture);
  const difference = (x: number): number => hot.at(x) - cold.at(x);

  function changes(samples: readonly number[], tolerance: number): number[] {
    return [...phaseChanges(hot, samples, tolerance), ...phaseChanges(cold, samples, tolerance)];
  }

  return {
    lay(hotIn, hotOut, coldIn, coldOut) {
      hot.lay(hotOut, hotIn);
      cold.lay(coldIn, coldOut);
    },
    closest() {
      const even = evenShares(SEARCHED);
      const kinks = changes(even, CHANGE);
      const share = lowestOf(inOrder(even, kinks), new Set([0, 1, ...kinks]), difference);
      const hotK = hot.at(share);
      const coldK = cold.at(share);
      return { share, hotK, coldK, differenceK: hotK - coldK };
    },
    conductance(heatW) {
      const even = evenShares(SUMMED);
      const shares = inOrder(even, changes(even, CHANGE));
      let sum = 0;
      let before = difference(0);
      for (let k = 1; k < shares.length; k++) {
        const after = difference(shares[k]);
        if (!(before > 0 && after > 0)) return null;
        sum += ((shares[k] - shares[k - 1]) * heatW) / logMean(before, after);
        before = after;
      }
      return sum;
    },
    curve(heatW, closest) {
      const even = evenShares(DRAWN);
      const shares = inOrder(even, drawnChanges(changes(even, 1e-4)), [closest.share]);
      return {
        heat_kW: shares.map((x) => drawn((x * heatW) / 1e3)),
        hot_K: shares.map((x) => drawn(hot.at(x))),
        cold_K: shares.map((x) => drawn(cold.at(x))),
      };
    },
  };
}

/** Logarithmic mean of two differences [K]. */
export function logMean(a: number, b: number): number {
  // Near a = b the quotient loses its digits; the mean itself differs there from the half sum by (a − b)²/12a.
  if (Math.abs(a - b) < 1e-5 * a) return 0.5 * (a + b);
  return (a - b) / Math.log(a / b);
}

/**
 * The x of the lowest value of a function given at samples: every sample lower than its neighbours is followed
 * down. At an end or a kink (`sharp`) that is done to either side, if the function falls away from it at all.
 */
function lowestOf(xs: readonly number[], sharp: ReadonlySet<number>, f: (x: number) => number): number {
  const values = xs.map(f);
  let best = { x: xs[0], value: values[0] };
  const keep = (found: { readonly x: number; readonly value: number }) => {
    if (found.value < best.value) best = found;
  };
  xs.forEach((x, k) => {
    if (values[k] > (values[k - 1] ?? Infinity) || values[k] > (values[k + 1] ?? Infinity)) return;
    keep({ x, value: values[k] });
    if (!sharp.has(x)) {
      keep(lowestPoint(f, xs[k - 1], xs[k + 1], VALLEY));
      return;
    }
    for (const to of [xs[k - 1], xs[k + 1]]) {
      if (to === undefined || Math.abs(to - x) < VALLEY || f(x + PROBE * (to - x)) >= values[k]) continue;
      keep(lowestPoint(f, Math.min(x, to), Math.max(x, to), VALLEY));
    }
  });
  return best.x;
}
