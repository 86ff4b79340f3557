import { type ChartPoint, nearestPoint, type PointRows, pointRows } from './chart-points.ts';
import { localNumber } from './decimal-mark.ts';

/** Charts tell the value under the pointer, or the one that the arrow keys have come to. */
export function readCharts(): void {
  for (const figure of document.querySelectorAll<HTMLElement>('.chart-figure')) {
    const svg = figure.querySelector<SVGSVGElement>('svg.chart');
    const picture = figure.querySelector<HTMLElement>('.picture');
    const words = figure.querySelector<HTMLElement>('.value');
    if (svg !== null && picture !== null && words !== null) readChart(svg, picture, words);
  }
}

function readChart(svg: SVGSVGElement, picture: HTMLElement, words: HTMLElement): void {
  const rows = pointRows(svg);
  if (rows.length === 0) return;
  let at: readonly [number, number] | null = null;
  const show = (next: readonly [number, number] | null) => {
    at = next;
    const point = next === null ? null : rows[next[0]]![next[1]]!;
    mark(svg, point);
    words.textContent = point === null ? '' : sentence(svg, point);
  };
  svg.addEventListener('pointermove', ({ clientX, clientY }) => {
    const { left, top, width } = svg.getBoundingClientRect();
    const scale = svg.viewBox.baseVal.width / width;
    show(nearestPoint(rows, (clientX - left) * scale, (clientY - top) * scale));
  });
  picture.tabIndex = 0;
  picture.setAttribute('role', 'group');
  picture.setAttribute('aria-label', 'Chart; the arrow keys read its values');
  picture.addEventListener('keydown', (event) => {
    const step = STEPS[event.key];
    if (step === undefined) return;
    event.preventDefault();
    show(at === null ? [0, 0] : moved(rows, at, step));
  });
  picture.addEventListener('blur', () => show(null));
  svg.addEventListener('pointerleave', () => {
    if (document.activeElement !== picture) show(null);
  });
}

/** Along the row and from row to row, upwards as in the drawing. */
const STEPS: Readonly<Record<string, readonly [number, number]>> = {
  ArrowLeft: [0, -1],
  ArrowRight: [0, 1],
  ArrowUp: [1, 0],
  ArrowDown: [-1, 0],
};

function moved(
  rows: PointRows,
  [row, place]: readonly [number, number],
  [up, along]: readonly [number, number],
): readonly [number, number] {
  const next = held(row + up, rows.length);
  return [next, held(place + along, rows[next]!.length)];
}

function held(place: number, count: number): number {
  return Math.min(Math.max(place, 0), count - 1);
}

function sentence({ dataset }: SVGSVGElement, { name, x, y, value }: ChartPoint): string {
  const { xName = '', xUnit = '', yName = '', yUnit = '', unit = '' } = dataset;
  const said = (number: number, its: string) => `${localNumber(number)} ${its}`.trimEnd();
  if (value === null) {
    const series = name === '' ? '' : `${name}: `;
    return `${series}${yName} ${said(y, yUnit)} at ${xName} ${said(x, xUnit)}`;
  }
  const figure = Number.isNaN(value) ? 'no value' : said(value, unit);
  return `${name} ${figure} at ${xName} ${said(x, xUnit)}, ${yName} ${said(y, yUnit)}`;
}

function mark(svg: SVGSVGElement, point: ChartPoint | null): void {
  let ring = svg.querySelector<SVGCircleElement>('.pointed');
  if (point === null) {
    ring?.remove();
    return;
  }
  if (ring === null) {
    ring = document.createElementNS('http://www.w3.org/2000/svg', 'circle');
    ring.setAttribute('class', 'pointed');
    ring.setAttribute('r', '6');
    svg.append(ring);
  }
  ring.setAttribute('cx', String(point.left));
  ring.setAttribute('cy', String(point.top));
}
