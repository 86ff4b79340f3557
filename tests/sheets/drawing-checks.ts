import type { Result } from '../../src/model/result.ts';
import type { Drawing } from '../../src/sheets/drawing/drawing.ts';
import type { Box, Point } from '../../src/sheets/drawing/svg.ts';

const SLACK = 0.5;

/** Every pair that lies over one another on a drawing, in words; empty where all is clear. */
export function overlaps(drawing: Drawing, result: Result): string[] {
  const { texts, symbols, lines } = drawing;
  const found: string[] = [];
  texts.forEach((one, k) => {
    for (const other of texts.slice(k + 1))
      if (meet(one.box, other.box)) found.push(`text ${one.text} on text ${other.text}`);
    // The words of a feed or an outlet stand inside its tag.
    for (const symbol of symbols)
      if (meet(one.box, symbol.box) && !(isTag(symbol.kind) && inside(one.box, symbol.box)))
        found.push(`text ${one.text} on symbol ${symbol.name}`);
  });
  for (const [k, one] of symbols.entries())
    for (const other of symbols.slice(k + 1))
      if (meet(one.box, other.box)) found.push(`symbol ${one.name} on symbol ${other.name}`);
  for (const { tag, points } of lines) {
    const { from, to } = result.streams[tag]!;
    const ends = [from, to, from.replace(/\..*/, ''), to.replace(/\..*/, ''), tag];
    for (const stretch of stretches(points)) {
      for (const text of texts)
        if (meet(stretch, text.box)) found.push(`line ${tag} through text ${text.text}`);
      for (const symbol of symbols)
        if (!ends.includes(symbol.name) && meet(stretch, symbol.box))
          found.push(`line ${tag} through symbol ${symbol.name}`);
    }
  }
  return found;
}

/** Places where two lines cross, counted apart from the code that avoids them. */
export function crossingPoints({ lines }: Drawing): string[] {
  const found: string[] = [];
  for (const [k, one] of lines.entries())
    for (const other of lines.slice(k + 1))
      for (const a of stretches(one.points))
        for (const b of stretches(other.points)) {
          const across = a.width === 0 ? b.height === 0 : b.width === 0;
          if (!across) continue;
          const [upright, level] = a.width === 0 ? [a, b] : [b, a];
          if (
            upright.x > level.x + SLACK &&
            upright.x < level.x + level.width - SLACK &&
            level.y > upright.y + SLACK &&
            level.y < upright.y + upright.height - SLACK
          )
            found.push(`${one.tag} x ${other.tag} at ${upright.x},${level.y}`);
        }
  return found;
}

/** Do all lines run level or upright? */
export function isOrthogonal({ lines }: Drawing): boolean {
  return lines.every(({ points }) =>
    stretches(points).every((each) => each.width === 0 || each.height === 0),
  );
}

function stretches(points: readonly Point[]): Box[] {
  return points.slice(1).map((b, k) => {
    const a = points[k]!;
    const flat = (value: number): number => (value < 0.02 ? 0 : value);
    return {
      x: Math.min(a.x, b.x),
      y: Math.min(a.y, b.y),
      width: flat(Math.abs(a.x - b.x)),
      height: flat(Math.abs(a.y - b.y)),
    };
  });
}

function isTag(kind: string): boolean {
  return kind === 'feed' || kind === 'outlet';
}

function meet(a: Box, b: Box): boolean {
  return (
    a.x + a.width > b.x + SLACK &&
    b.x + b.width > a.x + SLACK &&
    a.y + a.height > b.y + SLACK &&
    b.y + b.height > a.y + SLACK
  );
}

export function inside(a: Box, b: Box): boolean {
  return a.x >= b.x && a.y >= b.y && a.x + a.width <= b.x + b.width && a.y + a.height <= b.y + b.height;
}
