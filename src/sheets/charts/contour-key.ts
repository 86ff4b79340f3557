import { num, text } from '../drawing/svg.ts';
import { textWidth } from '../drawing/text-width.ts';
import { axisTitle, type ChartAxis, type Tick } from './axis-scale.ts';
import { LETTERS } from './frame.ts';
import { bandColour, INK, PAPER, QUIET } from './palette.ts';

export interface ContourKey {
  readonly id: string;
  readonly figure: ChartAxis;
  readonly levels: readonly Tick[];
  /** the value that there is everywhere, where there are no levels; null where there is no value */
  readonly only: string | null;
  readonly hasLimits: boolean;
  readonly hasFailed: boolean;
  readonly width: number;
}

const ROW = 18;
const BAR = 12;

/** Room of the key under the chart. */
export function keyHeight({ hasLimits, hasFailed }: ContourKey): number {
  return ROW + BAR + ROW + (hasLimits ? 2 * ROW : 0) + (hasFailed ? ROW : 0) + 4;
}

/** The bands in their order with the values between them, and what hatching and crosses mean. */
export function contourKey(
  { id, figure, levels, only, hasLimits, hasFailed, width }: ContourKey,
  top: number,
): string {
  const left = 4;
  const cell = Math.min(48, (width - 2 * left) / (levels.length + 1));
  const barTop = top + ROW - 4;
  const parts = [text(axisTitle(figure), left, top + 8, { size: LETTERS, width: width - 8 }).svg];
  for (let k = 0; k <= levels.length; k++) {
    const colour = bandColour(levels.length === 0 ? 0 : k / levels.length);
    parts.push(
      `<rect x="${num(left + k * cell)}" y="${num(barTop)}" width="${num(cell)}" height="${BAR}" fill="${colour}" stroke="${QUIET}" stroke-width="0.7"/>`,
    );
  }
  let free = 0;
  for (const [k, { value, text: shown, decimals }] of levels.entries()) {
    const at = left + (k + 1) * cell;
    const half = textWidth(shown, LETTERS) / 2;
    if (at - half < free) continue;
    free = at + half + 4;
    const label = text(shown, at, barTop + BAR + LETTERS + 1, { size: LETTERS, anchor: 'middle' }).svg;
    parts.push(label.replace('<text ', `<text data-number="${value}" data-decimals="${decimals}" `));
  }
  if (levels.length === 0) {
    const all = only === null ? 'no value' : `${only} throughout`;
    parts.push(text(all, left + cell + 6, barTop + BAR - 2, { size: LETTERS, width: width - cell - 14 }).svg);
  }
  let y = barTop + BAR + ROW + 8;
  const row = (sample: string, meaning: string) => {
    parts.push(
      sample,
      text(meaning, left + 38, y + 0.35 * LETTERS, { size: LETTERS, width: width - 46 }).svg,
    );
    y += ROW;
  };
  if (hasLimits) {
    row(
      `<path d="M${left} ${num(y)}h30" stroke="${INK}" stroke-width="2.6"/>`,
      'edge of the part in which all limits hold',
    );
    row(
      `<rect x="${left}" y="${num(y - 6)}" width="30" height="12" fill="url(#${id}-hatch)" stroke="${QUIET}" stroke-width="0.7"/>`,
      'hatched: a limit does not hold',
    );
  }
  if (hasFailed) row(cross(left + 15, y), 'no value: the case failed');
  return `<g class="key" fill="${INK}">${parts.join('')}</g>`;
}

/** The mark of a case that failed. */
export function cross(x: number, y: number): string {
  const at = `M${num(x - 3.5)} ${num(y - 3.5)}l7 7m-7 0l7 -7`;
  return `<path d="${at}" stroke="${PAPER}" stroke-width="3.6"/><path class="failed" d="${at}" stroke="${INK}" stroke-width="1.4"/>`;
}
