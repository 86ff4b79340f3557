import type { GasActivity } from './gas-activity.ts';

/** Equilibrium along one reaction; `steps` and `extent` are those of the last solve. */
export interface SingleEquilibrium {
  readonly extent: number;
  readonly steps: number;
  /** where the answer lies between the two ends: ln(way from the low end / way to the high end) */
  readonly position: number;
  /**
   * Bring the reaction in row `at` of `rows` to equilibrium.
   *
   * @param lnK ln K with the standard pressure folded in: Σ ν (ln y + ln φ) = lnK over the gas
   * @param from amounts to start from, not negative
   * @param start first guess of `position`
   * @param lnPhi null: fugacities follow the composition; otherwise held at these values
   * @param tolerance largest |affinity|/RT [-]
   * @param amounts written; may be `from`
   * @returns false when it did not settle
   */
  solve(
    rows: Float64Array,
    at: number,
    lnK: number,
    from: Float64Array,
    T: number,
    P: number,
    start: number,
    lnPhi: Float64Array | null,
    tolerance: number,
    amounts: Float64Array,
  ): boolean;
}

/** exp(±690) is still a number of double precision */
const farthest = 690;
/** how far a reaction may run that no gas species bounds, in units of the gas amount */
const unbounded = 1e8;

/**
 * One reaction, solved for t = ln((ξ − ξlow)/(ξhigh − ξ)), where ξlow and ξhigh are the extents at which the
 * first product or reactant is used up. The affinity Σ ν ln(y φ) − ln K rises with t from −∞ to +∞, at both
 * ends in straight lines, so Newton inside a bracket settles from any start; amounts are counted from the
 * nearer end, so a trace of 1e-20 keeps all its digits. The effect of the composition on ln φ enters the
 * slope as a secant, remembered from solve to solve.
 */
export function createSingleEquilibrium(size: number, activity: GasActivity): SingleEquilibrium {
  const low = new Float64Array(size);
  const high = new Float64Array(size);
  const lnPhiHere = new Float64Array(size);
  const { inGas } = activity;
  const state = {
    extent: 0,
    steps: 0,
    position: 0,
    /** d(Σ ν ln φ)/d(extent/total) */
    phiSlope: 0,
    solve,
  };

  function solve(
    rows: Float64Array,
    at: number,
    lnK: number,
    from: Float64Array,
    T: number,
    P: number,
    start: number,
    lnPhi: Float64Array | null,
    tolerance: number,
    amounts: Float64Array,
  ): boolean {
    const total = activity.total(from);
    let first = Number.NEGATIVE_INFINITY;
    let last = Number.POSITIVE_INFINITY;
    let change = 0;
    for (let i = 0; i < size; i++) {
      const v = rows[at + i];
      if (v === 0 || inGas[i] === 0) continue;
      change += v;
      if (v > 0) first = Math.max(first, -from[i] / v);
      else last = Math.min(last, from[i] / -v);
    }
    if (first === Number.NEGATIVE_INFINITY) first = -unbounded * total;
    if (last === Number.POSITIVE_INFINITY) last = unbounded * total;
    const way = last - first;
    state.extent = 0;
    state.steps = 0;
    if (!(way > 0)) {
      amounts.set(from);
      return true;
    }
    for (let i = 0; i < size; i++) {
      low[i] = amountAtEnd(from[i], rows[at + i] * first, inGas[i] === 1);
      high[i] = amountAtEnd(from[i], rows[at + i] * last, inGas[i] === 1);
    }

    let t = Math.max(-farthest, Math.min(farthest, start));
    let below = -farthest;
    let above = farthest;
    let previousPhi = 0;
    let previousExtent = Number.NaN;
    let settled = false;
    const phi = lnPhi ?? lnPhiHere;
    for (let step = 1; step <= 200; step++) {
      state.steps = step;
      const fromLow = way / (1 + Math.exp(-t));
      const fromHigh = way / (1 + Math.exp(t));
      const extent = t < 0 ? first + fromLow : last - fromHigh;
      for (let i = 0; i < size; i++) {
        const v = rows[at + i];
        amounts[i] = v === 0 ? from[i] : t < 0 ? low[i] + v * fromLow : high[i] - v * fromHigh;
      }
      state.extent = extent;
      if (settled) break;
      const gasTotal = activity.total(amounts);
      if (lnPhi === null) activity.lnPhi(T, P, amounts, gasTotal, phi);
      let affinity = -lnK - change * Math.log(gasTotal);
      let curvature = (-change * change) / gasTotal;
      let phiSum = 0;
      for (let i = 0; i < size; i++) {
        const v = rows[at + i];
        if (v === 0 || inGas[i] === 0) continue;
        affinity += v * Math.log(amounts[i]);
        phiSum += v * phi[i];
        curvature += (v * v) / amounts[i];
      }
      affinity += phiSum;
      if (lnPhi === null && activity.real) {
        const moved = extent - previousExtent;
        if (Math.abs(moved) > 1e-9 * way) state.phiSlope = ((phiSum - previousPhi) / moved) * total;
        previousPhi = phiSum;
        previousExtent = extent;
      }
      if (Math.abs(affinity) <= 1e-14) break;
      if (affinity > 0) above = t;
      else below = t;
      const rate = way / (2 + Math.exp(t) + Math.exp(-t));
      const ideal = curvature * rate;
      const withPhi = ideal + (lnPhi === null ? (state.phiSlope / total) * rate : 0);
      const slope = withPhi > 0.2 * ideal ? withPhi : ideal;
      let next = t - affinity / slope;
      if (!(next > below && next < above)) next = 0.5 * (below + above);
      // the last step is taken before leaving: it costs nothing and squares the error
      settled =
        Math.abs(affinity) <= tolerance ||
        Math.abs(next - t) <= 1e-14 * Math.max(1, Math.abs(t)) ||
        above - below < 1e-12;
      if (Math.abs(affinity) <= tolerance && Math.abs(next - t) > 0.1) break;
      t = next;
    }
    state.position = t;
    return settled || state.steps < 200;
  }

  return state;
}

/** Amount at an end of the way; what is used up there is exactly 0, whatever rounding says. */
function amountAtEnd(from: number, change: number, gas: boolean): number {
  const left = from + change;
  if (!gas) return left;
  return left <= 4e-16 * Math.max(from, Math.abs(change)) ? 0 : left;
}
