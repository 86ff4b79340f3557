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
    [
      'a setting that is not there',
      over('condenser.temprature=-25 degC..10 degC:8'),
      `command line error unknown-key
  condenser has an unknown key temprature.
  why:  the nearest known key is temperature
  mend: write condenser.temperature

1 error
`,
    ],
    [
      'a unit that does not fit',
      over('condenser.temperature=1 bar..10 bar:8'),
      `command line error wrong-unit
  condenser.temperature: 1 bar is no temperature.
  why:  "bar" is a unit of pressure, and a temperature is needed here
  mend: write it in degC, K, degF

1 error
`,
    ],
    [
      'an empty range',
      over('condenser.temperature=1 degC..1 degC:8'),
      `command line error bad-range
  The range is empty.
  why:  both ends are 1 degC
  mend: write two different ends, or the one value alone

1 error
`,
    ],
    [
      'a range without its number',
      over('condenser.temperature=1 degC..5 degC'),
      `command line error bad-range
  1 degC..5 degC does not say how many values it has.
  why:  behind a range stands a colon and the number of values, both ends among them
  mend: write 1 degC..5 degC:8

1 error
`,
    ],
    [
      'equal ratios from zero',
      over('purge.fractions.bleed=0 %..5 %:4 log'),
      `command line error bad-range
  0 %..5 % cannot have equal ratios.
  why:  log needs both ends above zero
  mend: take log out, or begin above zero

1 error
`,
    ],
    [
      'a value out of its bounds',
      over('purge.fractions.bleed=50 %..150 %:3'),
      `command line error out-of-range
  purge.fractions.bleed: the value 150 % is out of range.
  why:  a fraction here must be at most 100 %
  mend: write a value of at most 100 %

1 error
`,
    ],
    [
      'a setting that is no number',
      over('gas=srk'),
      `command line error unknown-setting
  gas cannot be swept.
  why:  a sweep moves settings of blocks and feeds that are one number
  mend: write a path such as condenser.temperature

1 error
`,
    ],
    [
      'a grid of millions',
      [
        ...over('condenser.temperature=-20 degC..10 degC:2000'),
        ...over('purge.fractions.bleed=1 %..9 %:1000'),
      ],
      `command line error grid-too-large
  The grid has 2000000 points.
  why:  2000 x 1000 points are more than a million, which is seldom meant
  mend: take fewer values, or add --yes if it is meant

1 error
`,
    ],
    [
      'a grid of a thousand settings',
      Array.from({ length: 1000 }, (_, k) => over(`b${k}.temperature=1 K,2 K`)).flat(),
      `command line error grid-too-large
  A grid over 1000 settings is too large.
  why:  with two values of each it has more points than can ever be calculated; at most 30 settings are taken
  mend: sweep a few settings at a time; looptally levers tells which ones matter

1 error
`,
    ],
    [
      'a setting twice',
      [...T, ...T],
      `command line error duplicate-name
  condenser.temperature is swept twice.
  why:  a setting has one value in a case
  mend: write all its values behind one =

1 error
`,
    ],
    [
      'a figure that is not there',
      [...T, '--record', 'figures.recycle_ration'],
      `command line error unknown-figure
  figures.recycle_ration is not known.
  why:  figures has no recycle_ration; the nearest is recycle_ratio
  mend: write figures.recycle_ratio

1 error
`,
    ],
    [
      'a detail that is not there',
      [...T, '--record', 'figures.recycle_ratio,blocks.condenser.condensed'],
      `command line error unknown-figure
  blocks.condenser.condensed is not known.
  why:  the nearest is condensed_kmol_h
  mend: write blocks.condenser.condensed_kmol_h

1 error
`,
    ],
    [
      'a folder that is not there',
      [...T, '--out', 'nowhere/t.csv'],
      `command line error bad-output
  nowhere/t.csv cannot be written.
  why:  there is no folder nowhere
  mend: make the folder first, or name another one

1 error
`,
    ],
    [
      'a name without an ending',
      [...T, '--out', 'table'],
      `command line error bad-output
  table has no ending that tells what to write.
  why:  a table is written as .csv, .ndjson, .parquet, a page as .html
  mend: write e.g. --out table.csv

1 error
`,
    ],
    [
      'more slices than paths',
      [...T, '--out', 't.csv', '--part', '2/3'],
      `command line error bad-part
  A grid of 4 points has no 3 slices.
  why:  8 points after one another start from their neighbours and stay together
  mend: leave --part out

1 error
`,
    ],
    [
      'nothing to go over',
      [],
      `command line error missing-option
  looptally sweep needs the settings to go over.
  why:  neither --over nor a study in the file names one
  mend: write e.g. --over 'condenser.temperature=-25 degC..10 degC:8'

1 error
`,
    ],
    [
      'a disk too small',
      [
        ...over('condenser.temperature=-20 degC..10 degC:2000'),
        ...over('purge.fractions.bleed=1 %..9 %:2000'),
        ...over('makeup.flow=6000 kmol/h..7000 kmol/h:2000'),
        '--yes',
        '--out',
        't.csv',
      ],
      `command line error cannot-write
  There is no room for t.csv.
  why:  a table of 8000000000 rows takes about 1.73e+6 MB, and ... MB are free
  mend: make room, record fewer expressions, or write it elsewhere

1 error
`,
    ],
  ])('%s', (_, words, message) => {
    const { code, out, err } = run(['sweep', 'loop.yaml', ...words]);
    expect({ code, out }).toEqual({ code: 2, out: '' });
    expect(told(err)).toBe(message);
  });

  test('what is wrong with the study of a file, at its place', () => {
    expect(told(run(['sweep', 'study.yaml']).err)).toMatchInlineSnapshot(`
      "study.yaml:60:34 error wrong-unit
        10 bar is no temperature.
        why:  "bar" is a unit of pressure, and a temperature is needed here
        mend: write it in degC, K, degF

      1 error
      "
    `);
    expect(told(run(['sweep', 'note.yaml']).err)).toMatchInlineSnapshot(`
      "note.yaml:62:29 error bad-note
        study: figures.recycle_ration is no column of its table.
        why:  the nearest column is figures.recycle_ratio
        mend: write figures.recycle_ratio

      note.yaml:62:63 error bad-note
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
