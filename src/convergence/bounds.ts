import type { FixedPointProblem } from './problem.ts';

/** Share of the way to a bound that a step must leave, when neither the guess nor the answer is nearer to it. */
const LEAVE = 0.1;

/**
 * Hold a step inside the bounds of a problem, in place. A variable may not come nearer to a bound than a tenth
 * of the distance that guess and answer keep from it: a flow thus falls to a tenth at most, and is never
 * thrown to zero or below by extrapolation.
 *
 * @param x,g  guess and answer the step starts from
 * @param xNext  the step, changed in place
 * @returns how many variables were held
 */
export function keepWithinBounds(
  problem: Pick<FixedPointProblem, 'lower' | 'upper'>,
  x: Float64Array,
  g: Float64Array,
  xNext: Float64Array,
): number {
  const { lower, upper } = problem;
  let held = 0;
  for (let i = 0; i < xNext.length; i++) {
    const low = lower[i];
    const high = upper ? upper[i] : Infinity;
    const floor = low === -Infinity ? low : low + LEAVE * Math.max(Math.min(x[i], g[i]) - low, 0);
    const ceiling = high === Infinity ? high : high - LEAVE * Math.max(high - Math.max(x[i], g[i]), 0);
    if (xNext[i] < floor) {
      xNext[i] = floor;
      held++;
    } else if (xNext[i] > ceiling) {
      xNext[i] = ceiling;
      held++;
    }
  }
  return held;
}
