import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { Role } from './component-roles.ts';
import type { GasModel } from './gas-model.ts';
import type { LiquidPhase } from './liquid-phase.ts';
import { createSubstitution, SWING } from './phase-substitution.ts';
import { createPureCondensate } from './pure-condensate.ts';

/** Rounds after which the first drop or bubble has its composition well enough to tell which way it goes. */
const MAX_ROUNDS = 50;

/** A gas that does not dissolve makes no bubble below this mole fraction: the bubble would be rounding. */
const NO_BUBBLE = 1e-13;

/** A first drop that adds up to less than this is far from forming: 1e-6 of the temperature move the sum by some 1e-5. */
const CLEAR = 0.99;
/** What the temperature may fall by after a split that found clear gas [-]. */
const CLEAR_SPAN = 1e-6;

/** With less of the one component that condenses than this, what stays in the gas is solved for by itself. */
const MOSTLY_GAS = 0.9;

/** Shares the fluid of a stream between gas and liquid at given temperature and pressure. */
export interface PhaseSplit {
  /**
   * @param T,P  temperature [K], pressure [Pa]
   * @param flows  all components [mol/s], solids included
   * @param liquid  written: the liquid part, solids included [mol/s]
   * @returns mol vapour / mol fluid; 1 when there is no fluid
   * @throws PassTrouble when the split does not settle
   */
  split(T: number, P: number, flows: Float64Array, liquid: Float64Array): number;
  /** The last split found gas alone, so far from its dew point that 1e-6 of the temperature makes no dew. */
  isClear(): boolean;
}

/**
 * Phase split by successive substitution in ln K = ln(f/x)_liquid − ln(φ P), with tests for a single phase
 * first. It always starts from the first drop, never from the last state: near a critical point two answers may both
 * hold, and which one is given must not depend on what was asked before.
 *
 * A cubic equation has no gas to offer for the composition of a compressed liquid: its only root is then its
 * own liquid, a few per cent off this one in fugacity, and to compare the two would be to toss a coin. Such a
 * root counts as no gas.
 *
 * @source Michelsen & Mollerup, Thermodynamic Models: Fundamentals & Computational Aspects, 2nd ed., ch. 9–10
 */
export function createPhaseSplit(gas: GasModel, liquidPhase: LiquidPhase): PhaseSplit {
  const size = gas.size;
  const substitution = createSubstitution(gas, liquidPhase);
  const { z, x, y, lnK, share } = substitution;
  const drop = new Float64Array(size);
  const lnPhi = new Float64Array(size);
  const lnLiquid = new Float64Array(size);
  const change = new Float64Array(size);
  const gasFraction = createPureCondensate(gas);
  const found = { clear: false };

  return {
    isClear: () => found.clear,
    split(T, P, flows, liquid) {
      const total = overallFractions(flows, liquidPhase.roles, z);
      putAllInGas(flows, liquidPhase.roles, liquid);
      found.clear = !liquidPhase.mayForm((1 - CLEAR_SPAN) * T, z);
      if (total === 0 || !liquidPhase.mayForm(T, z)) return 1;
      liquidPhase.at(T, P);
      const maybeGas = !gas.isLiquidLike(T, P, z);
      if (gasIsStable(T, P, maybeGas)) return 1;
      if (liquidIsStable(T, P)) {
        liquid.set(flows);
        return 0;
      }
      const k = liquidPhase.pureCondensate;
      if (k >= 0 && maybeGas && z[k] < MOSTLY_GAS) {
        const left = gasFraction(T, P, z, k, lnLiquid[k] - Math.log(P), lnPhi[k]);
        if (left < z[k]) {
          liquid[k] = ((z[k] - left) / (1 - left)) * total;
          return (1 - z[k]) / (1 - left);
        }
      }
      startFromDrop();
      if (!substitution.run(T, P)) throw unsettled(T, P);
      // Two phases that have become one: it is a liquid where its density says so.
      const { V, L } = share;
      if (V <= 0 || (L <= 0 && !maybeGas && liquidHoldsAll(T))) {
        liquid.set(flows);
        return 0;
      }
      if (L <= 0 || !liquidPhase.isLiquid(T, x)) return 1;
      for (let i = 0; i < size; i++) {
        if (liquidPhase.roles[i] !== 'solid') liquid[i] = Math.min(L * total * x[i], flows[i]);
      }
      return V;
    },
  };

  /** Would the first drop of liquid evaporate from the gas of composition z? Leaves it in `drop`, not normalised. */
  function gasIsStable(T: number, P: number, maybeGas: boolean): boolean {
    if (maybeGas) gas.lnPhi(T, P, z, lnPhi);
    else lnPhi.fill(0);
    const lnP = Math.log(P);
    drop.set(z);
    change.fill(0);
    let sum = 0;
    let shortened = 1;
    let last = 0;
    // The composition of the drop enters through solvent shares and activities: without them two rounds settle it.
    for (let round = 0; round < MAX_ROUNDS; round++) {
      liquidPhase.lnFugacityPerFraction(drop, lnLiquid);
      let moved = 0;
      let along = 0;
      let before = 0;
      sum = 0;
      for (let i = 0; i < size; i++) {
        if (lnLiquid[i] === Number.POSITIVE_INFINITY) drop[i] = 0;
        if (drop[i] === 0) continue;
        const apart = round === 0 ? 0 : Math.log(z[i] / drop[i]);
        const off = apart + lnPhi[i] + lnP - lnLiquid[i];
        moved = Math.max(moved, Math.abs(off));
        along += off * change[i];
        before += change[i] * change[i];
        change[i] = off;
      }
      // Strong attraction in the liquid (ammonia and water) makes plain steps swing, further each time.
      const eigenvalue = before > 0 ? 1 + (along / before - 1) / shortened : 0;
      if (eigenvalue < SWING) shortened = Math.min(shortened, 1 / (1 - eigenvalue));
      for (let i = 0; i < size; i++) {
        if (drop[i] > 0) drop[i] *= Math.exp(shortened * change[i]);
        sum += drop[i];
      }
      // Where composition does not act, the first round was exact.
      if (moved <= 1e-12 || !liquidPhase.compositionActs) break;
      // As many steps as are left, each no smaller than this one, would not bring the sum up to 1.
      if (maybeGas && moved < last && (MAX_ROUNDS - round) * moved < -Math.log(sum)) break;
      last = moved;
    }
    found.clear = maybeGas && sum <= CLEAR;
    return (maybeGas && sum <= 1) || !liquidPhase.isLiquid(T, drop);
  }

  /** Can all there is be one liquid? Leaves its fugacities in lnLiquid. */
  function liquidHoldsAll(T: number): boolean {
    if (!liquidPhase.isLiquid(T, z)) return false;
    liquidPhase.lnFugacityPerFraction(z, lnLiquid);
    for (let i = 0; i < size; i++) {
      if (z[i] > NO_BUBBLE && lnLiquid[i] === Number.POSITIVE_INFINITY) return false;
    }
    return true;
  }

  /** Would the first bubble collapse in the liquid of composition z? Gases that do not dissolve say no. */
  function liquidIsStable(T: number, P: number): boolean {
    if (!liquidHoldsAll(T)) return false;
    lnPhi.fill(0);
    const lnP = Math.log(P);
    let sum = 0;
    for (let round = 0; round < MAX_ROUNDS; round++) {
      let next = 0;
      for (let i = 0; i < size; i++) {
        const finite = lnLiquid[i] !== Number.POSITIVE_INFINITY;
        y[i] = z[i] > 0 && finite ? z[i] * Math.exp(lnLiquid[i] - lnPhi[i] - lnP) : 0;
        next += y[i];
      }
      for (let i = 0; i < size; i++) y[i] /= next;
      if (gas.isLiquidLike(T, P, y)) return true;
      gas.lnPhi(T, P, y, lnPhi);
      if (Math.abs(next - sum) < 1e-12) return next <= 1;
      sum = next;
    }
    return sum <= 1;
  }

  function startFromDrop(): void {
    for (let i = 0; i < size; i++) lnK[i] = z[i] === 0 ? 0 : Math.log(z[i] / drop[i]);
  }
}

/** Mole fractions of the fluid; returns its flow [mol/s]. */
export function overallFractions(flows: Float64Array, roles: readonly Role[], z: Float64Array): number {
  let total = 0;
  for (let i = 0; i < z.length; i++) if (roles[i] !== 'solid') total += flows[i];
  for (let i = 0; i < z.length; i++) z[i] = total > 0 && roles[i] !== 'solid' ? flows[i] / total : 0;
  return total;
}

/** Solids lie with the liquid, wherever the rest is. */
export function putAllInGas(flows: Float64Array, roles: readonly Role[], liquid: Float64Array): void {
  for (let i = 0; i < liquid.length; i++) liquid[i] = roles[i] === 'solid' ? flows[i] : 0;
}

export function unsettled(T: number, P: number): PassTrouble {
  return new PassTrouble(
    'phase-split',
    `The split into gas and liquid at ${(T - 273.15).toFixed(2)} degC and ${(P / 1e5).toFixed(3)} bar does not settle.`,
    'the two phases are close to identical there (near the critical point of the mixture)',
    'move the temperature or pressure of this block away from the critical region',
  );
}
