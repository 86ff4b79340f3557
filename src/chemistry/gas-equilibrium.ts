import type { GasActivity } from './gas-activity.ts';
import { reachableSpecies } from './reachable-species.ts';
import { eliminate } from './reaction-rows.ts';
import { createSimultaneousEquilibrium } from './simultaneous-equilibrium.ts';
import { createSingleEquilibrium } from './single-equilibrium.ts';

/** Equilibrium of a fixed set of rows from any feed. */
export interface GasEquilibrium {
  /** steps of the last solve */
  readonly steps: number;
  /** rows that could not run at the last solve, for want of a species that nothing makes */
  readonly closed: number;
  /**
   * @param feed amounts, not negative
   * @param lnK per original reaction, standard pressure folded in
   * @param amounts equilibrium amounts, written; solids may come out negative
   * @param extents per original reaction, written
   */
  solve(
    T: number,
    P: number,
    feed: Float64Array,
    lnK: Float64Array,
    amounts: Float64Array,
    extents: Float64Array,
  ): void;
}

/** What can run where some species are absent. */
interface Opening {
  readonly count: number;
  readonly rows: Float64Array<ArrayBuffer>;
  /** sum of the reactions that makes all absent species that can be made */
  readonly direction: Float64Array<ArrayBuffer>;
}

/** below this share of the gas an amount counts as absent */
const absentBelow = 1e-200;

/**
 * Handles what a feed lacks. Species that no sum of the reactions can make stay absent, and the rows are
 * recombined so that none of the remaining ones touches them; what can be made gets a first trace along a
 * direction found once per pattern of absent species. The rest is one row, solved inside a bracket, or
 * several, solved together.
 *
 * @param rows reaction rows of `width` (components, then shares of the `reactions` original reactions)
 */
export function createGasEquilibrium(
  rows: Float64Array,
  count: number,
  reactions: number,
  activity: GasActivity,
): GasEquilibrium {
  const { inGas } = activity;
  const size = inGas.length;
  const width = size + reactions;
  const single = createSingleEquilibrium(size, activity);
  const together = createSimultaneousEquilibrium(size, reactions, activity, single);
  const known = new Map<string, Opening>();
  const lacking = new Int8Array(size).fill(-1);
  let open = new Float64Array(rows.length);
  let direction = new Float64Array(size);
  const touched = new Uint8Array(size);
  const start = new Float64Array(size);
  const pivots = new Int32Array(count);
  let openCount = 0;
  let position = 0;
  for (let r = 0; r < count; r++) {
    for (let i = 0; i < size; i++) if (rows[r * width + i] !== 0 && inGas[i] === 1) touched[i] = 1;
  }
  const state = { steps: 0, closed: 0, solve };

  function solve(
    T: number,
    P: number,
    feed: Float64Array,
    lnK: Float64Array,
    amounts: Float64Array,
    extents: Float64Array,
  ): void {
    state.steps = 0;
    const total = activity.total(feed);
    if (patternChanged(feed, total * absentBelow)) useOpening();
    extents.fill(0);
    amounts.set(feed);
    if (openCount === 0 || !(total > 0)) return;
    if (openCount === 1) {
      let lnKRow = 0;
      for (let k = 0; k < reactions; k++) lnKRow += open[size + k] * lnK[k];
      single.solve(open, 0, lnKRow, feed, T, P, position, null, 1e-9, amounts);
      position = single.position;
      state.steps = single.steps;
      for (let k = 0; k < reactions; k++) extents[k] = single.extent * open[size + k];
      return;
    }
    interior(feed, total);
    together.solve(open, openCount, lnK, T, P, feed, start, amounts, extents);
    state.steps = together.steps;
  }

  function patternChanged(feed: Float64Array, least: number): boolean {
    let changed = false;
    for (let i = 0; i < size; i++) {
      const lacks = touched[i] === 1 && !(feed[i] > least) ? 1 : 0;
      if (lacks !== lacking[i]) {
        lacking[i] = lacks;
        changed = true;
      }
    }
    return changed;
  }

  /** A loop that is closed again and again starts from the same empty recycle: what was found for a pattern is kept. */
  function useOpening(): void {
    const pattern = lacking.join('');
    let opening = known.get(pattern);
    if (opening === undefined) {
      opening = openRows();
      known.set(pattern, opening);
    }
    openCount = opening.count;
    state.closed = count - openCount;
    open = opening.rows;
    direction = opening.direction;
    position = 0;
    together.warm = false;
  }

  /** The rows that can run when the species marked in `lacking` are absent, and a way into the open. */
  function openRows(): Opening {
    const absent: number[] = [];
    for (let i = 0; i < size; i++) if (lacking[i] === 1) absent.push(i);
    const extentDirection = new Float64Array(count);
    const reachable = new Uint8Array(absent.length);
    reachableSpecies(rows, width, count, absent, extentDirection, reachable);
    const way = new Float64Array(size);
    for (let r = 0; r < count; r++) {
      for (let i = 0; i < size; i++) way[i] = way[i] + extentDirection[r] * rows[r * width + i];
    }
    const never = absent.filter((_, j) => reachable[j] === 0);
    const work = Float64Array.from(rows);
    const closed = eliminate(work, width, count, Int32Array.from(never), never.length, pivots);
    return { count: count - closed, rows: work.slice(closed * width), direction: way };
  }

  /** A point with every reachable species present: the feed, moved a third of the way it can go. */
  function interior(feed: Float64Array, total: number): void {
    let way = total;
    for (let i = 0; i < size; i++) {
      if (inGas[i] === 1 && direction[i] < 0) way = Math.min(way, feed[i] / -direction[i]);
    }
    for (let i = 0; i < size; i++) start[i] = feed[i] + 0.3 * way * direction[i];
  }

  return state;
}
