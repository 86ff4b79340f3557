import { axisTitle, type ChartAxis } from './axis-scale.ts';
import type { ContourChartSpec } from './contour-chart.ts';
import type { ContourNodes } from './contour-nodes.ts';
import type { LineChartSpec, LineSeries } from './line-chart.ts';
import { decimalsOfDigits, pointText } from './number-text.ts';

/** What a chart of lines shows, in words, for those who cannot see it. */
export function lineDescription({ x, y, series, marked = [] }: LineChartSpec): string {
  const parts = [`${axisTitle(y)} against ${axisTitle(x)}.`];
  for (const one of series) parts.push(seriesSentence(one, x, y));
  for (const { x: atX, y: atY, label } of marked) {
    parts.push(`${label}: ${numberWith(atY, y)} at ${numberWith(atX, x)}.`);
  }
  return parts.join(' ');
}

function seriesSentence({ name, x, y }: LineSeries, xAxis: ChartAxis, yAxis: ChartAxis): string {
  let least = -1;
  let most = -1;
  let missing = 0;
  for (let k = 0; k < y.length; k++) {
    if (!Number.isFinite(y[k]!)) {
      missing++;
      continue;
    }
    if (least < 0 || y[k]! < y[least]!) least = k;
    if (most < 0 || y[k]! > y[most]!) most = k;
  }
  const said = (words: string) =>
    name === '' ? words.charAt(0).toUpperCase() + words.slice(1) : `${name}: ${words}`;
  if (least < 0) return said('no value.');
  const gaps = missing === 0 ? '' : `, no value at ${missing} of ${y.length} points`;
  const at = (k: number) => `${numberWith(y[k]!, yAxis)} at ${numberWith(x[k]!, xAxis)}`;
  if (y[least] === y[most]) return said(`${numberWith(y[least]!, yAxis)} throughout${gaps}.`);
  return said(`least ${at(least)}, greatest ${at(most)}${gaps}.`);
}

/** What a contour chart shows, in words. */
export function contourDescription(
  { x, y, figure, marked = [] }: ContourChartSpec,
  nodes: ContourNodes,
): string {
  const { values, failed, margin } = nodes;
  const at = (k: number) =>
    `${numberWith(nodes.x[k % nodes.x.length]!, x)} and ${numberWith(nodes.y[Math.floor(k / nodes.x.length)]!, y)}`;
  const known = Array.from(values.keys()).filter((k) => Number.isFinite(values[k]!));
  const parts = [`${axisTitle(figure)} over ${axisTitle(x)} (across) and ${axisTitle(y)} (up).`];
  if (known.length === 0) parts.push('No value.');
  else {
    const least = known.reduce((a, b) => (values[b]! < values[a]! ? b : a));
    const most = known.reduce((a, b) => (values[b]! > values[a]! ? b : a));
    parts.push(`Least ${numberWith(values[least]!, figure)} at ${at(least)}.`);
    parts.push(`Greatest ${numberWith(values[most]!, figure)} at ${at(most)}.`);
  }
  const failures = failed.filter(Boolean).length;
  if (failures > 0) parts.push(`${failures} of ${failed.length} cases failed.`);
  if (margin !== null) {
    const holding = margin.filter((value) => value >= 0).length;
    parts.push(`All limits hold in ${holding} of ${margin.length} cases.`);
  }
  for (const one of marked) {
    parts.push(`${one.label}: ${numberWith(one.x, x)} and ${numberWith(one.y, y)}.`);
  }
  return parts.join(' ');
}

/** A number of five digits with the unit of its axis. */
export function numberWith(value: number, { unit, text = pointText }: ChartAxis): string {
  return `${text(value, decimalsOfDigits(value, 5))} ${unit}`.trimEnd();
}
