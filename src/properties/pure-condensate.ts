import type { GasModel } from './gas-model.ts';

const MAX_STEPS = 20;
/** ln of the fraction is taken as settled when it moves no more than this. */
const SETTLED = 1e-13;
/** What is left over falls by 1 per ln y in an ideal gas; where it hardly falls a critical point is near: no case for this. */
const FLATTEST = -0.2;

/**
 * What stays of the one component that condenses, and condenses pure, in the gas over its liquid: ln y + ln φ + ln P =
 * ln f(liquid), by secants in ln y. The general substitution comes to the same in as many steps, but shares out all
 * components in each.
 *
 * @param gas  model of the gas
 * @returns a function of T, P, overall fractions z, the index k of what condenses, ln(f/P) of its liquid and ln φ of it
 *   in a gas of composition z; gives y, NaN where the secants do not close in
 */
export function createPureCondensate(gas: GasModel) {
  const y = new Float64Array(gas.size);
  const lnPhi = new Float64Array(gas.size);

  return (T: number, P: number, z: Float64Array, k: number, lnLiquid: number, lnPhiAtZ: number): number => {
    let before = Math.log(z[k]);
    let offBefore = lnLiquid - lnPhiAtZ - before;
    let at = before + offBefore;
    for (let step = 0; step < MAX_STEPS; step++) {
      const fraction = Math.exp(at);
      if (!(fraction < 1)) return Number.NaN;
      const ofOthers = (1 - fraction) / (1 - z[k]);
      for (let i = 0; i < y.length; i++) y[i] = z[i] * ofOthers;
      y[k] = fraction;
      gas.lnPhi(T, P, y, lnPhi);
      const off = lnLiquid - lnPhi[k] - at;
      if (Math.abs(off) <= SETTLED) return Math.exp(at + off);
      const slope = (off - offBefore) / (at - before);
      if (!(slope < FLATTEST)) return Number.NaN;
      const next = at - off / slope;
      // The next step would be shorter again by as much: this one leads to the answer.
      if ((off * off) / Math.abs(offBefore) <= SETTLED) return Math.exp(next);
      before = at;
      offBefore = off;
      at = next;
    }
    return Number.NaN;
  };
}
