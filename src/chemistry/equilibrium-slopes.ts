import type { GasActivity } from './gas-activity.ts';
import { solveLinear } from './linear-solve.ts';
import { eliminate, type ReactionRows } from './reaction-rows.ts';

/** Derivatives of amounts at equilibrium; the work space is kept. */
export interface EquilibriumSlopes {
  /**
   * By the implicit function theorem on Σ ν (ln y + ln φ) = lnK over the gas.
   *
   * @param amounts at equilibrium, solved for T [K] and P [Pa]
   * @param absent solids that are used up: each takes the reaction that forms it along
   * @param lnKPerKelvin,lnKPerPascal slopes of ln K per reaction, standard pressure folded in
   * @param byFeed written: components rows of (components + 2) columns, ∂n_i/∂feed_j, then ∂n_i/∂T, ∂n_i/∂P
   * @param extents written: the same for the extents, one row per reaction
   * @returns false where there are none
   */
  at(
    T: number,
    P: number,
    amounts: Float64Array,
    absent: readonly number[],
    lnKPerKelvin: Float64Array,
    lnKPerPascal: Float64Array,
    byFeed: Float64Array,
    extents: Float64Array,
  ): boolean;
}

/**
 * Written in the basis of reaction-basis.ts: each row has one own species, the smallest in it, whose amount is
 * its variable, and n_i = rest_i + Σ ν_ri n_own(r). With D = diag(√own amount) the matrix D H D is near the unit
 * matrix however small the amounts are, and what is used up stays so.
 *
 * A solid that is used up is the own species of its row and does not move.
 *
 * @source W. R. Smith, R. W. Missen, Chemical Reaction Equilibrium Analysis, Wiley 1982 (sensitivities)
 */
export function createEquilibriumSlopes(rows: ReactionRows, activity: GasActivity): EquilibriumSlopes {
  const { size, reactions, width, count } = rows;
  const { inGas } = activity;
  const columns = size + 2;
  const nu = new Float64Array(rows.values.length);
  const own = new Int32Array(count);
  const rowOf = new Int32Array(size);
  const order = new Int32Array(size);
  const root = new Float64Array(count);
  const lnPhiByAmount = new Float64Array(size * size);
  const lnPhiPerKelvin = new Float64Array(size);
  const lnPhiPerPascal = new Float64Array(size);
  /** ∂(Σ ν (ln y + ln φ))/∂n_j of a row, times its root */
  const pull = new Float64Array(size);
  const matrix = new Float64Array(count * (count + columns));

  /** Recombines the rows; returns how many of them an absent solid holds, -1 where some have no own species. */
  function choose(amounts: Float64Array, absent: readonly number[]): number {
    nu.set(rows.values);
    let tried = 0;
    for (const i of absent) order[tried++] = i;
    const solids = tried;
    for (let i = 0; i < size; i++) {
      if (inGas[i] === 0) continue;
      let place = tried++;
      for (; place > solids && amounts[order[place - 1]] > amounts[i]; place--)
        order[place] = order[place - 1];
      order[place] = i;
    }
    if (eliminate(nu, width, count, order, tried, own) < count) return -1;
    rowOf.fill(-1);
    let held = 0;
    for (let r = 0; r < count; r++) {
      rowOf[own[r]] = r;
      const gas = inGas[own[r]] === 1;
      root[r] = gas ? Math.sqrt(amounts[own[r]]) : 0;
      if (!gas) held++;
    }
    return held;
  }

  /** Sets `pull` for a row; false where it touches a species that is not there. */
  function pullOf(r: number, amounts: Float64Array, total: number): boolean {
    let change = 0;
    for (let i = 0; i < size; i++) if (inGas[i] === 1) change += nu[r * width + i];
    for (let j = 0; j < size; j++) {
      pull[j] = 0;
      if (inGas[j] === 0) continue;
      let sum = -change;
      if (activity.real)
        for (let i = 0; i < size; i++) sum += nu[r * width + i] * lnPhiByAmount[i * size + j];
      pull[j] = (sum / total) * root[r];
      const v = nu[r * width + j];
      // that of the own species is put in where it is 1
      if (v === 0 || j === own[r]) continue;
      if (!(amounts[j] > 0)) return false;
      pull[j] += (v * root[r]) / amounts[j];
    }
    return true;
  }

  /** One row of [D H D | right-hand sides]. */
  function setRow(r: number, first: number, lnKPerKelvin: Float64Array, lnKPerPascal: Float64Array): void {
    const open = count - first;
    const at = (r - first) * (open + columns);
    for (let q = first; q < count; q++) {
      let sum = 0;
      for (let j = 0; j < size; j++) sum += pull[j] * nu[q * width + j];
      matrix[at + q - first] = sum * root[q] + (q === r ? 1 : 0);
    }
    for (let k = 0; k < size; k++) {
      const s = rowOf[k];
      let sum = 0;
      if (s < 0) sum = -pull[k];
      else for (let j = 0; j < size; j++) if (j !== k) sum += pull[j] * nu[s * width + j];
      matrix[at + open + k] = sum;
    }
    let perKelvin = 0;
    let perPascal = 0;
    for (let i = 0; i < size; i++) {
      perKelvin -= nu[r * width + i] * lnPhiPerKelvin[i];
      perPascal -= nu[r * width + i] * lnPhiPerPascal[i];
    }
    for (let k = 0; k < reactions; k++) {
      perKelvin += nu[r * width + size + k] * lnKPerKelvin[k];
      perPascal += nu[r * width + size + k] * lnKPerPascal[k];
    }
    matrix[at + open + size] = perKelvin * root[r];
    matrix[at + open + size + 1] = perPascal * root[r];
  }

  /** From the own species to all amounts and extents. */
  function spread(first: number, byFeed: Float64Array, extents: Float64Array): void {
    const open = count - first;
    extents.fill(0);
    byFeed.fill(0);
    for (let i = 0; i < size; i++) if (rowOf[i] < 0) byFeed[i * columns + i] = 1;
    for (let r = 0; r < count; r++) {
      const at = (r - first) * (open + columns) + open;
      for (let k = 0; k < columns; k++) {
        const ownMoves = r < first ? 0 : matrix[at + k] * root[r];
        const extent = ownMoves - (k === own[r] ? 1 : 0);
        if (extent === 0) continue;
        for (let i = 0; i < size; i++) {
          if (i !== own[r]) byFeed[i * columns + k] += nu[r * width + i] * extent;
        }
        for (let q = 0; q < reactions; q++) extents[q * columns + k] += nu[r * width + size + q] * extent;
        byFeed[own[r] * columns + k] = ownMoves;
      }
    }
  }

  return {
    at(T, P, amounts, absent, lnKPerKelvin, lnKPerPascal, byFeed, extents) {
      const total = activity.total(amounts);
      if (!(total > 0)) return false;
      const first = choose(amounts, absent);
      if (first < 0) return false;
      activity.lnPhiSlopes(T, P, amounts, total, lnPhiByAmount, lnPhiPerKelvin, lnPhiPerPascal);
      for (let r = first; r < count; r++) {
        if (!pullOf(r, amounts, total)) return false;
        setRow(r, first, lnKPerKelvin, lnKPerPascal);
      }
      if (!solveLinear(matrix, count - first, columns)) return false;
      spread(first, byFeed, extents);
      for (let i = 0; i < byFeed.length; i++) if (!Number.isFinite(byFeed[i])) return false;
      return true;
    },
  };
}
