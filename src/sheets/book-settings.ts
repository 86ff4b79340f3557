import type { Flowsheet } from '../model/flowsheet.ts';
import type { AimResult, Result } from '../model/result.ts';
import { natural } from '../study/compare.ts';
import { type SettingValue, settingList } from '../study/setting-list.ts';
import { settingDisplay } from './figure-display.ts';
import { plainText } from './plain.ts';
import { heightOf } from './xlsx-head.ts';
import { heads, looks, number, ownFormat, text, unitHeads } from './xlsx-looks.ts';
import { type Cell, type Page, put } from './xlsx-model.ts';

/** What decides the result, by path: value, unit, and which aim has moved it; then the aims. */
export function fillSettings(page: Page, result: Result, flowsheet: Flowsheet): void {
  put(page, [...heads(['setting'], 1), ...heads(['value'], 0), ...unitHeads(['unit', 'remark'])]);
  const movedBy = new Map(Object.entries(result.aims).map(([name, aim]) => [aim.setting, { name, aim }]));
  for (const [path, value] of settingList(flowsheet)) {
    const moved = movedBy.get(path);
    const row = put(page, [
      text(path),
      ...(moved === undefined ? given(value) : found(path, moved.aim)),
      text(moved === undefined ? '' : `moved by the aim ${plainText(moved.name)}`, looks.unit),
    ]);
    if (value.kind === 'text') page.heights.set(row, heightOf(value.text, page.widths[1]!));
  }
  if (Object.keys(result.aims).length === 0) return;
  put(page, []);
  put(page, [...heads(['aim'], 1), ...heads(['achieved', 'wanted'], 0), ...unitHeads(['outcome'])]);
  for (const [name, { reached, achieved, target, until, note }] of Object.entries(result.aims)) {
    put(page, [
      text(name),
      number(achieved, ownFormat(achieved)),
      number(target, ownFormat(target)),
      text(
        `${reached ? 'reached' : 'NOT REACHED'}: ${until}${note === null ? '' : `; ${note}`}`,
        reached ? looks.unit : { ...looks.unit, bold: true, colour: looks.alarm.colour },
      ),
    ]);
  }
}

function given(value: SettingValue): [Cell, Cell] {
  if (value.kind === 'text') return [text(value.text, looks.rightProse), null];
  const { setting } = value;
  // The natural unit of a temperature is that of its steps; as a value it is read in degC.
  if (setting.dimension === 'temperature')
    return [number(tidy(setting.value - 273.15), looks.right), text('degC', looks.unit)];
  return [
    number(tidy(natural(setting)), looks.right),
    text(setting.unit === '1' ? '' : setting.unit, looks.unit),
  ];
}

function found(path: string, { value, unit }: AimResult): [Cell, Cell] {
  const display = settingDisplay(path, unit);
  return [
    number(value * display.factor + display.offset, ownFormat(value * display.factor + display.offset)),
    text(display.unit, looks.unit),
  ];
}

/** The number as it was written, without the last digits that its way through SI has cost. */
function tidy(value: number): number {
  return Number(value.toPrecision(12));
}
