import { contours } from 'd3-contour';
import type { Point } from '../drawing/svg.ts';

/** Where a figure is at or above a level, and the lines on which it is at the level. */
export interface Contour {
  readonly level: number;
  /** closed rings, in places along the nodes of the two axes */
  readonly rings: readonly (readonly Point[])[];
  /** the parts of the rings that do not run along the edge of the grid */
  readonly lines: readonly (readonly Point[])[];
}

/**
 * Contours of a grid by marching squares.
 *
 * @param values  row by row, all finite
 * @param size  nodes along a row and number of rows, at least two each
 * @source the rings are those of the d3-contour package, which reach half a step beyond the outer nodes; here they end there
 */
export function contoursOf(
  values: readonly number[],
  [width, height]: readonly [number, number],
  levels: readonly number[],
): Contour[] {
  const find = contours().size([width, height]).smooth(true);
  return levels.map((level) => {
    const rings = find
      .contour(values as number[], level)
      .coordinates.flat()
      .map((ring) => ring.map(([x, y]) => ({ x: held(x! - 0.5, width - 1), y: held(y! - 0.5, height - 1) })));
    return { level, rings, lines: rings.flatMap((ring) => innerLines(ring, width - 1, height - 1)) };
  });
}

function held(place: number, last: number): number {
  return Math.min(Math.max(place, 0), last);
}

function innerLines(ring: readonly Point[], right: number, bottom: number): Point[][] {
  const lines: Point[][] = [];
  let line: Point[] = [];
  for (let k = 0; k + 1 < ring.length; k++) {
    const [a, b] = [ring[k]!, ring[k + 1]!];
    const onEdge =
      (a.x === b.x && (a.x === 0 || a.x === right)) || (a.y === b.y && (a.y === 0 || a.y === bottom));
    if (onEdge) {
      if (line.length > 1) lines.push(line);
      line = [];
    } else {
      if (line.length === 0) line.push(a);
      line.push(b);
    }
  }
  if (line.length > 1) {
    // A ring begins anywhere: what was cut at its beginning is one line with what stands at its end.
    const first = lines[0]?.[0];
    const end = line.at(-1)!;
    if (first !== undefined && first.x === end.x && first.y === end.y)
      lines[0] = [...line, ...lines[0]!.slice(1)];
    else lines.push(line);
  }
  return lines;
}
