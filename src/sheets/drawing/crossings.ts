import type { Point } from './svg.ts';

/** How often level and upright stretches of different lines cross. */
export function crossings(lines: readonly (readonly Point[])[]): number {
  let count = 0;
  lines.forEach((one, k) => {
    for (const other of lines.slice(k + 1)) count += crossingsOf(one, other);
  });
  return count;
}

function crossingsOf(one: readonly Point[], other: readonly Point[]): number {
  let count = 0;
  for (let i = 1; i < one.length; i++)
    for (let j = 1; j < other.length; j++) if (cross(one[i - 1]!, one[i]!, other[j - 1]!, other[j]!)) count++;
  return count;
}

/** Do two stretches cross at a point inside both? */
function cross(a: Point, b: Point, c: Point, d: Point): boolean {
  const between = (value: number, p: number, q: number): boolean =>
    value > Math.min(p, q) + 0.01 && value < Math.max(p, q) - 0.01;
  const upright = (p: Point, q: Point): boolean => Math.abs(p.x - q.x) < 0.01;
  if (upright(a, b) === upright(c, d)) return false;
  return upright(a, b)
    ? between(a.x, c.x, d.x) && between(c.y, a.y, b.y)
    : between(c.x, a.x, b.x) && between(a.y, c.y, d.y);
}
