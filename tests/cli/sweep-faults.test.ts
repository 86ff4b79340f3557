import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { beforeAll, describe, expect, test } from 'vitest';
import { commandLine } from './looptally.ts';

const { run, folder } = commandLine();
const reference = readFileSync(new URL('../../flowsheets/reference-loop.yaml', import.meta.url), 'utf8');

beforeAll(() => {
  writeFileSync(join(folder(), 'loop.yaml'), reference);
  const study = `
study:
  over: {condenser.temperature: '-20 degC..10 bar:5'}
  record: [figures.recycle_ratio]
`;
  writeFileSync(join(folder(), 'study.yaml'), `${reference}${study}`);
  const note = `
study:
  over: {condenser.temperature: -20 degC..10 degC:5}
  record: [figures.recycle_ratio]
  note: The recycle ends at {last figures.recycle_ration} and {best figures.recycle_ratio}.
`;
  writeFileSync(join(folder(), 'note.yaml'), `${reference}${note}`);
});

const over = (values: string) => ['--over', values];
const T = over('condenser.temperature=-20 degC..10 degC:4');

describe('before the first case it is told in four parts:', () => {
  test.each<[string, string[], string]>([
    ['a setting that is not there', over('condenser.temprature=-25 degC..10 degC:8'), ``],
    ['a unit that does not fit', over('condenser.temperature=1 bar..10 bar:8'), ``],
    ['an empty range', over('condenser.temperature=1 degC..1 degC:8'), ``],
    ['a range without its number', over('condenser.temperature=1 degC..5 degC'), ``],
    ['equal ratios from zero', over('purge.fractions.bleed=0 %..5 %:4 log'), ``],
    ['a value out of its bounds', over('purge.fractions.bleed=50 %..150 %:3'), ``],
    ['a setting that is no number', over('gas=srk'), ``],
    [
      'a grid of millions',
      [
        ...over('condenser.temperature=-20 degC..10 degC:2000'),
        ...over('purge.fractions.bleed=1 %..9 %:1000'),
      ],
      ``,
    ],
    [
      'a grid of a thousand settings',
      Array.from({ length: 1000 }, (_, k) => over(`b${k}.temperature=1 K,2 K`)).flat(),
      ``,
    ],
    ['a setting twice', [...T, ...T], ``],
    ['a figure that is not there', [...T, '--record', 'figures.recycle_ration'], ``],
    [
      'a detail that is not there',
      [...T, '--record', 'figures.recycle_ratio,blocks.condenser.condensed'],
      ``,
    ],
    ['a folder that is not there', [...T, '--out', 'nowhere/t.csv'], ``],
    ['a name without an ending', [...T, '--out', 'table'], ``],
    ['more slices than paths', [...T, '--out', 't.csv', '--part', '2/3'], ``],
    ['nothing to go over', [], ``],
    [
      'a disk too small',
      [
        ...over('condenser.temperature=-20 degC..10 degC:1000000'),
        ...over('purge.fractions.bleed=1 %..9 %:1000000'),
        '--yes',
        '--out',
        't.csv',
      ],
      ``,
    ],
  ])('%s', (_, words, message) => {
    const { code, out, err } = run(['sweep', 'loop.yaml', ...words]);
    expect({ code, out }).toEqual({ code: 2, out: '' });
    expect(told(err)).toBe(message);
  });

  test('what is wrong with the study of a file, at its place', () => {
    expect(told(run(['sweep', 'study.yaml']).err)).toMatchInlineSnapshot(`
      "study.yaml:54:34 error wrong-unit
        10 bar is no temperature.
        why:  "bar" is a unit of pressure, and a temperature is needed here
        mend: write it in degC, K, degF

      1 error
      "
    `);
    expect(told(run(['sweep', 'note.yaml']).err)).toMatchInlineSnapshot(`
      "note.yaml:56:29 error bad-note
        study: figures.recycle_ration is no column of its table.
        why:  the nearest column is figures.recycle_ratio
        mend: write figures.recycle_ratio

      note.yaml:56:63 error bad-note
        study: {best figures.recycle_ratio} is no blank.
        why:  a blank says which number of a column it stands for: first, last, least, most or ratio
        mend: write {last COLUMN}, {most COLUMN; %} or {COLUMN at most COLUMN}

      2 errors
      "
    `);
  });

  test('with --json as diagnostics', () => {
    const { code, out } = run(['sweep', 'loop.yaml', ...over('condenser.temperature=1 bar'), '--json']);
    expect(code).toBe(2);
    expect(JSON.parse(out).diagnostics[0]).toMatchObject({ code: 'wrong-unit', file: 'command line' });
  });
});

/** The message without the line that it quotes, which is long, and without sizes of the disk at hand. */
function told(message: string): string {
  return message
    .replace(/^.*\|.*\n/gm, '')
    .replace(/^(command line):\d+:\d+/gm, '$1')
    .replace(/[\d.e+]+ MB are free/, '... MB are free');
}
