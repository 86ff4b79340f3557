import { num, type Point } from '../drawing/svg.ts';
import { type Contour, contoursOf } from './contour-lines.ts';
import { type ContourNodes, filledHoles, isKnownSquare, knownSquares, placing } from './contour-nodes.ts';
import type { Frame } from './frame.ts';
import { hatchPattern } from './hatch.ts';
import { bandColour, INK, PAPER } from './palette.ts';

/** The lines of one level, in the drawing. */
export interface LevelLines {
  readonly level: number;
  readonly lines: readonly (readonly Point[])[];
}

/** Bands of colour between levels, their lines, and over them what the limits forbid. */
export interface Bands {
  readonly svg: string;
  readonly lines: readonly LevelLines[];
}

export function bands(id: string, nodes: ContourNodes, levels: readonly number[], frame: Frame): Bands {
  const squares = knownSquares(nodes, frame);
  if (squares === '') return { svg: '', lines: [] };
  const size = [nodes.x.length, nodes.y.length] as const;
  const place = placing(nodes, frame);
  const found = contoursOf(filledHoles(nodes.values, size[0]), size, levels);
  const lines = found.map(({ level, lines: each }) => ({
    level,
    lines: each.flatMap((line) => shownParts(line, nodes)).map((line) => line.map(place)),
  }));
  const stroke = lines.flatMap(({ lines: each }) => each.map(pathOf)).join('');
  const parts = [
    `<defs><clipPath id="${id}-known"><path d="${squares}"/></clipPath>${nodes.margin === null ? '' : hatchPattern(id)}</defs>`,
    `<g clip-path="url(#${id}-known)"><path d="${squares}" fill="${bandColour(0)}"/>`,
    ...found.map((contour, k) => band(contour, (k + 1) / levels.length, place)),
    // A pale line under the dark one: it can be seen on the palest band and on the darkest.
    `<g class="contours" fill="none"><path d="${stroke}" stroke="#f6f0dd" stroke-width="2.2" stroke-opacity="0.45"/><path d="${stroke}" stroke="#1b2126" stroke-width="0.9"/></g>`,
    nodes.margin === null ? '' : forbidden(id, nodes.margin, size, place),
    '</g>',
  ];
  return { svg: parts.join(''), lines };
}

/** The parts of a line that run through squares whose corners all have a value. */
function shownParts(line: readonly Point[], nodes: ContourNodes): Point[][] {
  const parts: Point[][] = [];
  let part: Point[] = [];
  for (let k = 0; k + 1 < line.length; k++) {
    const [a, b] = [line[k]!, line[k + 1]!];
    // A line crosses one square from point to point, so that their middle lies in it.
    if (isKnownSquare(nodes, Math.floor((a.x + b.x) / 2), Math.floor((a.y + b.y) / 2))) {
      part.push(...(part.length === 0 ? [a, b] : [b]));
    } else {
      if (part.length > 0) parts.push(part);
      part = [];
    }
  }
  if (part.length > 0) parts.push(part);
  return parts;
}

function band({ rings }: Contour, share: number, place: (at: Point) => Point): string {
  const path = rings.map((ring) => `${pathOf(ring.map(place))}Z`).join('');
  return `<path d="${path}" fill="${bandColour(share)}" fill-rule="evenodd"/>`;
}

/** Hatched and faded where a limit does not hold, a heavy line along the edge of where all hold. */
function forbidden(
  id: string,
  margin: readonly number[],
  size: readonly [number, number],
  place: (at: Point) => Point,
): string {
  const [allowed] = margin.some(Number.isFinite) ? contoursOf(filledHoles(margin, size[0]), size, [0]) : [];
  if (allowed === undefined) return '';
  const [right, top] = [size[0] - 1, size[1] - 1];
  const whole = [
    { x: 0, y: 0 },
    { x: right, y: 0 },
    { x: right, y: top },
    { x: 0, y: top },
  ];
  const path = [whole, ...allowed.rings].map((ring) => `${pathOf(ring.map(place))}Z`).join('');
  const edge = allowed.lines.map((line) => pathOf(line.map(place))).join('');
  return (
    `<g class="forbidden" fill-rule="evenodd"><path d="${path}" fill="${PAPER}" fill-opacity="0.5"/><path d="${path}" fill="url(#${id}-hatch)"/></g>` +
    `<path d="${edge}" stroke="${PAPER}" stroke-width="5" fill="none"/><path class="edge" d="${edge}" stroke="${INK}" stroke-width="2.6" fill="none"/>`
  );
}

function pathOf(points: readonly Point[]): string {
  return points.map(({ x, y }, k) => `${k === 0 ? 'M' : 'L'}${num(x)} ${num(y)}`).join('');
}
