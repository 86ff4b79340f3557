import type { Flowsheet } from '../../model/flowsheet.ts';
import { dangersOfAll, studyTool } from '../cautions.ts';
import { chartStyle } from '../charts/palette.ts';
import { csvCell } from '../csv.ts';
import { type JobField, type PageSection, pageDocument } from '../page/document.ts';
import { type Html, html, ownMarkup, userText } from '../page/html.ts';
import { bulletList } from '../page/tables.ts';

/** What the rim hands to every page of a study. */
export interface StudyPageOptions {
  /** version of Looptally */
  readonly version: string;
  /** the script that shows values, downloads the table and writes numbers as the reader does; '' for none */
  readonly script: string;
  /** name under which the table is downloaded, e.g. sweep.csv */
  readonly csvName: string;
}

export interface StudyPageParts {
  /** e.g. Sweep */
  readonly document: string;
  readonly title: string;
  /** what the study is of, for the dangers that the page names */
  readonly flowsheets: readonly Flowsheet[];
  /** fields of the title block that say what was asked */
  readonly job: readonly JobField[];
  readonly lead?: Html;
  readonly sections: readonly (PageSection | null)[];
  /** the table behind the page, as the command writes it to a .csv file */
  readonly csv: string;
}

/** Rows of a table that fit a page that a browser opens at once. */
export const MOST_PAGE_ROWS = 20_000;

/** The page of a study: what was asked in the title block, numbered sections, the table to take away at the end. */
export function studyDocument(parts: StudyPageParts, options: StudyPageOptions): string {
  const { version, script, csvName } = options;
  return pageDocument({
    title: parts.title || 'Untitled flowsheet',
    document: parts.document,
    job: [
      ...parts.job,
      { label: 'Program', value: `Looptally ${version}`, span: 3 },
      { label: 'Prepared', value: '', span: 3 },
      { label: 'Checked', value: '', span: 3 },
      { label: 'Issued', value: '', span: 3 },
    ],
    ...(parts.lead === undefined ? {} : { lead: parts.lead }),
    sections: [...parts.sections.filter((one) => one !== null), takeAway(csvName, parts.flowsheets)],
    style: chartStyle + studyStyle,
    script,
    data: { csv: { name: csvName, text: parts.csv } },
  });
}

/** The button is of no use without the script, which shows it. */
function takeAway(csvName: string, flowsheets: readonly Flowsheet[]): PageSection {
  const dangers = dangersOfAll(flowsheets).map((danger) => html`<li>${danger}</li>`);
  return {
    id: 'data',
    heading: 'Data and use',
    html: html`<p>The table behind this page is kept in it, numbers in full.</p><p class="screen-only"><button type="button" id="take-csv" hidden>Download ${csvName}</button></p><div class="caution"><p>${studyTool} What the flowsheet assumes is told by looptally check.</p><ul>${dangers}</ul></div>`,
  };
}

/** A chart under its name, and what is to be said of it; a script writes the value under the pointer in between. */
export function chartFigure(svg: string, name: string, note = ''): Html {
  return html`<figure class="chart-figure"><figcaption>${userText(name)}</figcaption><div class="picture">${ownMarkup(svg)}</div><p class="value" role="status"></p>${
    note === '' ? null : html`<p class="note">${note}</p>`
  }</figure>`;
}

/** Charts side by side as the width allows. */
export function chartGrid(figures: readonly Html[]): Html {
  return html`<div class="charts">${figures}</div>`;
}

/** Cases that failed, by their reasons. */
export function failureList(
  failures: readonly { readonly reason: string; readonly count: number; readonly first: number }[],
  noun: string,
): Html {
  return bulletList(
    failures.map(
      ({ reason, count, first }) =>
        html`${count} ${count === 1 ? 'case' : 'cases'}, first ${noun} ${first}: ${userText(reason)}`,
    ),
  );
}

/** Rows as the text of a CSV file. */
export function csvText(rows: readonly (readonly (string | number | null)[])[]): string {
  return rows.map((row) => `${row.map(csvCell).join(',')}\r\n`).join('');
}

const studyStyle = `
.charts{grid-template-columns:repeat(auto-fill,minmax(min(100%,25rem),1fr))}
.chart-figure{break-inside:avoid;min-width:0}
.chart-figure .chart{width:100%;max-width:34rem}
.chart-figure figcaption{color:var(--ink);font-weight:600;margin:0 0 .3rem}
.chart-figure .value{min-height:1.5em;margin:.1rem 0;font-size:.84rem}
.chart-figure:focus-within .picture,.chart-figure .picture:focus-visible{outline:2px solid var(--accent);outline-offset:2px}
.pointed{fill:none;stroke:var(--accent);stroke-width:2}
.long{max-height:32rem;overflow:auto}
.long .scroll{overflow:visible}
.long td{white-space:nowrap}
.long thead th{position:sticky;top:0;background:var(--paper)}
.differs{font-weight:650}
.same{color:var(--soft)}
.next{border-left:1px solid var(--hair);padding-left:.7rem}
button{font:inherit;color:var(--ink);background:var(--wash);border:1px solid var(--rule);padding:.35rem .9rem;cursor:pointer}
button:hover{background:var(--accent-wash)}
@media print{.charts{grid-template-columns:1fr 1fr}.chart-figure .value{display:none}.long{max-height:none;overflow:visible}.long th,.long td:last-child{white-space:normal}.note,.caution,.chart-figure figcaption{font-size:8pt}.long thead th{position:static}}
`;
