/**
 * Reactions as rows of one dense matrix. A row holds the coefficients over the components and, behind them,
 * the share of each original reaction in the row, so that extents and ln K follow every row operation.
 */
export interface ReactionRows {
  /** number of components */
  readonly size: number;
  /** number of original reactions */
  readonly reactions: number;
  /** length of a row: size + reactions */
  readonly width: number;
  /** number of rows */
  readonly count: number;
  /** count × width */
  readonly values: Float64Array;
}

/** One row per reaction, each its own share. */
export function reactionRows(coefficients: readonly Float64Array[], size: number): ReactionRows {
  const reactions = coefficients.length;
  const width = size + reactions;
  const values = new Float64Array(reactions * width);
  coefficients.forEach((row, r) => {
    values.set(row, r * width);
    values[r * width + size + r] = 1;
  });
  return { size, reactions, width, count: reactions, values };
}

/**
 * Gauss-Jordan elimination in place. Columns are tried in the order given; each that still has an entry in a
 * row without a pivot becomes the pivot (entry 1) of one row and is cleared from all others. Rows with a
 * pivot come first. Because columns are tried in ascending order of amount, the pivot of a row is the
 * smallest amount in it.
 *
 * @param values rows of `width`, `count` of them, changed in place
 * @param columns the columns to try, the first `tried` of them
 * @param pivots pivot column per row, written
 * @returns number of pivots found
 */
export function eliminate(
  values: Float64Array,
  width: number,
  count: number,
  columns: Int32Array,
  tried: number,
  pivots: Int32Array,
): number {
  let done = 0;
  for (let k = 0; k < tried && done < count; k++) {
    const column = columns[k];
    const row = largestEntry(values, width, done, count, column);
    if (row < 0) continue;
    swapRows(values, width, row, done);
    const at = done * width;
    const scale = 1 / values[at + column];
    for (let j = 0; j < width; j++) values[at + j] = values[at + j] * scale;
    values[at + column] = 1;
    for (let r = 0; r < count; r++) {
      if (r !== done) subtractRow(values, width, r, done, column);
    }
    pivots[done] = column;
    done++;
  }
  return done;
}

/** A reaction that is a sum of the ones before it. */
export interface DependentReaction {
  readonly index: number;
  /** factor of each earlier reaction; 0 for those that take no part */
  readonly factors: readonly number[];
}

/**
 * Reactions that are sums of earlier ones: their equilibrium says nothing new (or contradicts, when the
 * constants come from different sources), so a set at equilibrium must do without them.
 */
export function dependentReactions(coefficients: readonly Float64Array[]): DependentReaction[] {
  const found: DependentReaction[] = [];
  const kept: number[] = [];
  coefficients.forEach((_, index) => {
    const chosen = [...kept, index].map((k) => coefficients[k]);
    const factors = combination(chosen);
    if (factors === null) kept.push(index);
    else {
      const all = new Array<number>(index).fill(0);
      kept.forEach((k, at) => {
        all[k] = factors[at];
      });
      found.push({ index, factors: all });
    }
  });
  return found;
}

/** Factors of the earlier rows that add up to the last one, or null when it is independent. */
function combination(coefficients: readonly Float64Array[]): number[] | null {
  const size = coefficients[0].length;
  const rows = reactionRows(coefficients, size);
  const pivots = new Int32Array(rows.count);
  const columns = Int32Array.from({ length: size }, (_, i) => i);
  const rank = eliminate(rows.values, rows.width, rows.count, columns, size, pivots);
  if (rank === rows.count) return null;
  const at = (rows.count - 1) * rows.width + size;
  const own = rows.values[at + rows.count - 1];
  return coefficients.slice(0, -1).map((_, r) => round(-rows.values[at + r] / own));
}

function round(x: number): number {
  return Math.round(x * 1e9) / 1e9 + 0;
}

function largestEntry(
  values: Float64Array,
  width: number,
  from: number,
  count: number,
  column: number,
): number {
  let best = -1;
  let size = 1e-9;
  for (let r = from; r < count; r++) {
    const entry = Math.abs(values[r * width + column]);
    if (entry > size) {
      size = entry;
      best = r;
    }
  }
  return best;
}

function swapRows(values: Float64Array, width: number, a: number, b: number): void {
  if (a === b) return;
  for (let j = 0; j < width; j++) {
    const keep = values[a * width + j];
    values[a * width + j] = values[b * width + j];
    values[b * width + j] = keep;
  }
}

/** Clear `column` of row r with the pivot row; what rounding leaves of a cancelled entry becomes 0. */
function subtractRow(values: Float64Array, width: number, r: number, pivotRow: number, column: number): void {
  const factor = values[r * width + column];
  if (factor === 0) return;
  for (let j = 0; j < width; j++) {
    const left = values[r * width + j] - factor * values[pivotRow * width + j];
    values[r * width + j] = Math.abs(left) < 1e-11 ? 0 : left;
  }
  values[r * width + column] = 0;
}
