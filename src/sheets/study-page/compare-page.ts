import { type Comparison, type FigureRow, SAME, type SettingRow } from '../../study/compare.ts';
import {
  cellText,
  columnLine,
  differingFigures,
  displayOf,
  figureName,
  percentStep,
  sameKind,
} from '../compare.ts';
import { compareCsv } from '../compare-tables.ts';
import { shownStep, shownValue } from '../figure-display.ts';
import { type Html, html, userText } from '../page/html.ts';
import { bulletList, type Cell, headCell, numberCell, table } from '../page/tables.ts';
import { type StudyPageOptions, studyDocument } from './study-document.ts';

/** Cases or files side by side as one HTML file: what differs among the settings first, then what that does. */
export function comparePage(found: Comparison, options: StudyPageOptions): string {
  const { columns } = found;
  const [first] = columns as [Comparison['columns'][0]];
  const open = columns.filter(({ closed }) => !closed);
  const files = [...new Set(columns.map(({ flowsheet }) => flowsheet.file))];
  return studyDocument(
    {
      document: 'Comparison',
      title: first.flowsheet.title,
      flowsheets: columns.map(({ flowsheet }) => flowsheet),
      job: [
        { label: 'Held against', value: userText(first.name), span: 4 },
        { label: 'Columns', value: String(columns.length), span: 2 },
        {
          label: files.length === 1 ? 'Flowsheet' : 'Flowsheets',
          value: files.map((file) => html`<div>${userText(file)}</div>`),
          span: 6,
        },
      ],
      ...(open.length === 0
        ? {}
        : {
            lead: html`<div class="alarm"><strong>Not closed:</strong> ${open.length} of ${columns.length} columns hold no answer.</div>`,
          }),
      sections: [
        {
          id: 'columns',
          heading: 'What is compared',
          html: bulletList(columns.map((_, c) => userText(columnLine(found, c)))),
        },
        { id: 'settings', heading: 'Settings that differ', html: settingTable(found) },
        { id: 'figures', heading: 'What that does to the figures', html: figureTable(found) },
        found.warnings.length === 0
          ? null
          : { id: 'warnings', heading: 'Warnings that not all have', html: warningList(found) },
      ],
      csv: compareCsv(found),
    },
    options,
  );
}

function settingTable(found: Comparison): Html {
  if (found.settings.length === 0) return html`<p>None: all columns are settled alike.</p>`;
  return table({
    caption: 'Settings that are not the same in all columns',
    heads: [{ text: 'setting' }, ...found.columns.map(({ name }) => ({ text: userText(name), right: true }))],
    rows: found.settings.map(({ path, values }) => [
      headCell(path),
      ...values.map((value, c) => settingCell(values, value, c)),
    ]),
  });
}

/** What differs from the first column is heavier and has a mark; what does not says so. */
function settingCell(values: SettingRow['values'], value: SettingRow['values'][0], c: number): Cell {
  const first = values[0]!;
  if (c === 0) return numberCell(cellText(value));
  if (cellText(value) === cellText(first) && sameKind(value, first))
    return { content: 'same', kind: 'number', mark: 'same' };
  return { content: `≠ ${cellText(value)}`, kind: 'number', mark: 'differs' };
}

function figureTable(found: Comparison): Html {
  const rows = differingFigures(found);
  const alike = found.figures.length - rows.length;
  const rest =
    alike === 0
      ? null
      : html`<p class="note">${alike} other figures are the same in all columns that closed.</p>`;
  if (rows.length === 0) return html`<p>No figure differs.</p>${rest}`;
  const others = found.columns.slice(1);
  return html`${table({
    caption: 'Figures that differ, with the change against the first column',
    heads: [
      { text: 'figure' },
      { text: 'unit' },
      { text: userText(found.columns[0]!.name), right: true },
      ...others.flatMap(({ name }) => [
        { text: userText(name), right: true },
        { text: 'change', right: true },
        { text: '%', right: true },
      ]),
    ],
    rows: rows.map((row) => figureCells(found, row)),
  })}<p class="note">▲ more, ▼ less than the first column; heavy where it is 1 % or more.</p>${rest}`;
}

/** Changes of this share are looked at first. */
const LARGE = 0.01;

function figureCells(found: Comparison, row: FigureRow): Cell[] {
  const display = displayOf(found, row);
  const others = row.values.slice(1).flatMap((value, k): Cell[] => {
    const step = row.differences[k + 1]!;
    const share = row.relative[k + 1]!;
    const arrow = step === null || step === 0 ? '' : step > 0 ? '▲ ' : '▼ ';
    const mark = share !== null && Math.abs(share) >= LARGE ? 'differs' : step === 0 ? 'same' : '';
    return [
      { content: shownValue(value, display), kind: 'number', mark: 'next' },
      { content: `${arrow}${shownStep(step, display.factor)}`, kind: 'number', mark },
      { content: share !== null && Math.abs(share) < SAME ? '0' : percentStep(share), kind: 'number', mark },
    ];
  });
  return [
    headCell(figureName(row)),
    { content: display.unit, kind: 'unit' },
    numberCell(shownValue(row.values[0]!, display)),
    ...others,
  ];
}

function warningList({ warnings, columns }: Comparison): Html {
  return bulletList(
    warnings.map(({ warning, columns: having }) => {
      const who = columns.flatMap(({ name }, c) => (having[c] ? [name] : [])).join(', ');
      return html`${userText(who)}: ${userText(warning.where)}: ${userText(warning.message)} (${warning.code})`;
    }),
  );
}
