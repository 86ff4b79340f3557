import { singularValues } from './singular-values.ts';

/**
 * A row of the Jacobian (relative change of a figure over the whole way of a setting) below this is nothing: loops are
 * closed to 1e-9 and differences taken over a thousandth of the way.
 */
export const DEAD = 1e-6;
/**
 * Rows of unit length with a combination smaller than this ask for the same thing at the place they are taken: what
 * those differences can tell apart. For two aims it is a cosine of 1 − 1e-10.
 */
const SAME = 1e-5;
/**
 * The same where a search has stopped short of the aims: it stops beside the place where a combination of them cannot
 * be bettered to first order, not on it. For two aims it is a cosine of 0.999.
 */
const SAME_WHERE_STOPPED = 0.03;
/** An aim with a smaller weight in that combination has no part in it. */
const PART = 0.1;

/**
 * The aims that ask contradictory things of settings that move them alike, where a search has stopped; one alone is an
 * aim that no setting moves; null when all can be told apart.
 *
 * @param J  rows are aims, columns settings scaled to 0 ... 1
 */
export function fightingAims(J: readonly Float64Array[]): readonly number[] | null {
  const dead = J.findIndex((row) => Math.hypot(...row) <= DEAD);
  if (dead >= 0) return [dead];
  const { sigma, w } = singularValues(unitRows(J));
  if (sigma.at(-1)! > SAME_WHERE_STOPPED) return null;
  return Array.from(w.at(-1)!.keys()).filter((i) => Math.abs(w.at(-1)![i]) > PART);
}

/** Number of combinations of aims that settings cannot move apart from the rest. */
export function undecided(J: readonly Float64Array[]): number {
  return singularValues(unitRows(J)).sigma.filter((sigma) => sigma <= SAME).length;
}

function unitRows(J: readonly Float64Array[]): Float64Array[] {
  return J.map((row) => {
    const size = Math.hypot(...row);
    return row.map((value) => (size > DEAD ? value / size : 0));
  });
}
