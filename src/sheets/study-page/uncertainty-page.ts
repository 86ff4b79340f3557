import type { FigureSpread, Share, Uncertainty } from '../../study/uncertainty.ts';
import { type Bar, barChart } from '../charts/bar-chart.ts';
import { lineChart } from '../charts/line-chart.ts';
import type { LimitLine } from '../charts/stretches.ts';
import { shownValue } from '../figure-display.ts';
import { significant } from '../numbers.ts';
import { type Html, html, userText } from '../page/html.ts';
import { bulletList, type Cell, headCell, numberCell, table, textCell } from '../page/tables.ts';
import { cutNotes, sampleLine, shapeText, shortName } from '../uncertainty.ts';
import { uncertaintyCsv } from '../uncertainty-csv.ts';
import { figureAxis, shown } from './study-charts.ts';
import {
  chartFigure,
  chartGrid,
  failureList,
  type StudyPageOptions,
  studyDocument,
} from './study-document.ts';

/** What spreads make of the figures as one HTML file: how each is distributed, what it follows, what did not close. */
export function uncertaintyPage(found: Uncertainty, options: StudyPageOptions): string {
  const { flowsheet, figures, failures, options: asked } = found;
  const open = found.failed + found.extraFailed;
  return studyDocument(
    {
      document: 'Uncertainty',
      title: flowsheet.title,
      flowsheets: [flowsheet],
      job: [
        { label: 'Sample', value: sampleLine(found), span: 12 },
        { label: 'Flowsheet', value: userText(flowsheet.file), span: 8 },
        {
          label: 'Case of the file',
          value: flowsheet.caseName === null ? 'as in the file' : userText(flowsheet.caseName),
          span: 4,
        },
      ],
      ...(open === 0
        ? {}
        : {
            lead: html`<div class="alarm"><strong>Not all closed:</strong> ${open} of ${found.table.rows} cases have no part in the numbers below.</div>`,
          }),
      sections: [
        { id: 'spreads', heading: 'What was spread', html: spreadTable(found) },
        { id: 'percentiles', heading: 'What becomes of the figures', html: percentileTable(found) },
        {
          id: 'curves',
          heading: 'Share of cases below a value',
          html: chartGrid(figures.flatMap((figure, f) => cumulative(found, figure, f))),
        },
        {
          id: 'shares',
          heading:
            asked.shares === 'sobol'
              ? 'What each figure follows: share of its variance'
              : 'What each figure follows: share of the variance of its ranks',
          html: shareCharts(found),
        },
        failures.length === 0
          ? null
          : { id: 'failed', heading: 'Cases that did not close', html: failureList(failures, 'in sample') },
      ],
      csv: uncertaintyCsv(found),
    },
    options,
  );
}

function spreadTable({ spreads, flowsheet }: Uncertainty): Html {
  const notes = [
    ...flowsheet.correlations.map(
      ({ between: [one, other], value }) => `${one} and ${other} move together: rank correlation ${value}.`,
    ),
    ...spreads.flatMap(cutNotes),
  ];
  return html`${table({
    caption: 'What was spread',
    heads: [{ text: 'setting' }, { text: 'shape' }, { text: 'spread' }],
    rows: spreads.map((one) => [
      headCell(one.spread.path),
      textCell(one.spread.shape.kind),
      textCell(shapeText(one)),
    ]),
  })}${notes.length === 0 ? null : bulletList(notes.map(userText))}`;
}

function percentileTable({ flowsheet, figures }: Uncertainty): Html {
  const percents = figures.find(({ summary }) => summary !== null)?.summary?.percentiles ?? [];
  return table({
    caption: 'Mean, standard deviation and percentiles; behind ± how far chance may have moved a percentile',
    showCaption: true,
    heads: [
      { text: 'figure' },
      { text: 'unit' },
      { text: 'in the file', right: true },
      { text: 'mean', right: true },
      { text: 'sd', right: true },
      ...percents.map(({ percent }) => ({ text: `${percent} %`, right: true })),
      { text: 'cases', right: true },
    ],
    rows: figures.map(({ expression, asInFile, summary }): Cell[] => {
      const { display } = figureAxis(flowsheet, expression);
      const percentile = (p: number) => {
        if (summary === null) return '-';
        const { value, low, high } = summary.percentiles[p]!;
        const chance =
          low === null || high === null
            ? ''
            : ` ± ${significant(Math.max(value - low, high - value) * display.factor, 2)}`;
        return `${shownValue(value, display)}${chance}`;
      };
      return [
        headCell(shortName(expression)),
        { content: display.unit, kind: 'unit' },
        numberCell(shownValue(asInFile, display)),
        numberCell(shownValue(summary?.mean ?? null, display)),
        numberCell(summary === null ? '-' : significant(summary.sd * display.factor, 3)),
        ...percents.map((_, p) => numberCell(percentile(p))),
        numberCell(String(summary?.count ?? 0)),
      ];
    }),
  });
}

/** A curve of so many points shows all that can be seen. */
const MOST_POINTS = 200;

/** The values of a figure in order against the share of cases below: no classes to choose, nothing is smoothed. */
function cumulative(
  { flowsheet, table: cases, options, figures }: Uncertainty,
  figure: FigureSpread,
  f: number,
): Html[] {
  const { expression, summary, asInFile } = figure;
  if (summary === null) return [];
  const { display, title } = figureAxis(flowsheet, expression);
  const values = Array.from({ length: options.samples }, (_, row) => cases.found[row * figures.length + f]!)
    .filter(Number.isFinite)
    .sort((a, b) => a - b);
  const last = values.length - 1;
  const count = Math.min(values.length, MOST_POINTS);
  const ranks = Array.from({ length: count }, (_, k) =>
    count === 1 ? 0 : Math.round((k * last) / (count - 1)),
  );
  const { percentiles } = summary;
  const told = [percentiles[0], percentiles[Math.floor(percentiles.length / 2)], percentiles.at(-1)];
  const limits = [...new Set(told)].flatMap((one, k): LimitLine[] =>
    one === undefined
      ? []
      : [
          {
            axis: 'x',
            value: shown(one.value, display),
            label: `${one.percent} %`,
            light: true,
            nameOnTop: k === 0,
          },
        ],
  );
  const below = values.filter((value) => value < (asInFile ?? Number.NaN)).length;
  const svg = lineChart({
    id: `curve-${f + 1}`,
    title: `Share of cases below a value of ${expression}`,
    x: title,
    y: { title: 'cases below', unit: '%' },
    series: [
      {
        name: '',
        x: ranks.map((rank) => shown(values[rank]!, display)),
        y: ranks.map((rank) => (last === 0 ? 50 : (100 * rank) / last)),
      },
    ],
    limits,
    marked:
      asInFile === null
        ? []
        : [{ x: shown(asInFile, display), y: (100 * below) / values.length, label: 'as in the file' }],
    points: values.length < 30,
  });
  return [chartFigure(svg, shortName(expression))];
}

/** Shares of less than this are no cause [-]. */
const SMALL = 0.005;

function shareCharts({ figures, options }: Uncertainty): Html {
  const isSobol = options.shares === 'sobol';
  const sizeOf = ({ sobol, rankShare }: Share) => (isSobol ? sobol?.total : rankShare) ?? 0;
  const charts = figures.flatMap(({ expression, summary, shares }, f): Html[] => {
    if (summary === null) return [];
    // Spreads that vary together have one share: one bar, told by the first of them.
    const large = shares.filter(
      (share) => sizeOf(share) >= SMALL && (isSobol || share.together[0] === share.path),
    );
    if (large.length === 0) return [];
    const bars = large
      .toSorted((a, b) => sizeOf(b) - sizeOf(a))
      .map((share): Bar => {
        const { rankCorrelation, sobol } = share;
        const isOne = isSobol || share.together.length === 1;
        const text = isSobol
          ? `${(100 * sizeOf(share)).toFixed(0)} ± ${(100 * (sobol?.totalError ?? 0)).toFixed(0)} %`
          : !isOne
            ? `${(100 * sizeOf(share)).toFixed(0)} % together`
            : `${(100 * sizeOf(share)).toFixed(0)} % (${rankCorrelation! < 0 ? '' : '+'}${rankCorrelation!.toFixed(2)})`;
        const label = isOne ? share.path : share.together.join(' with ');
        return { label, value: sizeOf(share), text, hatched: isOne && (rankCorrelation ?? 0) < 0 };
      });
    const svg = barChart({ id: `shares-${f + 1}`, title: `What ${expression} follows`, bars, full: 1 });
    return [chartFigure(svg, shortName(expression))];
  });
  if (charts.length === 0) return html`<p>No figure follows any of the spreads.</p>`;
  const what = isSobol
    ? 'A bar is the share of the variance that a spread has a part in, with the others or alone.'
    : 'A bar is the share of the variance of the ranks, behind it the rank correlation; spreads that vary together have one bar. Of few samples a small share may be chance.';
  return html`<p class="note">${what} Full: the figure rises with the spread; hatched: it falls.</p>${chartGrid(charts)}`;
}
