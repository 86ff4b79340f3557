import { eliminate } from './reaction-rows.ts';

/**
 * Reaction rows recombined so that each has one own species, the smallest amount in it, with coefficient 1
 * and in no other row. The own species are the variables; all others follow from the balances:
 *   n_i = rest_i + Σ_r ν_ri n_own(r)
 */
export interface ReactionBasis {
  /** number of rows in use */
  count: number;
  readonly rows: Float64Array;
  /** own species of each row */
  readonly own: Int32Array;
  /** Σ ν over the gas of each row */
  readonly moleChange: Float64Array;
  /** part of an amount that the variables do not carry */
  readonly rest: Float64Array;
  /** Recombine `rows` (may be the own rows) for the amounts n. */
  choose(rows: Float64Array, n: Float64Array): void;
  /** another species than the own one has become the smallest of its row */
  isStale(n: Float64Array): boolean;
  /** Fill in the other species from the own ones; false when one in the gas is not positive. */
  fill(n: Float64Array): boolean;
  /** Keep the own species of n times a factor and take the balances from a new feed; false as `fill`. */
  resume(n: Float64Array, factor: number, feed: Float64Array, total: number): boolean;
}

export function createReactionBasis(size: number, reactions: number, inGas: Uint8Array): ReactionBasis {
  const width = size + reactions;
  const rows = new Float64Array(reactions * width);
  const own = new Int32Array(reactions);
  const moleChange = new Float64Array(reactions);
  const rest = new Float64Array(size);
  const order = new Int32Array(size);
  const state = { count: 0, rows, own, moleChange, rest, choose, isStale, fill, resume };

  function choose(from: Float64Array, n: Float64Array): void {
    const m = state.count;
    if (from !== rows) rows.set(from.subarray(0, m * width));
    const tried = ascending(n);
    const rank = eliminate(rows, width, m, order, tried, own);
    if (rank < m) throw new Error('reaction basis: a row without gas species, or dependent rows');
    rest.set(n);
    for (let r = 0; r < m; r++) {
      const amount = n[own[r]];
      moleChange[r] = 0;
      for (let i = 0; i < size; i++) {
        const v = rows[r * width + i];
        rest[i] = rest[i] - v * amount;
        if (inGas[i] === 1) moleChange[r] = moleChange[r] + v;
      }
    }
    for (let r = 0; r < m; r++) rest[own[r]] = 0;
  }

  /** Gas species by ascending amount into `order`; returns their number. */
  function ascending(n: Float64Array): number {
    let tried = 0;
    for (let i = 0; i < size; i++) if (inGas[i] === 1) order[tried++] = i;
    for (let a = 1; a < tried; a++) {
      const species = order[a];
      let b = a - 1;
      while (b >= 0 && n[order[b]] > n[species]) {
        order[b + 1] = order[b];
        b--;
      }
      order[b + 1] = species;
    }
    return tried;
  }

  function isStale(n: Float64Array): boolean {
    for (let r = 0; r < state.count; r++) {
      const amount = n[own[r]];
      for (let i = 0; i < size; i++) {
        if (inGas[i] === 1 && rows[r * width + i] !== 0 && n[i] < 0.1 * amount) return true;
      }
    }
    return false;
  }

  function fill(n: Float64Array): boolean {
    for (let i = 0; i < size; i++) {
      if (isOwn(i)) continue;
      let touched = false;
      let sum = rest[i];
      for (let r = 0; r < state.count; r++) {
        const v = rows[r * width + i];
        if (v === 0) continue;
        touched = true;
        sum += v * n[own[r]];
      }
      n[i] = sum;
      if (touched && inGas[i] === 1 && !(sum > 0)) return false;
    }
    return true;
  }

  function isOwn(i: number): boolean {
    for (let r = 0; r < state.count; r++) if (own[r] === i) return true;
    return false;
  }

  function resume(n: Float64Array, factor: number, feed: Float64Array, total: number): boolean {
    rest.set(feed);
    for (let r = 0; r < state.count; r++) {
      const amount = feed[own[r]];
      if (amount === 0) continue;
      for (let i = 0; i < size; i++) rest[i] = rest[i] - rows[r * width + i] * amount;
    }
    for (let i = 0; i < size; i++) {
      // what cancels but for rounding is 0
      if (Math.abs(rest[i]) <= 4e-16 * total && rest[i] !== feed[i]) rest[i] = 0;
    }
    for (let r = 0; r < state.count; r++) {
      rest[own[r]] = 0;
      n[own[r]] = n[own[r]] * factor;
    }
    return fill(n);
  }

  return state;
}
