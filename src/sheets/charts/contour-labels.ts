import { type Box, type Point, text } from '../drawing/svg.ts';
import { textWidth } from '../drawing/text-width.ts';
import type { LevelLines } from './contour-bands.ts';
import { type Frame, LETTERS } from './frame.ts';
import { INK, PAPER } from './palette.ts';

const SIZE = LETTERS - 1;
const STEP = 6;

/** The level of every contour line, written level with the page on the line, where it touches nothing else. */
export function contourLabels(
  lines: readonly LevelLines[],
  levelText: (level: number) => { readonly text: string; readonly decimals: number },
  { plot }: Frame,
  taken: readonly Box[],
): string {
  const boxes = taken.slice();
  const labels: string[] = [];
  for (const { level, lines: each } of lines) {
    const { text: shown, decimals } = levelText(level);
    const width = textWidth(shown, SIZE) + 4;
    const longest = each.map(spaced).sort((a, b) => b.length - a.length)[0] ?? [];
    if (longest.length * STEP < width * 1.2) continue;
    const place = fromTheMiddle(longest).find((point) => {
      const box = around(point, width);
      return isInside(box, plot) && boxes.every((other) => !touch(box, other));
    });
    if (place === undefined) continue;
    boxes.push(around(place, width));
    const label = text(shown, place.x, place.y + 0.35 * SIZE, { size: SIZE, anchor: 'middle' });
    labels.push(label.svg.replace('<text ', `<text data-number="${level}" data-decimals="${decimals}" `));
  }
  return `<g class="levels" fill="${INK}" stroke="${PAPER}" stroke-width="3" stroke-opacity="0.85" paint-order="stroke" stroke-linejoin="round">${labels.join('')}</g>`;
}

/** Points at even distances along a line. */
function spaced(line: readonly Point[]): Point[] {
  const points: Point[] = [];
  let left = STEP / 2;
  for (let k = 0; k + 1 < line.length; k++) {
    const [a, b] = [line[k]!, line[k + 1]!];
    const length = Math.hypot(b.x - a.x, b.y - a.y);
    for (; left <= length; left += STEP) {
      points.push({ x: a.x + ((b.x - a.x) * left) / length, y: a.y + ((b.y - a.y) * left) / length });
    }
    left -= length;
  }
  return points;
}

function fromTheMiddle(points: readonly Point[]): Point[] {
  const middle = (points.length - 1) / 2;
  return points
    .map((point, k) => ({ point, off: Math.abs(k - middle) }))
    .sort((a, b) => a.off - b.off)
    .map(({ point }) => point);
}

function around({ x, y }: Point, width: number): Box {
  return { x: x - width / 2, y: y - SIZE / 2 - 1, width, height: SIZE + 2 };
}

function isInside(box: Box, plot: Box): boolean {
  return (
    box.x >= plot.x &&
    box.y >= plot.y &&
    box.x + box.width <= plot.x + plot.width &&
    box.y + box.height <= plot.y + plot.height
  );
}

function touch(a: Box, b: Box): boolean {
  return a.x < b.x + b.width && b.x < a.x + a.width && a.y < b.y + b.height && b.y < a.y + a.height;
}
