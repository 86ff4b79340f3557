import type { Flowsheet } from '../../model/flowsheet.ts';
import { countFailures } from '../../study/failures.ts';
import { cellOf, type SweptTable } from '../../study/swept-table.ts';
import { significant } from '../numbers.ts';
import { type Html, html, nameText, userText } from '../page/html.ts';
import { bulletList, type Cell, headCell, numberCell, table, textCell } from '../page/tables.ts';
import { figureAxis, numberText, shown, studyCharts } from './study-charts.ts';
import {
  chartFigure,
  chartGrid,
  csvText,
  failureList,
  type StudyPageOptions,
  studyDocument,
} from './study-document.ts';

export interface SweepPageContent {
  readonly flowsheet: Flowsheet;
  readonly swept: SweptTable;
  /** heads of the table, as `sweepHeads` gives them */
  readonly heads: readonly string[];
  /** sentences of the study in the file */
  readonly reading: readonly string[];
  /** limits of the objective whose figures were recorded though nobody asked, as written */
  readonly addedLimits: readonly string[];
}

/** Rows that the page itself shows; the file behind the button has all. */
const SHOWN_ROWS = 400;

/** A sweep as one HTML file: charts of everything recorded, where limits hold, extremes, failures, the table. */
export function sweepPage(content: SweepPageContent, options: StudyPageOptions): string {
  const { flowsheet, swept, heads, reading, addedLimits } = content;
  const closed = swept.converged.reduce((sum, one) => sum + one, 0);
  const { charts, slice } = studyCharts(flowsheet, swept, 'chart');
  const failures = countFailures(swept.notes, (row) => swept.converged[row] === 0);
  return studyDocument(
    {
      document: 'Sweep',
      title: flowsheet.title,
      flowsheets: [flowsheet],
      job: [
        {
          label: 'Settings',
          value: swept.axes.map(
            ({ path, numbers, unit }) => html`<div>${userText(path)}: ${rangeText(numbers, unit)}</div>`,
          ),
          span: 8,
        },
        {
          label: 'Cases',
          value: `${swept.rows}${closed === swept.rows ? ', all closed' : `, ${swept.rows - closed} failed`}`,
          span: 4,
        },
        { label: 'Flowsheet', value: userText(flowsheet.file), span: 8 },
        {
          label: 'Case of the file',
          value: flowsheet.caseName === null ? 'as in the file' : userText(flowsheet.caseName),
          span: 4,
        },
      ],
      sections: [
        reading.length === 0
          ? null
          : { id: 'reading', heading: 'What it says', html: bulletList(reading.map(userText)) },
        {
          id: 'charts',
          heading: 'Charts',
          html: html`${slice === null ? null : html`<p>${slice}</p>`}${
            addedLimits.length === 0
              ? null
              : html`<p class="note">Recorded as well, for the limits of the objective: ${addedLimits.join(', ')}.</p>`
          }${chartGrid(charts.map(({ svg, name, note }) => chartFigure(svg, name, note)))}`,
        },
        { id: 'extremes', heading: 'Least and greatest', html: extremes(flowsheet, swept) },
        failures.length === 0
          ? null
          : { id: 'failed', heading: 'Cases that failed', html: failureList(failures, 'in row') },
        { id: 'table', heading: 'Table', html: caseTable(swept, heads) },
      ],
      csv: sweptCsv(swept, heads),
    },
    options,
  );
}

function rangeText(numbers: Float64Array, unit: string): string {
  const text = (value: number) => `${numberText(value)} ${unit}`.trimEnd();
  if (numbers.length === 1) return text(numbers[0]!);
  return `${text(numbers[0]!)} to ${text(numbers.at(-1)!)}, ${numbers.length} values`;
}

function extremes(flowsheet: Flowsheet, swept: SweptTable): Html {
  const rows = swept.record.map((name, column): Cell[] => {
    const { display } = figureAxis(flowsheet, name);
    const ends = endsOf(swept, column);
    if (ends === null)
      return [headCell(name), textCell('no value'), textCell(''), textCell(''), textCell(''), textCell('')];
    const end = (row: number): Cell[] => [
      numberCell(significant(shown(cellOf(swept, row, column), display))),
      textCell(settingsOf(swept, row)),
    ];
    return [headCell(name), { content: display.unit, kind: 'unit' }, ...end(ends.least), ...end(ends.most)];
  });
  return table({
    caption: 'Least and greatest of everything recorded, with the settings of the case',
    heads: [
      { text: 'recorded' },
      { text: 'unit' },
      { text: 'least', right: true },
      { text: 'at' },
      { text: 'greatest', right: true },
      { text: 'at' },
    ],
    rows,
  });
}

function endsOf(swept: SweptTable, column: number): { least: number; most: number } | null {
  let ends: { least: number; most: number } | null = null;
  for (let row = 0; row < swept.rows; row++) {
    const value = cellOf(swept, row, column);
    if (!Number.isFinite(value)) continue;
    if (ends === null) ends = { least: row, most: row };
    else if (value < cellOf(swept, ends.least, column)) ends.least = row;
    else if (value > cellOf(swept, ends.most, column)) ends.most = row;
  }
  return ends;
}

function settingsOf({ axes, record, cells }: SweptTable, row: number): string {
  const width = axes.length + record.length;
  return axes
    .map(({ path, unit }, a) => `${path} ${numberText(cells[row * width + a]!)} ${unit}`.trimEnd())
    .join(', ');
}

function caseTable(swept: SweptTable, heads: readonly string[]): Html {
  const { axes, record, cells } = swept;
  const width = axes.length + record.length;
  const count = Math.min(swept.rows, SHOWN_ROWS);
  const rows = Array.from({ length: count }, (_, row): Cell[] => [
    ...Array.from(cells.subarray(row * width, (row + 1) * width), (value, c) =>
      numberCell(c < axes.length ? numberText(value) : significant(value, 6)),
    ),
    textCell(swept.converged[row] === 1 ? 'yes' : 'NO'),
    numberCell(String(swept.passes[row])),
    textCell(swept.notes[row]!),
  ]);
  const note =
    count === swept.rows
      ? 'Figures in the units of formulas, fractions 0 to 1.'
      : `The first ${count} of ${swept.rows} cases; the table to download has all. Figures in the units of formulas, fractions 0 to 1.`;
  return html`<p class="note">${note}</p><div class="long">${table({
    caption: 'The cases of the sweep',
    heads: heads.map((text, c) => ({ text: nameText(text), right: c < width || c === width + 1 })),
    rows,
  })}</div>`;
}

/** The bytes of `--out table.csv`. */
function sweptCsv(swept: SweptTable, heads: readonly string[]): string {
  const width = swept.axes.length + swept.record.length;
  return csvText([
    heads,
    ...Array.from({ length: swept.rows }, (_, row) => [
      ...swept.cells.subarray(row * width, (row + 1) * width),
      swept.converged[row] === 1 ? 'true' : 'false',
      swept.passes[row]!,
      swept.notes[row]!,
    ]),
  ]);
}
