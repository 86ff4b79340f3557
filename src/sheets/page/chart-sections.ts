import { lineChart } from '../charts/line-chart.ts';
import type { LimitLine } from '../charts/stretches.ts';
import { type Html, html, joined, ownMarkup } from './html.ts';
import { passTable } from './note-sections.ts';
import type { PageView } from './view.ts';

const WIDTH = 460;
const HEIGHT = 290;

/** Temperature against heat of every condenser and exchanger. */
export function heatCurvesSection(view: PageView): Html | null {
  const charts = Object.entries(view.result.blocks).flatMap(([name, { details }], k) => {
    const curve = numbersIn(details['heat_curve']);
    const heat = curve['heat_kW'];
    if (heat === undefined) return [];
    const evaporator = details['evaporator_K'];
    const limits: LimitLine[] =
      typeof evaporator === 'number' ? [{ axis: 'y', value: evaporator - 273.15, label: 'evaporator' }] : [];
    const lines = (['hot_K', 'process_K', 'cold_K'] as const).flatMap((key) => curve[key] ?? []).length;
    if (lines === 0) return [];
    return [
      figureOf(
        lineChart({
          id: `heat-${k}`,
          title: `${name}: temperature against heat`,
          x: { title: 'heat given off from the cold end', unit: 'MW', text: view.axisText },
          y: { title: `${name}: temperature`, unit: 'degC', text: view.axisText },
          series: (
            [
              ['hot_K', 'hot'],
              ['process_K', ''],
              ['cold_K', 'cold'],
            ] as const
          ).flatMap(([key, word]) => {
            const temperatures = curve[key];
            if (temperatures === undefined) return [];
            return [{ name: word, x: heat.map((kW) => kW / 1000), y: temperatures.map(degC) }];
          }),
          limits,
          points: false,
          width: WIDTH,
          height: HEIGHT,
        }),
      ),
    ];
  });
  return charts.length === 0 ? null : html`<div class="charts">${charts}</div>`;
}

/** The way of the gas through adiabatic beds against equilibrium, and along beds with a rate law. */
export function convertersSection(view: PageView): Html | null {
  const charts = Object.entries(view.result.blocks).flatMap(([name, { details }], k) => [
    ...bedLines(view, name, details, k),
    ...bedProfile(view, name, details, k),
  ]);
  return charts.length === 0 ? null : html`<div class="charts">${charts}</div>`;
}

type Details = Readonly<Record<string, unknown>>;

function bedLines(view: PageView, name: string, details: Details, k: number): Html[] {
  const operating = pointsIn(details['operating_line']);
  const equilibrium = pointsIn(details['equilibrium_line']);
  if (operating.length === 0) return [];
  const beds = [...new Set(operating.map(({ bed }) => bed))];
  const series = (word: string, points: readonly LinePoint[]) => ({
    name: word,
    x: points.map((point) => degC(point.temperature_K)),
    y: points.map((point) => 100 * point.conversion),
  });
  // Between two beds the gas is cooled: one line, with the step to the left in it, is how it is drawn by hand.
  return [
    figureOf(
      lineChart({
        id: `beds-${k}`,
        title: `${name}: operating line against equilibrium`,
        x: { title: 'temperature', unit: 'degC', text: view.axisText },
        y: { title: `${name}: conversion`, unit: '%', text: view.axisText },
        series: [
          series(beds.length === 1 ? 'bed' : `${beds.length} beds`, operating),
          series('equilibrium', equilibrium),
        ],
        points: false,
        width: WIDTH,
        height: HEIGHT + 40,
      }),
    ),
  ];
}

function bedProfile(view: PageView, name: string, details: Details, k: number): Html[] {
  const profile = numbersIn(details['profile']);
  const position = profile['position'];
  const temperature = profile['temperature_K'];
  if (position === undefined || temperature === undefined) return [];
  const equilibrium = Object.entries(
    (details['profile'] as Record<string, unknown>)['equilibrium_K'] ?? {},
  ).flatMap(([reaction, values]) => (isNumbers(values) ? [{ reaction, values }] : []));
  const x = position.map((share) => 100 * share);
  return [
    figureOf(
      lineChart({
        id: `profile-${k}`,
        title: `${name}: temperature along the bed`,
        x: { title: 'share of the catalyst', unit: '%', text: view.axisText },
        y: { title: `${name}: temperature`, unit: 'degC', text: view.axisText },
        series: [
          { name: 'gas', x, y: temperature.map(degC) },
          ...equilibrium.map(({ reaction, values }) => ({
            name: equilibrium.length === 1 ? 'equilibrium' : `equilibrium of ${reaction}`,
            x,
            y: values.map(degC),
          })),
        ],
        points: false,
        width: WIDTH,
        height: HEIGHT,
      }),
    ),
  ];
}

/** Residual after each pass, and what the solver did. */
export function passesSection(view: PageView): Html {
  const { history } = view.result.convergence;
  const shown = history.filter(({ residual }) => residual > 0);
  const chart =
    shown.length < 2
      ? null
      : figureOf(
          lineChart({
            id: 'passes',
            title: 'Residual of the tears after each pass',
            // There is no half pass.
            x: { title: 'pass', unit: '', text: (pass) => (Number.isInteger(pass) ? String(pass) : '') },
            y: { title: 'residual', unit: 'relative', log: true, text: view.axisText },
            series: [
              { name: '', x: shown.map(({ pass }) => pass), y: shown.map(({ residual }) => residual) },
            ],
            width: WIDTH,
            height: 240,
          }),
        );
  return html`<div class="charts">${chart}</div>${passTable(view)}`;
}

function figureOf(svg: string): Html {
  return joined([ownMarkup('<figure>'), ownMarkup(svg), ownMarkup('</figure>')]);
}

interface LinePoint {
  readonly bed?: number;
  readonly temperature_K: number;
  readonly conversion: number;
}

function pointsIn(value: unknown): readonly LinePoint[] {
  return Array.isArray(value) ? (value as LinePoint[]) : [];
}

/** The lists of numbers in a detail, by their names. */
function numbersIn(value: unknown): Readonly<Record<string, readonly number[]>> {
  if (typeof value !== 'object' || value === null) return {};
  return Object.fromEntries(
    Object.entries(value).filter((entry): entry is [string, readonly number[]] => isNumbers(entry[1])),
  );
}

function isNumbers(value: unknown): value is readonly number[] {
  return (
    Array.isArray(value) && value.length > 0 && value.every((one) => typeof one === 'number' || one === null)
  );
}

function degC(kelvin: number): number {
  return kelvin === null ? Number.NaN : kelvin - 273.15;
}
