import { num, text } from '../drawing/svg.ts';
import { textWidth } from '../drawing/text-width.ts';
import { type Frame, LETTERS } from './frame.ts';
import { hatchPattern } from './hatch.ts';
import { INK, PAPER, QUIET } from './palette.ts';

/** A part of the x axis that is hatched. */
export interface Stretch {
  readonly from: number;
  readonly to: number;
  /** stands in it where there is room; may be empty */
  readonly label: string;
}

/** A line through a value of one axis: a limit, or where something stands. */
export interface LimitLine {
  readonly axis: 'x' | 'y';
  readonly value: number;
  readonly label: string;
  /** thin and dotted: no limit, only a place to know */
  readonly light?: boolean;
  /** the name of an upright line stands at its top instead of at its foot */
  readonly nameOnTop?: boolean;
}

/** Hatched from the bottom to the top of the plot; what lies outside the plot is left out. */
export function stretches(id: string, wanted: readonly Stretch[], { plot, x, atX }: Frame): string {
  const shown = wanted.flatMap(({ from, to, label }) => {
    const left = atX(Math.max(Math.min(from, to), x.low));
    const right = atX(Math.min(Math.max(from, to), x.high));
    return right > left ? [{ left, width: right - left, label }] : [];
  });
  if (shown.length === 0) return '';
  const parts = shown.map(({ left, width, label }) => {
    const name =
      label !== '' && textWidth(label, LETTERS) <= width - 8
        ? text(label, left + 4, plot.y + LETTERS + 1, { size: LETTERS, width: width - 8 }).svg
        : '';
    return (
      `<rect x="${num(left)}" y="${num(plot.y)}" width="${num(width)}" height="${num(plot.height)}" fill="url(#${id}-hatch)"/>` +
      `<g fill="${QUIET}" stroke="${PAPER}" stroke-width="4" paint-order="stroke">${name}</g>`
    );
  });
  return `<defs>${hatchPattern(id)}</defs><g class="stretches">${parts.join('')}</g>`;
}

/** Dash-dot lines for limits, thin dotted ones for places, with their names inside the plot. */
export function limitLines(lines: readonly LimitLine[], { plot, atX, atY }: Frame): string {
  return lines
    .map(({ axis, value, label, light = false, nameOnTop = false }) => {
      const at = axis === 'x' ? atX(value) : atY(value);
      const path =
        axis === 'x'
          ? `M${num(at)} ${num(plot.y)}v${num(plot.height)}`
          : `M${num(plot.x)} ${num(at)}h${num(plot.width)}`;
      const name =
        axis === 'x'
          ? upright(label, at, plot, nameOnTop)
          : text(label, plot.x + plot.width - 4, at - 4 > plot.y + LETTERS ? at - 4 : at + LETTERS + 2, {
              size: LETTERS,
              anchor: 'end',
              width: plot.width - 8,
            }).svg;
      return (
        `<g class="${light ? 'place' : 'limit'}"><path d="${path}" stroke="${light ? QUIET : INK}" ${light ? 'stroke-width="1.1" stroke-dasharray="2 3"' : 'stroke-width="1.4" stroke-dasharray="14 3 3 3"'}/>` +
        `<g fill="${INK}" stroke="${PAPER}" stroke-width="3" paint-order="stroke">${name}</g></g>`
      );
    })
    .join('');
}

function upright(label: string, at: number, plot: Frame['plot'], onTop: boolean): string {
  const right = plot.x + plot.width - at;
  const toRight = textWidth(label, LETTERS) <= right - 8 || right > plot.width / 2;
  return text(label, toRight ? at + 4 : at - 4, onTop ? plot.y + LETTERS + 1 : plot.y + plot.height - 6, {
    size: LETTERS,
    anchor: toRight ? 'start' : 'end',
    width: Math.max(30, (toRight ? right : at - plot.x) - 8),
  }).svg;
}
