/** A variable below this share of its scale counts as that large: it may appear out of nothing. */
const NOTHING = 1e-3;

/**
 * Shorten a step as a whole, in place, until no variable grows to more than `factor` times the larger of guess and
 * answer nor falls below the smaller of the two over `factor`. A model of a loop is good near the passes
 * it was made from; far away it throws flows a thousandfold. Shortened from the answer, so that a direct
 * step always remains. Variables that are or may become negative are left alone downward.
 *
 * @param x,g  guess and answer the step starts from
 * @param xNext  the step, changed in place
 * @returns the share of the step that is left, 1 when nothing was shortened
 */
export function limitStep(
  x: Float64Array,
  g: Float64Array,
  scale: Float64Array,
  xNext: Float64Array,
  factor: number,
): number {
  let share = 1;
  for (let i = 0; i < x.length; i++) {
    const low = Math.min(x[i], g[i]) / factor;
    if (low < 0) continue;
    const high = factor * Math.max(x[i], g[i], NOTHING * scale[i]);
    const bound = Math.min(Math.max(xNext[i], low), high);
    if (bound !== xNext[i]) share = Math.min(share, (bound - g[i]) / (xNext[i] - g[i]));
  }
  if (share < 1) for (let i = 0; i < x.length; i++) xNext[i] = g[i] + share * (xNext[i] - g[i]);
  return share;
}
