/**
 * Colours of charts as CSS values: custom properties of the page, each with what it is where the page sets none. The
 * charts stand in a light and in a dark page without being drawn twice, and alone in a file.
 */
export const INK = 'var(--ink, #1b2126)';
export const QUIET = 'var(--soft, #56606e)';
export const RULE = 'var(--hair, #cfcac0)';
export const PAPER = 'var(--paper, #ffffff)';

/** How one series is told from another: by colour, by dash and by the shape of its points, each enough alone. */
export interface SeriesLook {
  readonly colour: string;
  /** stroke-dasharray; '' for a full line */
  readonly dash: string;
  /** outline of a point about the origin */
  readonly point: string;
  /** an outline without an inside is drawn as lines */
  readonly filled: boolean;
}

/** Grey values of the light colours differ too, but no reader has to rely on that. */
const LOOKS: readonly SeriesLook[] = [
  look(1, '#17456b', '', 'M-3.2 0A3.2 3.2 0 1 0 3.2 0A3.2 3.2 0 1 0 -3.2 0Z'),
  look(2, '#a8471f', '7 3', 'M-2.9 -2.9H2.9V2.9H-2.9Z'),
  look(3, '#4c6b1f', '2 2.5', 'M0 -3.9L3.7 2.6H-3.7Z'),
  look(4, '#7a3f78', '9 3 2 3', 'M0 -4.2L4.2 0L0 4.2L-4.2 0Z'),
  look(5, '#5c5343', '12 4', 'M-3.4 -3.4L3.4 3.4M-3.4 3.4L3.4 -3.4', false),
  look(6, '#0f6d70', '4 2 1 2 1 2', 'M0 3.9L3.7 -2.6H-3.7Z'),
  look(7, '#8a6a00', '1 4', 'M-4 0H4M0 -4V4', false),
];

function look(number: number, colour: string, dash: string, point: string, filled = true): SeriesLook {
  return { colour: `var(--series-${number}, ${colour})`, dash, point, filled };
}

/** The look of the k-th series of a chart; they come round again after the last. */
export function seriesLook(k: number): SeriesLook {
  return LOOKS[k % LOOKS.length]!;
}

/** Pale straw to deep slate by way of moss: lightness falls evenly, so that the bands keep their order in grey. */
const SCALE: readonly (readonly [number, number, number])[] = [
  [246, 240, 221],
  [205, 205, 172],
  [146, 166, 143],
  [92, 126, 128],
  [49, 82, 103],
  [28, 42, 66],
];

/** Colour of a share from 0 (least) to 1 (most) of a figure's range, the same in a light and in a dark page. */
export function bandColour(share: number): string {
  const at = Math.min(Math.max(share, 0), 1) * (SCALE.length - 1);
  const below = Math.min(Math.floor(at), SCALE.length - 2);
  const part = at - below;
  const hex = [0, 1, 2].map((c) => {
    const value = SCALE[below]![c]! + part * (SCALE[below + 1]![c]! - SCALE[below]![c]!);
    return Math.round(value).toString(16).padStart(2, '0');
  });
  return `#${hex.join('')}`;
}

/** CSS that a page needs for charts: lines bright enough on dark paper, and black numbers on white in print. */
export const chartStyle = `
.chart{display:block;max-width:100%;height:auto}
@media (prefers-color-scheme:dark){:root{--series-1:#9cc7ee;--series-2:#f0a37f;--series-3:#b5d387;--series-4:#dba9d8;--series-5:#cfc3ad;--series-6:#79cfcf;--series-7:#e3c45c}}
@media print{:root{--series-1:#17456b;--series-2:#a8471f;--series-3:#4c6b1f;--series-4:#7a3f78;--series-5:#5c5343;--series-6:#0f6d70;--series-7:#8a6a00}}
`;
