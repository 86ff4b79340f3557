import { figureLeaves } from '../../tally/figure-leaves.ts';
import { figureDisplay, shownValue } from '../figure-display.ts';
import { figureUnits } from '../figure-units.ts';
import { isOfPower, isWithoutPower } from '../no-power.ts';
import { significant } from '../numbers.ts';
import { story } from '../story.ts';
import { type Html, html, joined, nameText, type Part } from './html.ts';
import { definitions, headCell, numberCell, table, textCell, unitCell } from './tables.ts';
import { type PageView, sheetOptions } from './view.ts';

/** The loop in the order its questions are asked. */
export function storySection(view: PageView): Html {
  const rows: [Part, Part[]][] = [];
  for (const { label, text } of story(view.result, sheetOptions(view))) {
    const line = view.words(text.replaceAll('\u00a0', ' '));
    const last = rows.at(-1);
    if (label === '' && last !== undefined) last[1].push(line);
    else rows.push([nameText(label.trim()), [line]]);
  }
  return html`${definitions(rows.map(([label, lines]) => [label, joined(lines, '<br>')]))}${aims(view)}`;
}

function aims({ result, words }: PageView): Html | null {
  const entries = Object.entries(result.aims);
  if (entries.length === 0) return null;
  const rows = entries.map(([name, aim]) => {
    const display = figureDisplay('');
    return [
      headCell(name),
      textCell(aim.reached ? 'reached' : html`<strong class="alarm-word">NOT REACHED</strong>`),
      textCell(aim.until),
      numberCell(shownValue(aim.achieved, display), words),
      textCell(aim.setting),
      textCell(aim.note ?? ''),
    ];
  });
  const heads = ['aim', 'outcome', 'until', 'got', 'setting moved', 'note'].map((text) => ({
    text,
    right: text === 'got',
  }));
  return html`<h3>Aims</h3>${table({ caption: 'Aims of the file', heads, rows })}`;
}

/** Every key figure by its name. */
export function figuresSection({ result, flowsheet, words }: PageView): Html {
  const units = figureUnits(flowsheet);
  const withoutPower = isWithoutPower(result.figures);
  const rows = [...figureLeaves(result.figures)].map(([name, value]) => {
    const display = figureDisplay(name, units);
    if (withoutPower && isOfPower(name)) return [headCell(name), numberCell('none'), unitCell('')];
    // The number of the contract stands beside what is shown of it, for whoever copies or checks the page.
    const shown = html`<data value="${value}">${words(shownValue(value, display))}</data>`;
    return [headCell(name), { content: shown, kind: 'number' as const }, unitCell(display.unit)];
  });
  const heads = [{ text: 'figure' }, { text: 'value', right: true }, { text: 'unit' }];
  return table({ caption: 'Key figures by the names that formulas call them', heads, rows, mark: 'long' });
}

/** A figure that is looked at while a setting is moved. */
export interface Glance {
  readonly label: string;
  readonly value: string;
  readonly unit: string;
}

/** The figures that decide, few enough to be seen at a glance. */
export function glances({ result, flowsheet, words }: PageView): Glance[] {
  const leaves = figureLeaves(result.figures);
  const units = figureUnits(flowsheet);
  return [...leaves].flatMap(([name, value]) => {
    const label = glanceLabel(name, result.figures.overall_yield?.reactant ?? '');
    if (label === null) return [];
    if (isOfPower(name) && isWithoutPower(result.figures)) return [{ label, value: 'none', unit: '' }];
    const display = figureDisplay(name, units);
    const shown = name === 'recycle_ratio' ? significant(value, 4) : shownValue(value, display);
    return [{ label, value: words(shown), unit: display.unit }];
  });
}

function glanceLabel(name: string, reactant: string): string | null {
  const perPass = /^per_pass_conversion\.([^.]+)\.(.+)$/.exec(name);
  if (perPass !== null) return perPass[2] === reactant ? `${reactant}, one pass of ${perPass[1]}` : null;
  const inerts = /^inerts\.(.+)$/.exec(name);
  if (inerts !== null) return `inerts into ${inerts[1]}`;
  return figureLabels[name] ?? null;
}

const figureLabels: Readonly<Record<string, string>> = {
  recycle_ratio: 'recycle per fresh feed',
  overall_yield: 'yield',
  production_t_d: 'production',
  'power_kW.total': 'power in all',
  specific_power_kWh_t: 'specific power',
  'purge.fraction_of_makeup': 'purge per fresh feed',
};

/** A key figure in plain words, for a chart. */
export function figureLabel(formula: string): string {
  const name = formula.replace(/^figures\./, '').replace(/^overall_yield\.value$/, 'overall_yield');
  const inerts = /^inerts\.(.+)$/.exec(name);
  if (inerts !== null) return `inerts into ${inerts[1]}`;
  return figureLabels[name] ?? name.replace(/^user\./, '').replaceAll('_', ' ');
}
