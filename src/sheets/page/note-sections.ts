import { natural } from '../../study/compare.ts';
import { type SettingValue, settingList } from '../../study/setting-list.ts';
import { planFlowsheet } from '../../tally/plan.ts';
import { caution, dangersOf } from '../cautions.ts';
import { settingDisplay, shownValue } from '../figure-display.ts';
import { closureText, significant } from '../numbers.ts';
import { unlistedPasses } from '../trace.ts';
import { type Html, html, nameText, userText } from './html.ts';
import { bulletList, headCell, numberCell, table, textCell, unitCell } from './tables.ts';
import type { PageView } from './view.ts';

/** What decides the result, by path; what was moved since the file is marked. */
export function settingsSection({ result, flowsheet, asInFile, words }: PageView): Html {
  const movedBy = new Map(Object.entries(result.aims).map(([name, aim]) => [aim.setting, { name, aim }]));
  const before = settingList(asInFile);
  const rows = [...settingList(flowsheet)].map(([path, value]) => {
    const was = before.get(path);
    const aim = movedBy.get(path);
    if (aim !== undefined) {
      const display = settingDisplay(path, aim.aim.unit);
      const shown = numberCell(shownValue(aim.aim.value, display), words);
      return [headCell(path), shown, unitCell(display.unit), textCell(`moved by the aim ${aim.name}`)];
    }
    const { text, unit, isNumber } = settingText(value);
    const old = was === undefined ? null : settingText(was);
    const isMoved = old !== null && old.text !== text;
    const remark = isMoved ? `moved; in the file ${words(old.text)} ${old.unit}`.trimEnd() : '';
    const cell = isNumber ? numberCell(text, words) : { ...textCell(nameText(text)), mark: 'r prose' };
    return [headCell(path), cell, unitCell(unit), textCell(isMoved ? html`<mark>${remark}</mark>` : remark)];
  });
  return table({
    caption: 'Settings by their paths',
    heads: [{ text: 'setting' }, { text: 'value', right: true }, { text: 'unit' }, { text: 'remark' }],
    rows,
    mark: 'long',
  });
}

function settingText(value: SettingValue): { text: string; unit: string; isNumber: boolean } {
  if (value.kind === 'text') return { text: value.text, unit: '', isNumber: false };
  const { setting } = value;
  const isTemperature = setting.dimension === 'temperature';
  const number = isTemperature ? setting.value - 273.15 : natural(setting);
  // Without the last digits that the way through SI has cost.
  const text = String(Number(number.toPrecision(10)));
  return { text, unit: isTemperature ? 'degC' : setting.unit === '1' ? '' : setting.unit, isNumber: true };
}

/** Warnings of blocks and balances. */
export function warningsSection({ result, words }: PageView): Html {
  const { warnings } = result;
  if (warnings.length === 0) return html`<p>None.</p>`;
  return bulletList(
    warnings.map(
      ({ where, message, code }) =>
        html`<strong>Warning</strong> ${userText(where)}: ${userText(words(message))} <span class="u">[${code}]</span>`,
    ),
    'warnings',
  );
}

/** The passes of the solver, one a line. */
export function passTable({ result, words }: PageView): Html {
  const { history } = result.convergence;
  if (history.length === 0) return html`<p>Nothing goes round, so nothing had to be closed.</p>`;
  const unlisted = unlistedPasses(history);
  return html`${unlisted === '' ? null : html`<p class="note">${unlisted}</p>`}${table({
    caption: 'Passes of the solver',
    heads: [
      { text: 'pass', right: true },
      { text: 'residual', right: true },
      { text: 'method' },
      { text: 'worst' },
      { text: 'note' },
    ],
    rows: history.map(({ pass, residual, method, worst, note }) => [
      numberCell(significant(pass, 1 + Math.floor(Math.log10(Math.max(1, pass))))),
      numberCell(closureText(residual), words),
      textCell(method),
      textCell(worst),
      { ...textCell(note), mark: 'prose' },
    ]),
  })}`;
}

export function assumptionsSection({ result }: PageView): Html {
  return bulletList(result.assumptions.map(userText));
}

/** Where the numbers come from: models by block, data by component. */
export function sourcesSection({ flowsheet }: PageView): Html {
  const { components, blocks, shared } = planFlowsheet(flowsheet).sources;
  const rows = [
    ...shared.map((line) => ['all blocks', 'state', line]),
    ...blocks.flatMap(({ name, kind, models }) => models.map((line) => [name, kind, line])),
    ...components.flatMap(({ id, data }) => Object.entries(data).map(([what, source]) => [id, what, source])),
  ];
  return table({
    caption: 'Models and data with their sources',
    heads: ['of', 'what', 'source or model'].map((text) => ({ text })),
    rows: rows.map(([of, what, source]) => [
      headCell(of!),
      textCell(what!),
      { ...textCell(source!), mark: 'prose' },
    ]),
    mark: 'long',
  });
}

export function cautionsSection({ flowsheet, result }: PageView): Html {
  const notes = flowsheet.notes.trim();
  const dangers = dangersOf(result).map((danger) => html`<li>${danger}</li>`);
  return html`${notes === '' ? null : html`<p><span class="u">Notes of the file:</span> ${userText(notes)}</p>`}<div class="caution"><p>${caution}</p><ul>${dangers}</ul></div>`;
}
