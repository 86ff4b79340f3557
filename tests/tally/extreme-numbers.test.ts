import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { readFlowsheet } from '../../src/flowsheet/read.ts';
import type { Result } from '../../src/model/result.ts';
import { csvTables } from '../../src/sheets/csv.ts';
import { renderers } from '../../src/sheets/renderers.ts';
import { textSheet } from '../../src/sheets/text.ts';
import { balance } from '../../src/tally/balance.ts';

const names = ['ammonia-loop', 'methanol-loop', 'dme-direct', 'green-ammonia'];
const texts = new Map(
  names.map((name) => [
    name,
    readFileSync(new URL(`../../flowsheets/${name}.yaml`, import.meta.url), 'utf8'),
  ]),
);

/** Numbers of a result that are none. */
function notFinite(value: unknown, path = 'result'): string[] {
  if (typeof value === 'number') return Number.isFinite(value) ? [] : [`${path} = ${value}`];
  if (value === null || typeof value !== 'object') return [];
  return Object.entries(value).flatMap(([key, part]) => notFinite(part, `${path}.${key}`));
}

function expectNumbers(result: Result): void {
  expect(notFinite(result)).toEqual([]);
  const sheets = [
    textSheet(result),
    ...Object.values(csvTables).map((table) => JSON.stringify(table(result, {}))),
  ];
  for (const sheet of sheets) expect(sheet).not.toMatch(/NaN|Infinity|undefined/);
}

/** Each closes with balances that hold, is refused with its bound, or does not close for a reason that is told. */
type Outcome = 'closes' | 'refused' | 'does not close' | 'either';
const settings: readonly (readonly [string, Outcome])[] = [
  ['flow=1e300 kmol/h', 'refused'],
  ['flow=1e-300 kmol/h', 'refused'],
  ['flow=5e-324 kmol/h', 'refused'],
  ['flow=-1 kmol/h', 'refused'],
  ['flow=1e12 kmol/h', 'closes'],
  ['flow=1e-9 kmol/h', 'closes'],
  ['flow=0 kmol/h', 'closes'],
  ['temperature=1e300 K', 'refused'],
  ['temperature=1e-300 K', 'refused'],
  ['temperature=5 K', 'either'],
  ['temperature=5000 K', 'either'],
  ['pressure=1e300 bar', 'refused'],
  ['pressure=1e-300 bar', 'refused'],
  ['pressure=1e6 bar', 'does not close'],
  ['composition.H2=1e300', 'closes'],
  ['composition.H2=1e-300', 'closes'],
  ['composition.Ar=1e-300', 'closes'],
];

test.each(names.flatMap((name) => settings.map(([setting, outcome]) => ({ name, setting, outcome }))))(
  '$name with its feed at $setting: $outcome',
  async ({ name, setting, outcome }) => {
    const text = texts.get(name)!;
    const { flowsheet: plain } = await readFlowsheet(text, { file: name });
    if (setting.includes('Ar') && !plain!.components.some(({ id }) => id === 'Ar')) return;
    const set = [`${plain!.feeds[0]!.name}.${setting}`];
    const { flowsheet, diagnostics } = await readFlowsheet(text, { file: name, set });
    expect(flowsheet === null).toBe(outcome === 'refused');
    if (flowsheet === null) {
      expect(diagnostics.map(({ code }) => code).join()).toMatch(/^(out-of-range|no-quantity)$/);
      return;
    }
    const { result, diagnosis } = balance(flowsheet, { curves: false });
    if (outcome !== 'either') expect(result.convergence.converged).toBe(outcome === 'closes');
    if (!result.convergence.converged) {
      expect(`${diagnosis?.what} ${diagnosis?.why} ${diagnosis?.mend}`).not.toMatch(/NaN|Infinity|undefined/);
      return;
    }
    expectNumbers(result);
    expect(Math.abs(result.closure.mass)).toBeLessThan(1e-8);
    expect(Math.abs(result.closure.energy)).toBeLessThan(1e-8);
  },
);

test('what is written to files has no NaN in it where nothing is fed', async () => {
  const { flowsheet } = await readFlowsheet(texts.get('ammonia-loop')!, {
    file: 'ammonia-loop.yaml',
    set: ['makeup.flow=0 kmol/h'],
  });
  const { result } = balance(flowsheet!);
  expect(result.figures.recycle_ratio).toBeNull();
  expect(result.figures.purge).toBeNull();
  for (const ending of ['.md', '.csv']) {
    const content = await renderers.get(ending)!.render(result, { flowsheet: flowsheet!, version: '0' });
    expect(String(content)).not.toMatch(/NaN|Infinity/);
  }
  // A workbook refuses to be written with a number that its formula does not give.
  const workbook = await renderers.get('.xlsx')!.render(result, { flowsheet: flowsheet!, version: '0' });
  expect(workbook.length).toBeGreaterThan(1000);
});
