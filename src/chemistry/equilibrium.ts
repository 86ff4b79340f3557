import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { Component } from '../model/component.ts';
import type { GasModel } from '../properties/gas-model.ts';
import { createConstant, lnKSlope } from './approach.ts';
import { createEquilibriumSlopes } from './equilibrium-slopes.ts';
import { createGasActivity } from './gas-activity.ts';
import type { GasEquilibrium } from './gas-equilibrium.ts';
import { createGasEquilibrium } from './gas-equilibrium.ts';
import { dependentReactions, eliminate, reactionRows } from './reaction-rows.ts';

/** One reaction at equilibrium. */
export interface EquilibriumReaction {
  /** in component order, products positive */
  coefficients: Float64Array;
  /** ln K at T [K], activities referred to standardPressurePa */
  lnK(T: number): number;
  standardPressurePa: number;
  /** temperature approach [K], not negative: K is taken where less is formed of what forms */
  approachK: number;
}

export interface EquilibriumSolver {
  /** extents of the last solve, per reaction [unit of the feed] */
  readonly extents: Float64Array;
  /**
   * @param T,P temperature [K] and pressure [Pa]
   * @param feed amounts or flows, not negative, any unit
   * @param product written, same unit; may be `feed`
   * @returns number of Newton steps
   * @throws PassTrouble `equilibrium` when it does not settle
   */
  solve(T: number, P: number, feed: Float64Array, product: Float64Array): number;
  /**
   * Derivatives at the last solve, asked with its T and P; in the columns the feed, then T and P.
   * @param product written: components rows of (components + 2) columns
   * @param extents written: the same, one row per reaction
   * @returns false where there are none: a reaction cannot run because the feed lacks something
   */
  slopes(T: number, P: number, product: Float64Array, extents: Float64Array): boolean;
}

/** The reactions with some of the solids absent. */
interface Branch {
  readonly gas: GasEquilibrium;
  /** of each absent solid from the gas */
  readonly formation: readonly Float64Array[];
  /** the absent solids */
  readonly absent: readonly number[];
}

/** A solid may exceed unit activity by this much in ln a before it is taken to form. */
const solidSlack = 1e-9;

/**
 * All equilibrium reactions of a reactor at once:
 *   Π (y_i φ_i P/P°)^ν = K(T ± approach)  over the gas, solids with unit activity,
 * y being mole fractions of the gas alone. A solid that is used up leaves its reaction without an
 * equilibrium: then its amount is 0 and its activity at most 1. A reaction that cannot run because the feed
 * lacks something has extent 0. A reaction that is a sum of earlier ones is left out (extent 0); tell the
 * user before with `dependentReactions`.
 *
 * The approach moves the temperature of K to the side where K is smaller: hotter where ln K falls with T
 * (exothermic), colder where it rises. The solver starts from its last answer and keeps its own work space:
 * one solver for one reactor.
 */
export function createEquilibriumSolver(
  reactions: readonly EquilibriumReaction[],
  gas: GasModel,
  components: readonly Component[],
): EquilibriumSolver {
  const size = components.length;
  const activity = createGasActivity(
    gas,
    components.map((c) => c.solid),
  );
  const left = new Set(dependentReactions(reactions.map((r) => r.coefficients)).map((d) => d.index));
  const used = reactions.filter((_, r) => !left.has(r));
  const place = reactions.map((_, r) => r).filter((r) => !left.has(r));
  const count = used.length;
  const rows = reactionRows(
    used.map((r) => r.coefficients),
    size,
  );
  const constants = used.map(createConstant);
  const moleChange = used.map((r) => gasMoleChange(r.coefficients, components));
  const solids = solidsOf(used, components);
  const byAbsence = new Map<number, Branch>();

  const lnK = new Float64Array(count);
  const from = new Float64Array(size);
  const amounts = new Float64Array(size);
  const part = new Float64Array(count);
  const sum = new Float64Array(count);
  const lnPhi = new Float64Array(size);
  const extents = new Float64Array(reactions.length);
  const sensitivities = createEquilibriumSlopes(rows, activity);
  const lnKPerKelvin = new Float64Array(count);
  const lnKPerPascal = new Float64Array(count);
  const usedSlopes = new Float64Array(count * (size + 2));
  const state = { extents, solve, slopes };
  /** bit s set: solid s is taken to be absent */
  let absence = 0;

  function solve(T: number, P: number, feed: Float64Array, product: Float64Array): number {
    for (let r = 0; r < count; r++) {
      const value = constants[r](T) - moleChange[r] * Math.log(P / used[r].standardPressurePa);
      if (!Number.isFinite(value)) throw noConstant(T, P);
      lnK[r] = value;
    }
    let steps = 0;
    restart(feed);
    for (let turn = 0; ; turn++) {
      const branch = branchOf(absence);
      branch.gas.solve(T, P, from, lnK, amounts, part);
      steps += branch.gas.steps;
      const gone = mostOverdrawn();
      if (gone >= 0) {
        removeSolid(gone);
        continue;
      }
      for (let r = 0; r < count; r++) sum[r] = sum[r] + part[r];
      const forming = turn < 8 ? formingSolid(branch.formation, T, P) : -1;
      if (forming < 0) break;
      absence &= ~(1 << forming);
      from.set(feed);
      sum.fill(0);
      // any other solid that is absent but fed starts present again
      for (let s = 0; s < solids.length; s++) if (feed[solids[s]] > 0) absence &= ~(1 << s);
    }
    extents.fill(0);
    for (let r = 0; r < count; r++) extents[place[r]] = sum[r];
    product.set(amounts);
    return steps;
  }

  function slopes(T: number, P: number, product: Float64Array, ofExtents: Float64Array): boolean {
    const { gas: last, absent } = branchOf(absence);
    if (last.closed > 0) return false;
    for (let r = 0; r < count; r++) {
      lnKPerKelvin[r] = lnKSlope(used[r], T);
      lnKPerPascal[r] = -moleChange[r] / P;
    }
    if (!sensitivities.at(T, P, amounts, absent, lnKPerKelvin, lnKPerPascal, product, usedSlopes))
      return false;
    const width = size + 2;
    ofExtents.fill(0);
    for (let r = 0; r < count; r++) {
      for (let k = 0; k < width; k++) ofExtents[place[r] * width + k] = usedSlopes[r * width + k];
    }
    return true;
  }

  /** A solid that is fed starts present; one that is not keeps the state of the last solve. */
  function restart(feed: Float64Array): void {
    from.set(feed);
    sum.fill(0);
    for (let s = 0; s < solids.length; s++) if (feed[solids[s]] > 0) absence &= ~(1 << s);
  }

  function branchOf(mask: number): Branch {
    let branch = byAbsence.get(mask);
    if (branch === undefined) {
      const absent = solids.filter((_, s) => (mask & (1 << s)) !== 0);
      const values = Float64Array.from(rows.values);
      const pivots = new Int32Array(count);
      const closed = eliminate(values, rows.width, count, Int32Array.from(absent), absent.length, pivots);
      const formation = absent.map((_, a) => {
        const r = pivots.subarray(0, closed).indexOf(absent[a]);
        return r < 0 ? new Float64Array(rows.width) : values.slice(r * rows.width, (r + 1) * rows.width);
      });
      const open = values.slice(closed * rows.width);
      branch = { gas: createGasEquilibrium(open, count - closed, count, activity), formation, absent };
      byAbsence.set(mask, branch);
    }
    return branch;
  }

  /** The solid that would first be used up on the way from `from` to `amounts`; -1 when none is. */
  function mostOverdrawn(): number {
    let first = -1;
    let least = 2;
    for (let s = 0; s < solids.length; s++) {
      const i = solids[s];
      if (!(amounts[i] < 0)) continue;
      const way = from[i] / (from[i] - amounts[i]);
      if (way < least) {
        least = way;
        first = s;
      }
    }
    return first;
  }

  /** Go only as far as the solid lasts, and stay there without it. */
  function removeSolid(s: number): void {
    const i = solids[s];
    const way = from[i] / (from[i] - amounts[i]);
    for (let j = 0; j < size; j++) from[j] = from[j] + way * (amounts[j] - from[j]);
    from[i] = 0;
    for (let r = 0; r < count; r++) sum[r] = sum[r] + way * part[r];
    absence |= 1 << s;
  }

  /** An absent solid whose activity would be above 1, by its formation from the gas; -1 when none. */
  function formingSolid(formation: readonly Float64Array[], T: number, P: number): number {
    if (absence === 0) return -1;
    const total = activity.total(amounts);
    if (!(total > 0)) return -1;
    activity.lnPhi(T, P, amounts, total, lnPhi);
    let k = 0;
    for (let s = 0; s < solids.length; s++) {
      if ((absence & (1 << s)) === 0) continue;
      const row = formation[k++];
      let affinity = 0;
      for (let r = 0; r < count; r++) affinity -= row[size + r] * lnK[r];
      for (let i = 0; i < size; i++) {
        if (row[i] === 0 || activity.inGas[i] === 0) continue;
        affinity += row[i] * (Math.log(amounts[i] / total) + lnPhi[i]);
      }
      // NaN: the gas lacks species on both sides; whether the solid forms shows only with it present
      if (!(affinity >= -solidSlack)) return s;
    }
    return -1;
  }

  return state;
}

function gasMoleChange(coefficients: Float64Array, components: readonly Component[]): number {
  return components.reduce((sum, c, i) => (c.solid ? sum : sum + coefficients[i]), 0);
}

/** Indices of the solids that take part. */
function solidsOf(reactions: readonly EquilibriumReaction[], components: readonly Component[]): number[] {
  return components.flatMap((c, i) => (c.solid && reactions.some((r) => r.coefficients[i] !== 0) ? [i] : []));
}

function noConstant(T: number, P: number): PassTrouble {
  return new PassTrouble(
    'equilibrium',
    `There is no equilibrium constant at ${T.toFixed(2)} K and ${(P / 1e5).toFixed(3)} bar.`,
    'the equilibrium constant or the pressure is not a positive finite number there',
    'check temperature and pressure of the reactor, its approach, and the formula of lnK',
  );
}
