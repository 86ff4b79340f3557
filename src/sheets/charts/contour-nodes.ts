import { num, type Point } from '../drawing/svg.ts';
import type { ContourChartSpec } from './contour-chart.ts';
import type { Frame } from './frame.ts';

/** The nodes of a grid with both settings rising, row by row. */
export interface ContourNodes {
  readonly x: readonly number[];
  readonly y: readonly number[];
  /** NaN where there is none */
  readonly values: readonly number[];
  readonly failed: readonly boolean[];
  /** below zero where a limit is broken; null where there are no limits */
  readonly margin: readonly number[] | null;
}

/** @throws Error where an axis has fewer than two different values, or the values are not one per node */
export function contourNodes({ x, y, values, failed, feasible }: ContourChartSpec): ContourNodes {
  const width = x.values.length;
  if (values.length !== width * y.values.length) throw new Error('not one value per node');
  const columns = risingPlaces(x.values);
  const rows = risingPlaces(y.values);
  if (columns.length < 2 || rows.length < 2) throw new Error('a contour needs two values of each setting');
  const places = rows.flatMap((row) => columns.map((column) => row * width + column));
  return {
    x: columns.map((column) => x.values[column]!),
    y: rows.map((row) => y.values[row]!),
    values: places.map((k) => values[k]!),
    failed: places.map((k) => (failed ? failed[k]! : !Number.isFinite(values[k]!))),
    margin: feasible ? places.map((k) => feasible[k]!) : null,
  };
}

/** Where values stand in rising order, each value once: a list of settings may be written in any order. */
function risingPlaces(values: ArrayLike<number>): number[] {
  const places = Array.from({ length: values.length }, (_, k) => k).sort((a, b) => values[a]! - values[b]!);
  return places.filter((place, k) => k === 0 || values[place] !== values[places[k - 1]!]);
}

/** The squares between four nodes that all have a value, as a path. */
export function knownSquares(nodes: ContourNodes, { atX, atY }: Frame): string {
  const { x, y } = nodes;
  let path = '';
  for (let j = 0; j + 1 < y.length; j++) {
    for (let i = 0; i + 1 < x.length; i++) {
      if (!isKnownSquare(nodes, i, j)) continue;
      path += `M${num(atX(x[i]!))} ${num(atY(y[j]!))}H${num(atX(x[i + 1]!))}V${num(atY(y[j + 1]!))}H${num(atX(x[i]!))}Z`;
    }
  }
  return path;
}

/** Have all corners of the square between columns i, i + 1 and rows j, j + 1 a value? */
export function isKnownSquare({ x, values }: ContourNodes, i: number, j: number): boolean {
  const k = j * x.length + i;
  const corners = [values[k], values[k + 1], values[k + x.length], values[k + x.length + 1]];
  return corners.every((value) => Number.isFinite(value));
}

/** Where in the drawing a place along the nodes of both axes is, in a straight line between two nodes. */
export function placing({ x, y }: ContourNodes, { atX, atY }: Frame): (place: Point) => Point {
  return (place) => ({ x: atX(valueAtPlace(x, place.x)), y: atY(valueAtPlace(y, place.y)) });
}

function valueAtPlace(values: readonly number[], place: number): number {
  const below = Math.min(Math.floor(place), values.length - 2);
  return values[below]! + (place - below) * (values[below + 1]! - values[below]!);
}

/**
 * Values with the holes filled from their neighbours, ring by ring: contours need a number everywhere. What is filled in
 * is never shown. At least one value is finite.
 */
export function filledHoles(values: readonly number[], width: number): number[] {
  let filled = values.slice();
  while (!filled.every(Number.isFinite)) {
    const before = filled;
    filled = before.map((value, k) => {
      if (Number.isFinite(value)) return value;
      const near = [
        k % width > 0 ? before[k - 1] : undefined,
        k % width < width - 1 ? before[k + 1] : undefined,
        before[k - width],
        before[k + width],
      ].filter((one): one is number => Number.isFinite(one));
      return near.length === 0 ? value : near.reduce((sum, one) => sum + one, 0) / near.length;
    });
  }
  return filled;
}
