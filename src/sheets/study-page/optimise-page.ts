import type { CurveRow } from '../../study/curve.ts';
import type { Optimised } from '../../study/optimise.ts';
import { lineChart } from '../charts/line-chart.ts';
import type { Stretch } from '../charts/stretches.ts';
import { type FigureDisplay, settingDisplay } from '../figure-display.ts';
import { answerLine, caseLines, type OptimisePart, optimiseParts } from '../optimise.ts';
import { optimiseCsv } from '../optimise-tables.ts';
import { type Html, html, userText } from '../page/html.ts';
import { type Cell, numberCell, table, textCell } from '../page/tables.ts';
import { figureAxis, type StudyChart, shown } from './study-charts.ts';
import { chartFigure, chartGrid, type StudyPageOptions, studyDocument } from './study-document.ts';

/** What `optimise` found as one HTML file: the answer, what holds it, and the goal around it or the trade-off. */
export function optimisePage(found: Optimised, options: StudyPageOptions): string {
  const { flowsheet, objective, evaluations } = found;
  const charts = found.front.length > 0 ? frontCharts(found) : curveCharts(found);
  const [, , line] = caseLines(found, (text) => text);
  const answer = answerLine(found);
  return studyDocument(
    {
      document: found.front.length > 0 ? 'Trade-off' : 'Best settings',
      title: flowsheet.title,
      flowsheets: [flowsheet],
      job: [
        {
          label: 'Wanted',
          value: objective.goals.map(({ sense, text }) => html`<div>${sense} ${userText(text)}</div>`),
          span: 6,
        },
        { label: 'Flowsheet', value: userText(flowsheet.file), span: 6 },
        {
          label: 'Case of the file',
          value: flowsheet.caseName === null ? 'as in the file' : userText(flowsheet.caseName),
          span: 6,
        },
        { label: 'Closings', value: String(evaluations), span: 6 },
      ],
      sections: [
        {
          id: 'answer',
          heading: 'Answer',
          html: html`<p><strong>${userText(answer.charAt(0).toUpperCase() + answer.slice(1))}.</strong></p>${
            line === undefined
              ? null
              : html`<p>To put under cases: in the file: <code>${line.trim()}</code></p>`
          }`,
        },
        charts.length === 0
          ? null
          : {
              id: 'charts',
              heading: found.front.length > 0 ? 'The trade-off' : 'Around the best case',
              html: chartGrid(charts.map(({ svg, name, note }) => chartFigure(svg, name, note))),
            },
        ...optimiseParts(found).map((part, p) => ({
          id: `part-${p + 1}`,
          heading: part.title,
          html: partTable(part),
        })),
      ],
      csv: optimiseCsv(found),
    },
    options,
  );
}

/** The tables of the text; columns of numbers stand to the right, and no head is left empty. */
function partTable({ title, rows, left }: OptimisePart): Html {
  const [heads, ...body] = rows as readonly (readonly string[])[];
  return table({
    caption: title,
    heads: heads!.map((text, c) => ({
      text: userText(text || (c === 0 ? 'no.' : 'remark')),
      right: !left.includes(c),
    })),
    rows: body.map((row) =>
      row.map((cell, c): Cell => (left.includes(c) ? textCell(cell) : numberCell(cell))),
    ),
  });
}

/** The goal over each setting, the others as in the best case. */
function curveCharts(found: Optimised): StudyChart[] {
  const { objective, curve, best, flowsheet } = found;
  const [goal] = objective.goals;
  if (goal === undefined || best === null || curve.length === 0) return [];
  const { display, title } = figureAxis(flowsheet, goal.text);
  return objective.moves.map(({ path, unit }, m) => {
    const rows = curve.filter(({ move }) => move === m);
    const its = settingDisplay(path, unit);
    const x = rows.map(({ value }) => shown(value, its));
    const broken = stretchesOf(rows, its);
    const svg = lineChart({
      id: `curve-${m + 1}`,
      title: `${goal.text} over ${path}, all else as in the best case`,
      x: { title: path, unit: its.unit },
      y: title,
      series: [
        { name: '', x, y: rows.map(({ goal: got }) => (got === null ? Number.NaN : shown(got, display))) },
      ],
      marked: [{ x: shown(best.settings[m]!, its), y: shown(best.case.goals[0]!, display), label: 'best' }],
      stretches: broken,
    });
    const note =
      broken.length === 0
        ? ''
        : 'Hatched: a limit does not hold. Its edge lies between two of the cases closed.';
    return { svg, name: `${goal.text} over ${path}`, note };
  });
}

/** From half way before the first case that breaks a limit to half way behind the last. */
function stretchesOf(rows: readonly CurveRow[], display: FigureDisplay): Stretch[] {
  const at = (k: number) => shown(rows[k]!.value, display);
  const found: Stretch[] = [];
  for (let k = 0; k < rows.length; k++) {
    if (rows[k]!.broken.length === 0) continue;
    let end = k;
    while (end + 1 < rows.length && rows[end + 1]!.broken.length > 0) end++;
    found.push({
      from: k === 0 ? at(0) : (at(k - 1) + at(k)) / 2,
      to: end === rows.length - 1 ? at(end) : (at(end) + at(end + 1)) / 2,
      label: '',
    });
    k = end;
  }
  return found;
}

/** One goal against the other, and each setting along the way. */
function frontCharts(found: Optimised): StudyChart[] {
  const { objective, front, flowsheet } = found;
  const [one, other] = objective.goals.map(({ text }) => ({ text, ...figureAxis(flowsheet, text) }));
  if (one === undefined || other === undefined) return [];
  const x = front.map((point) => shown(point.case.goals[0]!, one.display));
  const y = front.map((point) => shown(point.case.goals[1]!, other.display));
  const between = {
    svg: lineChart({
      id: 'front',
      title: `${other.text} against ${one.text}: of these cases none is better in both`,
      x: one.title,
      y: other.title,
      series: [{ name: '', x, y }],
    }),
    name: `${other.text} against ${one.text}`,
    note: 'Of these cases none is better in both.',
  };
  return [
    between,
    ...objective.moves.map(({ path, unit }, m) => {
      const its = settingDisplay(path, unit);
      const settings = front.map((point) => shown(point.settings[m]!, its));
      const svg = lineChart({
        id: `front-${m + 1}`,
        title: `${path} along the trade-off`,
        x: one.title,
        y: { title: path, unit: its.unit },
        series: [{ name: '', x, y: settings }],
      });
      return { svg, name: `${path} along the trade-off`, note: '' };
    }),
  ];
}
