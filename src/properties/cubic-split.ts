import type { Component } from '../model/component.ts';
import type { GasModel } from './gas-model.ts';
import type { LiquidPhase } from './liquid-phase.ts';
import { overallFractions, type PhaseSplit, putAllInGas, unsettled } from './phase-split.ts';
import { createSubstitution } from './phase-substitution.ts';

const MAX_ROUNDS = 200;
/** A trial phase is taken as settled when no ln of its amounts moves more than this. */
const SETTLED = 1e-9;
/** Σ (ln W/z)² below which a trial phase has become the feed itself. */
const TRIVIAL = 1e-8;
/** A trial phase this much larger than 1 would grow out of the feed. */
const GROWS = 1e-9;
/** Two phases whose ln K are all below this are one. */
const APART = 1e-4;
/** Every so many rounds the rest of the way is guessed from the dominant eigenvalue. */
const ROUNDS_PER_LEAP = 5;
const LONGEST_LEAP = 20;

/**
 * Phase split of one equation of state in both phases: the feed, on the root of lower Gibbs energy, is tested
 * with a gas-like and a liquid-like trial phase from Wilson's K values for the tangent plane distance; where
 * one of them would grow, K values are substituted until the fugacities are the same. Nothing is kept from one
 * state to the next: where the equation has more than one pair of phases to offer (two liquids and a gas), the
 * answer must not depend on what was asked before.
 *
 * Two liquids are not told apart: where the equation has two and no gas, they are counted as one.
 *
 * @param gas  the equation on its vapour root
 * @param liquidPhase  the same on its liquid root, see cubic-liquid.ts
 * @source M. L. Michelsen, Fluid Phase Equilib. 9 (1982) 1 and 21; G. M. Wilson, A modified Redlich-Kwong
 *   equation of state, 65th AIChE meeting, Cleveland 1969
 */
export function createCubicSplit(
  components: readonly Component[],
  gas: GasModel,
  liquidPhase: LiquidPhase,
): PhaseSplit {
  const size = components.length;
  const substitution = createSubstitution(gas, liquidPhase);
  const { z, x, y, lnK, share } = substitution;
  const lnGas = new Float64Array(size);
  const lnLiquid = new Float64Array(size);
  /** ln z + ln φ of the feed */
  const feed = new Float64Array(size);
  const lnWilson = new Float64Array(size);
  const lnTrial = new Float64Array(size);
  const trial = new Float64Array(size);
  const lnBubble = new Float64Array(size);
  const lnDrop = new Float64Array(size);
  const change = new Float64Array(size);

  return {
    // Its trial phases are settled too loosely to tell how far the dew point is.
    isClear: () => false,
    split(T, P, flows, liquid) {
      const total = overallFractions(flows, liquidPhase.roles, z);
      putAllInGas(flows, liquidPhase.roles, liquid);
      if (total === 0 || !liquidPhase.mayForm(T, z)) return 1;
      liquidPhase.at(T, P);
      const isLiquid = chooseRoot(T, P);
      wilson(T, P);
      const drop = grows(T, P, -1, lnDrop);
      const bubble = grows(T, P, 1, lnBubble);
      if (drop || bubble) {
        start(drop, bubble);
        if (!substitution.run(T, P)) throw unsettled(T, P);
      }
      if (!(drop || bubble) || !areTwo(T, P)) {
        if (!isLiquid) return 1;
        liquid.set(flows);
        return 0;
      }
      for (let i = 0; i < size; i++) {
        if (liquidPhase.roles[i] !== 'solid') liquid[i] = Math.min(share.L * total * x[i], flows[i]);
      }
      return share.V;
    },
  };

  /** Has the substitution ended in a gas and a liquid? */
  function areTwo(T: number, P: number): boolean {
    if (share.V <= 0 || share.L <= 0 || gas.isLiquidLike(T, P, y)) return false;
    for (let i = 0; i < size; i++) if (z[i] > 0 && Math.abs(lnK[i]) > APART) return true;
    return false;
  }

  /** Sets `feed` on the root of lower Gibbs energy; true where that is a liquid. */
  function chooseRoot(T: number, P: number): boolean {
    gas.lnPhi(T, P, z, lnGas);
    liquidPhase.lnFugacityPerFraction(z, lnLiquid);
    const lnP = Math.log(P);
    let gain = 0;
    for (let i = 0; i < size; i++) {
      if (z[i] > 0) gain += z[i] * (lnGas[i] + lnP - lnLiquid[i]);
    }
    const dense = gas.isLiquidLike(T, P, z);
    const isLiquid = gain > 1e-12 || (gain > -1e-12 && dense);
    for (let i = 0; i < size; i++) {
      feed[i] = z[i] > 0 ? Math.log(z[i]) + (isLiquid ? lnLiquid[i] - lnP : lnGas[i]) : 0;
    }
    return isLiquid;
  }

  function wilson(T: number, P: number): void {
    for (let i = 0; i < size; i++) {
      const critical = components[i].critical;
      lnWilson[i] = critical
        ? Math.log(critical.pressurePa / P) +
          5.37 * (1 + critical.acentricFactor) * (1 - critical.temperatureK / T)
        : 0;
    }
  }

  /**
   * Would a trial phase grow out of the feed? ln Wᵢ = ln zᵢ + ln φᵢ(z) − ln φᵢ(W), until ΣW tells.
   * @param sign  1 for a bubble, −1 for a drop; its ln W is left in `out`
   */
  function grows(T: number, P: number, sign: 1 | -1, out: Float64Array): boolean {
    const lnP = Math.log(P);
    for (let i = 0; i < size; i++) {
      lnTrial[i] = z[i] > 0 ? Math.log(z[i]) + sign * lnWilson[i] : Number.NEGATIVE_INFINITY;
    }
    change.fill(0);
    let sum = 0;
    for (let round = 0; round < MAX_ROUNDS; round++) {
      for (let i = 0; i < size; i++) trial[i] = Math.exp(lnTrial[i]);
      if (sign > 0) gas.lnPhi(T, P, trial, lnGas);
      else liquidPhase.lnFugacityPerFraction(trial, lnLiquid);
      let moved = 0;
      let along = 0;
      let before = 0;
      let away = 0;
      sum = 0;
      for (let i = 0; i < size; i++) {
        if (z[i] === 0) continue;
        const next = feed[i] - (sign > 0 ? lnGas[i] : lnLiquid[i] - lnP);
        sum += Math.exp(next);
        if (next === Number.NEGATIVE_INFINITY) {
          lnTrial[i] = next;
          continue;
        }
        const off = next - lnTrial[i];
        moved = Math.max(moved, Math.abs(off));
        along += off * change[i];
        before += change[i] * change[i];
        change[i] = off;
        lnTrial[i] = next;
        const distance = next - Math.log(z[i]);
        away += distance * distance;
      }
      if (away < TRIVIAL) return false;
      if (moved < SETTLED) break;
      const eigenvalue = before > 0 ? along / before : 0;
      if (round % ROUNDS_PER_LEAP === ROUNDS_PER_LEAP - 1 && eigenvalue > 0 && eigenvalue < 1) {
        const leap = Math.min(eigenvalue / (1 - eigenvalue), LONGEST_LEAP);
        for (let i = 0; i < size; i++)
          if (lnTrial[i] > Number.NEGATIVE_INFINITY) lnTrial[i] += leap * change[i];
      }
    }
    out.set(lnTrial);
    return sum > 1 + GROWS && !(sign > 0 && gas.isLiquidLike(T, P, trial));
  }

  /** K values from the trial phases that grow; the feed stands for one that does not. */
  function start(drop: boolean, bubble: boolean): void {
    for (let i = 0; i < size; i++) {
      const lnZ = Math.log(z[i]);
      lnK[i] = z[i] === 0 ? 0 : (bubble ? lnBubble[i] : lnZ) - (drop ? lnDrop[i] : lnZ);
    }
    share.V = 0.5;
    share.L = 0.5;
  }
}
