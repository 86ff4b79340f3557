import { PassTrouble } from '../diagnostics/diagnostic.ts';
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
}

/**
 * Phase split by successive substitution in ln K = ln(f/x)_liquid − ln(φ P), with tests for a single phase
 * first. The last K values are kept: a neighbouring state starts from them.
 *
 * A cubic equation has no gas to offer for the composition of a compressed liquid: its only root is then its
 * own liquid, a few per cent off this one in fugacity, and to compare the two would be to toss a coin. Such a
 * root counts as no gas.
 *
 * @source Michelsen & Mollerup, Thermodynamic Models: Fundamentals & Computational Aspects, 2nd ed., ch. 9–10
 */
export function createPhaseSplit(gas: GasModel, liquidPhase: LiquidPhase): PhaseSplit {
  const size = gas.size;
  const z = new Float64Array(size);
  const x = new Float64Array(size);
  const y = new Float64Array(size);
  const K = new Float64Array(size);
  const lnPhi = new Float64Array(size);
  const lnLiquid = new Float64Array(size);
  const lnK = new Float64Array(size);
  const lnKKept = new Float64Array(size);
  let kept = false;
  let V = 0.5;

  return {
    split(T, P, flows, liquid) {
      const total = overallFractions(flows);
      putAllInGas(flows, liquid);
      if (total === 0 || !liquidPhase.canExist(T, z)) return 1;
      liquidPhase.at(T, P);
      const warm = kept && partsFromKept(T, P);
      kept = false;
      if (!warm) {
        if (gasIsStable(T, P)) return 1;
        if (!liquidIsStable(T, P)) {
          startFromDrop();
          if (!substitute(T, P)) throw unsettled(T, P);
        } else V = 0;
      }
      if (V >= 1) return 1;
      if (V <= 0) {
        liquid.set(flows);
        return 0;
      }
      lnKKept.set(lnK);
      kept = true;
      for (let i = 0; i < size; i++) {
        if (liquidPhase.roles[i] !== 'solid') liquid[i] = Math.min((1 - V) * total * x[i]!, flows[i]!);
      }
      return V;
    },
  };

  /** Two phases from the K values of the last state? If not, the tests of a single phase must be asked. */
  function partsFromKept(T: number, P: number): boolean {
    lnK.set(lnKKept);
    return substitute(T, P) && V > 0 && V < 1 && !gas.isLiquidLike(T, P, y);
  }

  function overallFractions(flows: Float64Array): number {
    let total = 0;
    for (let i = 0; i < size; i++) if (liquidPhase.roles[i] !== 'solid') total += flows[i]!;
    for (let i = 0; i < size; i++) {
      z[i] = total > 0 && liquidPhase.roles[i] !== 'solid' ? flows[i]! / total : 0;
    }
    return total;
  }

  function putAllInGas(flows: Float64Array, liquid: Float64Array): void {
    for (let i = 0; i < size; i++) liquid[i] = liquidPhase.roles[i] === 'solid' ? flows[i]! : 0;
  }

  /** Would the first drop of liquid evaporate from the gas of composition z? Leaves that drop in x. */
  function gasIsStable(T: number, P: number): boolean {
    const isGas = !gas.isLiquidLike(T, P, z);
    if (isGas) gas.lnPhi(T, P, z, lnPhi);
    else lnPhi.fill(0);
    const lnP = Math.log(P);
    x.set(z);
    let sum = 0;
    // The composition of the drop enters through the solvent shares only: three rounds settle it.
    for (let round = 0; round < 3; round++) {
      liquidPhase.lnFugacityPerFraction(x, lnLiquid);
      sum = 0;
      for (let i = 0; i < size; i++) {
        x[i] = z[i]! === 0 ? 0 : z[i]! * Math.exp(lnPhi[i]! + lnP - lnLiquid[i]!);
        sum += x[i]!;
      }
    }
    return isGas && sum <= 1;
  }

  /** Would the first bubble collapse in the liquid of composition z? Gases that do not dissolve say no. */
  function liquidIsStable(T: number, P: number): boolean {
    liquidPhase.lnFugacityPerFraction(z, lnLiquid);
    for (let i = 0; i < size; i++) {
      if (z[i]! > 0 && lnLiquid[i] === Number.POSITIVE_INFINITY) return false;
    }
    lnPhi.fill(0);
    const lnP = Math.log(P);
    let sum = 0;
    for (let round = 0; round < 50; round++) {
      let next = 0;
      for (let i = 0; i < size; i++) {
        y[i] = z[i]! === 0 ? 0 : z[i]! * Math.exp(lnLiquid[i]! - lnPhi[i]! - lnP);
        next += y[i]!;
      }
      for (let i = 0; i < size; i++) y[i]! /= next;
      if (gas.isLiquidLike(T, P, y)) return true;
      gas.lnPhi(T, P, y, lnPhi);
      if (Math.abs(next - sum) < 1e-12) return next <= 1;
      sum = next;
    }
    return sum <= 1;
  }

  function startFromDrop(): void {
    for (let i = 0; i < size; i++) lnK[i] = z[i]! === 0 ? 0 : Math.log(z[i]! / x[i]!);
  }

  /**
   * Repeat: K → V → x, y → K. Leaves V, x, y, lnK; V of 0 or 1 says that one phase holds all.
   * @returns false when the K values do not settle
   */
  function substitute(T: number, P: number): boolean {
    const lnP = Math.log(P);
    let last = Number.POSITIVE_INFINITY;
    for (let step = 0; step < MAX_STEPS; step++) {
      for (let i = 0; i < size; i++) K[i] = Math.exp(lnK[i]!);
      V = vapourFraction(z, K, V);
      const single = V <= 0 || V >= 1;
      let sumX = 0;
      let sumY = 0;
      for (let i = 0; i < size; i++) {
        const k = K[i]!;
        x[i] = k === Number.POSITIVE_INFINITY ? 0 : z[i]! / (1 + V * (k - 1));
        y[i] = k === Number.POSITIVE_INFINITY ? z[i]! / Math.max(V, 1e-300) : k * x[i]!;
        sumX += x[i]!;
        sumY += y[i]!;
      }
      for (let i = 0; i < size; i++) {
        x[i]! /= sumX;
        y[i]! /= sumY;
      }
      liquidPhase.lnFugacityPerFraction(x, lnLiquid);
      gas.lnPhi(T, P, y, lnPhi);
      let moved = 0;
      for (let i = 0; i < size; i++) {
        if (z[i]! === 0) continue;
        const next = lnLiquid[i]! - lnPhi[i]! - lnP;
        if (next !== Number.POSITIVE_INFINITY) moved = Math.max(moved, Math.abs(next - lnK[i]!));
        lnK[i] = next;
      }
      if (moved <= SETTLED || (moved <= ROUNDING && moved >= last)) return true;
      if (single && step > SINGLE_STEPS) return true;
      last = moved;
    }
    return false;
  }
}

function unsettled(T: number, P: number): PassTrouble {
  return new PassTrouble(
    'phase-split',
    `The split into gas and liquid at ${(T - 273.15).toFixed(2)} degC and ${(P / 1e5).toFixed(3)} bar does not settle.`,
    'the two phases are close to identical there (near the critical point of the mixture)',
    'move the temperature or pressure of this block away from the critical region',
  );
}
