import { line } from 'd3-shape';
import { escaped, num } from '../drawing/svg.ts';
import { plainText } from '../plain.ts';
import { type AxisScale, type ChartAxis, createAxisScale } from './axis-scale.ts';
import { lineDescription } from './description.ts';
import {
  axes,
  axisData,
  CHART_HEIGHT,
  CHART_WIDTH,
  checkId,
  createFrame,
  type Frame,
  gridLines,
  svgFigure,
  ticksAcross,
} from './frame.ts';
import { type Marked, markedPoint } from './marked-point.ts';
import { PAPER, type SeriesLook, seriesLook } from './palette.ts';
import { seriesLabels } from './series-labels.ts';
import { type LimitLine, limitLines, type Stretch, stretches } from './stretches.ts';

export interface LineSeries {
  /** '' where there is one series and nothing to tell apart */
  readonly name: string;
  readonly x: ArrayLike<number>;
  /** NaN where there is no value: the line has a gap there */
  readonly y: ArrayLike<number>;
}

export interface LineChartSpec {
  /** unlike any other on the page: small letters, digits and hyphens */
  readonly id: string;
  readonly title: string;
  readonly x: ChartAxis;
  readonly y: ChartAxis;
  readonly series: readonly LineSeries[];
  /** e.g. the operating point */
  readonly marked?: readonly Marked[];
  readonly limits?: readonly LimitLine[];
  /** parts of the x axis that are set apart, e.g. where a limit does not hold */
  readonly stretches?: readonly Stretch[];
  /** the points themselves are shown; false for smooth curves of many points */
  readonly points?: boolean;
  readonly width?: number;
  readonly height?: number;
}

/** Beyond so many points in a series only some have their mark, enough to know the line by. */
const MOST_MARKS = 30;

/**
 * Curves over one axis as an SVG picture, for a page or a file. Series differ by colour, dash and point; each series
 * carries its name and numbers in `data-name`, `data-x` and `data-y`, for a script that shows them.
 *
 * @throws Error where the id is none, or a series has x and y of different length
 */
export function lineChart(spec: LineChartSpec): string {
  const { id, title, series, marked = [], limits = [], points = true } = spec;
  checkId(id);
  for (const { x, y } of series) if (x.length !== y.length) throw new Error('x and y differ in length');
  const width = spec.width ?? CHART_WIDTH;
  const height = spec.height ?? CHART_HEIGHT;
  const x = createAxisScale(spec.x, allOf(series, marked, 'x'), ticksAcross(width), true);
  const near = limits.filter(({ axis, value }) => axis === 'y' && isNear(value, allOf(series, marked, 'y')));
  const y = createAxisScale(
    spec.y,
    [...allOf(series, marked, 'y'), ...near.map(({ value }) => value)],
    Math.max(3, Math.floor(height / 60)),
  );
  const labels = seriesLabels(series, width);
  const frame = createFrame(x, y, { width, height, right: labels.right, below: labels.below });
  const inside = limits.filter(({ axis, value }) => isWithin(axis === 'x' ? x : y, value));
  const body = [
    stretches(id, spec.stretches ?? [], frame),
    gridLines(frame),
    limitLines(inside, frame),
    axes(frame, spec.x, spec.y, width),
    ...series.map((one, k) => curve(one, seriesLook(k), frame, points)),
    labels.draw(frame),
    ...marked.map((one) => markedPoint(one, frame, width)),
  ];
  const data = axisData(frame, spec.x, spec.y);
  return svgFigure(id, title, lineDescription(spec), { width, height, data }, body.join(''));
}

function curve({ name, x, y }: LineSeries, look: SeriesLook, { atX, atY }: Frame, points: boolean): string {
  const places = Array.from({ length: x.length }, (_, k) => k);
  const isKnown = (k: number) => Number.isFinite(x[k]!) && Number.isFinite(y[k]!);
  const path = line<number>()
    .defined(isKnown)
    .x((k) => atX(x[k]!))
    .y((k) => atY(y[k]!))
    .digits(2)(places);
  const known = places.filter(isKnown);
  const every = Math.ceil(known.length / MOST_MARKS);
  const marked = points ? known.filter((_, n) => n % every === 0) : [];
  const marks = marked.map(
    (k) => `<path d="${look.point}" transform="translate(${num(atX(x[k]!))} ${num(atY(y[k]!))})"/>`,
  );
  const dash = look.dash === '' ? '' : ` stroke-dasharray="${look.dash}"`;
  const fill = look.filled ? look.colour : 'none';
  const said = escaped(plainText(name));
  return (
    `<g class="series" data-name="${said}" data-x="${numbersOf(x, known)}" data-y="${numbersOf(y, known)}" stroke="${look.colour}">` +
    `<path class="curve" d="${path ?? ''}" fill="none" stroke-width="1.8" stroke-linejoin="round"${dash}/>` +
    `<g class="points" fill="${fill}"${look.filled ? ` stroke="${PAPER}" stroke-width="0.8"` : ' stroke-width="1.6"'}>${marks.join('')}</g></g>`
  );
}

function numbersOf(values: ArrayLike<number>, places: readonly number[]): string {
  return places.map((k) => Number(values[k]!.toPrecision(8))).join(' ');
}

function allOf(series: readonly LineSeries[], marked: readonly Marked[], axis: 'x' | 'y'): number[] {
  const values = marked.map((one) => one[axis]);
  for (const one of series) {
    // An x without a y takes no room on the y axis, but keeps its place on the x axis.
    for (let k = 0; k < one.x.length; k++) values.push(one[axis][k]!);
  }
  return values;
}

/** A limit far away would press the curves into a line. */
function isNear(value: number, values: readonly number[]): boolean {
  const known = values.filter(Number.isFinite);
  const least = known.reduce((a, b) => Math.min(a, b), Number.POSITIVE_INFINITY);
  const most = known.reduce((a, b) => Math.max(a, b), Number.NEGATIVE_INFINITY);
  const room = 0.5 * (most - least);
  return value >= least - room && value <= most + room;
}

function isWithin({ low, high }: AxisScale, value: number): boolean {
  return value >= low && value <= high;
}
