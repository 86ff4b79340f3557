import type { TradeOff } from '../../study/trade-off.ts';
import { lineChart } from '../charts/line-chart.ts';
import { formulaDisplay } from '../formula-display.ts';
import { figureLabel } from './figure-sections.ts';
import { numberOf } from './handle-text.ts';
import { type Html, html, joined, ownMarkup, userText } from './html.ts';
import type { PageView } from './view.ts';

const WIDTH = 400;
const HEIGHT = 235;

/** What each handle does to the key figures over its range, all else as it stands, with the present point marked. */
export function tradeOffSection(view: PageView): Html | null {
  const drawn = view.tradeOffs.filter(({ figures }) => figures.length > 0);
  if (drawn.length === 0) return null;
  return html`<p class="note">Each row moves one setting over its range and closes the loop at every point; the other settings stay as they are. The ring is the present case; where a line is broken the loop does not close.</p>${joined(
    drawn.map(
      (one, t) =>
        html`<h3>${userText(one.handle.path)}</h3><div class="charts">${joined(one.figures.map((_, f) => chart(view, one, t, f)))}</div>`,
    ),
  )}`;
}

function chart(view: PageView, { handle, values, figures }: TradeOff, t: number, f: number): Html {
  const { formula, values: found } = figures[f]!;
  const display = formulaDisplay(formula.text, view.flowsheet);
  const shown = (value: number) => value * display.factor + display.offset;
  const now = view.at.get(handle.path);
  const here = formula.evaluate({ figures: view.result.figures });
  const label = figureLabel(formula.text);
  return html`<figure>${ownMarkup(
    lineChart({
      id: `trade-${t}-${f}`,
      title: `${label} against ${handle.path}`,
      x: { title: handle.path.split('.').at(-1) ?? '', unit: handle.unit, text: view.axisText },
      y: { title: label, unit: display.unit, text: view.axisText },
      series: [
        {
          name: '',
          x: Array.from(values, (value) => numberOf(handle, value)),
          y: Array.from(found, shown),
        },
      ],
      marked:
        now === undefined || !Number.isFinite(here)
          ? []
          : [{ x: numberOf(handle, now), y: shown(here), label: 'now' }],
      points: false,
      width: WIDTH,
      height: HEIGHT,
    }),
  )}</figure>`;
}
