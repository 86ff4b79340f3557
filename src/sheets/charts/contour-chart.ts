import { ticks } from 'd3-array';
import { escaped } from '../drawing/svg.ts';
import { plainText } from '../plain.ts';
import { type ChartAxis, createAxisScale, type Tick } from './axis-scale.ts';
import { bands } from './contour-bands.ts';
import { type ContourKey, contourKey, cross, keyHeight } from './contour-key.ts';
import { contourLabels } from './contour-labels.ts';
import { type ContourNodes, contourNodes } from './contour-nodes.ts';
import { contourDescription, numberWith } from './description.ts';
import {
  axes,
  axisData,
  CHART_WIDTH,
  checkId,
  createFrame,
  type Frame,
  svgFigure,
  ticksAcross,
} from './frame.ts';
import { type Marked, markedBox, markedPoint } from './marked-point.ts';
import { decimalsOfStep, pointText } from './number-text.ts';

export interface ContourChartSpec {
  /** unlike any other on the page: small letters, digits and hyphens */
  readonly id: string;
  readonly title: string;
  readonly x: ChartAxis & { readonly values: ArrayLike<number> };
  readonly y: ChartAxis & { readonly values: ArrayLike<number> };
  readonly figure: ChartAxis;
  /** the figure at each node, one row for every y, in it one for every x; NaN where there is no value */
  readonly values: ArrayLike<number>;
  /** how far each node is from breaking a limit: below zero one is broken; null where there is no limit */
  readonly feasible?: ArrayLike<number> | null;
  /** nodes whose case failed get a cross; null: all that have no value */
  readonly failed?: ArrayLike<boolean> | null;
  readonly marked?: readonly Marked[];
  readonly width?: number;
}

const LEVELS = 8;
const PLOT_HEIGHT = 320;
/** Differences that closing leaves open, against the size of the figure. */
const NOISE = 1e-9;

/**
 * One figure over two settings as an SVG picture: bands between round values with their lines, hatched and faded where a
 * limit does not hold, a cross where a case failed. Between the nodes the figure is taken as linear along each setting;
 * squares with a corner that has no value stay empty. What a script needs to show the values is in `data-` attributes.
 *
 * @throws Error where the id is none, an axis has fewer than two values or there is not one value per node
 */
export function contourChart(spec: ContourChartSpec): string {
  const { id, title, marked = [], width = CHART_WIDTH } = spec;
  checkId(id);
  const nodes = contourNodes(spec);
  const levels = levelsOf(nodes.values, spec.figure);
  const known = nodes.values.find(Number.isFinite);
  const key: ContourKey = {
    id,
    figure: spec.figure,
    levels,
    only: known === undefined ? null : numberWith(known, { ...spec.figure, unit: '' }),
    hasLimits: nodes.margin !== null,
    hasFailed: nodes.failed.includes(true),
    width,
  };
  const below = keyHeight(key);
  const height = PLOT_HEIGHT + below;
  const x = createAxisScale(spec.x, [...nodes.x, ...marked.map((one) => one.x)], ticksAcross(width), true);
  const y = createAxisScale(spec.y, [...nodes.y, ...marked.map((one) => one.y)], 6, true);
  const frame = createFrame(x, y, { width, height, right: 16, below });
  const picture = bands(
    id,
    nodes,
    levels.map(({ value }) => value),
    frame,
  );
  const body = [
    picture.svg,
    contourLabels(
      picture.lines,
      (level) => levels.find(({ value }) => value === level)!,
      frame,
      marked.map((one) => markedBox(one, frame, width)),
    ),
    axes(frame, spec.x, spec.y, width),
    nodeData(nodes, spec.figure, frame),
    ...marked.map((one) => markedPoint(one, frame, width)),
    contourKey(key, frame.plot.y + frame.plot.height + 50),
  ];
  const data = `${axisData(frame, spec.x, spec.y)} data-unit="${escaped(plainText(spec.figure.unit))}"`;
  return svgFigure(id, title, contourDescription(spec, nodes), { width, height, data }, body.join(''));
}

/** Round values between the least and the greatest. */
function levelsOf(values: readonly number[], { text = pointText }: ChartAxis): Tick[] {
  const known = values.filter(Number.isFinite);
  const least = known.reduce((a, b) => Math.min(a, b), Number.POSITIVE_INFINITY);
  const most = known.reduce((a, b) => Math.max(a, b), Number.NEGATIVE_INFINITY);
  if (!(most - least > NOISE * Math.max(Math.abs(least), Math.abs(most)))) return [];
  const levels = ticks(least, most, LEVELS).filter((level) => level > least && level < most);
  const decimals =
    levels.length > 1 ? decimalsOfStep(levels[1]! - levels[0]!) : decimalsOfStep((most - least) / 4);
  return levels.map((value) => ({ value, text: text(value, decimals), decimals }));
}

/** Crosses, and the numbers of all nodes in one place: thousands of elements would make a page slow. */
function nodeData({ x, y, values, failed }: ContourNodes, { title }: ChartAxis, { atX, atY }: Frame): string {
  const crosses = failed.map((is, k) =>
    is ? cross(atX(x[k % x.length]!), atY(y[Math.floor(k / x.length)]!)) : '',
  );
  return `<g class="nodes" data-name="${escaped(plainText(title))}" data-columns="${x.join(' ')}" data-rows="${y.join(' ')}" data-values="${values.map((value) => (Number.isFinite(value) ? Number(value.toPrecision(8)) : '-')).join(' ')}">${crosses.join('')}</g>`;
}
