import type { Axis } from './axis.ts';

/** Rows of a path at least and at most, and how many paths a grid of some size is cut into. */
const SHORTEST = 8;
const LONGEST = 256;
const PATHS = 64;

/**
 * All combinations of the values of some axes, the last one running fastest, cut into paths.
 *
 * A path is some consecutive rows that are calculated one after another, each from its neighbour, by one worker. How the
 * grid is cut depends on the grid alone: so a table has the same bytes however many workers or machines made it.
 */
export interface Grid {
  readonly axes: readonly Axis[];
  /** rows */
  readonly size: number;
  /** rows of a path; the last may be shorter */
  readonly pathRows: number;
  readonly paths: number;
}

export function createGrid(axes: readonly Axis[]): Grid {
  const size = gridSize(axes);
  const line = axes.at(-1)?.numbers.length ?? 1;
  const wanted = Math.min(Math.max(Math.ceil(size / PATHS), SHORTEST), LONGEST);
  // Whole lines where they fit: then the path turns round at their ends and every step moves one setting.
  const pathRows = line <= wanted ? Math.ceil(wanted / line) * line : wanted;
  return { axes, size, pathRows, paths: Math.ceil(size / pathRows) };
}

/** Number of combinations; may be beyond what a number can count exactly. */
export function gridSize(axes: readonly Axis[]): number {
  return axes.reduce((product, { numbers }) => product * numbers.length, 1);
}

/** The rows of a path in the order of calculation: along the lines of the grid, there and back. */
export function rowsOfPath({ axes, size, pathRows }: Grid, path: number): Int32Array {
  const first = path * pathRows;
  const count = Math.min(pathRows, size - first);
  const line = axes.at(-1)?.numbers.length ?? 1;
  const rows = new Int32Array(count);
  for (let k = 0; k < count; ) {
    const row = first + k;
    const number = Math.floor(row / line);
    const end = Math.min(first + count, (number + 1) * line);
    // Within the path, so that a path cut out of the middle of a line still begins at its first row.
    const back = (number - Math.floor(first / line)) % 2 === 1;
    const length = end - row;
    for (let j = 0; j < length; j++) rows[k + j] = (back ? end - 1 - j : row + j) - first;
    k += length;
  }
  return rows;
}

/** Index of the value that each axis takes in a row. */
export function indicesOf({ axes }: Grid, row: number, out: Int32Array): void {
  let rest = row;
  for (let a = axes.length - 1; a >= 0; a--) {
    const { length } = axes[a]!.numbers;
    out[a] = rest % length;
    rest = Math.floor(rest / length);
  }
}

/** The paths of part k (from 1) of n: [first, end). Parts follow one another and differ by one path at most. */
export function pathsOfPart({ paths }: Grid, part: number, of: number): readonly [number, number] {
  return [Math.floor(((part - 1) * paths) / of), Math.floor((part * paths) / of)];
}
