/** A problem on the unit box: f is to become least while every c stays at or below zero. */
export interface BoxProblem {
  /** settings, each 0 to 1 */
  readonly size: number;
  /** constraints */
  readonly limits: number;
  /** @returns f and the c at u; null where they cannot be had (the loop does not close there) */
  evaluate(u: Float64Array): BoxValue | null;
}

export interface BoxValue {
  readonly f: number;
  readonly c: Float64Array;
}

export interface BoxSlopes {
  readonly f: Float64Array;
  /** per constraint */
  readonly c: readonly Float64Array[];
}

/** The largest violation; 0 where all constraints hold. */
export function violation({ c }: BoxValue): number {
  return c.reduce((worst, value) => Math.max(worst, value), 0);
}

/**
 * Half the step of central differences: closings leave some 1e-9 open, and a third power of that keeps what they
 * leave open and what the parabola bends equally small.
 *
 * @source W. H. Press and others, Numerical Recipes, 3rd ed. (2007), section 5.7
 */
export const STEP = 1e-3;

/** Slopes by differences: central, of second order to one side at a bound, and plain ones where a neighbour fails. */
export function slopesAt(problem: BoxProblem, u: Float64Array, here: BoxValue, step = STEP): BoxSlopes {
  const f = new Float64Array(problem.size);
  const c = Array.from(here.c, () => new Float64Array(problem.size));
  const at = u.slice();
  const probe = (i: number, by: number) => {
    at[i] = u[i]! + by;
    const value = problem.evaluate(at);
    at[i] = u[i]!;
    return value;
  };
  for (let i = 0; i < problem.size; i++) {
    const first = u[i]! + step <= 1 ? step : -step;
    const second = first > 0 && u[i]! - step >= 0 ? -step : 2 * first;
    const a = probe(i, first);
    const b = probe(i, second);
    const slope = (pick: (value: BoxValue) => number): number => {
      if (a !== null && b !== null) {
        const da = (pick(a) - pick(here)) / first;
        const db = (pick(b) - pick(here)) / second;
        // Newton's divided differences, taken at the point itself.
        return da - (first * (db - da)) / (second - first);
      }
      if (a !== null) return (pick(a) - pick(here)) / first;
      return b === null ? 0 : (pick(b) - pick(here)) / second;
    };
    f[i] = slope((value) => value.f);
    for (const [k, row] of c.entries()) row[i] = slope((value) => value.c[k]!);
  }
  return { f, c };
}
