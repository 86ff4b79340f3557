import { num, text } from '../drawing/svg.ts';
import { textWidth } from '../drawing/text-width.ts';
import { plainText } from '../plain.ts';
import { type Frame, LETTERS } from './frame.ts';
import type { LineSeries } from './line-chart.ts';
import { INK, type SeriesLook, seriesLook } from './palette.ts';

/** Names of the series: at the ends of their lines where there is room, in a key under the chart where not. */
export interface SeriesLabels {
  readonly right: number;
  readonly below: number;
  draw(frame: Frame): string;
}

const ROW = 16;
const SAMPLE = 30;
const MOST_AT_ENDS = 8;
const WIDEST = 130;

export function seriesLabels(series: readonly LineSeries[], width: number): SeriesLabels {
  const names = series.map(({ name }) => plainText(name));
  if (names.every((name) => name === '')) return { right: 14, below: 0, draw: () => '' };
  const widest = Math.max(...names.map((name) => textWidth(name, LETTERS)));
  if (series.length <= MOST_AT_ENDS && widest <= WIDEST) {
    return { right: Math.ceil(widest) + 20, below: 0, draw: (frame) => atEnds(series, names, frame) };
  }
  const rows = keyRows(names, width);
  return { right: 14, below: rows.length * ROW + 6, draw: (frame) => key(rows, frame, width) };
}

/** Level with where each line ends, moved apart so that no two touch, joined to the end where it was moved. */
function atEnds(series: readonly LineSeries[], names: readonly string[], { plot, atX, atY }: Frame): string {
  const ends = series.flatMap((one, k) => {
    let last = one.y.length - 1;
    while (last >= 0 && !(Number.isFinite(one.y[last]!) && Number.isFinite(one.x[last]!))) last--;
    return last < 0 ? [] : [{ k, x: atX(one.x[last]!), y: atY(one.y[last]!) }];
  });
  ends.sort((a, b) => a.y - b.y || a.k - b.k);
  const wanted = ends.map(({ y }) => y);
  const placed = apart(wanted, ROW, plot.y + ROW / 2, plot.y + plot.height - ROW / 2);
  const left = plot.x + plot.width + 14;
  return ends
    .map(({ k, x, y }, n) => {
      const look = seriesLook(k);
      const at = placed[n]!;
      const leader = `<path d="M${num(x + 5)} ${num(y)}L${num(left - 3)} ${num(at)}" stroke="${look.colour}" stroke-width="0.7"/>`;
      return `${leader}<g class="name" fill="${INK}">${text(names[k]!, left, at + 0.35 * LETTERS, { size: LETTERS }).svg}</g>`;
    })
    .join('');
}

/** Places in order, as near to the wanted ones as a distance between them allows, within [low, high]. */
function apart(wanted: readonly number[], distance: number, low: number, high: number): number[] {
  const placed: number[] = [];
  for (const place of wanted) placed.push(Math.max(place, (placed.at(-1) ?? low - distance) + distance));
  let ceiling = high;
  for (let k = placed.length - 1; k >= 0; k--) {
    placed[k] = Math.min(placed[k]!, ceiling);
    ceiling = placed[k]! - distance;
  }
  return placed;
}

interface KeyEntry {
  readonly k: number;
  readonly name: string;
  readonly x: number;
}

function keyRows(names: readonly string[], width: number): KeyEntry[][] {
  const rows: KeyEntry[][] = [[]];
  let x = 4;
  for (const [k, name] of names.entries()) {
    const room = Math.min(SAMPLE + 6 + textWidth(name, LETTERS) + 14, width - 8);
    if (x + room > width && rows.at(-1)!.length > 0) {
      rows.push([]);
      x = 4;
    }
    rows.at(-1)!.push({ k, name, x });
    x += room;
  }
  return rows;
}

function key(rows: readonly KeyEntry[][], { plot }: Frame, width: number): string {
  const top = plot.y + plot.height + 50;
  return rows
    .flatMap((row, r) =>
      row.map(({ k, name, x }) => {
        const y = top + r * ROW;
        const look = seriesLook(k);
        const label = text(name, x + SAMPLE + 6, y + 0.35 * LETTERS, {
          size: LETTERS,
          width: width - x - SAMPLE - 10,
        });
        return `${sample(look, x, y)}<g class="name" fill="${INK}">${label.svg}</g>`;
      }),
    )
    .join('');
}

function sample(look: SeriesLook, x: number, y: number): string {
  const dash = look.dash === '' ? '' : ` stroke-dasharray="${look.dash}"`;
  return (
    `<path d="M${num(x)} ${num(y)}h${SAMPLE}" stroke="${look.colour}" stroke-width="1.8"${dash}/>` +
    `<path d="${look.point}" transform="translate(${num(x + SAMPLE / 2)} ${num(y)})" stroke="${look.colour}" fill="${look.filled ? look.colour : 'none'}"/>`
  );
}
